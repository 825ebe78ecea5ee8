import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { run } from './stand-in.ts';

const here = process.cwd();
let folder = '';
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'rungcheck-figures-'));
  process.chdir(folder);
});
afterAll(() => {
  process.chdir(here);
  rmSync(folder, { recursive: true });
});

const map = (...more: string[]) => run(['map', 'lyp', 'correlation-non-positive', '--cells', '21', ...more]);

describe('rungcheck map', () => {
  test('writes a PNG of the width asked for (signature and IHDR: PNG specification)', async () => {
    expect(await map('--out', 'map.png', '--pixels', '640')).toEqual({ status: 0, out: '', err: '' });
    const png = readFileSync('map.png');
    expect([...png.subarray(0, 8)]).toEqual([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]);
    expect(png.readUInt32BE(16)).toBe(640);
  });

  test('csv and json hold the same cells, each one a point for at', async () => {
    const csv = await map('--format', 'csv');
    const json = JSON.parse((await map('--format', 'json')).out);
    const [header, ...lines] = csv.out.trimEnd().split('\n');
    expect(header).toBe('functional,s,rs,zeta,margin');
    expect(lines.map((line) => Number(line.split(',')[4]))).toEqual(json.panels[0].margins);
    const [, s = '', rs = '', zeta = '', margin = ''] = (lines[200] as string).split(',');
    const at = await run(['at', 'lyp', '--rs', rs, '--zeta', zeta, '--s', s, '--format', 'json']);
    expect(JSON.parse(at.out).points[0].Fc).toBeCloseTo(Number(margin), 12);
  });

  test('--prove: csv and json hold the same rectangles, which cover the plane', async () => {
    const asked = ['map', 'revpbe', 'exchange-lieb-oxford', '--cells', '21', '--prove', '--boxes', '400'];
    const csv = await run([...asked, '--format', 'csv']);
    const [{ regions }] = JSON.parse((await run([...asked, '--format', 'json'])).out).panels;
    const [header, ...lines] = csv.out.trimEnd().split('\n');
    expect(header).toBe('functional,s_lower,s_upper,rs_lower,rs_upper,zeta,state');
    const rows = lines.map((line) => line.split(','));
    for (const state of ['proved', 'violated', 'undecided']) {
      const own = rows.filter((row) => row.at(-1) === state).map((row) => row.slice(1, 5).map(Number));
      expect(own).toEqual(regions[state]);
    }
    expect(rows.reduce((sum, row) => sum + Number(row[2]) - Number(row[1]), 0)).toBeCloseTo(5, 12);
    // s ≥ 3.22 (Y. Zhang, W. Yang, Phys. Rev. Lett. 80, 890 (1998), in the condition's sheet).
    expect(regions.shares.violated).toBeCloseTo((5 - 3.22) / 5, 2);
  });

  test('--prove of a condition that boxes cannot decide, and --boxes alone, are refused with a remedy', async () => {
    const limit = await run(['map', 'pbe', 'correlation-kinetic-bound', '--cells', '11', '--prove', '--format', 'csv']);
    expect([limit.status, limit.err]).toEqual([2, expect.stringMatching(/not provable by boxes: .*limit/s)]);
    const boxes = await map('--boxes', '5', '--format', 'csv');
    expect([boxes.status, boxes.err]).toEqual([2, expect.stringContaining('Add --prove.')]);
  });

  test('all faults of a request at once', async () => {
    const { status, err } = await run([
      'map',
      'lypp',
      'nonsense',
      '--at',
      'zeta=2',
      '--width',
      '3mm',
      '--out',
      'x.gif',
    ]);
    expect(status).toBe(2);
    for (const part of ['lypp', 'nonsense', 'zeta is 2', '3mm', 'x.gif']) expect(err).toContain(part);
  });
});

describe('rungcheck plot', () => {
  test('writes SVG; --vary gives a curve for each value', async () => {
    expect((await run(['plot', 'pbe', '--vary', 'kappa=0.5,1', '--out', 'fx.svg'])).status).toBe(0);
    expect(readFileSync('fx.svg', 'utf8')).toMatch(/^<\?xml[^>]*>\n<svg [^>]*width="86mm"/);
    const { out } = await run(['plot', 'pbe', '--vary', 'kappa=0.5,1', '--format', 'csv']);
    expect(out.split('\n')[0]).toBe('functional,kappa,zeta,s,Fx');
    // 1 + κ − κ/(1 + μs²/κ) at s = 5 and κ = 1, μ = 0.2195149727645171.
    expect(Number(out.trimEnd().split('\n').at(-1)?.split(',').at(-1))).toBeCloseTo(
      2 - 1 / (1 + 0.2195149727645171 * 25),
      4,
    );
  });
});

describe('rungcheck render', () => {
  const vet = ['vet', 'pbe', '--only', 'exchange-lieb-oxford'];

  test('gives what vet would have given (law)', async () => {
    await run([...vet, '--format', 'json', '--out', 'findings.json']);
    for (const format of ['table', 'markdown', 'latex', 'json']) {
      expect(await run(['render', 'findings.json', '--format', format])).toEqual(
        await run([...vet, '--format', format]),
      );
    }
  });

  test('takes the format from the file name', async () => {
    expect((await run(['render', 'findings.json', '--out', 'table.tex'])).status).toBe(0);
    expect(readFileSync('table.tex', 'utf8')).toContain('\\begin{longtable}');
  });

  test.each([
    ['{', /not JSON/],
    ['{"format":"other"}', /no findings of rungcheck/],
    ['{"format":"rungcheck findings","formatVersion":1,"engineVersion":1}', /engineVersion.*\n.*\n.*catalogueVersion/],
  ])('%s is refused with what is wrong', async (input, message) => {
    const { status, err } = await run(['render', '-'], input);
    expect([status, err]).toEqual([2, expect.stringMatching(message)]);
  });
});
