import { describe, expect, it } from 'vitest';
import { openRecording } from '../../src/decode/formats';
import { bytesOf } from '../../src/export/result-file';
import type { Recording } from '../../src/recording/recording';
import { type ResultInput, resultFiles } from '../../src/report/result-files';
import { ageWords, resultsWithoutIdentity } from '../../src/report/results-without-identity';
import { appendEdit, beginSession } from '../../src/session/log';
import { inventedInput } from '../export/invented-input';
import { signature } from '../session/invented-session';

const plain = inventedInput();
/** An invented person in every place that can hold one. */
const NAMES = /maria|mustermann|4711|beispiel|ward 7|2024|abab|\.edf/i;
const recording: Recording = {
  ...plain.recording,
  fileName: 'Maria_Mustermann_2024.edf',
  identity: {
    code: 'PAT-4711',
    name: 'Mustermann, Maria',
    sex: 'F',
    birthYear: 1931,
    recordingText: 'Ward 7 Dr Beispiel',
  },
  start: { kind: 'known', local: '2024-05-14T09:00:00' },
  channels: plain.recording.channels.map((one) => ({
    ...one,
    label: `EGG Mustermann ${one.index}`,
  })),
  found: [{ severity: 'warning', what: 'label “EGG Mustermann 1” is odd', place: null }],
};

function named(): ResultInput {
  const state = {
    ...plain.state,
    study: {
      ...plain.state.study,
      code: 'PAT-4711',
      start: '2024-05-14T09:00:00',
      sha256: 'ab'.repeat(32),
    },
    protocol: {
      ...plain.state.protocol,
      meal: 'eggs by Maria',
      kcal: 300,
      medicines: 'Beispielol',
    },
    leadChoice: 'as Dr Beispiel wished',
    phases: [
      { name: 'fasting', fromS: 0, toS: 60 },
      { name: 'maria fed', fromS: 60, toS: 150 },
    ],
    spans: plain.state.spans.map((one) => ({ ...one, note: 'Maria talks' })),
    events: [{ id: 1, atS: 5, text: 'Maria drank' }],
    symptoms: [{ id: 2, atS: 9, text: 'Mustermann felt sick', score: 4 }],
    notes: 'Mustermann was calm',
    conclusion: 'Dear Dr Beispiel',
  };
  const one = {
    ...signature(0),
    name: 'B. Beispiel',
    atUtc: '2024-05-16T10:30:00Z',
    sha256: 'ab'.repeat(32),
    findings: plain.findings,
  };
  const session = appendEdit(
    beginSession(state),
    { name: 'sign as Beispiel', changes: [{ kind: 'sign', signature: one }] },
    'B. Beispiel',
    '2024-05-16T10:30:00Z',
  );
  const samples = Float64Array.from({ length: 600 }, (_, i) => 100 * Math.sin(i / 12));
  return {
    ...plain,
    recording,
    session,
    state: session.state,
    sha256: 'ab'.repeat(32),
    heart: plain.heart && { ...plain.heart, heightUv: 300, noiseUv: 10, timingSdMs: 1 },
    signals: {
      slow: [{ lead: '#1~#2', rateHz: 4, samples }],
      heart: { rateHz: 250, samples: new Float32Array(37_500) },
    },
    waves: [],
    age: null,
  };
}

/** Text of a file; paths of pictures are coordinates, which are no texts. */
const textOf = (bytes: Uint8Array) =>
  new TextDecoder('latin1').decode(bytes).replaceAll(/ d="[^"]*"|%20d%3D%22.*?%22/g, '');
const files = (input: ResultInput) =>
  new Map(resultFiles(input).map((file) => [file.name, bytesOf(file)]));

describe('the files of results', () => {
  it('are tables, figures, report, pictures and signals', () => {
    expect([...files(named()).keys()]).toEqual([
      ...['beats.csv', 'epochs.csv', 'minutes.csv', 'spans.csv', 'findings.json', 'report.html'],
      ...['spectrogram.svg', 'trend.svg', 'separated.edf', 'annotations.edf'],
    ]);
  });

  it('hold a report that fetches nothing and runs nothing', () => {
    const html = textOf(files(named()).get('report.html') ?? new Uint8Array());
    expect(html).toMatch(/^<!doctype html>/);
    expect(html).toContain(`http-equiv="Content-Security-Policy" content="default-src 'none'`);
    expect(html).not.toMatch(/<script|<link|src="(?!data:)|url\((?!['"]?data:|%23|#)|@import/i);
    expect(html).toContain('Maria');
  });

  it('hold the annotations of the review as an EDF+ file of its own', async () => {
    const bytes = files(named()).get('annotations.edf') ?? new Uint8Array();
    expect(textOf(bytes)).toContain('fasting');
    expect(textOf(bytes)).toContain('beat N');
    await expect(openRecording(new Blob([bytes]), 'annotations.edf', null)).rejects.toThrow(
      /annotations only/,
    );
  });
});

describe('results without identity', () => {
  const bare = files(resultsWithoutIdentity(named()));

  it('say nowhere whose they are, whatever was typed', () => {
    for (const [name, bytes] of bare)
      expect(`${name} ${textOf(bytes).match(NAMES)}`).toBe(`${name} null`);
  });

  it('leave out the site’s reference values, whose words may say where it was', () => {
    const range = {
      figure: 'rmssd_ms',
      phase: 'fasting' as const,
      minMinutes: 0.5,
      maxMinutes: 60,
      posture: '',
      meal: '',
      low: 11,
      high: 99,
      population: 'our patients',
      source: 'Clinic of Ward 7',
    };
    const input = { ...named(), siteReference: { ranges: [range] } };
    const holds = (one: ResultInput) =>
      [...files(one)]
        .filter(([, bytes]) => /Clinic of|our patients/.test(textOf(bytes)))
        .map(([name]) => name);
    expect(holds(input)).toEqual(['findings.json', 'report.html']);
    expect(holds(resultsWithoutIdentity(input))).toEqual([]);
  });

  it('have X where the header names the person, and begin on the first day of 1985', async () => {
    const source = await openRecording(
      new Blob([bare.get('separated.edf') ?? new Uint8Array()]),
      'separated.edf',
      null,
    );
    expect(source.recording.identity).toMatchObject({ code: null, name: null, birthYear: null });
    expect(source.recording.start).toEqual({ kind: 'known', local: '1985-01-01T00:00:00' });
  });

  it('keep the time from the recording to the signature, not its date', () => {
    const html = textOf(bare.get('report.html') ?? new Uint8Array());
    expect(html).toContain('1985-01-03');
    expect(html).not.toContain('2024');
  });

  it('keep every number', () => {
    const full = files(named());
    expect(bare.get('beats.csv')).toEqual(full.get('beats.csv'));
    const figures = (of: Map<string, Uint8Array>) =>
      JSON.parse(textOf(of.get('findings.json') ?? new Uint8Array())).phases.map(
        ({ figures: all }: { readonly figures: unknown }) => all,
      );
    expect(figures(bare)).toEqual(figures(full));
  });

  it.each([
    [1934, '90', 'over 89'],
    [1935, '89', '89'],
    [null, 'not known', 'X'],
  ])('give the age of someone born in %s as %s: %s', (birthYear, _, words) => {
    expect(ageWords({ ...recording, identity: { ...recording.identity, birthYear } })).toBe(words);
  });
});
