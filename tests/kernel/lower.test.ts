import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { add, power, variable } from '../../src/graph/build.ts';
import { Graph } from '../../src/graph/graph.ts';
import { printNode } from '../../src/graph/print.ts';
import { evaluateDecimal } from '../../src/kernel/decimal.ts';
import { lowerPowers } from '../../src/kernel/lower.ts';
import { decimalContext } from '../../src/number/decimal.ts';
import { rational } from '../../src/number/rational.ts';

describe('lowerPowers', () => {
  it.each([
    [rational(4, 3), 'x*cbrt(x)'],
    [rational(2, 3), 'cbrt(x)*cbrt(x)'],
    [rational(-1, 3), '1/cbrt(x)'],
    [rational(5, 3), 'x*cbrt(x)*cbrt(x)'],
    [rational(1, 2), 'abs(sqrt(x))'],
    [rational(7, 6), 'abs(x*sqrt(cbrt(x)))'],
    [rational(4), 'x*x*x*x'],
    [rational(2, 7), 'x^(2/7)'],
  ])('x^(%s) becomes products and roots as done by hand', (exponent, expected) => {
    const graph = new Graph();
    const lowered = lowerPowers(graph, [power(graph, variable(graph, 'x'), exponent)]);
    const text = printNode(lowered.graph, lowered.outputs[0] as number);
    expect(text).toBe(expected);
  });

  it('the powers 1/3, 2/3, 4/3, −1/3 and 8/3 share one cube root', () => {
    const graph = new Graph();
    const x = variable(graph, 'x');
    const powers = [rational(1, 3), rational(2, 3), rational(4, 3), rational(-1, 3), rational(8, 3)];
    const sum = powers.map((exponent) => power(graph, x, exponent)).reduce((total, term) => add(graph, total, term));
    const lowered = lowerPowers(graph, [sum]);
    expect(lowered.graph.nodes.filter(({ kind }) => kind === 'power')).toHaveLength(1);
  });

  it('agrees with the power itself in 40 digits, for either sign of x', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: -70, max: 70 }),
        fc.integer({ min: 1, max: 8 }),
        fc.integer({ min: -999, max: 999 }),
        (p, q, base) => {
          const graph = new Graph();
          const output = power(graph, variable(graph, 'x'), rational(p, q));
          const lowered = lowerPowers(graph, [output]);
          const context = decimalContext(50);
          const x = new Map([['x', context.from(base).div(100)]]);
          const direct = evaluateDecimal(graph, [output], x, 50)[0];
          const image = evaluateDecimal(lowered.graph, lowered.outputs, x, 50)[0];
          const same = direct?.toSignificantDigits(40).toString() === image?.toSignificantDigits(40).toString();
          expect(same, `${base}/100: ${direct} and ${image}`).toBe(true);
        },
      ),
      { seed: 40, numRuns: 300 },
    );
  });
});
