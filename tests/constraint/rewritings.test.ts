import { describe, expect, test } from 'vitest';
import type { Expression } from '../../src/expression/expression.ts';
import { parseExpression } from '../../src/expression/parse.ts';
import { expressionText } from '../../src/expression/print.ts';
import { rational } from '../../src/number/rational.ts';
import { findingOf, mutated, settled } from './made.ts';

/** Formulas that stand in the sheets on one line, and conditions that look at them. */
const formulas: readonly [sheet: string, formula: string, condition: string][] = [
  ['pbe', '1 + kappa - kappa/(1 + mu*s^2/kappa)', 'exchange-gradient-second-order'],
  ['pbe', '1 + kappa - kappa/(1 + mu*s^2/kappa)', 'exchange-hartree-fock-bound'],
  ['pbe', 'gamma*phi^3*log(1 + beta/gamma*t^2*(1 + y)/(1 + y + y^2))', 'correlation-gradient-second-order'],
  ['pbe', 'beta/gamma/(exp(-ec/(gamma*phi^3)) - 1)', 'correlation-gas-monte-carlo'],
  [
    'pw92',
    '-2*A*(1 + a*rs)*log(1 + 1/(2*A*(b1*sqrt(rs) + b2*rs + b3*rs^(3/2) + b4*rs^2)))',
    'correlation-gas-monte-carlo',
  ],
  ['pw92', '((1 + zeta)^(4/3) + (1 - zeta)^(4/3) - 2)/(2^(4/3) - 2)', 'correlation-gas-spin-stiffness'],
  ['pw92', 'ec0 + stiffness*f(zeta)/f2*(1 - zeta^4) + (ec1 - ec0)*f(zeta)*zeta^4', 'correlation-gas-low-density'],
  ['scan', '1 + k1 - k1/(1 + y/k1)', 'exchange-gradient-fourth-order'],
  ['scan', '(h1 + f(alpha, c1x, c2x, dx)*(h0x - h1))*gx(s)', 'exchange-two-electron-bound'],
  ['scan', 'gamma*phi^3*log(1 + w1*(1 - gc1))', 'correlation-gas-monte-carlo'],
];

/** Rewritings that hold for every real number. */
const rules: readonly ((e: Expression) => Expression | undefined)[] = [
  // a + b = b + a, a b = b a
  (e) => (isArithmetic(e, '+', '*') ? { ...e, left: e.right, right: e.left } : undefined),
  // a − b = −b + a
  (e) => (isArithmetic(e, '-') ? { ...e, op: '+', left: negated(e.right), right: e.left } : undefined),
  // a + b = −(−a − b)
  (e) => (isArithmetic(e, '+') ? negated({ ...e, op: '-', left: negated(e.left) }) : undefined),
  // a/b = (2a)/(2b)
  (e) => (isArithmetic(e, '/') ? { ...e, left: doubled(e.left), right: doubled(e.right) } : undefined),
  // a b = −(a (−b))
  (e) => (isArithmetic(e, '*') ? negated({ ...e, right: negated(e.right) }) : undefined),
];

describe('harmless rewritings of PBE, PW92 and SCAN change no verdict and no margin beyond round-off', () => {
  let count = 0;
  for (const [sheet, formula, condition] of formulas) {
    const original = settled(parseExpression({ text: formula, placeAt: () => ({ file: '', line: 1, column: 1 }) }));
    const before = findingOf(mutated(sheet, formula, formula), condition);
    for (const [number, rule] of rules.entries()) {
      const rewritten =
        rewrittenOnce(original, rule, number * 2) ?? rewrittenOnce(original, rules[0] as typeof rule, number);
      const text = expressionText(rewritten as Expression);
      count++;
      test(`${sheet}, ${condition}: ${text}`, () => {
        expect(text).not.toBe(expressionText(original));
        const after = findingOf(mutated(sheet, formula, text), condition);
        expect(after.verdict).toBe(before.verdict);
        expect(after.gate).toBe(before.gate);
        const allowed = 1e-12 * Math.max(1, Math.abs(before.margin as number));
        expect(Math.abs((after.margin as number) - (before.margin as number))).toBeLessThanOrEqual(allowed);
      });
    }
  }
  test('there are fifty', () => expect(count).toBe(50));
});

type Arithmetic = Extract<Expression, { kind: 'arithmetic' }>;

function isArithmetic(e: Expression, ...ops: readonly Arithmetic['op'][]): e is Arithmetic {
  return e.kind === 'arithmetic' && ops.includes(e.op);
}

function negated(operand: Expression): Expression {
  return { kind: 'negation', operand, offset: 0 };
}

function doubled(right: Expression): Expression {
  return { kind: 'arithmetic', op: '*', left: { kind: 'number', value: rational(2), offset: 0 }, right, offset: 0 };
}

/** The rule applied at the place-th operation that it fits; at the last one where there are fewer. */
function rewrittenOnce(
  expression: Expression,
  rule: (e: Expression) => Expression | undefined,
  place: number,
): Expression | undefined {
  let fits = 0;
  walk(expression, (e) => {
    if (rule(e) !== undefined) fits++;
    return undefined;
  });
  if (fits === 0) return undefined;
  let left = place % fits;
  return walk(expression, (e) => (rule(e) !== undefined && left-- === 0 ? rule(e) : undefined));
}

/** Rebuilds an expression; where `change` answers, its answer stands instead. */
function walk(e: Expression, change: (e: Expression) => Expression | undefined): Expression {
  const changed = change(e);
  if (changed !== undefined) return changed;
  switch (e.kind) {
    case 'arithmetic':
      // Exponents stay the exact constants that they are.
      return { ...e, left: walk(e.left, change), right: e.op === '^' ? e.right : walk(e.right, change) };
    case 'negation':
      return { ...e, operand: walk(e.operand, change) };
    case 'call':
      return { ...e, args: e.args.map((argument) => walk(argument, change)) };
    default:
      return e;
  }
}
