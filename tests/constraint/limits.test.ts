import { describe, expect, test } from 'vitest';
import { closedFormsWithin } from '../../src/closed-form/algebra.ts';
import { parseDecimal, type Rational } from '../../src/number/rational.ts';
import { findingOf, madeCondition, madeFunctional, mutated, settled } from './made.ts';

/** A condition that is nothing but a value: its margin is minus the distance from what is expected. */
function marginOf(functional: string, quantity: string, at: string, relation = '== 0'): number {
  const condition = settled(
    madeCondition(`
title: a value
statement: a value
force: definition
status: norm
sources: [test]
part: exchange-correlation
rungs: [lda, gga, meta-gga]
at: ${at}
requirement: ${quantity} ${relation}
tolerance: 1e-9
`),
  );
  const finding = findingOf(functional, condition);
  return finding.margin as number;
}

/** F_x bounded at s → ∞. */
function belowAtLargeGradients(bound: string) {
  return settled(
    madeCondition(`
title: large s
statement: large s
force: sufficient
status: norm
sources: [test]
part: exchange
rungs: [gga]
at: { rs: 1, zeta: 0, alpha: 1 }
requirement: limit(Fx, s, inf) <= ${bound}
tolerance: 1e-9
`),
  );
}

/** ∂F_x/∂p, ∂F_x/∂α and ½ ∂²F_x/∂α² at s = 0, α = 1: evaluated with an independent library of functionals, r_s = 1. */
describe('gradient coefficients of published functionals are those recomputed independently', () => {
  const at = '{ rs: 1, zeta: 0, s: 0, alpha: 1, q: 0 }';
  test.each([
    ['scan', 0.123457, 0, 0.01459],
    ['rscan', 0.12335, -0.16309, 0.0886],
    ['rppscan', 0.12373, -0.16274, 0.0885],
    ['r2scan', 0.00291, -0.16274, 0.0739],
    ['tpss', 0.123457, 0, 0.0146],
    ['ms0', 0.123457, 0, 0.0002],
    ['mvs', 0, -0.16667, 0.2603],
    ['task', -0.03202, -0.2099, 0.0167],
  ])('%s: %f, %f, %f', (functional, byP, byAlpha, second) => {
    const miss = (quantity: string, expected: number) =>
      Math.abs(marginOf(functional, quantity, at, `== ${expected}`)) as number;
    expect(miss('coefficient(Fx, p, 1)', byP)).toBeLessThan(6e-6);
    expect(miss('coefficient(Fx, alpha, 1)', byAlpha)).toBeLessThan(6e-6);
    // By finite differences there, good to about 2e-4.
    expect(miss('coefficient(Fx, alpha, 2)', second)).toBeLessThan(3e-4);
  });

  test.each([
    // B88: β = 0.0042 gives μ = 0.274293, recomputed.
    ['b88', 0.274293],
    ['pbe', 0.2195149727645171],
    ['pbesol', 0.12345679012],
  ])('%s: μ = %f', (functional, mu) => {
    expect(Math.abs(marginOf(functional, 'coefficient(Fx, p, 1)', at, `== ${mu}`))).toBeLessThan(6e-7);
  });
});

describe('limits of the uniform gas', () => {
  const gas = '{ zeta: 0, s: 0, alpha: 1, q: 0 }';
  test('PW92 has c1 = 0.046643 at ζ = 0 (from its parameters, recomputed) and c0 = 0.031091 (as printed)', () => {
    expect(
      Math.abs(marginOf('pw92', 'limit(rs*d(eps_c, rs)*log(rs) - eps_c, rs, 0)', gas, '== 0.046643')),
    ).toBeLessThan(1e-6);
    expect(Math.abs(marginOf('pw92', 'limit(rs*d(eps_c, rs), rs, 0)', gas, '== 0.031091'))).toBeLessThan(1e-12);
  });

  test('PW92 has d0 = 0.43352 and 0.32868 at ζ = 0 and 1 (from its parameters, recomputed)', () => {
    expect(Math.abs(marginOf('pw92', 'limit(rs*eps_c, rs, inf)', gas, '== -0.43352'))).toBeLessThan(6e-6);
    const polarised = '{ zeta: 1, s: 0, alpha: 1, q: 0 }';
    expect(Math.abs(marginOf('pw92', 'limit(rs*eps_c, rs, inf)', polarised, '== -0.32868'))).toBeLessThan(6e-6);
  });

  test('LYP and the fit to the random-phase approximation miss every condition on the gas', () => {
    for (const id of ['lyp', 'vwn-rpa']) {
      expect(findingOf(id, 'correlation-gas-monte-carlo')).toMatchObject({ verdict: 'violated', gate: 'fail' });
      expect(findingOf(id, 'correlation-gas-high-density').verdict).toBe('violated');
    }
  });
});

describe('limits at large s', () => {
  const at = '{ rs: 1, zeta: 0, alpha: 1, q: 0 }';
  test.each([
    // κ = 0.804 and 1.245; libxc 5.2.3 gives the limits 1.8040 and 2.2450
    ['pbe', 1.804],
    ['revpbe', 2.245],
    ['rpbe', 1.804],
  ])('F_x of %s tends to %f', (functional, limit) => {
    expect(Math.abs(marginOf(functional, 'limit(Fx, s, inf)', at, `== ${limit}`))).toBeLessThan(1e-12);
  });

  test('F_xc of revPBE at ζ = 1 tends to 2^(1/3)(1 + κ) (catalogue, Traps)', () => {
    const polarised = '{ rs: 1, zeta: 1, alpha: 1, q: 0 }';
    const miss = marginOf('revpbe', 'limit(Fxc, s, inf)', polarised, '== 2^(1/3)*2.245');
    expect(Math.abs(miss)).toBeLessThan(1e-9);
  });

  test.each([
    ['pbe', 0, 0],
    ['scan', -0.5, 0],
    // s asinh(s) in the denominator
    ['b88', 1, -1],
  ])('F_x of %s grows as s^%f (ln s)^%f (closed form)', (functional, power, logPower) => {
    expect(Math.abs(marginOf(functional, 'order(Fx, s, inf)', at, `== ${power}`))).toBeLessThan(1e-4);
    expect(Math.abs(marginOf(functional, 'logOrder(Fx, s, inf)', at, `== ${logPower}`))).toBeLessThan(2e-2);
  });
});

describe('the two orders of s → 0 and α → 0', () => {
  test('TPSS: a table of both limits differs by 0.119, SCAN: not at all (Ruzsinszky et al., JCTC 8, 2078 (2012))', () => {
    const tpss = findingOf('tpss', 'exchange-limit-order');
    expect(tpss).toMatchObject({ verdict: 'violated', gate: 'fail' });
    expect(tpss.margin).toBeCloseTo(-0.119, 3);
    expect(tpss.sequences?.length).toBe(2);
    expect(findingOf('scan', 'exchange-limit-order').verdict).toBe('holds');
  });
});

describe('closed forms in the parameters of the sheet', { timeout: 60_000 }, () => {
  const settings = { closedForms: closedFormsWithin(30_000) };
  test('PBE: μ at small s and 1 + κ at large s (Eq. (14) of PRL 77, 3865)', () => {
    const second = findingOf('pbe', 'exchange-gradient-second-order', settings);
    expect(second.sequences?.find(({ quantity }) => quantity === 'coefficient(Fx, p, 1)')?.closedForm).toBe('mu');
    const condition = belowAtLargeGradients('1.804');
    expect(findingOf('pbe', condition, settings).sequences?.[0]?.closedForm).toBe('1 + kappa');
    // (1 + 15 a s²/15 …)^(1/15) is no rational function: the number stands alone.
    expect(findingOf('pw86', condition, settings).sequences?.[0]?.closedForm).toBeNull();
  });

  test('an answer that does not agree with the number is not shown', () => {
    const finding = findingOf('pbe', 'exchange-gradient-second-order', {
      closedForms: (asked) => asked.map(() => '2*p0'),
    });
    expect(finding.sequences?.every(({ closedForm }) => closedForm === null)).toBe(true);
  });
});

describe('forms made to break what no published functional breaks', () => {
  const made = (exchange: string, correlation: string, exact = '') =>
    madeFunctional(`
name: made
rung: meta-gga
citations: [test]
uses: { base: r2scan }
${exact}
exchange: { enhancement: "${exchange}" }
correlation: { per-particle: "${correlation}" }
`);

  test.each([
    ['exchange-alpha-bounded', made('base.enhancement(s, alpha) + 0.001*sqrt(alpha)', 'base.correlation'), -0.5],
    // F_c of a logarithm: r_s ∂F_c/∂r_s tends to 0.01
    ['correlation-low-density-limit', made('1', 'base.correlation + 0.01*epsx_unif*log(1 + rs)'), -0.01],
    // A tenth too much of short-range exchange.
    ['range-separation-limits', mutated('cam-b3lyp', 'b0*attenuation(', '1.1*b0*attenuation('), -0.1],
    // A quarter of exact exchange that the semilocal part does not make room for.
    ['hybrid-bookkeeping', made('base.enhancement(s, alpha)', 'base.correlation', 'exact-exchange: 0.25'), -0.25],
  ])('%s, with the size known in closed form', (condition, functional, margin) => {
    const finding = findingOf(functional, condition);
    expect(finding.verdict, finding.reason).toBe('violated');
    expect(finding.margin).toBeCloseTo(margin, 6);
  });
});

test('a function without a limit is undecided, and its sequence is shown', () => {
  const wavy = madeFunctional(`
name: wavy
rung: gga
citations: [test]
exchange: { enhancement: 1 + 0.1*sin(s) }
`);
  const finding = findingOf(wavy, belowAtLargeGradients('1.05'));
  expect(finding.verdict).toBe('undecided');
  expect(finding.sequences?.[0]?.terms.length).toBeGreaterThan(5);
});

test('exact decimals of parameters reach a limit: κ = 0.9 gives 1.9 to all digits', () => {
  const parameters = new Map([['kappa', parseDecimal('0.9') as Rational]]);
  const condition = belowAtLargeGradients('1.804');
  expect(findingOf('pbe', condition, { parameters }).margin).toBeCloseTo(-0.096, 14);
});
