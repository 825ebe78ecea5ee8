import { describe, expect, test } from 'vitest';
import { constantValues } from '../../src/constraint/constants.ts';
import type { Settings } from '../../src/constraint/decide.ts';
import { customDomain, type DomainCoordinate } from '../../src/constraint/domain.ts';
import { vetFunctional } from '../../src/constraint/vet.ts';
import type { Finding } from '../../src/finding/finding.ts';
import { parseDecimal, type Rational } from '../../src/number/rational.ts';
import { conditionOf, functionalOf, standardSettings } from './catalogue.ts';

const exact = (text: string) => parseDecimal(text) as Rational;

function find(functional: string, constraint: string, settings: Partial<Settings> = {}): Finding {
  const [finding] = vetFunctional(functionalOf(functional), [conditionOf(constraint)], {
    ...standardSettings,
    ...settings,
  }).findings;
  if (finding === undefined) throw new Error('no finding');
  return finding;
}

const within = (bounds: Partial<Record<DomainCoordinate, [number, number]>>): Partial<Settings> => ({
  domain: customDomain(new Map(Object.entries(bounds) as [DomainCoordinate, [number, number]][])),
});

describe('where enhancement factors cross a bound (crossings recomputed independently to three digits)', () => {
  test.each([
    ['pbe', 'exchange-lieb-oxford', '1.58', 4.91],
    ['pbesol', 'exchange-lieb-oxford', '1.58', 6.55],
    ['pbe', 'exchange-lieb-oxford', '1.6358', 7.76],
    ['pbesol', 'exchange-lieb-oxford', '1.6358', 10.35],
    ['pbe', 'exchange-hartree-fock-bound', '1.679', 1.65],
    ['pbesol', 'exchange-hartree-fock-bound', '1.679', 2.2],
  ])('%s, %s with C = %s: s = %f', (functional, constraint, constant, crossing) => {
    const constants = constantValues(new Map([['lieb-oxford', exact(constant)]]));
    const finding = find(functional, constraint, { ...within({ s: [0, 15] }), constants });
    expect(finding.verdict).toBe('violated');
    expect(finding.through[0]?.lower).toBeGreaterThan(crossing - 0.006);
    expect(finding.through[0]?.lower).toBeLessThan(crossing + 0.006);
  });
});

describe('the size of a margin', () => {
  test('PBE at s = 5 exceeds 1.174 by 1 + κ − κ/(1 + μs²/κ) − 1.174 (Eq. (14) of PRL 77, 3865)', () => {
    const mu = 0.2195149727645171;
    const expected = 1.174 - (1.804 - 0.804 / (1 + (mu * 25) / 0.804));
    const finding = find('pbe', 'exchange-two-electron-bound');
    expect(finding.margin).toBeCloseTo(expected, 12);
    expect(finding.witness).toMatchObject({ zeta: 0, s: 5, alpha: 0 });
    expect(finding.irrelevant).toEqual(['rs']);
    expect(Number(finding.confirmed)).toBeCloseTo(expected, 12);
    expect(finding.confirmedDigits).toBeGreaterThan(30);
  });

  test('LYP gives the fully polarised gas nothing: relative miss 1 (closed form: ε_c = 0 at ζ = 1)', () => {
    expect(find('lyp', 'correlation-uniform-gas')).toMatchObject({ verdict: 'violated', gate: 'fail', margin: -1 });
  });

  test('SCAN touches F_x = 1.174 at s = 0, α = 0 and does not pass it (h0x = 1.174, PRL 115, 036402)', () => {
    expect(find('scan', 'exchange-two-electron-bound')).toMatchObject({ verdict: 'holds', margin: 0 });
  });

  test('an identity of the formula is decided by one value', () => {
    expect(find('pbe', 'exchange-coordinate-scaling')).toMatchObject({ verdict: 'holds', margin: 0, points: 1 });
  });
});

describe('narrow regions', () => {
  test('P86 at r_s = 1, ζ = 0 is positive only for 1.96 < s < 2.28 (recomputed independently)', () => {
    const finding = find('p86', 'correlation-non-positive', within({ rs: [1, 1], zeta: [0, 0] }));
    const along = finding.through.find(({ coordinate }) => coordinate === 's');
    expect(finding.verdict).toBe('violated');
    expect(along?.lower).toBeCloseTo(1.96, 2);
    expect(along?.upper).toBeCloseTo(2.28, 2);
    expect(finding.regions[0]?.words).toBe('r_s = 1, ζ = 0, 1.96 ≤ s < 2.28');
  });

  test('the worst points of PKZB and TPSS lie at ζ from 0.9 to 1 (literature: 0.95–0.999)', () => {
    for (const functional of ['pkzb', 'tpss']) {
      const finding = find(functional, 'correlation-coordinate-scaling');
      expect(finding.verdict).toBe('violated');
      expect(finding.violatedShare).toBeLessThan(0.01);
      expect(finding.witness?.zeta).toBeGreaterThan(0.9);
    }
  });
});

describe('the invented re-fit of the README', () => {
  test('breaks four conditions: everywhere, in a spot, near ζ = 1, and by its digits', () => {
    const drift = find('functionals/demo/tern.yaml', 'exchange-coordinate-scaling');
    expect(drift.violatedShare).toBeGreaterThan(0.98);
    const spot = find('functionals/demo/tern.yaml', 'exchange-two-electron-bound');
    expect(spot.regions[0]?.words).toBe('r_s ≥ 0.872, 1.96 ≤ s ≤ 2.02');
    // 1 + 0.043 ζ²⁴ passes 1.02 at ζ = (0.02/0.043)^(1/24) = 0.96860 (closed form; the two gases differ by 2e-5).
    const open = find('functionals/demo/tern.yaml', 'correlation-uniform-gas');
    expect(open.through.find(({ coordinate }) => coordinate === 'zeta')?.lower).toBeCloseTo(
      (0.02 / 0.043) ** (1 / 24),
      4,
    );
    // a0 + a1 = −1e-4, times 2^(1/3) at ζ = 1.
    const digits = find('functionals/demo/tern.yaml', 'exchange-uniform-gas');
    expect(digits.margin).toBeCloseTo(-1e-4 * 2 ** (1 / 3), 12);
    expect(digits.cause?.kind).toBe('printed-digits');
    expect(drift.cause?.kind).toBe('formula');
  });

  test('and its corrected sheet holds all four', () => {
    for (const id of [
      'exchange-coordinate-scaling',
      'exchange-two-electron-bound',
      'correlation-uniform-gas',
      'exchange-uniform-gas',
    ]) {
      expect(find('functionals/demo/tern-corrected.yaml', id).verdict).toBe('holds');
    }
  });
});

describe('what a violation means for the exit status (catalogue, "How it gates")', () => {
  test.each([
    ['b88', 'exchange-lieb-oxford', 'fail', 'necessary for a GGA'],
    ['b3lyp', 'exchange-lieb-oxford', 'warn', 'sufficient only with exact exchange'],
    ['lyp', 'correlation-non-positive', 'warn', 'sufficient only'],
    ['pbe', 'correlation-kinetic-ceiling', 'note', 'a conjecture'],
    ['pbe', 'correlation-one-electron', 'warn', 'a GGA cannot meet it'],
    ['pbe', 'exchange-hartree-fock-bound', 'warn', 'no published design was built for it'],
  ])('%s, %s: %s, %s', (functional, constraint, gate) => {
    expect(find(functional, constraint)).toMatchObject({ verdict: 'violated', gate });
  });

  test('a condition that does not apply says why', () => {
    expect(find('lyp', 'exchange-lieb-oxford')).toMatchObject({
      verdict: 'not-applicable',
      reason: 'the functional has no exchange',
    });
    expect(find('cam-b3lyp', 'lieb-oxford').verdict).toBe('not-applicable');
  });
});

test('a trial value of a parameter moves the verdict: κ = 0.9 takes PBE above 1.80436 at large s', () => {
  // 1 + κ − κ/(1 + μs²/κ) = 1.80436 at s = 5.872 (closed form).
  const finding = find('pbe', 'exchange-lieb-oxford', {
    ...within({ s: [0, 20] }),
    parameters: new Map([['kappa', exact('0.9')]]),
  });
  const mu = 0.2195149727645171;
  const bound = 1.679 / (2 ** (1 / 3) * 0.7385587663820223);
  const closedForm = Math.sqrt(((0.9 / (1.9 - bound) - 1) * 0.9) / mu);
  expect(finding.verdict).toBe('violated');
  expect(finding.through[0]?.lower).toBeCloseTo(closedForm, 5);
});
