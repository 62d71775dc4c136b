import { expect, test } from 'vitest';
import type { Span } from '../../src/recording/span';
import { stripSpans } from '../../src/review/strip-spans';

const span = (id: number, lead: string | null, target: Span['target']): Span => ({
  id,
  fromS: 10 * id,
  toS: 10 * id + 5,
  lead,
  target,
  cause: 'flat',
  origin: 'proposed',
  note: '',
});

const shown = (...spans: Span[]) =>
  stripSpans(spans, { stomach: '#2', heart: '#1' }).map(({ id, target }) => [id, target]);

test('a lead that serves the heart alone spoils nothing of the stomach row', () => {
  expect(shown(span(1, '#1', 'both'), span(2, '#1', 'stomach'))).toEqual([[1, 'heart']]);
});

test('the stomach row shows what spoils the reported lead, not what spoils another', () => {
  expect(shown(span(1, '#2', 'both'), span(2, '#3', 'stomach'))).toEqual([[1, 'stomach']]);
});

test('a span of every lead acts on both', () => {
  expect(shown(span(1, null, 'both'), span(2, null, 'heart'))).toEqual([
    [1, 'both'],
    [2, 'heart'],
  ]);
});
