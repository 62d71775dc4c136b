import { readFileSync } from 'node:fs';
import Ajv2020 from 'ajv/dist/2020';
import { describe, expect, it } from 'vitest';
import { findingsJson } from '../../src/export/findings-json';
import { analysedFixture } from '../workers/analysed-fixture';
import { inventedInput } from './invented-input';

/** The published schema, read by a JSON Schema validator of its own (Ajv, draft 2020-12). */
const schema = JSON.parse(readFileSync('public/findings.schema.json', 'utf8'));
const valid = new Ajv2020({ strict: true, allowUnionTypes: true, strictRequired: false }).compile(
  schema,
);
const faultsOf = (document: unknown) => (valid(document) ? [] : valid.errors);

describe('findings.json keeps to its published schema', () => {
  it('for an invented input', () => {
    expect(faultsOf(JSON.parse(findingsJson(inventedInput())))).toEqual([]);
  });

  it('for record 208 as the pipeline analyses it', async () => {
    expect(faultsOf(JSON.parse(findingsJson(await analysedFixture())))).toEqual([]);
  });

  it.each([
    ['a figure without its unit', (d: Doc) => void Reflect.deleteProperty(firstFigure(d), 'unit')],
    ['a hash that is none', (d: Doc) => void Object.assign(d, { sha256: 'abc' })],
    [
      'a part of the evidence left out',
      (d: Doc) => void Reflect.deleteProperty(d.evidence, 'planted'),
    ],
    ['a lead by its label', (d: Doc) => void Object.assign(d.roles, { heart: 'EGG 1' })],
  ])('and the schema refuses %s', (_, spoil) => {
    const document: Doc = JSON.parse(findingsJson(inventedInput()));
    spoil(document);
    expect(valid(document)).toBe(false);
  });
});

interface Doc {
  readonly roles: object;
  readonly evidence: object;
  readonly phases: readonly { readonly figures: Readonly<Record<string, object>> }[];
}
const firstFigure = ({ phases }: Doc): object =>
  Object.values(phases[0].figures).find((figure) => 'value' in figure) ?? {};
