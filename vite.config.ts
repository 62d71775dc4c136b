import { existsSync, readdirSync, readFileSync } from 'node:fs';
import react from '@vitejs/plugin-react';
import { defineConfig } from 'vitest/config';

/** The page's policy: no request but for its own static files, in the worker too (it is started from a blob that inherits this). */
const POLICY = [
  "default-src 'none'",
  "script-src 'self' 'wasm-unsafe-eval'",
  "worker-src 'self' blob:",
  "style-src 'self'",
  "img-src 'self' data: blob:",
  "connect-src 'none'",
  "manifest-src 'self'",
  "base-uri 'none'",
  "form-action 'none'",
].join('; ');

const contentSecurityPolicy = {
  name: 'content-security-policy',
  apply: 'build' as const,
  transformIndexHtml: () => [
    {
      tag: 'meta',
      attrs: { 'http-equiv': 'Content-Security-Policy', content: POLICY },
      injectTo: 'head-prepend' as const,
    },
  ],
};

/**
 * What @stdlib's arithmetic brings along for engines before 2015, in one line each: typed arrays made by hand, and properties
 * set with messages for every misuse. A third of the worker was made of them.
 */
const NATIVE: Readonly<Record<string, string>> = {
  '@stdlib/array-float64': 'Float64Array',
  '@stdlib/array-uint32': 'Uint32Array',
  '@stdlib/array-uint16': 'Uint16Array',
  '@stdlib/array-uint8': 'Uint8Array',
  '@stdlib/utils-define-nonenumerable-read-only-property':
    '(object, name, value) => Object.defineProperty(object, name, { value })',
};
const NATIVE_ID = '\0native:';
const nativeArrays = {
  name: 'native-arrays',
  enforce: 'pre' as const,
  resolveId: (id: string) => (Object.hasOwn(NATIVE, id) ? NATIVE_ID + id : null),
  load: (id: string) =>
    id.startsWith(NATIVE_ID) ? `module.exports = ${NATIVE[id.slice(NATIVE_ID.length)]};` : null,
};

/** Licence texts of every package that the page ships, as one file beside it; the bundles carry no comments. */
const licences = {
  name: 'licences',
  apply: 'build' as const,
  generateBundle(this: {
    emitFile(file: { type: 'asset'; fileName: string; source: string }): void;
  }) {
    const { packages } = JSON.parse(readFileSync('package-lock.json', 'utf8')) as {
      packages: Record<string, { version?: string; license?: string; dev?: boolean }>;
    };
    const namesByText = new Map<string, string[]>();
    for (const [path, { version, license, dev }] of Object.entries(packages)) {
      if (!path.startsWith('node_modules/') || dev || !existsSync(path)) continue;
      const file = readdirSync(path).find((name) => /^licen[cs]e/i.test(name));
      const text = file ? readFileSync(`${path}/${file}`, 'utf8').trim() : '';
      const name = `${path.replace('node_modules/', '')} ${version} (${license})`;
      namesByText.set(text, [...(namesByText.get(text) ?? []), name]);
    }
    const parts = [...namesByText].map(([text, names]) => `${names.join('\n')}\n\n${text}\n`);
    this.emitFile({ type: 'asset', fileName: 'licences.txt', source: parts.join('\n----\n\n') });
  },
};

export default defineConfig(({ mode }) => {
  const node = mode === 'node';
  return {
    base: './',
    appType: 'mpa',
    publicDir: node ? false : 'public',
    plugins: node ? [nativeArrays] : [nativeArrays, react(), contentSecurityPolicy, licences],
    worker: {
      format: 'es',
      plugins: () => [nativeArrays],
      rolldownOptions: { output: { comments: { legal: false } } },
    },
    build: node
      ? {
          ssr: true,
          outDir: 'workers/dist',
          target: 'node20',
          minify: false,
          rollupOptions: {
            input: {
              analyse: 'workers/analyse.ts',
              serve: 'workers/serve.ts',
              bench: 'test/bench/bench.ts',
            },
            output: { entryFileNames: '[name].mjs', chunkFileNames: 'chunks/[name].mjs' },
          },
        }
      : {
          outDir: 'dist',
          target: 'es2022',
          assetsInlineLimit: 0,
          modulePreload: { polyfill: false },
          chunkSizeWarningLimit: 600,
          rolldownOptions: {
            output: {
              comments: { legal: false },
              // What the page needs at once in one piece: in many small ones it compresses worse.
              codeSplitting: { groups: [{ name: 'index', tags: ['$initial'] }] },
            },
          },
        },
    test: {
      include: ['test/**/*.test.ts'],
      environment: 'node',
      testTimeout: 60_000,
    },
  };
});
