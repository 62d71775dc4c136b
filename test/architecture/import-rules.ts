/**
 * Who may import whom: one row a part of the tree. A part is a folder of src or one file (or kind
 * of file) of workers; everything not listed is forbidden. Within a part imports are free.
 */
export interface ImportRule {
  /** Paths that start so belong to the part; the first row that fits counts. */
  readonly part: string;
  /** Parts whose code may be imported, as starts of paths. */
  readonly uses: readonly string[];
  /** Parts of which only types may be imported. */
  readonly types?: readonly string[];
  /** Packages; `name/*` stands for all of a scope. */
  readonly packages?: readonly string[];
}

const BOTTOM = ['src/units/', 'src/numeric/', 'src/recording/'];
const STEPS = [
  'src/decode/',
  'src/separate/',
  'src/stomach/',
  'src/heart/',
  'src/trust/',
  'src/simulate/',
];
const CONTRACT = ['workers/analysis-api'];
/** The page's side of the workers: calls and answers, no analysis. */
const CLIENTS = ['workers/analysis-client', 'workers/hash-client', 'workers/start-worker'];
const REACT = ['react', 'react-dom', 'react-dom/*', 'zustand', 'zustand/*'];

export const IMPORT_RULES: readonly ImportRule[] = [
  { part: 'src/units/', uses: [] },
  { part: 'src/numeric/', uses: ['src/units/'], packages: ['fft.js', '@stdlib/*'] },
  { part: 'src/recording/', uses: ['src/units/', 'src/numeric/'] },
  { part: 'src/decode/', uses: BOTTOM, packages: ['hash-wasm'] },
  ...STEPS.slice(1).map((part) => ({ part, uses: BOTTOM })),
  {
    part: 'src/session/',
    uses: BOTTOM,
    types: CONTRACT,
    packages: ['valibot', 'zustand/vanilla'],
  },
  { part: 'src/export/', uses: [...BOTTOM, 'src/session/'], types: CONTRACT },
  {
    part: 'src/review/',
    uses: [...BOTTOM, 'src/session/', ...CLIENTS],
    types: CONTRACT,
    packages: [...REACT, 'uplot', 'uplot/*'],
  },
  {
    part: 'src/report/',
    uses: [...BOTTOM, 'src/session/', 'src/export/', 'src/review/idle'],
    types: [...CONTRACT, 'src/review/analysis-store', 'src/review/view-store'],
    packages: REACT,
  },
  {
    part: 'src/app/',
    uses: [...BOTTOM, 'src/session/', 'src/export/', 'src/review/', 'src/report/', ...CLIENTS],
    types: CONTRACT,
    packages: REACT,
  },
  {
    part: 'src/main.tsx',
    uses: [
      'src/app/',
      'src/report/',
      'src/review/',
      'src/session/',
      'src/units/',
      'workers/analysis.worker?worker&url',
      'workers/hash.worker?worker&url',
    ],
    packages: REACT,
  },
  { part: 'workers/analysis-api', uses: [], types: [...BOTTOM, 'src/session/'] },
  {
    part: 'workers/pipeline',
    uses: [...BOTTOM, ...STEPS, 'workers/'],
    types: ['src/session/'],
  },
  { part: 'workers/demo-study', uses: [...BOTTOM, 'src/simulate/', 'src/export/'] },
  {
    part: 'workers/',
    uses: [...BOTTOM, 'src/session/', 'src/export/', 'src/report/', 'workers/'],
    packages: ['comlink', 'hash-wasm', 'node:*'],
  },
];
