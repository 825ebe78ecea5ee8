import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { run } from './stand-in.ts';

let folder = '';
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'own-conditions-'));
  const sheet = (requirement: string) => `title: Enhancement at large gradients
statement: F_x stays below 1.8
force: sufficient
status: norm
sources: [own]
part: exchange
rungs: [gga, meta-gga]
at: { rs: 1, alpha: 1 }
sweep: { zeta: [0, 1] }
requirement: ${requirement}
tolerance: 1e-9
`;
  writeFileSync(join(folder, 'own-limit.yaml'), sheet('limit(Fx, s, inf) <= 1.8'));
  writeFileSync(join(folder, 'faulty.yaml'), sheet('limit(Fx, t, inf) <= 1.8'));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

describe('explain --for', () => {
  test('adds verdict, witness and the margins around it', async () => {
    const { status, out } = await run(['explain', 'exchange-two-electron-bound', '--for', 'pbe']);
    expect(status).toBe(0);
    expect(out).toContain('PBE · pbe: ✗ violated');
    expect(out).toMatch(/worst at +ζ = 0, s = 5/);
    // 1.174 − F_x(0) = 0.174
    expect(out).toMatch(/margin along +s: 0 → \+0\.174/);
  });

  test('shows limiting sequences, of a condition of the user too', async () => {
    const { status, out } = await run(['explain', 'own-limit', '--for', 'pbe', '--constraints', folder]);
    expect(status).toBe(0);
    expect(out).toContain('tried on       r_s = 1, α = 1, ζ = 0 | 1');
    // 2^(1/3) 1.804 = 2.272897…
    expect(out).toMatch(/limit\(Fx, s, inf\) = 2\.27289757/);
    expect(out).toMatch(/s → ∞ +value/);
    expect(out).toContain('ζ = 0: -0.004');
  });

  test('a faulty condition of the user is a problem with its place', async () => {
    const { status, err } = await run(['explain', 'faulty', '--for', 'pbe', '--constraints', folder]);
    expect(status).toBe(2);
    expect(err).toMatch(/faulty\.yaml:10:14: limit\( , , \) goes along a coordinate/);
    expect(err).toContain('Write limit(f, x, inf) with x one of rs, zeta, s, alpha, q, omega.');
  });

  test('an unknown functional is a problem', async () => {
    expect((await run(['explain', 'lieb-oxford', '--for', 'pbf'])).err).toContain('there is no functional pbf');
  });
});

test('--margins shows the margins of the known holders and breakers', async () => {
  const { out } = await run(['explain', 'exchange-two-electron-bound', '--margins']);
  // SCAN touches 1.174 at s = 0 (PRL 115, 036402); PBE exceeds it by 0.527 at s = 5 (closed form).
  expect(out).toMatch(/scan \(0\)/);
  expect(out).toMatch(/pbe \(-0\.527\)/);
}, 60_000);

test('vet finds a condition in a folder of the user', async () => {
  const { out } = await run(['vet', 'pbe', '--only', 'own-limit', '--constraints', folder, '--format', 'json']);
  const [finding] = JSON.parse(out).functionals[0].findings;
  expect(finding).toMatchObject({ constraint: 'own-limit', verdict: 'violated', points: 2 });
  expect(finding.sequences[0].terms.length).toBeGreaterThan(5);
}, 30_000);
