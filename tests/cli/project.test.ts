import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { findingsSchema } from '../../src/finding/finding.ts';
import { run } from './stand-in.ts';

const here = process.cwd();
let folder = '';
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'rungcheck-project-'));
  process.chdir(folder);
});
afterAll(() => {
  process.chdir(here);
  rmSync(folder, { recursive: true });
});

const project = `
sheets: [dirac]
only: [exchange-uniform-gas, exchange-lieb-oxford]
domain: { rs: [0.5, 2] }
constants: { lieb-oxford: 1.58 }
tolerances: { exchange-uniform-gas: 0.25 }
`;

async function findings(...args: readonly string[]) {
  const { status, out, err } = await run(['vet', ...args, '--format', 'json']);
  expect([status, err]).toEqual([0, '']);
  return findingsSchema.parse(JSON.parse(out));
}

describe('rungcheck.yaml in the current folder', () => {
  test('says what is vetted and with which settings', async () => {
    writeFileSync('rungcheck.yaml', project);
    const { functionals } = await findings();
    const [dirac] = functionals;
    expect(functionals.map(({ id }) => id)).toEqual(['dirac']);
    expect(dirac?.findings.map(({ constraint, tolerance }) => [constraint, tolerance])).toEqual([
      ['exchange-uniform-gas', 0.25],
      ['exchange-lieb-oxford', 1e-9],
    ]);
    expect(dirac?.domain.coordinates.find(({ name }) => name === 'rs')).toMatchObject({ lower: 0.5, upper: 2 });
    expect(dirac?.findings[1]?.constants['lieb-oxford']).toBe(1.58);
  });

  test('gives way to the command line, and is passed over with --no-project', async () => {
    const given = ['b88', '--only', 'exchange-uniform-gas', '--domain', 'wide'];
    const { functionals } = await findings(...given);
    expect(functionals.map(({ id, domain }) => [id, domain.name])).toEqual([['b88', 'wide']]);
    expect(functionals[0]?.findings[0]?.tolerance).toBe(0.25);
    const without = await findings(...given, '--no-project');
    expect(without.functionals[0]?.findings[0]?.tolerance).toBe(1e-6);
  });
});
