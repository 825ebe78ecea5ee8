import { describe, expect, test } from 'vitest';
import { findingsJsonSchema, findingsSchema } from '../../src/finding/finding.ts';
import { countFindings, exitStatusOf } from '../../src/finding/gate-counts.ts';
import { findingsJson } from '../../src/report/json.ts';
import { failing, findingsOf, functional, violated } from '../report/made-up.ts';

describe('findings', () => {
  test('written as JSON and read back they are the same, and fit the schema (law)', () => {
    const findings = findingsOf(functional);
    const read: unknown = JSON.parse(findingsJson(findings));
    expect(findingsSchema.parse(read)).toEqual(findings);
  });

  test('numbers that are not finite are refused, since JSON has none', () => {
    const broken = findingsOf({ ...functional, findings: [{ ...violated, tolerance: Number.POSITIVE_INFINITY }] });
    expect(findingsSchema.safeParse(broken).success).toBe(false);
  });

  test('a verdict outside the closed set is refused', () => {
    const broken = { ...violated, verdict: 'failed' };
    expect(findingsSchema.safeParse({ ...findingsOf({ ...functional, findings: [broken as never] }) }).success).toBe(
      false,
    );
  });

  test('the JSON Schema asks for what the findings file promises (issue: id, domain, findings and their fields)', () => {
    const schema = findingsJsonSchema() as {
      properties: {
        functionals: { items: { required: string[]; properties: { findings: { items: { required: string[] } } } } };
      };
    };
    const { items } = schema.properties.functionals;
    expect(items.required).toEqual(expect.arrayContaining(['id', 'domain', 'findings']));
    expect(items.properties.findings.items.required).toEqual(
      expect.arrayContaining([
        'constraint',
        'verdict',
        'margin',
        'witness',
        'violatedShare',
        'tolerance',
        'confirmedDigits',
        'reason',
      ]),
    );
  });

  test('only the gate fail makes the exit status 1', () => {
    expect(exitStatusOf(findingsOf(functional))).toBe(1);
    const others = functional.findings.filter(({ gate }) => gate !== 'fail');
    expect(exitStatusOf(findingsOf({ ...functional, findings: others }))).toBe(0);
    expect(exitStatusOf(findingsOf())).toBe(0);
  });

  test('counts add up to the number of findings (law)', () => {
    const { verdicts, gates } = countFindings([...functional.findings, failing]);
    const sum = (counts: Readonly<Record<string, number>>) => Object.values(counts).reduce((a, b) => a + b, 0);
    expect([sum(verdicts), sum(gates), gates.fail]).toEqual([6, 6, 2]);
  });
});
