import { spawnSync } from 'node:child_process';
import { cpSync, existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { findingsSchema } from '../../src/finding/finding.ts';
import { run } from './stand-in.ts';

const here = process.cwd();
let folder = '';
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'rungcheck-cli-'));
  process.chdir(folder);
});
afterAll(() => {
  process.chdir(here);
  rmSync(folder, { recursive: true });
});

describe('help', () => {
  test.each([[['--help']], [['help', 'at']], [['vet', '--help']], [['new', '--help']]])(
    '%j goes to standard output',
    async (args) => {
      const { status, out, err } = await run(args);
      expect([status, err]).toEqual([0, '']);
      expect(out).toMatch(/Examples?:/);
    },
  );

  test('the version is that of the package, with that of the catalogue', async () => {
    const { version } = JSON.parse(readFileSync(join(here, 'package.json'), 'utf8')) as { version: string };
    const { status, out, err } = await run(['--version']);
    expect([status, err]).toEqual([0, '']);
    expect(out).toMatch(/^\S+ \(catalogue [0-9a-f]{12}: \d+ functionals, \d+ conditions\)\n$/);
    expect(out.split(' ')[0]).toBe(version);
  });
});

describe('faulty requests end with status 2, problems on the error stream and nothing else', () => {
  test.each([
    [[], /Usage/],
    [['vte', 'pbe'], /unknown command 'vte'.*\n.*Did you mean vet/],
    [['vet'], /no sheet is named/],
    [['vet', 'pbe', '--formt', 'json'], /unknown option '--formt'.*\n.*Did you mean --format/],
    [['vet', 'pbe', '--format', 'xml'], /Allowed choices are table, .*junit/],
    [['vet', 'pbee'], /no functional pbee.*\n.*Did you mean pbe/],
    [['vet', './none.yaml'], /none\.yaml: cannot read the file/],
    [['vet', 'pbe', '--only', 'lieb-oxfrod'], /Did you mean lieb-oxford/],
    [['vet', 'pbe', '--set', 'kapa=1'], /pbe has no parameter kapa.*\n.*Did you mean kappa/],
    [['vet', 'pbe', '--constants', 'lieb=1'], /does not know lieb/],
    [['vet', 'pbe', '--constraints', 'nowhere'], /nowhere: there is no such folder/],
    [['vet', 'pbe', '--domain', 'rs=0:1'], /bounds 0:1 of rs/],
    [['vet', 'pbe', '--out', '.'], /it is a folder/],
    [['at', 'pbe'], /no point is given/],
    [['at', 'pbe', '--rs', '1'], /a gga needs s/],
    [['at', 'pbe', '--rs', 'x', '--zeta', '0', '--s', '0'], /--rs is not a decimal number: x/],
    [['at', 'pbe', '--rs', '-1', '--zeta', '0', '--s', '0'], /rs is -1/],
    [['at', 'pbe', '--rs', '1', '--points', '-'], /both given/],
    [['at', 'pbe', '--points', '.'], /it is a folder/],
    [['at', 'pbe', '--points', '-'], /standard input: there are no points/],
    [['at', 'pbe', '--rs', '1', '--zeta', '0', '--s', '0', '--digits', '0'], /--digits/],
    [['explain', 'lieb-oxfrod'], /Did you mean lieb-oxford/],
    [['list', 'functional'], /Allowed choices are functionals, constraints/],
    [['schema', 'x'], /Allowed choices/],
    [['new', 'Not An Id'], /cannot be the id/],
    [['new', 'x', '--rung', 'hybrid'], /Allowed choices/],
  ] as [string[], RegExp][])('%j', async (args, words) => {
    const { status, out, err } = await run(args);
    expect([status, out]).toEqual([2, '']);
    expect(err).toMatch(words);
    expect(err).not.toMatch(/\n {4}at /);
  });

  test('all faults of a request are told at once', async () => {
    const { err } = await run([
      'vet',
      'pbee',
      'scann',
      '--only',
      'x',
      '--set',
      'q',
      '--domain',
      'nope',
      '--constants',
      'x=1',
    ]);
    expect(err.match(/\[[a-z-]+\]/g)).toHaveLength(6);
  });

  test('points of both kinds at once, and a bad cell, name the file and the place', async () => {
    expect((await run(['at', 'pbe', '--points', '-'], 'rs,n_up\n1,1\n')).err).toContain('mix two kinds of points');
    writeFileSync('bad.csv', 'rs,zeta,s\n1,0,1\n1,x,2\n');
    expect((await run(['at', 'pbe', '--points', 'bad.csv'])).err).toContain(
      'bad.csv:3:3: zeta is not a decimal number: x',
    );
    writeFileSync('far.csv', 'rs,zeta,s\n1,0,1\n\n1,2,2\n');
    expect((await run(['at', 'pbe', '--points', 'far.csv'])).err).toContain('far.csv:4: zeta is 2');
  });
});

describe('at', () => {
  test('dirac exchange of the unpolarised gas is F_x = 1, ε_x = −(3/4)(9/(4π²))^(1/3)/r_s (Dirac 1930)', async () => {
    const { status, out } = await run([
      'at',
      'dirac',
      '--rs',
      '2',
      '--zeta',
      '0',
      '--s',
      '0',
      '--format',
      'json',
      '--derivatives',
    ]);
    const { functional, points } = JSON.parse(out) as { functional: string; points: Record<string, number | null>[] };
    expect([status, functional, points.length]).toEqual([0, 'dirac', 1]);
    const exact = (-(3 / 4) * (9 / (4 * Math.PI ** 2)) ** (1 / 3)) / 2;
    expect(Math.abs((points[0]?.eps_x as number) / exact - 1)).toBeLessThan(1e-14);
    expect(points[0]).toMatchObject({ rs: 2, zeta: 0, s: 0, Fx: 1, eps_c: null, Fc: null, dFx_drs: 0, dFc_drs: null });
  });

  test('columns are those of the issue, in its order, inputs first', async () => {
    const slice = await run(
      ['at', 'pbe', '--points', '-', '--format', 'csv', '--derivatives'],
      'rs,zeta,s,alpha\n1,0,1,1\n',
    );
    expect(slice.out.split('\n')[0]).toBe(
      'rs,zeta,s,alpha,eps_x,eps_c,eps_xc,Fx,Fc,Fxc,dFx_drs,dFc_drs,d2Fc_drs2,dFxc_drs',
    );
    const density = await run(
      ['at', 'dirac', '--points', '-', '--format', 'csv', '--derivatives'],
      'n_up,n_dn\n0.1,0.2\n',
    );
    expect(density.out.split('\n')[0]).toBe(
      'n_up,n_dn,eps_x,eps_c,eps_xc,Fx,Fc,Fxc,d_n_up_x,d_n_dn_x,d_n_up_c,d_n_dn_c,d_n_up,d_n_dn',
    );
  });

  test('digits are of high precision and agree with double precision', async () => {
    const point = ['at', 'pbe', '--rs', '1', '--zeta', '0.3', '--s', '2', '--format', 'json'];
    const [double] = (JSON.parse((await run(point)).out) as { points: Record<string, number>[] }).points;
    const [exact] = (JSON.parse((await run([...point, '--digits', '40'])).out) as { points: Record<string, string>[] })
      .points;
    expect(exact?.Fx).toMatch(/^1\.\d{36,39}$/);
    expect(Math.abs(Number(exact?.Fc) / (double?.Fc as number) - 1)).toBeLessThan(1e-12);
  });

  test('a trial value of a parameter is used and marked: F_x of PBE → 1 + κ at large s', async () => {
    const args = ['at', 'pbe', '--rs', '1', '--zeta', '0', '--s', '1e8', '--set', 'kappa=0.9', '--format', 'json'];
    const answer = JSON.parse((await run(args)).out) as { parameters: object; points: { Fx: number }[] };
    expect(answer.parameters).toEqual({ kappa: '0.9' });
    expect(answer.points[0]?.Fx).toBeCloseTo(1.9, 12);
  });

  test('a point that no density has is evaluated and noted', async () => {
    const points = 'n_up,n_dn,sigma_uu,sigma_ud,sigma_dd\n0.1,0.1,0.01,0.02,0.01\n';
    const { status, err } = await run(['at', 'pbe', '--points', '-', '--format', 'csv'], points);
    expect(status).toBe(0);
    expect(err).toContain('1 of 1 points belong to no density');
  });

  test('the answer goes to a file when asked', async () => {
    const { out } = await run(['at', 'dirac', '--rs', '1', '--zeta', '0', '--format', 'csv', '--out', 'values.csv']);
    expect([out, readFileSync('values.csv', 'utf8').split('\n').length]).toEqual(['', 3]);
  });
});

describe('vet', () => {
  // PBE: F_x ≤ 1 + κ = 1.804 < 1.8041 by construction; B88 passes it at large s (Perdew, Burke, Ernzerhof 1996).
  const lieb = ['--only', 'exchange-lieb-oxford'];

  test('status 0 when nothing fails, 1 when something does, 0 on request', async () => {
    expect((await run(['vet', 'pbe', ...lieb])).status).toBe(0);
    expect((await run(['vet', 'b88', ...lieb])).status).toBe(1);
    expect((await run(['vet', 'b88', ...lieb, '--exit-zero'])).status).toBe(0);
  });

  test('JSON fits the published schema and tells domain, trial and constants', async () => {
    const args = ['--domain', 's=0:3', '--set', 'kappa=0.804', '--constants', 'lieb-oxford=1.6358', '--format', 'json'];
    const { out } = await run(['vet', 'pbe', ...lieb, ...args]);
    const [functional] = findingsSchema.parse(JSON.parse(out)).functionals;
    expect(functional).toMatchObject({ id: 'pbe', parameters: { kappa: '0.804' }, domain: { name: 'custom' } });
    expect(functional?.findings[0]).toMatchObject({
      constraint: 'exchange-lieb-oxford',
      constants: { 'lieb-oxford': 1.6358 },
    });
  });

  test('the same request gives the same bytes', async () => {
    const once = await run(['vet', 'b88', ...lieb, '--format', 'json']);
    expect(await run(['vet', 'b88', ...lieb, '--format', 'json'])).toEqual(once);
  });

  test("a condition of the user's own is asked beside the catalogue", async () => {
    const text = readFileSync(join(here, 'constraints', 'exchange-non-positive.yaml'), 'utf8');
    rmSync('own', { recursive: true, force: true });
    cpSync(join(here, 'constraints'), 'own', { recursive: true, filter: (path) => !path.endsWith('.yaml') });
    writeFileSync(join('own', 'our-own.yaml'), text);
    const { out } = await run(['vet', 'b88', '--constraints', 'own', '--only', 'our-own', '--format', 'json']);
    expect(findingsSchema.parse(JSON.parse(out)).functionals[0]?.findings[0]?.constraint).toBe('our-own');
  });
});

describe('sheets and catalogue', () => {
  test.each(['lda', 'gga', 'meta-gga'])('new writes a %s that at can evaluate, and never overwrites', async (rung) => {
    const id = `from-nothing-${rung}`;
    expect((await run(['new', id, '--rung', rung])).status).toBe(0);
    const again = await run(['new', id, '--rung', rung]);
    expect([again.status, again.err.includes('it exists already')]).toEqual([2, true]);
    const point = ['--rs', '1', '--zeta', '0', '--s', '1', '--alpha', '1'];
    expect((await run(['at', `./${id}.yaml`, ...point])).status).toBe(0);
    expect((await run(['at', id, ...point])).err).toContain(`write ./${id}.yaml`);
  });

  test('lists name what can be vetted and explained', async () => {
    const functionals = await run(['list', 'functionals']);
    expect(functionals.out).toMatch(/^pbe +PBE +1996/m);
    const constraints = JSON.parse((await run(['list', 'constraints', '--format', 'json'])).out) as { id: string }[];
    for (const { id } of constraints) {
      const { status, out } = await run(['explain', id]);
      expect([status, out.includes(id), out.includes('statement')]).toEqual([0, true, true]);
    }
  });

  test.each(['sheet', 'constraint', 'findings'])('the schema of a %s is JSON Schema', async (what) => {
    expect(JSON.parse((await run(['schema', what])).out)).toMatchObject({
      $schema: expect.stringContaining('2020-12'),
    });
  });
});

describe('bin/rungcheck.js', () => {
  test('without a build it says how to make one and ends with status 2', () => {
    cpSync(join(here, 'bin'), join(folder, 'unbuilt', 'bin'), { recursive: true });
    writeFileSync(join(folder, 'unbuilt', 'package.json'), '{"type":"module"}');
    const { status, stderr } = spawnSync(process.execPath, [join(folder, 'unbuilt', 'bin', 'rungcheck.js')], {
      encoding: 'utf8',
    });
    expect([status, stderr]).toEqual([2, expect.stringContaining('npm run build')]);
  });

  test.runIf(existsSync(join(here, 'dist', 'cli.js')))('a reader that closes the pipe early is no fault', () => {
    const command = `"${process.execPath}" "${join(here, 'bin', 'rungcheck.js')}" list functionals | head -n 1`;
    const { status, stderr } = spawnSync('bash', ['-o', 'pipefail', '-c', command], { encoding: 'utf8' });
    expect([status, stderr]).toEqual([0, '']);
  });
});
