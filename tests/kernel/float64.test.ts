import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { add, choice, constant, div, mul, pi, power, sqrt, sub, unary, variable } from '../../src/graph/build.ts';
import { Graph, type NodeId } from '../../src/graph/graph.ts';
import { reachable } from '../../src/graph/traverse.ts';
import { evaluateDecimal } from '../../src/kernel/decimal.ts';
import { type AxisGroup, compileKernel } from '../../src/kernel/float64.ts';
import { generate } from '../../src/kernel/generate.ts';
import { planKernel } from '../../src/kernel/plan.ts';
import { exactDecimal } from '../../src/number/decimal.ts';
import { rational } from '../../src/number/rational.ts';
import { arbitraryExpression, arbitraryPoint, variableNames } from '../graph/arbitrary.ts';

function evaluateGrid(
  graph: Graph,
  outputs: readonly NodeId[],
  axes: readonly AxisGroup[],
  values: readonly (readonly (readonly number[])[])[],
  lengths?: readonly number[],
): Float64Array[] {
  const points = values.reduce((product, axis) => product * (axis[0]?.length ?? 0), 1);
  const out = outputs.map(() => new Float64Array(points).fill(123));
  const kernel = compileKernel(graph, outputs, axes, lengths);
  kernel.evaluate(
    values.map((axis) => axis.map((list) => Float64Array.from(list))),
    out,
  );
  return out;
}

const list: AxisGroup = { variables: variableNames };
const separate: AxisGroup[] = variableNames.map((name) => ({ variables: [name] }));

describe('random graphs over every operator', () => {
  it('the hoisted product grid equals one-point evaluation bit for bit, in any loop order', () => {
    fc.assert(
      fc.property(
        arbitraryExpression(4),
        arbitraryExpression(3),
        fc.array(arbitraryPoint, { minLength: 1, maxLength: 3 }),
        fc.tuple(fc.nat(60), fc.nat(60), fc.nat(60)),
        (first, second, points, lengths) => {
          const graph = new Graph();
          const outputs = [first(graph), second(graph)];
          const [as, bs, cs] = [0, 1, 2].map((place) => points.map((point) => point[place] as number)) as [
            number[],
            number[],
            number[],
          ];
          // Lengths 1 to 3, all different where there are enough points.
          const [shorter, shortest] = [bs.slice(0, 2), cs.slice(0, 1)];
          const grid = evaluateGrid(graph, outputs, separate, [[as], [shorter], [shortest]], lengths);
          const single = compileKernel(graph, outputs, [list]);
          const expected = outputs.map((): number[] => []);
          for (const a of as) {
            for (const b of shorter) {
              for (const c of shortest) {
                const out = outputs.map(() => new Float64Array(1));
                single.evaluate([[a, b, c].map((value) => Float64Array.of(value))], out);
                out.forEach((array, index) => {
                  expected[index]?.push(array[0] as number);
                });
              }
            }
          }
          expect(grid.map((array) => [...array])).toEqual(expected);
        },
      ),
      { seed: 31, numRuns: 300 },
    );
  });

  it('double precision equals 40-digit evaluation to 1e-12 of the largest intermediate value squared', () => {
    let usable = 0;
    const runs = 300;
    fc.assert(
      fc.property(arbitraryExpression(4), arbitraryPoint, (build, point) => {
        const graph = new Graph();
        const output = build(graph);
        const bindings = new Map(variableNames.map((name, place) => [name, exactDecimal(point[place] as number)]));
        const nodes = reachable(graph, [output]);
        const all = evaluateDecimal(graph, nodes, bindings, 40).map((value) => value.toNumber());
        const largest = Math.max(1, ...all.map(Math.abs));
        if (!(largest < 1e3)) return;
        usable++;
        const [array] = evaluateGrid(graph, [output], [list], [point.map((value) => [value])]);
        const expected = all[nodes.indexOf(output)] as number;
        expect(Math.abs((array?.[0] as number) - expected)).toBeLessThanOrEqual(1e-12 * largest ** 2);
      }),
      { seed: 32, numRuns: runs },
    );
    expect(usable).toBeGreaterThan(runs / 2);
  });
});

describe('layout', () => {
  const build = (graph: Graph): NodeId[] => {
    const [x, y, z] = ['x', 'y', 'z'].map((name) => variable(graph, name)) as [NodeId, NodeId, NodeId];
    const xz = mul(graph, x, z);
    return [
      add(graph, mul(graph, constant(graph, 100), x), add(graph, mul(graph, constant(graph, 10), y), z)),
      xz,
      add(graph, y, constant(graph, 1)),
      constant(graph, 7),
      add(graph, mul(graph, xz, xz), mul(graph, y, z)),
      z,
    ];
  };
  const formulas = [
    (x: number, y: number, z: number) => 100 * x + (10 * y + z),
    (x: number, _y: number, z: number) => x * z,
    (_x: number, y: number) => y + 1,
    () => 7,
    (x: number, y: number, z: number) => x * z * (x * z) + y * z,
    (_x: number, _y: number, z: number) => z,
  ];

  it.each([[[2, 3, 4]], [[4, 1, 3]], [[1, 1, 1]], [[1, 5, 1]], [[3, 2, 1]]])(
    'every output is row-major over axes of lengths %j, whatever the loop order, as nested loops over the formula',
    (lengths) => {
      const axisValues = lengths.map((length, axis) => Array.from({ length }, (_, index) => index + axis + 1));
      const [xs, ys, zs] = axisValues as [number[], number[], number[]];
      const expected = formulas.map((formula) => xs.flatMap((x) => ys.flatMap((y) => zs.map((z) => formula(x, y, z)))));
      for (const order of ['012', '021', '102', '120', '201', '210'].map((digits) => [...digits].map(Number))) {
        const graph = new Graph();
        const axes = ['x', 'y', 'z'].map((name) => ({ variables: [name] }));
        const { source, tables } = generate({ ...planKernel(graph, build(graph), axes), order });
        const out = formulas.map(() => new Float64Array(xs.length * ys.length * zs.length).fill(123));
        const storage = tables.map(
          (table) => new Float64Array(table.axes.reduce((size, axis) => size * (lengths[axis] as number), table.width)),
        );
        new Function('values', 'out', 'tables', source)(
          axisValues.map((values) => [Float64Array.from(values)]),
          out,
          storage,
        );
        expect(out.map((array) => [...array])).toEqual(expected);
      }
    },
  );

  it('puts the loops in the order in which least goes through tables', () => {
    const graph = new Graph();
    const [x, y, z] = ['x', 'y', 'z'].map((name) => variable(graph, name)) as [NodeId, NodeId, NodeId];
    const axes = ['x', 'y', 'z'].map((name) => ({ variables: [name] }));
    // Of x nothing is computed alone; of y one node, of (y, x) two: with y outermost none of them needs a table.
    const root = sqrt(graph, y);
    const pair = mul(graph, root, x);
    const output = add(graph, mul(graph, pair, z), mul(graph, unary(graph, 'exp', pair), sqrt(graph, z)));
    expect(compileKernel(graph, [output], axes).loopOrder).toEqual([1, 0, 2]);
  });

  it('a list of points beside an axis gives the outer product of the two', () => {
    const graph = new Graph();
    const output = sub(graph, mul(graph, variable(graph, 'x'), variable(graph, 'y')), variable(graph, 'z'));
    const axes = [{ variables: ['z'] }, { variables: ['x', 'y'] }];
    const [out] = evaluateGrid(graph, [output], axes, [
      [[1, 2]],
      [
        [3, 4, 5],
        [6, 7, 8],
      ],
    ]);
    expect([...(out as Float64Array)]).toEqual([17, 27, 39, 16, 26, 38]);
  });

  it('computes a part of two axes once per pair: counts of operations by axes', () => {
    const graph = new Graph();
    const [x, y, z] = ['x', 'y', 'z'].map((name) => variable(graph, name)) as [NodeId, NodeId, NodeId];
    const output = mul(graph, unary(graph, 'exp', unary(graph, 'sin', mul(graph, x, y))), z);
    const { operations } = compileKernel(
      graph,
      [output],
      ['x', 'y', 'z'].map((name) => ({ variables: [name] })),
    );
    expect(operations).toEqual([
      { axes: [0, 1], count: 3 },
      { axes: [0, 1, 2], count: 1 },
    ]);
  });

  it('refuses a variable on no axis, one on two axes, an empty axis and arrays that do not fit', () => {
    const graph = new Graph();
    const x = variable(graph, 'x');
    expect(() => compileKernel(graph, [x], [{ variables: ['y'] }])).toThrow(/variable x is on no axis/);
    expect(() => compileKernel(graph, [x], [{ variables: ['x'] }, { variables: ['x'] }])).toThrow(RangeError);
    expect(() => compileKernel(graph, [x], [{ variables: ['x'] }, { variables: [] }])).toThrow(RangeError);
    const kernel = compileKernel(graph, [x], [{ variables: ['x'] }]);
    expect(() => kernel.evaluate([[new Float64Array(2)]], [new Float64Array(3)])).toThrow(RangeError);
    expect(() => kernel.evaluate([], [new Float64Array(3)])).toThrow(RangeError);
    expect(() => kernel.evaluate([[]], [new Float64Array(0)])).toThrow(RangeError);
  });
});

describe('edges', () => {
  it('the branch of a choice that is not taken may be NaN or infinite', () => {
    const graph = new Graph();
    const x = variable(graph, 'x');
    const one = constant(graph, 1);
    const output = choice(
      graph,
      'ifLess',
      x,
      one,
      sqrt(graph, sub(graph, one, x)),
      div(graph, one, sqrt(graph, sub(graph, x, one))),
    );
    const inclusive = choice(graph, 'ifLessEqual', x, one, sqrt(graph, sub(graph, one, x)), constant(graph, 9));
    const out = evaluateGrid(graph, [output, inclusive], [{ variables: ['x'] }], [[[0, 0.75, 1, 5, Number.NaN]]]);
    expect(out.map((array) => [...array])).toEqual([
      [1, 0.5, Infinity, 0.5, NaN],
      [1, 0.5, 0, 9, 9],
    ]);
  });

  it('min and max propagate NaN', () => {
    const graph = new Graph();
    const x = variable(graph, 'x');
    const outputs = (['min', 'max'] as const).map((op) =>
      graph.intern({ kind: 'binary', op, args: [x, constant(graph, 2)] }),
    );
    const out = evaluateGrid(graph, outputs, [{ variables: ['x'] }], [[[1, 3, Number.NaN]]]);
    expect(out.map((array) => [...array])).toEqual([
      [1, 2, NaN],
      [2, 3, NaN],
    ]);
  });

  it.each([
    // at 0, −0, ∞, −∞, −64, 64
    [rational(1, 2), [0, 0, Infinity, NaN, NaN, 8]],
    [rational(1, 3), [0, -0, Infinity, -Infinity, -4, 4]],
    [rational(2, 3), [0, 0, Infinity, Infinity, 16, 16]],
    [rational(4, 3), [0, 0, Infinity, Infinity, 256, 256]],
    [rational(5, 3), [0, -0, Infinity, -Infinity, -1024, 1024]],
    [rational(8, 3), [0, 0, Infinity, Infinity, 65536, 65536]],
    [rational(-1, 3), [Infinity, -Infinity, 0, -0, -0.25, 0.25]],
    [rational(-4, 3), [Infinity, Infinity, 0, 0, 1 / 256, 1 / 256]],
    [rational(3, 2), [0, 0, Infinity, NaN, NaN, 512]],
    [rational(-1, 2), [Infinity, Infinity, 0, NaN, NaN, 0.125]],
    [rational(-5, 2), [Infinity, Infinity, 0, NaN, NaN, 2 ** -15]],
    [rational(1, 6), [0, 0, Infinity, NaN, NaN, 2]],
    [rational(5, 6), [0, 0, Infinity, NaN, NaN, 32]],
    [rational(-7, 6), [Infinity, Infinity, 0, NaN, NaN, 2 ** -7]],
    [rational(2), [0, 0, Infinity, Infinity, 4096, 4096]],
    [rational(-3), [Infinity, -Infinity, 0, -0, -(2 ** -18), 2 ** -18]],
    [rational(100), [0, 0, Infinity, Infinity, 2 ** 600, 2 ** 600]],
    [rational(3, 8), [0, 0, Infinity, NaN, NaN, 2 ** 2.25]],
    [rational(-3, 5), [Infinity, -Infinity, 0, -0, -(2 ** -3.6), 2 ** -3.6]],
  ])('x^(%s) at zeros, infinities and on negative x is as IEEE 754 pown and rootn have it', (exponent, expected) => {
    const graph = new Graph();
    const output = power(graph, variable(graph, 'x'), exponent);
    const points = [0, -0, Infinity, -Infinity, -64, 64];
    const [out] = evaluateGrid(graph, [output], [{ variables: ['x'] }], [[points]]) as [Float64Array];
    for (const [index, value] of expected.entries()) {
      const actual = out[index] as number;
      const near = Object.is(actual, value) || Math.abs(actual - value) <= 4e-16 * Math.abs(value);
      expect(near, `${points[index]}: ${actual}, expected ${value}`).toBe(true);
    }
  });

  it('rounds a constant expression once: (1 − ln 2)/π²', () => {
    const graph = new Graph();
    const gamma = div(
      graph,
      sub(graph, constant(graph, 1), unary(graph, 'log', constant(graph, 2))),
      power(graph, pi(graph), rational(2)),
    );
    const [out] = evaluateGrid(graph, [mul(graph, gamma, variable(graph, 'x'))], [{ variables: ['x'] }], [[[1]]]);
    // From A002162 and A000796 (OEIS): 0.0310906908696548940…
    expect((out as Float64Array)[0]).toBe(0.031090690869654894);
  });
});

describe('generated code', () => {
  it('contains no variable name of the graph', () => {
    const hostile = '"];process.exit()//`$';
    const graph = new Graph();
    const x = variable(graph, hostile);
    const output = unary(graph, 'exp', add(graph, power(graph, x, rational(3, 7)), variable(graph, 'innocent')));
    const kernel = compileKernel(graph, [output], [{ variables: [hostile] }, { variables: ['innocent'] }]);
    expect(kernel.source).not.toContain('process');
    expect(kernel.source).not.toContain('innocent');
    expect(kernel.source).toMatch(/^[\w\s"'.,;:?=<>+\-*/()[\]{}&|]*$/);
    const out = [new Float64Array(1)];
    kernel.evaluate([[Float64Array.of(0)], [Float64Array.of(1)]], out);
    expect(out[0]?.[0]).toBe(Math.E);
  });
});
