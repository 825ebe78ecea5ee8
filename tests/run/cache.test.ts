import { mkdtempSync, readdirSync, readFileSync, rmSync, utimesSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import fc from 'fast-check';
import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import { keyOf, openCache, pruneCache } from '../../src/run/cache.ts';
import { openSources, type ReadUses } from '../../src/run/sources.ts';

let folder = '';
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'rungcheck-cache-'));
});
afterEach(() => rmSync(folder, { recursive: true }));

const paths = () =>
  readdirSync(folder, { recursive: true, encoding: 'utf8' })
    .filter((name) => name.includes('.json'))
    .map((name) => join(folder, name));

describe('the cache', () => {
  test('gives back what was written, and nothing for another key', () => {
    const cache = openCache(folder);
    cache.write(keyOf('a'), { margin: -0.1, text: 'ζ' });
    expect([cache.read(keyOf('a')), cache.read(keyOf('b')), cache.fault()]).toEqual([
      { margin: -0.1, text: 'ζ' },
      undefined,
      undefined,
    ]);
  });

  test('gives nothing for an entry with any byte changed or cut (seed 4)', () => {
    const cache = openCache(folder);
    const key = keyOf('a');
    cache.write(key, { margin: -0.1, text: 'holds' });
    const [path = ''] = paths();
    const whole = readFileSync(path);
    fc.assert(
      fc.property(fc.nat(whole.length - 2), fc.integer({ min: 1, max: 255 }), fc.boolean(), (at, change, cut) => {
        const damaged = cut ? whole.subarray(0, at) : Buffer.from(whole);
        if (!cut) damaged[at] = (damaged[at] as number) ^ change;
        writeFileSync(path, damaged);
        expect(cache.read(key)).toBeUndefined();
      }),
      { seed: 4, numRuns: 200 },
    );
  });

  test('keys tell texts apart wherever their borders lie', () => {
    expect(keyOf('ab', 'c')).not.toBe(keyOf('a', 'bc'));
  });

  test('is rid of old entries and of what killed runs have left', () => {
    const now = Date.parse('2026-06-01');
    const cache = openCache(folder);
    for (const name of ['old', 'new']) cache.write(keyOf(name), name);
    const [first = '', second = ''] = paths();
    const seconds = (days: number) => now / 1000 - days * 86_400;
    utimesSync(first, seconds(91), seconds(91));
    utimesSync(second, seconds(89), seconds(89));
    const left = `${second}.abc.tmp`;
    writeFileSync(left, '');
    utimesSync(left, seconds(0.1), seconds(0.1));
    pruneCache(folder, 90, now);
    expect(paths()).toEqual([second]);
  });
});

describe('hashes of sheets', () => {
  const cache = { read: () => undefined, write: () => {}, fault: () => undefined };
  const readUses: ReadUses = async (_kind, text) =>
    text === 'faulty' ? undefined : text.split(' ').filter((word) => word.length === 1);
  const hashOf = (id: string) =>
    openSources({ functionals: [folder], constraints: [] }, cache, readUses).functionalHash(id);
  const write = (id: string, text: string) => writeFileSync(join(folder, `${id}.yaml`), text);

  test('change with the sheet and with everything that it uses', async () => {
    write('a', 'uses b');
    write('b', 'uses c');
    write('c', 'text');
    const before = await hashOf('a');
    expect(await hashOf('a')).toBe(before);
    write('c', 'other');
    expect(await hashOf('a')).not.toBe(before);
    write('c', 'text');
    expect(await hashOf('a')).toBe(before);
  });

  test('are none for what is missing, faulty, or uses itself', async () => {
    write('a', 'uses b');
    expect(await hashOf('a')).toBeUndefined();
    write('b', 'faulty');
    expect(await hashOf('a')).toBeUndefined();
    write('b', 'uses a');
    expect(await hashOf('a')).toBeUndefined();
    write('b', 'uses b');
    expect(await hashOf('b')).toBeUndefined();
  });
});
