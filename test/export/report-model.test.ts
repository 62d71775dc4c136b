import { describe, expect, it } from 'vitest';
import { reportModel } from '../../src/export/report-model';
import type { Findings, PhaseFindings } from '../../src/recording/findings';
import { leadKey } from '../../src/recording/lead';
import type { Recording } from '../../src/recording/recording';
import type { Span } from '../../src/recording/span';
import type { Session, SessionState, Signature } from '../../src/session/document';
import { appendEdit, beginSession } from '../../src/session/log';
import { signature } from '../session/invented-session';
import { inventedInput } from './invented-input';

const input = inventedInput();

const phase = (name: string, keptS: number, lengthS: number): PhaseFindings => ({
  ...input.findings.phases[0],
  name,
  phase: name,
  fromS: 0,
  toS: lengthS,
  keptStomachS: keptS,
  keptHeartS: keptS,
  adequacyStomach: 'enough',
  adequacyHeart: 'enough',
});

interface Given {
  readonly state?: Partial<SessionState>;
  readonly recording?: Partial<Recording>;
  readonly findings?: Partial<Findings>;
  readonly session?: (session: Session) => Session;
  readonly hidden?: boolean;
  readonly openDoubts?: number | null;
}

function model({
  state,
  recording,
  findings,
  session,
  hidden = false,
  openDoubts = 0,
}: Given = {}) {
  const begun = beginSession({ ...input.state, ...state });
  return reportModel({
    recording: { ...input.recording, ...recording },
    session: session ? session(begun) : begun,
    findings: { ...input.findings, ...findings },
    program: 'Bicadence 0.1.0',
    identityHidden: hidden,
    openDoubts,
    evidence: {},
    siteReference: null,
    age: null,
  });
}

const sign =
  (one: Signature) =>
  (session: Session): Session =>
    appendEdit(
      session,
      { name: 'sign', changes: [{ kind: 'sign', signature: one }] },
      'R. Reader',
      '2026-03-01T10:00:00Z',
    );

const factOf = (facts: readonly { name: string; words: string }[], name: string) =>
  facts.find((fact) => fact.name === name)?.words;

describe('doubts', () => {
  const doubts = [
    { id: 'early-beat-1', ending: 'kept', tick: 1 },
    { id: 'extra-beat-2', ending: 'mended', tick: 2 },
    { id: 'extra-beat-3', ending: 'mended', tick: 3 },
  ] as const;

  it('are counted as they were left, and open ones are said before the figures', () => {
    const { making, warnings } = model({ state: { doubts }, openDoubts: 4 });
    expect(factOf(making, 'Doubts')).toBe('4 open, 1 kept as they were, 2 mended');
    expect(warnings).toContain(
      '4 doubts are open: beats, spans and epochs in doubt count as they stand.',
    );
    expect(model({ openDoubts: 1 }).warnings.join()).toContain('One doubt is open');
  });

  it('are said not to have been looked for while they have not, and nothing where none is open', () => {
    expect(factOf(model({ openDoubts: null }).making, 'Doubts')).toMatch(/^not looked for yet/);
    expect(model({ openDoubts: 0 }).warnings.join()).not.toContain('doubt');
  });
});

describe('who the report is of', () => {
  it('is said with code, name and birth year, and that invented data is invented', () => {
    const { identity, foot } = model();
    expect(identity.map(({ name }) => name)).toEqual(['Code', 'Name', 'Born', 'Recorded', 'Data']);
    expect(foot).toBe('INV-7 · invented data · DRAFT of edit 0: not signed');
  });

  it('is on no line of a report whose identity is hidden', () => {
    const secrets = {
      code: 'KX-4471',
      name: 'Kowalska Anna',
      local: '2024-05-14T09:00:00',
      sha256: 'ab'.repeat(32),
    };
    const study = { ...input.state.study, ...secrets, start: secrets.local };
    const words = 'Anna KOWALSKA (kx-4471), seen 14.05.2024, file Kowalska Anna 2024.edf';
    const hidden = model({
      hidden: true,
      recording: {
        identity: { ...input.recording.identity, code: secrets.code, name: secrets.name },
        start: { kind: 'known', local: secrets.local },
        fileName: 'Kowalska Anna 2024.edf',
        found: [{ severity: 'warning', what: `${secrets.code} is odd`, place: null }],
      },
      state: {
        study,
        notes: words,
        conclusion: words,
        leadChoice: words,
        events: [{ id: 1, atS: 3, text: words }],
        symptoms: [{ id: 1, atS: 3, text: words, score: 4 }],
        protocol: { ...input.state.protocol, medicines: words },
      },
      session: sign({ ...signature(0), sha256: secrets.sha256, notes: words, conclusion: words }),
    });
    const printed = JSON.stringify(hidden).toLowerCase();
    for (const secret of ['kowalska', 'anna', 'kx-4471', '1980', '05-14', '14.05', '.edf', 'abab'])
      expect(printed).not.toContain(secret);
    expect(factOf(hidden.identity, 'Identity')).toBe('identity hidden');
    expect(hidden.foot).toContain('identity hidden');
  });

  it('hides whole words only: a short name leaves other words alone', () => {
    const { conclusion } = model({
      hidden: true,
      recording: { identity: { ...input.recording.identity, name: 'Ann Lee' } },
      state: { conclusion: 'Ann: annular, leeway, slee. (Lee)' },
    });
    expect(conclusion).toBe('[hidden]: annular, leeway, slee. ([hidden])');
  });
});

describe('events and symptoms', () => {
  it('are printed in the order of time, each with its phase, symptoms with their score', () => {
    const { events } = model({
      state: {
        phases: [
          { name: 'fasting', fromS: 0, toS: 1800 },
          { name: 'fed', fromS: 2400, toS: 5400 },
        ],
        events: [
          { id: 2, atS: 1800, text: 'drank 200 ml' },
          { id: 1, atS: 5400, text: 'sat up' },
        ],
        symptoms: [{ id: 1, atS: 1799.5, text: 'nausea', score: 6 }],
      },
    });
    expect(events).toEqual([
      { time: '0:29:59.5', phase: 'fasting', what: 'nausea', score: '6 of 10' },
      { time: '0:30:00', phase: '–', what: 'drank 200 ml', score: '' },
      { time: '1:30:00', phase: 'fed', what: 'sat up', score: '' },
    ]);
  });
});

describe('what the figures stand on', () => {
  it('is a line a phase; a meal, whose figures the report does not print, has no verdict', () => {
    const { rows, notes } = model({
      findings: {
        phases: [
          phase('fasting', 1764, 1800),
          { ...phase('meal', 30, 600), adequacyHeart: 'not-reportable' },
        ],
      },
    }).adequacy;
    expect(rows[0]).toMatchObject({
      stretch: '0:00:00–0:30:00',
      minutes: '30.0',
      stomach: { minutes: '29.4', percent: '98 %', words: 'enough', letters: [] },
      printed: true,
    });
    expect(rows[1].printed).toBe(false);
    expect(notes).toEqual([]);
  });

  it('says beside limited and not reportable what is missing', () => {
    const { rows, notes } = model({
      findings: {
        phases: [
          { ...phase('fasting', 1100, 1800), adequacyStomach: 'limited' },
          { ...phase('fed', 300, 300), adequacyStomach: 'not-reportable' },
        ],
      },
    }).adequacy;
    expect(rows.map(({ stomach }) => [stomach.words, stomach.letters])).toEqual([
      ['limited', ['a']],
      ['not reportable', ['b']],
    ]);
    expect(notes.map(({ text }) => text)).toEqual([
      'limited: 61 % kept',
      'not reportable: 5.0 min kept are too few',
    ]);
  });

  it('a study without a heart lead has no minutes of the heart', () => {
    const roles = { ...input.state.roles, heart: null };
    const { adequacy, making } = model({ state: { roles } });
    expect(adequacy.rows[0].heart).toBeNull();
    expect([factOf(making, 'Heart lead'), factOf(making, 'Breathing')]).toEqual([
      'none',
      'no lead',
    ]);
  });

  it('warnings of the filters and of the file stand together above the figures', () => {
    const { warnings } = model({
      findings: { warnings: [{ about: 'stomach', text: 'band tilted' }] },
      recording: { found: [{ severity: 'warning', what: 'cut off', place: 'record 90' }] },
    });
    expect(warnings).toEqual(['band tilted', 'cut off (record 90)']);
  });

  it('the protocol prints what is stated and names the rest', () => {
    const { stated, notStated } = model().protocol;
    expect(stated).toEqual([
      { name: 'Meal', words: 'soup' },
      { name: 'Energy', words: '300 kcal' },
    ]);
    expect(notStated).toContain('posture');
    expect(notStated).not.toContain('meal');
  });
});

describe('a signed report', () => {
  const signed = signature(0);
  const newer: Findings = {
    ...signed.findings,
    phases: [{ ...signed.findings.phases[0], figures: {} }],
  };

  it('prints figures, settings and words as they were signed, not as they are now', () => {
    const report = model({ session: sign(signed), findings: newer });
    const rmssd = report.main[0].groups
      .flatMap(({ rows }) => rows)
      .find((row) => row.key === 'rmssd_ms');
    expect(rmssd?.cells[0].words).toBe('42.5');
    expect([report.notes, report.conclusion]).toEqual(['calm', 'regular']);
    expect(report.differences.map(({ key }) => key)).toContain('rmssd_ms');
    expect(report.status).toBe('Final: signed 2026-03-01 10:00 UTC by A. Reader');
  });

  it('becomes a draft of the figures now once anything is edited', () => {
    const report = model({
      session: (begun) =>
        appendEdit(
          sign(signed)(begun),
          { name: 'note', changes: [{ kind: 'field', field: 'notes', before: '', after: 'more' }] },
          'R. Reader',
          '2026-03-02T10:00:00Z',
        ),
      findings: newer,
    });
    expect(report.kind).toBe('draft');
    expect(report.notes).toBe('more');
    expect(report.signatures).toMatchObject([{ name: 'A. Reader', current: false }]);
  });
});

describe('how the figures were made', () => {
  it('says program, hash, leads, log and settings', () => {
    const { making, settings } = model({
      state: { study: { ...input.state.study, sha256: 'ab'.repeat(32) } },
    });
    expect(factOf(making, 'SHA-256')).toBe('ab'.repeat(32));
    expect(factOf(making, 'Reported lead')).toContain('EGG1 − EGG2: least spoiled');
    expect(factOf(making, 'Log')).toBe('empty: nothing was edited');
    expect(factOf(settings, 'Rhythm limits')).toBe('brady 1–2, normo 2–4, tachy 4–9 cpm');
    expect(factOf(settings, 'Epochs')).toContain('240 s every 60 s');
  });

  it('counts the log by reviewer, and does not name reviewers where identity is hidden', () => {
    const session = sign(signature(0));
    expect(factOf(model({ session }).making, 'Log')).toBe('1 line: 1 edit (R. Reader 1)');
    expect(factOf(model({ session, hidden: true }).making, 'Log')).toContain('by 1 reviewer');
  });

  it('counts spoiled spans by cause in minutes, overlaps of one cause once', () => {
    const [first] = input.state.spans;
    const spans = [
      { ...first, id: 1, fromS: 0, toS: 60, cause: 'talk' as const },
      { ...first, id: 2, fromS: 30, toS: 90, cause: 'talk' as const, origin: 'proposed' as const },
    ];
    expect(model({ state: { spans } }).spans).toMatchObject([
      { cause: 'talk', spans: 2, minutes: '1.5', byHand: 1, proposed: 1 },
    ]);
  });

  it('says how many minutes each cause takes from each organ, and all of them together', () => {
    const [first] = input.state.spans;
    const { roles } = input.state;
    const reported = leadKey(roles.slow[roles.reported]);
    const spanOf = (id: number, fromS: number, toS: number, rest: Partial<Span>): Span => ({
      ...first,
      id,
      fromS,
      toS,
      lead: null,
      target: 'both',
      ...rest,
    });
    const spans = [
      spanOf(1, 0, 60, { cause: 'talk' }),
      spanOf(2, 30, 90, { cause: 'move', target: 'heart' }),
      spanOf(3, 90, 120, { cause: 'move', target: 'stomach', lead: reported }),
      spanOf(4, 120, 150, { cause: 'move', target: 'stomach', lead: '#9' }),
    ];
    const rows = model({ state: { spans } }).spans.map(
      ({ cause, minutes, stomachMinutes, heartMinutes }) =>
        [cause, minutes, stomachMinutes, heartMinutes].join(' '),
    );
    expect(rows).toEqual(['move 2.0 0.5 1.0', 'talk 1.0 1.0 1.0', 'all causes 2.5 1.5 1.5']);
  });

  it('counts beats by class and what people did to them', () => {
    const { beats } = input.state;
    const gone = { tick: beats.ticks[0], beatClass: 'N', origin: 'detected' } as const;
    const put = { tick: beats.ticks[0] + 64, beatClass: 'V', origin: 'added' } as const;
    const { making } = model({
      session: (begun) =>
        appendEdit(
          begun,
          { name: 'mend', changes: [{ kind: 'beats', removed: [gone], added: [put] }] },
          'R. Reader',
          '2026-03-02T10:00:00Z',
        ),
    });
    expect(factOf(making, 'Beats')).toBe('7 (N 6, S 0, V 1, F 0, Q 0)');
    expect(factOf(making, 'Beats edited')).toBe('of 7 found by the program: 1 removed; 1 added');
    expect(factOf(model().making, 'Beats edited')).toBe('none');
  });
});
