import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { differentiate } from '../../src/derivative/differentiate.ts';
import { interpret } from '../../src/expression/interpret.ts';
import { parseExpression } from '../../src/expression/parse.ts';
import { variable } from '../../src/graph/build.ts';
import { Graph, type NodeId } from '../../src/graph/graph.ts';
import { evaluateDecimal } from '../../src/kernel/decimal.ts';
import { decimalContext } from '../../src/number/decimal.ts';

const context = decimalContext(80);

function build(graph: Graph, text: string): NodeId {
  const parsed = parseExpression({ text, placeAt: (offset) => ({ file: 'test', line: 1, column: offset + 1 }) });
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.problems));
  const scope = {
    name: (name: string) => variable(graph, name),
    member: () => 0,
    call: () => 0,
    memberCall: () => 0,
  };
  return interpret(graph, parsed.value, scope);
}

/** Relative difference of the graph's derivative from a central difference of step 1e-25 in 80 digits (error ~1e-50). */
function differenceAt(text: string, at: number): number {
  const graph = new Graph();
  const f = build(graph, text);
  const derivative = differentiate(graph, f, 'x');
  const value = (x: ReturnType<typeof context.from>, id: NodeId) =>
    evaluateDecimal(
      graph,
      [id],
      new Map([
        ['x', x],
        ['y', context.from('0.7')],
      ]),
      80,
    )[0] as typeof x;
  const x = context.from(at);
  const step = context.from('1e-25');
  const central = value(x.plus(step), f)
    .minus(value(x.minus(step), f))
    .div(step.times(2));
  const exact = value(x, derivative);
  return Number(central.minus(exact).abs().div(exact.abs().plus(1)));
}

describe('graph derivatives against 80-digit central differences', () => {
  const forms = [
    'exp(-x*y)',
    'expm1(x)',
    'log(1 + x^2)',
    'log1p(x)',
    'sin(x)*cos(y*x)',
    'sinh(x)/cosh(x)',
    'tanh(x^2)',
    'asinh(3*x)',
    'atan(x/y)',
    'erf(x)',
    'lambertw(x)',
    'abs(x - 5)',
    'min(x, y)*max(x, 2*x)',
    'sqrt(x)',
    'cbrt(x)',
    'x^(4/3)',
    'x^(-5/6)',
    'x^x',
    'x < 1 ? x^2 : 3*x',
    '(x + y)/(x*y - 3)',
    '1 + 0.804 - 0.804/(1 + 0.2195*x^2/0.804)',
    '-(x - y)^3',
    'exp(x) - 1',
    'log(1 - x/10)',
    'pi*x',
  ];
  test.each(forms)('%s', (text) => {
    for (const at of [0.3, 0.9, 1.7, 2.9]) expect(differenceAt(text, at)).toBeLessThan(1e-20);
  });

  test('random compositions (seeded)', () => {
    const leaf = fc.constantFrom('x', 'y', '2', '0.5', 'pi');
    const { tree } = fc.letrec<{ tree: string }>((tie) => ({
      tree: fc.oneof(
        { maxDepth: 4 },
        leaf,
        fc.tuple(tie('tree'), fc.constantFrom('+', '-', '*'), tie('tree')).map(([a, op, b]) => `(${a} ${op} ${b})`),
        fc.tuple(tie('tree'), tie('tree')).map(([a, b]) => `(${a})/(1 + (${b})^2)`),
        fc
          .tuple(fc.constantFrom('atan', 'tanh', 'asinh', 'erf', 'sin', 'cos'), tie('tree'))
          .map(([name, a]) => `${name}(${a})`),
        tie('tree').map((a) => `log(1 + (${a})^2)`),
        tie('tree').map((a) => `(1 + (${a})^2)^(2/3)`),
      ),
    }));
    let usable = 0;
    fc.assert(
      fc.property(tree, fc.double({ min: 0.1, max: 2, noNaN: true }), (text, at) => {
        const difference = differenceAt(text, at);
        if (Number.isFinite(difference)) usable++;
        return !Number.isFinite(difference) || difference < 1e-15;
      }),
      { seed: 20260101, numRuns: 150 },
    );
    expect(usable).toBeGreaterThan(100);
  });
});

describe('one-sided derivatives at a kink', () => {
  const oneSided = (text: string, at: number) => {
    const graph = new Graph();
    const derivative = differentiate(graph, build(graph, text), 'x');
    return Number(evaluateDecimal(graph, [derivative], new Map([['x', context.from(at)]]), 30)[0]);
  };
  test('|x| has the right derivative at 0', () => expect(oneSided('abs(x)', 0)).toBe(1));
  test('a conditional has the derivative of the branch it takes', () => {
    expect(oneSided('x < 1 ? x^2 : 5*x', 1)).toBe(5);
    expect(oneSided('x <= 1 ? x^2 : 5*x', 1)).toBe(2);
  });
});
