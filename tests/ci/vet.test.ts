import { mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { quick, run, sheet, writeFiles } from './program.ts';

let folder = '';
let shared = '';
beforeAll(() => {
  shared = mkdtempSync(join(tmpdir(), 'rungcheck-shared-'));
});
afterAll(() => rmSync(shared, { recursive: true, force: true }));
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'rungcheck-ci-'));
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

/** Vets with a cache that the tests share, which keeps them short. */
const vet = (...args: readonly string[]) => run(folder, 'vet', '--cache', shared, ...args);
const read = (name: string) => readFileSync(join(folder, name), 'utf8');
const project = (more = '') => `sheets: [sheets]\nonly: [${quick}]\n${more}`;
const entries = () =>
  readdirSync(join(folder, '.cache'), { recursive: true, encoding: 'utf8' }).filter((name) => name.endsWith('.json'));

describe('a project', () => {
  test('is recorded, holds against its record, and fails when it gets worse', async () => {
    writeFiles(folder, { 'rungcheck.yaml': project(), 'sheets/a.yaml': sheet('0.7'), 'sheets/b.yaml': sheet('0.9') });
    expect((await vet('--record', 'state.json')).status).toBe(0);
    const same = await vet('--against', 'state.json');
    expect([same.status, same.err]).toEqual([0, '']);
    expect(same.out).toMatch(/^8 the same .*\nExit status 0: nothing is worse than state.json.\n$/);

    // F_x = 1 + slope·25/26 at s = 5; 1.8044 (Lieb-Oxford, C = 1.679) is passed with 0.9, and by more with 0.95.
    writeFiles(folder, { 'sheets/b.yaml': sheet('0.95') });
    const worse = await run(
      folder,
      'vet',
      '--against',
      'state.json',
      '--record',
      'state.json',
      '--write',
      'junit=o.xml',
    );
    expect(worse.status).toBe(1);
    expect(worse.out).toMatch(/▼ worse {3}b exchange-lieb-oxford: violated, margin -0\.0610\d* → -0\.1091\d*/);
    expect(worse.err).toBe('state.json is left as it was: the state is worse\n');
    expect(read('o.xml')).toContain('failures="1"');

    writeFiles(folder, { 'sheets/b.yaml': sheet('0.5') });
    const better = await vet('--against', 'state.json', '--record', 'new.json');
    expect(better.status).toBe(0);
    expect(better.out).toContain('b exchange-lieb-oxford: no longer violated: holds');
    const compared = await run(folder, 'compare', 'new.json', 'state.json');
    expect([compared.status, compared.out]).toEqual([1, expect.stringContaining('violated, margin -0.061')]);

    rmSync(join(folder, 'sheets', 'a.yaml'));
    const gone = await vet('--against', 'new.json');
    expect([gone.status, gone.out]).toEqual([1, expect.stringContaining('a: recorded, and not vetted now')]);
  });

  test('accepts violations, and says when they are gone or due', async () => {
    const accept = (id: string) =>
      `accept: [{ constraint: exchange-lieb-oxford, functional: ${id}, reason: by design, margin: -0.07, review: 2020-01-01 }]\n`;
    writeFiles(folder, { 'rungcheck.yaml': project(accept('b')), 'sheets/b.yaml': sheet('0.9') });
    const accepted = await vet('--write', 'sarif=o.sarif');
    expect(accepted.status).toBe(0);
    expect(accepted.out).toMatch(/violated .*exchange-lieb-oxford .*accepted/);
    expect(accepted.out).toContain(
      '! acceptance rungcheck.yaml:3: b exchange-lieb-oxford: the acceptance was to be looked',
    );
    expect(read('o.sarif')).toContain('"justification": "accepted by the project: by design"');
    writeFiles(folder, { 'sheets/b.yaml': sheet('0.95') });
    expect((await vet()).status).toBe(1);
    writeFiles(folder, { 'sheets/b.yaml': sheet('0.5') });
    expect((await vet()).out).toMatch(/the acceptance no longer applies: the verdict\s+is holds/);
    writeFiles(folder, { 'rungcheck.yaml': project(accept('c')) });
    expect((await vet()).out).toMatch(/the acceptance no longer applies: c is not\s+vetted/);
  });

  test('with faults tells all of them with their places, and vets nothing', async () => {
    const faulty = project('constants: { lieb-oxfrod: 1 }\naccept: [{ constraint: x, functional: b, reason: r }]\n');
    writeFiles(folder, { 'rungcheck.yaml': faulty, 'sheets/b.yaml': sheet('kapa') });
    const { status, out, err } = await vet();
    expect([status, out]).toEqual([2, '']);
    expect(err).toMatch(/rungcheck\.yaml:3:\d+: there is no constant lieb-oxfrod.*\n.*lieb-oxford/);
    expect(err).toMatch(/rungcheck\.yaml:4:\d+: there is no condition x/);
    expect(err).toMatch(/b\.yaml:3:\d+: unknown name kapa/);
  });

  test('with one faulty sheet tells of it, vets the others, and ends with status 2', async () => {
    writeFiles(folder, {
      'rungcheck.yaml': project(),
      'sheets/a.yaml': sheet('0.7'),
      'sheets/b.yaml': 'name: B\nrung: gga\n',
    });
    mkdirSync(join(folder, 'sheets', 'c.yaml'));
    const { status, out, err } = await vet('--write', 'junit=o.xml', '--record', 'state.json');
    expect(status).toBe(2);
    expect(out).toContain('exchange-lieb-oxford');
    expect(out).toContain('Exit status 2: 2 of the sheets could not be vetted.');
    expect(err).toMatch(/b\.yaml.*the sheet has no part/);
    expect(err).toMatch(/c\.yaml.*it is not a file/);
    expect(err).toContain('state.json is left as it was: not every sheet was vetted');
    expect(read('o.xml')).toContain('<testcase classname="sheets/b.yaml" name="sheet">');
  });
});

describe('the cache', () => {
  test('answers an unchanged project with the same bytes in under a second', async () => {
    const sheets = Object.fromEntries(
      ['a', 'b', 'c', 'd'].map((id, at) => [`sheets/${id}.yaml`, sheet(`0.${at + 1}`)]),
    );
    writeFiles(folder, { 'rungcheck.yaml': project(), ...sheets });
    const first = await run(folder, 'vet', '--format', 'json');
    const again = await run(folder, 'vet', '--format', 'json');
    expect(again.out).toBe(first.out);
    // Generous, as other tests run beside this one; an idle machine answers in 0.3 s.
    expect(again.time).toBeLessThan(Math.max(1000, first.time));
  });

  test('passes over damaged entries and writes them anew', async () => {
    writeFiles(folder, { 'rungcheck.yaml': project(), 'sheets/a.yaml': sheet('0.7') });
    const first = await run(folder, 'vet', '--format', 'json');
    const paths = entries().map((name) => join(folder, '.cache', name));
    const sizes = paths.map((path) => statSync(path).size);
    paths.forEach((path, at) => {
      const text = readFileSync(path, 'utf8');
      writeFileSync(
        path,
        ['', text.slice(0, text.length / 2), text.replace(/[0-9]/, '#'), '{"verdict":"holds"}'][at % 4] ?? '',
      );
    });
    expect((await run(folder, 'vet', '--format', 'json')).out).toBe(first.out);
    expect(paths.map((path) => statSync(path).size)).toEqual(sizes);
  });

  test('knows a changed import, a changed condition and another setting', async () => {
    const own = (bound: string) =>
      `title: Own\nstatement: F_x is bounded\nforce: sufficient\nstatus: rule\nsources: [invented]\npart: exchange\nrungs: [gga]\nat: { zeta: 0 }\nrequirement: Fx <= ${bound}\ntolerance: 1e-9\n`;
    const importing = 'name: C\nrung: gga\nuses: { base: a }\nexchange: { from: base }\n';
    writeFiles(folder, { 'a.yaml': sheet('0.7'), 'c.yaml': importing, 'own/own.yaml': own('1.8') });
    const vet = (...more: string[]) =>
      run(folder, 'vet', 'c.yaml', '--constraints', 'own', '--only', 'own', '--format', 'jsonl', ...more);
    const margins = async (...more: string[]) => /"margin":(-?[\d.]+)/.exec((await vet(...more)).out)?.[1];
    // F_x grows to 1 + slope·25/26 at s = 5.
    expect(Number(await margins())).toBeCloseTo(1.8 - 1 - (0.7 * 25) / 26, 12);
    writeFiles(folder, { 'a.yaml': sheet('0.6') });
    expect(Number(await margins())).toBeCloseTo(1.8 - 1 - (0.6 * 25) / 26, 12);
    writeFiles(folder, { 'own/own.yaml': own('1.9') });
    expect(Number(await margins())).toBeCloseTo(1.9 - 1 - (0.6 * 25) / 26, 12);
    expect(Number(await margins('--domain', 's=0:1'))).toBeCloseTo(1.9 - 1 - 0.6 / 2, 12);
  });

  test('that cannot be written is said, and no reason to stop', async () => {
    writeFiles(folder, { 'a.yaml': sheet('0.7'), cache: 'a file' });
    const { status, err } = await run(folder, 'vet', 'a.yaml', '--only', quick, '--cache', 'cache/x');
    expect([status, err]).toEqual([0, expect.stringContaining('warning: the cache cannot be written')]);
  });
});

describe('jobs and shards', () => {
  test('give the same bytes, with faulty sheets and acceptances among them', async () => {
    const accept =
      'accept: [{ constraint: exchange-lieb-oxford, functional: b, reason: by design }, { constraint: exchange-lieb-oxford, functional: a, reason: old }]\n';
    const sheets = Object.fromEntries(['a', 'b', 'c'].map((id, at) => [`sheets/${id}.yaml`, sheet(`${0.7 + at / 5}`)]));
    writeFiles(folder, { 'rungcheck.yaml': project(accept), ...sheets, 'sheets/e.yaml': 'name: E\nrung: gga\n' });
    const json = ['--format', 'json'];
    const whole = await run(folder, 'vet', '--no-cache', '--jobs', '1', ...json);
    expect(whole.status).toBe(2);
    expect((await vet('--jobs', '3', ...json)).out).toBe(whole.out);
    const shards = ['1', '2', '3'].map((index) => vet('--shard', `${index}/3`, '--out', `${index}.json`, ...json));
    await Promise.all([...shards, vet('--shard', '1/2', '--out', 'other.json', ...json)]);
    const [merged, missing, mixed] = await Promise.all([
      run(folder, 'merge', '3.json', '1.json', '2.json', ...json),
      run(folder, 'merge', '1.json', '2.json'),
      run(folder, 'merge', '2.json', 'other.json', '3.json'),
    ]);
    expect([merged?.status, merged?.out]).toEqual([2, whole.out]);
    expect([missing?.status, missing?.err]).toEqual([2, expect.stringContaining('shard 3 of 3 not given')]);
    expect([mixed?.status, mixed?.err]).toEqual([2, expect.stringContaining('other.json: the file is of another run')]);
  });
});
