import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { digestOf } from '../../src/proof/certificate.ts';
import { run } from './stand-in.ts';

let folder = '';
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'rungcheck-prove-'));
});
afterAll(() => rmSync(folder, { recursive: true }));

describe('rungcheck prove and verify', () => {
  test('a proof is written as a certificate, which verify accepts, and refuses after one bit is changed', async () => {
    const file = join(folder, 'pw92.json');
    const proved = await run(['prove', 'pw92', 'correlation-non-positive', '--certificate', file]);
    expect(proved).toMatchObject({ status: 0, err: '' });
    expect(proved.out).toContain('pw92: correlation-non-positive proved');
    expect(proved.out).toContain('holds on 100 %; violated on 0 %; undecided on 0 %');
    const verified = await run(['verify', file]);
    expect(verified).toMatchObject({ status: 0, err: '' });
    expect(verified.out).toMatch(/^verified: pw92 holds correlation-non-positive to 1e-9 on all of \d+ boxes/);
    const bytes = readFileSync(file);
    const place = bytes.indexOf('"tree":"') + 12;
    bytes[place] = (bytes[place] as number) ^ 1;
    writeFileSync(file, bytes);
    const refused = await run(['verify', file]);
    expect(refused.status).toBe(1);
    expect(refused.out).toContain('refused: its content does not match its digest');
  });

  test('unbounded: every s at once', async () => {
    const { status, out } = await run(['prove', 'pbe', 'exchange-lieb-oxford', '--domain', 'unbounded']);
    expect(status).toBe(0);
    expect(out).toContain('s 0 … ∞');
  });

  test('a budget that ends is status 1 and says where boxes are undecided; no certificate is written', async () => {
    const file = join(folder, 'none.json');
    const options = ['--boxes', '50', '--format', 'json', '--certificate', file];
    const { status, out, err } = await run(['prove', 'pbe', 'correlation-non-positive', ...options]);
    expect(status).toBe(1);
    expect(err).toBe('no certificate is written: nothing is proved\n');
    expect(JSON.parse(out).proof).toMatchObject({ stop: 'budget', boxes: 50 });
    expect(JSON.parse(out).proof.undecidedWords).toMatch(/s/);
  });

  test('a search that is kept goes on to the same certificate, and a finished one makes it at once', async () => {
    const [state, whole, resumed] = ['search.json', 'whole.json', 'resumed.json'].map((name) => join(folder, name)) as [
      string,
      string,
      string,
    ];
    const claim = ['prove', 'pw92', 'correlation-non-positive'];
    await run([...claim, '--certificate', whole]);
    const first = await run([...claim, '--state', state, '--boxes', '20']);
    expect(first.status).toBe(1);
    expect(first.err).toBe(`${state} keeps the search: more --boxes go on from there\n`);
    expect(JSON.parse(readFileSync(state, 'utf8')).judged).toHaveLength(20);
    const second = await run([...claim, '--state', state, '--certificate', resumed]);
    expect(second).toMatchObject({ status: 0, err: '' });
    expect(readFileSync(resumed, 'utf8')).toBe(readFileSync(whole, 'utf8'));
    const third = await run([...claim, '--state', state, '--boxes', '1']);
    expect(third).toEqual(second);
  });

  test('a state of another claim, a damaged one and another file are refused and left as they are', async () => {
    const state = join(folder, 'pbe-search.json');
    const claim = ['prove', 'pbe', 'correlation-non-positive', '--boxes', '30', '--state', state];
    await run(claim);
    const text = readFileSync(state, 'utf8');
    const damaged = text.replace('"judged":"', '"judged":".');
    const forged = JSON.parse(damaged);
    for (const [args, content, words] of [
      [
        ['prove', 'pbesol', 'correlation-non-positive', '--state', state],
        text,
        'the state is of another functional (pbe)',
      ],
      [[...claim, '--tolerance', '1e-6'], text, 'the state is of another tolerance'],
      [[...claim, '--set', 'beta=0.06'], text, 'the state is of other values of parameters'],
      [claim, damaged, 'does not match its digest'],
      [claim, JSON.stringify({ ...forged, digest: digestOf(forged) }), 'the state is damaged: letter'],
      [claim, '{}', 'no state of a search'],
    ] as const) {
      writeFileSync(state, content);
      const { status, out, err } = await run(args);
      expect([words, status, out]).toEqual([words, 2, '']);
      expect(err).toContain(`${state}: `);
      expect(err).toContain(words);
      expect(readFileSync(state, 'utf8')).toBe(content);
    }
  });

  test('all faults of a request at once', async () => {
    const { status, err } = await run([
      'prove',
      'pbee',
      'nothing',
      '--boxes',
      'many',
      '--tolerance',
      '2',
      '--jobs',
      '0',
    ]);
    expect(status).toBe(2);
    for (const text of ['pbee', 'nothing', '--boxes', '--tolerance', '--jobs']) expect(err).toContain(text);
  });

  test('vet --prove turns holds into proved', async () => {
    const options = ['--prove', '--boxes', '3000', '--no-cache', '--only', 'correlation-non-positive'];
    const { status, out } = await run(['vet', 'pw92', ...options]);
    expect(status).toBe(0);
    expect(out).toContain('● proved');
    expect(out).toContain('by interval arithmetic, rounded outward');
  });
});
