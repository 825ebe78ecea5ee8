import { describe, expect, it } from 'vitest';
import { add, choice, constant, decimal, div, mul, power, sqrt, sub, unary, variable } from '../../src/graph/build.ts';
import { Graph, type NodeId } from '../../src/graph/graph.ts';
import { evaluateCertified } from '../../src/kernel/certify.ts';
import { evaluateDecimal } from '../../src/kernel/decimal.ts';
import { Decimal } from '../../src/number/decimal.ts';
import { rational } from '../../src/number/rational.ts';

const at = (entries: Record<string, string>): Map<string, Decimal> =>
  new Map(Object.entries(entries).map(([name, text]) => [name, new Decimal(text)]));

describe('evaluateDecimal', () => {
  it('gives log 2 + cbrt 2 to 50 digits (OEIS A002162 + A002580)', () => {
    const graph = new Graph();
    const x = variable(graph, 'x');
    const output = add(graph, unary(graph, 'log', x), power(graph, x, rational(1, 3)));
    const [value] = evaluateDecimal(graph, [output], at({ x: '2' }), 55);
    // 0.69314718055994530941723212145817656807550013436025525412 + 1.25992104989487316476721060727822835057025146470150798008
    expect(value?.toFixed(50)).toBe('1.95306823045481847418444272873640491864575159906176');
  });

  it('keeps its precision through min, max and negation', () => {
    const graph = new Graph();
    const third = div(graph, variable(graph, 'x'), constant(graph, 3));
    const kept = ['min', 'max'].map((op) =>
      graph.intern({ kind: 'binary', op: op as 'min', args: [third, mul(graph, third, variable(graph, 'x'))] }),
    );
    const outputs = kept.map((node) => mul(graph, node, third));
    for (const value of evaluateDecimal(graph, outputs, at({ x: '1' }), 60)) {
      expect(value.toFixed(58)).toBe(`0.${'1'.repeat(58)}`);
    }
  });

  it('evaluates only the branch taken: an unbound variable or a division by zero elsewhere does not matter', () => {
    const graph = new Graph();
    const x = variable(graph, 'x');
    const faulty = div(graph, variable(graph, 'unbound'), sub(graph, x, x));
    const output = choice(graph, 'ifLess', x, constant(graph, 1), sqrt(graph, x), faulty);
    expect(evaluateDecimal(graph, [output], at({ x: '0.25' }), 30)[0]?.toString()).toBe('0.5');
    expect(() => evaluateDecimal(graph, [output], at({ x: '1' }), 30)).toThrow(/unbound/);
  });

  it('does not recurse: a chain of 20 000 nodes evaluates', () => {
    const graph = new Graph();
    let node: NodeId = variable(graph, 'x');
    for (let count = 0; count < 10_000; count++) node = unary(graph, 'sin', node);
    for (let count = 0; count < 10_000; count++)
      node = choice(graph, 'ifLess', variable(graph, 'x'), constant(graph, 1), variable(graph, 'x'), node);
    expect(evaluateDecimal(graph, [node], at({ x: '0.5' }), 20)[0]?.toString()).toBe('0.5');
  });
});

describe('evaluateCertified', () => {
  it('adds digits where 60 of them cancel: (1 + 10⁻⁶⁰) − 1', () => {
    const graph = new Graph();
    const x = variable(graph, 'x');
    const output = sub(graph, add(graph, x, decimal(graph, '1e-60')), x);
    const [certified] = evaluateCertified(graph, [output], at({ x: '1' }), 50);
    expect(certified?.agreedDigits).toBeGreaterThanOrEqual(45);
    expect(certified?.value.toString()).toBe('1e-60');
  });

  it('claims no digits of a zero reached by rounding, nor of NaN, and all of an exact zero', () => {
    const graph = new Graph();
    const x = variable(graph, 'x');
    const third = power(graph, x, rational(1, 3));
    // x^(1/3)·x^(1/3)·x^(1/3) − x is zero, but its evaluation leaves rounding noise.
    const noise = sub(graph, power(graph, third, rational(3)), x);
    const outputs = [
      noise,
      sqrt(graph, sub(graph, constant(graph, 1), x)),
      mul(graph, constant(graph, 2), sub(graph, x, constant(graph, 2))),
    ];
    const [zero, undefinedRoot, exact] = evaluateCertified(graph, outputs, at({ x: '2' }), 40);
    expect(zero?.agreedDigits).toBeLessThan(5);
    expect(undefinedRoot).toMatchObject({ agreedDigits: 0 });
    expect(undefinedRoot?.value.isNaN()).toBe(true);
    expect(exact?.agreedDigits).toBe(40);
  });
});
