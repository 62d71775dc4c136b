import { withEvidenceMarks } from '../recording/evidence/evidence-marks';
import type { FigureValue } from '../recording/figure';
import { FIGURES, type FigureDefinition } from '../recording/figure-catalogue';
import type { FigureChange, PhaseFindings } from '../recording/findings';
import { leadKey } from '../recording/lead';
import { type RangesFor, rangesOf, type SiteRange } from '../recording/site-reference';
import { evidenceJson } from './evidence/evidence-json';
import type { ExportInput } from './export-input';
import { roundedTo } from './write-number';

const CAUTIONS = [
  'Surface recordings show electrical rhythm, not contraction. No finding is a diagnosis.',
  'Figures depend on the settings given here.',
  'A heartbeat trace can itself identify a person.',
];

/**
 * findings.json: every figure by phase with its unit, what it stands on, coverage, settings, program and the study's SHA-256.
 * Keys are stable; figures are in the order of the catalogue, rounded to its decimals. A figure is a number (`value`), a count
 * (`count`, `of`, `what`) or withheld (`withheld`: the reason); the site's ranges that fit a number stand in its
 * `references_of_this_site`. Throws Error where a key is not in the catalogue.
 */
export function findingsJson(input: Omit<ExportInput, 'stomach' | 'heart'>): string {
  const { state, evidence } = input;
  const findings = withEvidenceMarks(input.findings, evidence);
  const { study, roles } = state;
  const ranges = rangesOf(input.siteReference, state.protocol);
  const document = {
    format: 'bicadence-findings',
    version: 1,
    program: input.program,
    sha256: input.sha256,
    edit: input.edit,
    cautions: CAUTIONS,
    study: {
      code: study.code,
      start: study.start,
      duration_s: seconds(input.recording.durationS),
      invented: study.invented,
    },
    roles: {
      slow: roles.slow.map(leadKey),
      reported: roles.slow[roles.reported] ? leadKey(roles.slow[roles.reported]) : null,
      heart: roles.heart && leadKey(roles.heart),
      breath: roles.breath && leadKey(roles.breath),
    },
    settings: inSnakeCase(state.settings),
    phases: findings.phases.map((part) => phasePart(part, ranges)),
    changes: findings.changes.map(changePart),
    seen_in_passing: findings.seen.map((one) => ({
      from_s: seconds(one.fromS),
      to_s: seconds(one.toS),
      text: one.text,
    })),
    warnings: findings.warnings.map(({ about, text }) => ({ about, text })),
    evidence: evidenceJson(evidence),
  };
  return `${JSON.stringify(document, null, 2)}\n`;
}

const seconds = (value: number) => roundedTo(value, 6);

function phasePart(part: PhaseFindings, ranges: RangesFor) {
  const lengthS = part.toS - part.fromS;
  const coverage = (keptS: number) => (lengthS > 0 ? roundedTo(keptS / lengthS, 4) : null);
  wantKnown(Object.keys(part.figures));
  const given = FIGURES.filter(({ key }) => Object.hasOwn(part.figures, key));
  return {
    name: part.name,
    phase: part.phase,
    from_s: seconds(part.fromS),
    to_s: seconds(part.toS),
    kept_stomach_s: seconds(part.keptStomachS),
    kept_heart_s: seconds(part.keptHeartS),
    coverage_stomach: coverage(part.keptStomachS),
    coverage_heart: coverage(part.keptHeartS),
    adequacy_stomach: part.adequacyStomach,
    adequacy_heart: part.adequacyHeart,
    figures: Object.fromEntries(
      given.map((figure) => [
        figure.key,
        {
          ...figurePart(figure, part.figures[figure.key]),
          ...rangePart(ranges(figure.key, part)),
        },
      ]),
    ),
  };
}

function changePart({ key, from, to, value }: FigureChange) {
  wantKnown([key]);
  const [figure] = FIGURES.filter((one) => one.key === key);
  return { key, from, to, ...figurePart(figure, value) };
}

function figurePart({ unit, decimals }: FigureDefinition, figure: FigureValue) {
  switch (figure.kind) {
    case 'number':
      return {
        unit,
        value: roundedTo(figure.value, decimals),
        basis: figure.basis,
        marks: figure.marks,
      };
    case 'count':
      return { count: figure.count, of: figure.of, what: figure.what, marks: figure.marks };
    case 'withheld':
      return { unit, withheld: figure.reason };
  }
}

/** The site's ranges beside a figure, as its file has them; nothing where none fits. */
function rangePart(ranges: readonly SiteRange[]) {
  return ranges.length === 0
    ? {}
    : { references_of_this_site: ranges.map(({ figure: _, ...range }) => inSnakeCase(range)) };
}

function wantKnown(keys: readonly string[]): void {
  const strange = keys.find((key) => !FIGURES.some((figure) => figure.key === key));
  if (strange !== undefined) throw new Error(`figure ${strange} is not in the catalogue`);
}

/** Plain data with its keys in snake_case ("slowBandCpm": "slow_band_cpm"), sorted: their order in memory says nothing. */
function inSnakeCase(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(inSnakeCase);
  if (typeof value !== 'object' || value === null) return value;
  const named = Object.entries(value).map(([key, part]): [string, unknown] => [
    key.replaceAll(/[A-Z]/g, (letter) => `_${letter.toLowerCase()}`),
    inSnakeCase(part),
  ]);
  return Object.fromEntries(named.sort(([a], [b]) => (a < b ? -1 : 1)));
}
