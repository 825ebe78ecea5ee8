import { describe, expect, test } from 'vitest';
import { azureAnnotations, githubAnnotations, gitlabQuality } from '../../src/report/annotations.ts';
import { jsonLines } from '../../src/report/json-lines.ts';
import { compared, findings, report } from './machine.ts';

const lines = (text: string) => text.split('\n').slice(0, -1);

describe('annotation lines', () => {
  test('of GitHub have level, file, line and column, one line each', () => {
    const told = lines(githubAnnotations(report));
    expect(told.map((line) => /^::(error|warning|notice) (.*?)title=/.exec(line)?.slice(1, 3).join(' '))).toEqual([
      'warning file=sheets/invented meta.yaml,line=15,col=17,',
      'notice file=sheets/invented meta.yaml,line=12,col=16,',
      'error file=sheets/invented meta.yaml,line=15,col=17,',
      'error file=sheets/invented meta.yaml,line=7,col=3,',
      'warning file=rungcheck.yaml,line=9,col=5,',
      'error file=broken.yaml,line=3,col=9,',
    ]);
  });

  test('of GitHub escape per cent, and colons and commas in properties', () => {
    const [first = ''] = lines(githubAnnotations(report));
    const [properties = '', message = ''] = first.split(/(?<!^)::/);
    expect(message).toContain('4.2 %25 of the domain');
    expect(properties.replace(/^::warning /, '').split(',')).toHaveLength(4);
  });

  test('of Azure Pipelines know errors and warnings only', () => {
    const told = lines(azureAnnotations(report));
    expect(told.every((line) => /^##vso\[task\.logissue type=(error|warning);[^\]]*\]/.test(line))).toBe(true);
    expect(told).toHaveLength(5);
  });

  test('of GitLab are a list with fingerprints that differ', () => {
    const items = JSON.parse(gitlabQuality(report)) as { fingerprint: string; location: { path: string } }[];
    expect(items).toHaveLength(6);
    expect(new Set(items.map(({ fingerprint }) => fingerprint)).size).toBe(6);
  });

  test('are quiet about what is recorded and not worse', () => {
    const told = lines(githubAnnotations(compared)).map((line) => /title=([^:]*)/.exec(line)?.[1]);
    expect(told).toEqual([
      'Invented spot',
      'Invented spot',
      'Worse than recorded',
      'Acceptance of invented-bound for invented-meta',
      'Faulty sheet ./broken.yaml',
    ]);
  });
});

describe('JSON lines', () => {
  test('hold every finding, remark, fault and change, one a line', () => {
    const types = lines(jsonLines(compared)).map((line) => (JSON.parse(line) as { type: string }).type);
    const count = (type: string) => types.filter((one) => one === type).length;
    expect(count('finding')).toBe(findings.functionals[0]?.findings.length);
    expect([count('run'), count('functional'), count('remark'), count('fault')]).toEqual([1, 1, 1, 1]);
    expect(count('change')).toBe(compared.comparison?.changes.length);
  });
});
