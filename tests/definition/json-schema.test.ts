import { describe, expect, test } from 'vitest';
import { parse } from 'yaml';
import { constraintSheetSchema, functionalSheetSchema } from '../../src/definition/json-schema.ts';
import { newSheet } from '../../src/definition/template.ts';
import { wholeConstraint, wholeFunctional } from './sheets.ts';

type Schema = Readonly<Record<string, unknown>>;

/** The part of JSON Schema 2020-12 (validation vocabulary) that the two schemas use; anything else is an error. */
function accepts(schema: Schema, value: unknown): boolean {
  return Object.entries(schema).every(([keyword, argument]) => {
    const check = keywords[keyword];
    if (check === undefined) throw new Error(`the test does not know the keyword ${keyword}`);
    return check(argument as never, value, schema);
  });
}

const isObject = (value: unknown): value is Schema =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

const typeTests: Readonly<Record<string, (value: unknown) => boolean>> = {
  string: (value) => typeof value === 'string',
  number: (value) => typeof value === 'number',
  integer: Number.isInteger,
  boolean: (value) => typeof value === 'boolean',
  array: Array.isArray,
  object: isObject,
};

const keywords: Readonly<Record<string, (argument: never, value: unknown, schema: Schema) => boolean>> = {
  $schema: () => true,
  title: () => true,
  description: () => true,
  type: (types: string | string[], value) => [types].flat().some((type) => typeTests[type]?.(value) ?? false),
  pattern: (pattern: string, value) => typeof value !== 'string' || new RegExp(pattern).test(value),
  minimum: (least: number, value) => typeof value !== 'number' || value >= least,
  maximum: (most: number, value) => typeof value !== 'number' || value <= most,
  enum: (allowed: unknown[], value) => allowed.includes(value),
  minItems: (least: number, value) => !Array.isArray(value) || value.length >= least,
  items: (item: Schema, value) => !Array.isArray(value) || value.every((one) => accepts(item, one)),
  required: (keys: string[], value) => !isObject(value) || keys.every((key) => key in value),
  dependentRequired: (needs: Record<string, string[]>, value) =>
    !isObject(value) ||
    Object.entries(needs).every(([key, others]) => !(key in value) || others.every((k) => k in value)),
  properties: (properties: Record<string, Schema>, value) =>
    !isObject(value) || Object.entries(properties).every(([key, one]) => !(key in value) || accepts(one, value[key])),
  propertyNames: (names: Schema, value) => !isObject(value) || Object.keys(value).every((key) => accepts(names, key)),
  additionalProperties: (rest: Schema | false, value, schema) =>
    !isObject(value) ||
    Object.entries(value)
      .filter(([key]) => !(key in ((schema.properties ?? {}) as Schema)))
      .every(([, one]) => rest !== false && accepts(rest, one)),
  anyOf: (options: Schema[], value) => options.some((one) => accepts(one, value)),
  oneOf: (options: Schema[], value) => options.filter((one) => accepts(one, value)).length === 1,
  not: (one: Schema, value) => !accepts(one, value),
};

const functional = functionalSheetSchema();
const constraint = constraintSheetSchema();

describe('the JSON Schemas, read as an editor reads a sheet (numbers as numbers)', () => {
  test('say their draft and accept the sheets that the parser accepts', () => {
    expect(functional.$schema).toBe('https://json-schema.org/draft/2020-12/schema');
    expect(constraint.$schema).toBe('https://json-schema.org/draft/2020-12/schema');
    expect(accepts(functional, parse(wholeFunctional))).toBe(true);
    expect(accepts(constraint, parse(wholeConstraint))).toBe(true);
    for (const rung of ['lda', 'gga', 'meta-gga'] as const) {
      expect(accepts(functional, parse(newSheet('mine', rung)))).toBe(true);
    }
  });

  test.each([
    'rung: lda\nexchange: { per-particle: 1 }',
    'name: a\nrung: lda',
    'name: a\nrung: ldaa\nexchange: { per-particle: 1 }',
    'name: a\nrung: lda\nexchange: { per-particle: 1, per-volume: 1 }',
    'name: a\nrung: lda\nexchange: { where: { a: 1 } }',
    'name: a\nrung: lda\nexchange: { per-particle: [1] }',
    'name: a\nrung: lda\nexchange: { per-particle: 1 }\nexchange-correlation: { per-particle: 1 }',
    'name: a\nrung: lda\nexchange: { per-particle: 1 }\nfoo: 1',
    'name: a\nrung: lda\nexchange: { per-particle: 1 }\nyear: 1066',
    'name: a\nrung: lda\nexchange: { per-particle: 1 }\nparameters: { a: { value: 1, digits: 0.5 } }',
    'name: a\nrung: lda\nexchange: { per-particle: 1 }\nparameters: { 1a: 1 }',
    'name: a\nrung: lda\nexchange: { per-particle: 1 }\nfunctions: { G: 1 }',
    'name: a\nrung: lda\nexchange: { per-particle: 1 }\nuses: { a: PBE }',
    'name: a\nrung: lda\ncorrelation: { partition: gas, same-spin: 1 }',
  ])('refuse the functional %j', (text) => {
    expect(accepts(functional, parse(text))).toBe(false);
  });

  test.each([
    ['tolerance: 1e-9', 'tolerance: -1'],
    ['force: sufficient', 'force: weak'],
    ['rungs: [lda, gga, meta-gga]', 'rungs: []'],
    ['gate-reason: a reason\n', ''],
    ['at: { zeta: 1, s: 1/2 }', 'at: { z: 1 }'],
  ])('refuse a constraint in which %j is %j', (from, to) => {
    expect(wholeConstraint).toContain(from);
    expect(accepts(constraint, parse(wholeConstraint.replace(from, to)))).toBe(false);
  });

  test('show help for every key and allow no unknown one', () => {
    for (const schema of [functional, constraint]) {
      const without: string[] = [];
      walk(schema, '', without);
      expect(without).toEqual([]);
      expect(schema.title).toMatch(/sheet$/);
    }
  });
});

/** Lists the keys without description and the mappings with fixed keys that allow others. */
function walk(schema: unknown, path: string, found: string[]): void {
  if (Array.isArray(schema)) for (const one of schema) walk(one, path, found);
  if (!isObject(schema)) return;
  if (isObject(schema.properties)) {
    if (schema.additionalProperties !== false) found.push(`${path} is open`);
    for (const [key, one] of Object.entries(schema.properties)) {
      const known = path === '.at' || (isObject(one) && typeof one.description === 'string');
      if (!known) found.push(`${path}.${key}`);
      walk(one, `${path}.${key}`, found);
    }
  }
  for (const keyword of ['anyOf', 'items', 'additionalProperties']) walk(schema[keyword], path, found);
}
