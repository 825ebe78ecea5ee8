import { all, create, type FactoryFunctionMap } from 'mathjs';
import { differentiate } from '../../src/derivative/differentiate.ts';
import type { Functional } from '../../src/functional/functional.ts';
import { instantiate } from '../../src/functional/instance.ts';
import { slicePlace } from '../../src/functional/place.ts';
import { variable } from '../../src/graph/build.ts';
import { Graph } from '../../src/graph/graph.ts';
import { compileKernel } from '../../src/kernel/float64.ts';
import { openShelf } from '../../src/shelf/shelf.ts';

/*
 * One million points of (r_s, ζ, s): F_x and F_c of PBE with their first and second r_s derivatives, beside the
 * same formulas through mathjs `compile`, point by point. What to trust is the ratio within one run.
 */
const side = 100;
const rs = Float64Array.from({ length: side }, (_, k) => 10 ** (-2 + (4 * k) / (side - 1)));
const zeta = Float64Array.from({ length: side }, (_, k) => k / (side - 1));
const s = Float64Array.from({ length: side }, (_, k) => (5 * k) / (side - 1));

const shelf = openShelf({ functionals: ['functionals'], constraints: [] });
const outcome = shelf.functional('pbe');
if (!outcome.ok) throw new Error(JSON.stringify(outcome.problems));
const hoisted = measureGrid(outcome.value);
const flat = measureFlat(outcome.value);
const mathjs = measureMathjs();

const rows: [string, number][] = [
  ['generated code, hoisted by axis (product grid)', hoisted],
  ['generated code, list of points', flat],
  ['mathjs compile, F_x and F_c only', mathjs.values],
  ['mathjs compile, derivatives by differences (3 values)', mathjs.values / 3],
];
for (const [name, pointsPerSecond] of rows) {
  const ratio = hoisted / pointsPerSecond;
  console.log(
    `${name.padEnd(56)} ${Math.round(pointsPerSecond).toLocaleString('en').padStart(13)} points/s   1 : ${ratio.toPrecision(3)}`,
  );
}

function outputsOf(graph: Graph, functional: Functional): number[] {
  const instance = instantiate(graph, functional);
  const coordinates = { rs: variable(graph, 'rs'), zeta: variable(graph, 'zeta'), s: variable(graph, 's') };
  const place = slicePlace(graph, coordinates);
  const exchange = instance.part('exchange', place)?.enhancement as number;
  const correlation = instance.part('correlation', place)?.enhancement as number;
  const first = differentiate(graph, correlation, 'rs');
  return [exchange, correlation, differentiate(graph, exchange, 'rs'), first, differentiate(graph, first, 'rs')];
}

function measureGrid(functional: Functional): number {
  const graph = new Graph();
  const outputs = outputsOf(graph, functional);
  const kernel = compileKernel(graph, outputs, [{ variables: ['rs'] }, { variables: ['zeta'] }, { variables: ['s'] }]);
  const out = outputs.map(() => new Float64Array(side ** 3));
  return side ** 3 / best(() => kernel.evaluate([[rs], [zeta], [s]], out));
}

function measureFlat(functional: Functional): number {
  const graph = new Graph();
  const outputs = outputsOf(graph, functional);
  const kernel = compileKernel(graph, outputs, [{ variables: ['rs', 'zeta', 's'] }]);
  const columns = [rs, zeta, s].map(() => new Float64Array(side ** 3));
  for (let k = 0; k < side ** 3; k++) {
    (columns[0] as Float64Array)[k] = rs[Math.floor(k / side ** 2)] as number;
    (columns[1] as Float64Array)[k] = zeta[Math.floor(k / side) % side] as number;
    (columns[2] as Float64Array)[k] = s[k % side] as number;
  }
  const out = outputs.map(() => new Float64Array(side ** 3));
  return side ** 3 / best(() => kernel.evaluate([columns], out));
}

function measureMathjs(): { values: number } {
  const math = create(all as FactoryFunctionMap);
  const text = `
    f = ((1 + zeta)^(4/3) + (1 - zeta)^(4/3) - 2)/(2^(4/3) - 2)
    phi = ((1 + zeta)^(2/3) + (1 - zeta)^(2/3))/2
    G(A, a1, b1, b2, b3, b4) = -2*A*(1 + a1*rs)*log(1 + 1/(2*A*(b1*sqrt(rs) + b2*rs + b3*rs^(3/2) + b4*rs^2)))
    e0 = G(0.0310907, 0.21370, 7.5957, 3.5876, 1.6382, 0.49294)
    e1 = G(0.01554535, 0.20548, 14.1189, 6.1977, 3.3662, 0.62517)
    ac = G(0.0168869, 0.11125, 10.357, 3.6231, 0.88026, 0.49671)
    ec = e0 - ac*f/1.7099209341613657*(1 - zeta^4) + (e1 - e0)*f*zeta^4
    kF = (9*pi/4)^(1/3)/rs
    t2 = s^2*pi*kF/(4*phi^2)
    g = (1 - log(2))/pi^2
    A = 0.06672455060314922/g/(exp(-ec/(g*phi^3)) - 1)
    y = A*t2
    H = g*phi^3*log(1 + 0.06672455060314922/g*t2*(1 + y)/(1 + y + y^2))
    Fc = (ec + H)/(-3*kF/(4*pi))
    F(x) = 1 + 0.804 - 0.804/(1 + 0.2195149727645171*x^2/0.804)
    u = 1 + zeta
    d = 1 - zeta
    Fx = (u^(4/3)*F(s*u^(-1/3)) + (d > 0 ? d^(4/3)*F(s*d^(-1/3)) : 0))/2
    [Fx, Fc]`;
  const code = math.compile(text);
  const points = 2000;
  const seconds = best(() => {
    for (let k = 0; k < points; k++) {
      code.evaluate({ rs: rs[k % side], zeta: zeta[(k * 7) % side], s: s[(k * 13) % side] });
    }
  });
  return { values: points / seconds };
}

/** Seconds of the fastest of several runs. */
function best(work: () => void, runs = 5): number {
  let fastest = Number.POSITIVE_INFINITY;
  for (let run = 0; run < runs; run++) {
    const start = performance.now();
    work();
    fastest = Math.min(fastest, performance.now() - start);
  }
  return fastest / 1000;
}
