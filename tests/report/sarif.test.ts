import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import Ajv from 'ajv';
import { describe, expect, test } from 'vitest';
import { sarifLog } from '../../src/report/sarif.ts';
import { compared, findings, report } from './machine.ts';
import { findingsOf } from './made-up.ts';

const require = createRequire(import.meta.url);
const readJson = (path: string) => JSON.parse(readFileSync(require.resolve(path), 'utf8')) as object;

// The schema of OASIS SARIF 2.1.0 as published (draft 4), from the package @microsoft/jest-sarif.
const ajv = new Ajv({ schemaId: 'id', meta: false, unknownFormats: 'ignore', allErrors: true });
ajv.addMetaSchema(readJson('ajv/lib/refs/json-schema-draft-04.json'), 'http://json-schema.org/draft-04/schema#');
const validate = ajv.compile(readJson('@microsoft/jest-sarif/lib/schemas/sarif-2.1.0-rtm.5.json'));

interface Result {
  ruleId: string;
  ruleIndex?: number;
  kind: string;
  level: string;
  baselineState?: string;
  suppressions?: object[];
  locations: {
    physicalLocation?: { artifactLocation: { uri: string; uriBaseId?: string }; region: { startLine: number } };
  }[];
  partialFingerprints: Record<string, string>;
}
interface Log {
  runs: [
    {
      tool: { driver: { rules: { id: string; help: { text: string } }[] } };
      results: Result[];
      invocations: [{ executionSuccessful: boolean }];
    },
  ];
}

const parse = (text: string) => (JSON.parse(text) as Log).runs[0];
const resultOf = (run: Log['runs'][0], rule: string) => run.results.find(({ ruleId }) => ruleId === rule) as Result;

describe('SARIF 2.1.0', () => {
  test.each([
    ['of a run', report],
    ['against a record', compared],
    ['of nothing', { ...report, findings: findingsOf(), conditions: new Map() }],
  ])('%s keeps to the published schema', (_title, one) => {
    const log = JSON.parse(sarifLog(one)) as object;
    expect([validate(log), validate.errors]).toEqual([true, null]);
  });

  test('the schema is really asked: a log without its tool is refused', () => {
    expect(validate({ version: '2.1.0', runs: [{}] })).toBe(false);
  });

  const run = parse(sarifLog(report));

  test('results point at the term of the part, or at the parameter to blame', () => {
    const [location] = resultOf(run, 'invented-scaling').locations;
    expect(location?.physicalLocation).toEqual({
      artifactLocation: { uri: 'sheets/invented%20meta.yaml', uriBaseId: 'SRCROOT' },
      region: { startLine: 15, startColumn: 17 },
    });
    expect(resultOf(run, 'invented-digits').locations[0]?.physicalLocation?.region.startLine).toBe(7);
  });

  test('rules carry the help text of their condition, and results find them', () => {
    const { ruleIndex = -1 } = resultOf(run, 'invented-scaling');
    const rule = run.tool.driver.rules[ruleIndex];
    expect(rule?.id).toBe('invented-scaling');
    expect(rule?.help.text).toContain('An invented source');
  });

  test('what fails is an error, a warning a warning, what is open has no level, what is accepted is suppressed', () => {
    const told = (rule: string) => {
      const { kind, level, suppressions = [] } = resultOf(run, rule);
      return `${kind} ${level} ${suppressions.length}`;
    };
    expect(['invented-spot', 'invented-scaling', 'invented-doubt', 'invented-known', 'acceptance'].map(told)).toEqual([
      'fail error 0',
      'fail warning 0',
      'open none 0',
      'fail note 1',
      'fail warning 0',
    ]);
    expect(run.invocations[0].executionSuccessful).toBe(false);
  });

  test('fingerprints differ between conditions and stay when lines and numbers change', () => {
    const moved = JSON.parse(
      JSON.stringify(findings).replaceAll('"line":15', '"line":99').replaceAll('-0.0023', '-0.0024'),
    );
    const again = parse(sarifLog({ ...report, findings: moved }));
    const prints = (one: Log['runs'][0]) =>
      one.results.map(({ partialFingerprints }) => Object.values(partialFingerprints)[0]);
    expect(prints(again)).toEqual(prints(run));
    expect(new Set(prints(run)).size).toBe(run.results.length);
  });

  test('against a record, results say whether they are new', () => {
    const against = parse(sarifLog(compared));
    expect(resultOf(against, 'invented-spot')).toMatchObject({ baselineState: 'new', level: 'error' });
    expect(resultOf(against, 'invented-scaling')).toMatchObject({ baselineState: 'unchanged', level: 'note' });
    expect(resultOf(against, 'recorded-state')).toMatchObject({ level: 'error' });
  });
});
