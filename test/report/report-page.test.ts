import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { reportModel } from '../../src/export/report-model';
import { CAUTIONS } from '../../src/recording/cautions';
import { cssString } from '../../src/report/foot-text';
import { ReportPage } from '../../src/report/report-page';
import { reportPictures } from '../../src/report/report-pictures';
import { appendEdit, beginSession } from '../../src/session/log';
import { inventedInput } from '../export/invented-input';
import { signature } from '../session/invented-session';

const { recording, state, findings, stomach } = inventedInput();

function page(signed: boolean): string {
  const begun = beginSession(state);
  const session = signed
    ? appendEdit(
        begun,
        { name: 'sign', changes: [{ kind: 'sign', signature: signature(0) }] },
        'A. Reader',
        '2026-03-01T10:00:00Z',
      )
    : begun;
  const model = reportModel({
    openDoubts: 0,
    evidence: {},
    siteReference: null,
    age: null,
    recording,
    session,
    findings,
    program: 'Bicadence 0.1.0',
    identityHidden: false,
  });
  const pictures = reportPictures({
    state,
    settings: state.settings,
    rhythm: stomach[0],
    heart: null,
    breathing: null,
    durationS: recording.durationS,
    waves: [],
  });
  return renderToStaticMarkup(createElement(ReportPage, { model, pictures }));
}

describe('the printed page', () => {
  it('a draft carries its mark on every sheet and once for paper; a signed one carries none', () => {
    expect(page(false).match(/report-watermark on-screen/g)).toHaveLength(3);
    expect(page(false).match(/report-watermark on-paper/g)).toHaveLength(1);
    expect(page(true)).not.toContain('report-watermark');
    expect(page(true)).toContain('Final: signed 2026-03-01 10:00 UTC by A. Reader');
    expect(page(true)).toContain('Name, typed, not authenticated');
  });

  it('has one first heading, and what could be used stands before any figure', () => {
    const html = page(false);
    expect(html.match(/<h1>/g)).toHaveLength(1);
    const order = [
      'How much could be used',
      'Protocol',
      'Rhythm over time',
      'Findings',
      'Signature',
      'How it was made',
    ];
    const places = order.map((title) => html.indexOf(`<h2>${title}`));
    expect(places.every((place) => place > 0)).toBe(true);
    expect([...places].sort((a, b) => a - b)).toEqual(places);
  });

  it('every table head says what it heads, and every picture has words', () => {
    const html = page(false);
    expect(html).not.toMatch(/<th(?=[ >])(?![^>]*scope=)/);
    const images = html.match(/<img[^>]*>/g) ?? [];
    expect(images.length).toBeGreaterThan(0);
    for (const image of images) expect(image).toMatch(/alt="[^"]{30,}"/);
  });

  it('no cell is empty', () => {
    expect(page(false)).not.toMatch(/<t[dh][^>]*><\/t[dh]>/);
  });

  it('prints every caution', () => {
    const html = page(false);
    for (const text of CAUTIONS) expect(html).toContain(text);
  });
});

describe('the foot of every page', () => {
  it('is a CSS string whatever the code of the study holds', () => {
    expect(cssString('INV-7 · Draft')).toBe('"INV-7 · Draft"');
    expect(cssString('a"b\\c\nd')).toBe('"a\\22 b\\5c c\\a d"');
  });
});
