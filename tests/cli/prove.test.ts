import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
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

  test('all faults of a request at once', async () => {
    const { status, err } = await run(['prove', 'pbee', 'nothing', '--boxes', 'many', '--tolerance', '2']);
    expect(status).toBe(2);
    for (const text of ['pbee', 'nothing', '--boxes', '--tolerance']) expect(err).toContain(text);
  });

  test('vet --prove turns holds into proved', async () => {
    const options = ['--prove', '--boxes', '3000', '--no-cache', '--only', 'correlation-non-positive'];
    const { status, out } = await run(['vet', 'pw92', ...options]);
    expect(status).toBe(0);
    expect(out).toContain('● proved');
    expect(out).toContain('by interval arithmetic, rounded outward');
  });
});
