import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import { builtProgram, quick, type Running, run, sheet, start, writeFiles } from './program.ts';
import { killedRuns, memoryOfRun } from './soak.ts';

let folder = '';
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'rungcheck-robust-'));
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

const pause = (milliseconds: number) => new Promise((done) => setTimeout(done, milliseconds));

async function until(condition: () => boolean, what: string): Promise<void> {
  for (let waited = 0; !condition(); waited += 20) {
    if (waited > 60_000) throw new Error(`waited in vain for ${what}`);
    await pause(20);
  }
}

describe('signals', () => {
  test.each([
    ['SIGINT', 130],
    ['SIGTERM', 143],
  ] as const)('%s ends a run with status %i and leaves no file', async (signal, status) => {
    const running = start(folder, ['vet', 'scan', '--jobs', '2', '--format', 'json', '--out', 'o.json']);
    await until(() => existsSync(join(folder, '.cache')), 'work that has begun');
    running.child.kill(signal);
    const ended = await running.ended;
    expect([ended.status, ended.out, ended.err]).toEqual([status, '', '']);
    expect(readdirSync(folder)).toEqual(['.cache']);
  });

  test('SIGINT ends a proof with status 130, undecided, and keeps what it has judged', async () => {
    const args = ['prove', 'tpss', 'correlation-coordinate-scaling', '--boxes', '1e9', '--jobs', '2'];
    const running = start(folder, [...args, '--state', 'search.json', '--format', 'json']);
    await pause(2500);
    running.child.kill('SIGINT');
    const { status, out, err } = await running.ended;
    expect([status, err]).toEqual([130, 'search.json keeps the search: the same command goes on from there\n']);
    const { proof } = JSON.parse(out);
    expect(proof.stop).toBe('interrupted');
    expect(proof.undecidedShare).toBeGreaterThan(0);
    expect(JSON.parse(readFileSync(join(folder, 'search.json'), 'utf8')).judged).toHaveLength(proof.boxes);
  });
});

describe('files that are not what they should be', () => {
  beforeEach(() =>
    writeFiles(folder, { 'a.yaml': sheet('0.7'), 'empty.json': '{}', 'newer.json': newer, 'cut.json': cut }),
  );
  const newer = JSON.stringify({ format: 'rungcheck state', formatVersion: 2 });
  const cut = '{ "format": "rungcheck state", "formatVersion": 1 }';

  test('all faults of states and targets are told before anything is vetted', async () => {
    const states: [string, RegExp][] = [
      ['none.json', /none\.json: cannot read the file.*\n.*Record one first: rungcheck vet … --record none\.json/],
      ['empty.json', /the file is neither a state nor findings/],
      ['newer.json', /format version 2; this rungcheck reads up to 1 \[newer-format\]/],
      ['cut.json', /the file is damaged at engineVersion/],
    ];
    for (const [file, words] of states) {
      const { status, out, err } = await run(folder, 'vet', 'a.yaml', '--only', quick, '--against', file);
      expect([file, status, out]).toEqual([file, 2, '']);
      expect(err).toMatch(words);
    }
    const targets = [
      '--write',
      'junit=no/o.xml',
      '--record',
      '.',
      '--write',
      'xml=o.xml',
      '--shard',
      '3/2',
      '--jobs',
      '0',
    ];
    const { status, err } = await run(folder, 'vet', 'a.yaml', '--only', quick, ...targets);
    expect([status, err.match(/\[[a-z-]+\]/g)?.length]).toEqual([2, 5]);
  });

  test('a full disk is a clear error, whatever is written to it', async () => {
    if (!existsSync('/dev/full')) return;
    const written = await run(folder, 'vet', 'a.yaml', '--only', quick, '--write', 'junit=/dev/full');
    expect([written.status, written.err]).toEqual([
      2,
      expect.stringContaining('/dev/full: cannot write the file: no space left'),
    ]);
    const program = [process.execPath, builtProgram(), 'vet', 'a.yaml', '--only', quick];
    const printed = spawnSync('sh', ['-c', '"$@" > /dev/full', 'sh', ...program], { cwd: folder, encoding: 'utf8' });
    expect([printed.status, printed.stderr]).toEqual([
      2,
      'standard output: cannot write: no space left [output-unwritable]\n',
    ]);
  });
});

describe('--watch', () => {
  test('shows what has changed after a save, a fault of the sheet too, and ends with its signal', async () => {
    writeFiles(folder, { 'a.yaml': sheet('0.7') });
    const running = start(folder, ['vet', 'a.yaml', '--only', quick, '--watch']);
    const tables = (one: Running) => one.out().split('waiting for a change').length - 1;
    await until(() => tables(running) === 1, 'the first table');
    writeFileSync(join(folder, 'a.yaml'), sheet('0.9'));
    await until(() => tables(running) === 2, 'the table after a save');
    expect(running.out()).toMatch(/▼ {2}✗ violated {2}exchange-lieb-oxford/);
    expect(running.out()).toContain('▼ a exchange-lieb-oxford: violated, margin -0.0610');
    writeFileSync(join(folder, 'a.yaml'), sheet('kapa'));
    await until(() => tables(running) === 3, 'the fault');
    expect(running.out()).toContain('unknown name kapa');
    running.child.kill('SIGTERM');
    expect((await running.ended).status).toBe(143);
  });
});

describe('a short soak (the long one: npm run soak)', () => {
  test('6 runs killed at random, two at a time, leave the cache and the outputs sound', async () => {
    expect(await killedRuns(folder, { kills: 6, seed: 3 })).toEqual([]);
  });

  test('memory does not grow with the number of sheets', async () => {
    const { status, early, late } = await memoryOfRun(folder, 40);
    expect(status).toBe(0);
    expect(late).toBeLessThan(early + 80);
  });
});
