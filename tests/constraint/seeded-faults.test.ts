import { describe, expect, test } from 'vitest';
import { functionalOf } from './catalogue.ts';
import { findingOf, mutated } from './made.ts';

/** One fault in a published sheet, and the condition that has to catch it; the sheet itself holds the condition. */
const faults: readonly [sheet: string, from: string, to: string, condition: string][] = [
  // PBE, exchange
  ['pbe', 'value: 0.804,', 'value: 1.0,', 'exchange-lieb-oxford'],
  ['pbe', 'value: 0.804,', 'value: 1.245,', 'exchange-lieb-oxford'],
  ['pbe', 'value: beta*pi^2/3', 'value: beta*pi^2/4', 'gas-linear-response'],
  ['pbe', 'value: beta*pi^2/3', 'value: 2*beta*pi^2/3', 'gas-linear-response'],
  ['pbe', 'value: beta*pi^2/3', 'value: -beta*pi^2/3', 'gas-linear-response'],
  ['pbe', '1 + kappa - kappa/', '1 + kappa + kappa/', 'exchange-uniform-gas'],
  ['pbe', '1 + kappa - kappa/', '1 - kappa - kappa/', 'exchange-uniform-gas'],
  ['pbe', 'mu*s^2/kappa', 'mu*s^4/kappa', 'gas-linear-response'],
  ['pbe', '(1 + mu*s^2/kappa)', '(1 - mu*s^2/kappa)', 'gas-linear-response'],
  // PBE, correlation
  ['pbe', 'value: 0.06672455060314922', 'value: 0.06', 'correlation-gradient-second-order'],
  ['pbe', 'value: 0.06672455060314922', 'value: 0.0780', 'correlation-gradient-second-order'],
  ['pbe', 'value: (1 - log(2))/pi^2', 'value: 0.9*(1 - log(2))/pi^2', 'correlation-high-density-limit'],
  ['pbe', 'beta/gamma*t^2*(1 + y)', '0.9*beta/gamma*t^2*(1 + y)', 'correlation-gradient-second-order'],
  ['pbe', 'per-particle: ec + H', 'per-particle: ec - H', 'correlation-gradient-second-order'],
  ['pbe', 'per-particle: ec + H', 'per-particle: H - ec', 'correlation-gas-monte-carlo'],
  ['pbe', 'per-particle: ec + H', 'per-particle: ec + 2*H', 'correlation-high-density-limit'],
  ['pbe', 'gamma*phi^3*log(', 'gamma*phi^2*log(', 'correlation-high-density-limit'],
  ['pbe', 'log(1 + beta/gamma', 'log(1 - beta/gamma', 'correlation-gradient-second-order'],
  ['pbe', '(1 + y)/(1 + y + y^2)', '(1 + y)/(1 + y + 2*y^2)', 'correlation-rapid-variation'],
  ['pbe', 'exp(-ec/(gamma*phi^3))', 'exp(-2*ec/(gamma*phi^3))', 'correlation-rapid-variation'],
  // PW92
  ['pw92', 'A0: { value: 0.031091', 'A0: { value: 0.041091', 'correlation-gas-high-density'],
  ['pw92', 'A0: { value: 0.031091', 'A0: { value: 0.021091', 'correlation-gas-high-density'],
  ['pw92', 'value: 0.21370', 'value: 0.31370', 'correlation-gas-low-density'],
  ['pw92', 'value: 7.5957', 'value: 9.5957', 'correlation-gas-high-density'],
  ['pw92', 'value: 3.5876', 'value: 5.5876', 'correlation-gas-monte-carlo'],
  ['pw92', 'value: 1.6382', 'value: 0.6382', 'correlation-gas-monte-carlo'],
  ['pw92', 'value: 0.49294', 'value: 0.39294', 'correlation-gas-low-density'],
  ['pw92', 'A1: { value: 0.015545', 'A1: { value: 0.025545', 'correlation-gas-high-density'],
  ['pw92', 'value: 0.20548', 'value: 0.40548', 'correlation-gas-low-density'],
  ['pw92', 'value: 14.1189', 'value: 10.1189', 'correlation-gas-high-density'],
  ['pw92', 'value: 3.3662', 'value: 6.3662', 'correlation-gas-monte-carlo'],
  ['pw92', 'value: 0.016887', 'value: 0.026887', 'correlation-gas-spin-stiffness'],
  ['pw92', 'value: 0.11125', 'value: 0.21125', 'correlation-gas-spin-stiffness'],
  ['pw92', 'value: 10.357', 'value: 14.357', 'correlation-gas-spin-stiffness'],
  ['pw92', 'value: 3.6231', 'value: 8.6231', 'correlation-gas-spin-stiffness'],
  ['pw92', 'value: 0.88026', 'value: 3.88026', 'correlation-gas-spin-stiffness'],
  ['pw92', 'f2: { value: 1.709921', 'f2: { value: 1.409921', 'correlation-gas-spin-stiffness'],
  ['pw92', 'per-particle: ec0 + stiffness', 'per-particle: ec0 - stiffness', 'correlation-gas-spin-stiffness'],
  ['pw92', '(ec1 - ec0)*f(zeta)*zeta^4', '(ec1 + ec0)*f(zeta)*zeta^4', 'correlation-gas-monte-carlo'],
  ['pw92', '(1 - zeta)^(4/3) - 2)/', '(1 - zeta)^(5/3) - 2)/', 'correlation-spin-symmetry'],
  // SCAN, exchange
  ['scan', 'mu: { value: 10/81', 'mu: { value: 10/80', 'exchange-gradient-second-order'],
  ['scan', '511/13500/(2*b2)', '511/13500/b2', 'exchange-gradient-fourth-order'],
  [
    'scan',
    'value: mu^2/k1 - 1606/18225 - b1^2',
    'value: mu^2/k1 + 1606/18225 - b1^2',
    'exchange-gradient-fourth-order',
  ],
  ['scan', 'exp(-a1/sqrt(s))', 'exp(-a1/cbrt(s))', 'exchange-nonuniform-scaling'],
  ['scan', 'h0x: { value: 1.174', 'h0x: { value: 1.194', 'exchange-two-electron-bound'],
  // SCAN, correlation
  ['scan', 'value: 0.066725', 'value: 0.046', 'correlation-gradient-second-order'],
  [
    'scan',
    'gamma: { value: (1 - log(2))/pi^2',
    'gamma: { value: 0.9*(1 - log(2))/pi^2',
    'correlation-high-density-limit',
  ],
  ['scan', 'b1c*log(1 + w0*(1 - (1 + 4*chi', 'b1c*log(1 + w0*(2 - (1 + 4*chi', 'correlation-rapid-variation'],
  ['scan', '(1 - zeta^12)', '(1 - zeta^12/2)', 'correlation-one-electron'],
  ['scan', 'gc: { value: 2.3631', 'gc: { value: -2.3631', 'low-density-spin-independence'],
];

describe('fifty faults in PBE, PW92 and SCAN are each caught by the condition that forbids them', () => {
  test('there are fifty', () => expect(faults).toHaveLength(50));

  test.each(faults)('%s: %s → %s breaks %s', (sheet, from, to, condition) => {
    const finding = findingOf(mutated(sheet, from, to), condition);
    expect(finding.verdict, finding.reason).toBe('violated');
  });

  test('the sheets as they are hold all of these conditions', () => {
    const asked = new Set(faults.map(([sheet, , , condition]) => `${sheet} ${condition}`));
    const broken = [...asked].filter((key) => {
      const [sheet, condition] = key.split(' ') as [string, string];
      return findingOf(functionalOf(sheet), condition).verdict !== 'holds';
    });
    expect(broken).toEqual([]);
  });
});
