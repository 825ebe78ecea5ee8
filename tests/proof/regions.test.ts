import { describe, expect, test } from 'vitest';
import type { Condition } from '../../src/constraint/condition.ts';
import { customDomain, type DomainCoordinate } from '../../src/constraint/domain.ts';
import { limitInFloat64 } from '../../src/constraint/limit.ts';
import { buildMargin } from '../../src/constraint/margin.ts';
import type { PlaneRegions, RegionTree } from '../../src/finding/regions.ts';
import type { Functional } from '../../src/functional/functional.ts';
import { Graph } from '../../src/graph/graph.ts';
import { compilePoint } from '../../src/kernel/float64.ts';
import { drawnAxis } from '../../src/map/axes.ts';
import { mapMargins } from '../../src/map/margin-map.ts';
import { regionsOnPlane, worstPlaces } from '../../src/map/regions.ts';
import { rational } from '../../src/number/rational.ts';
import { conditionAt, decideRegions, shortened } from '../../src/proof/regions.ts';
import { conditionOf, functionalOf, standardSettings } from '../constraint/catalogue.ts';
import { condition, invented, request, value } from '../map/invented.ts';

const domain = customDomain(new Map());
const drawn = (name: DomainCoordinate) => drawnAxis(domain, name);

async function treeOf(given: Condition, functional: Functional, budget: number, settings = standardSettings) {
  const tree = await decideRegions(given, functional, settings, { budget });
  if (typeof tree === 'string') throw new Error(tree);
  return tree;
}

/** Without tolerance, so that the line between the regions is where the margin is zero. */
const exactly = (given: Condition): Condition => ({ ...given, definition: { ...given.definition, tolerance: 0 } });

const plane = (tree: RegionTree, x: DomainCoordinate, y: DomainCoordinate, held = new Map<string, number>()) =>
  regionsOnPlane(tree, drawn(x), drawn(y), held);

/** The exact share lies between what is proved to hold and what is not proved to violate. */
function expectBracket({ shares }: PlaneRegions, exact: number, width: number) {
  expect(shares.proved + shares.violated + shares.undecided).toBeCloseTo(1, 12);
  expect(shares.proved).toBeLessThanOrEqual(exact);
  expect(1 - shares.violated).toBeGreaterThanOrEqual(exact);
  expect(shares.undecided).toBeLessThan(width);
}

describe('PBE with κ = 1.2 against F_x ≤ 1.804: s* = √(κ/μ (κ/(1 + κ − B) − 1)) (solved by hand)', async () => {
  const parameters = new Map([['kappa', rational(6, 5)]]);
  const settings = { ...standardSettings, parameters };
  const tree = await treeOf(
    exactly(conditionOf('exchange-lieb-oxford') as Condition),
    functionalOf('pbe'),
    2000,
    settings,
  );
  const regions = plane(tree, 's', 'rs');
  // μ as in the sheet of PBE; B = C/(2^(1/3) A_x), C = 1.679.
  const [kappa, mu, bound] = [1.2, 0.2195149727645171, 1.679 / (2 ** (1 / 3) * 0.75 * (3 / Math.PI) ** (1 / 3))];
  const exact = Math.sqrt((kappa / mu) * (kappa / (1 + kappa - bound) - 1));

  test('the shares bracket s*/5', () => expectBracket(regions, exact / 5, 1e-6));

  test('no rectangle of a state reaches to the other side', () => {
    for (const [, upper] of regions.proved) expect(upper).toBeLessThan(exact + 1e-12);
    for (const [lower] of regions.violated) expect(lower).toBeGreaterThan(exact - 1e-12);
  });

  test('r_s, which it does not depend on, is whole in each', () => {
    for (const [, , lower, upper] of [...regions.proved, ...regions.violated])
      expect([lower, upper]).toEqual([0.01, 100]);
  });
});

describe('F_x = 5 − s² − α² against F_x ≥ 1: a quarter of a circle of radius 2, π of 25 (by hand)', async () => {
  const tree = await treeOf(exactly(condition('Fx >= 1')), invented('5 - s^2 - alpha^2'), 20_000);
  const regions = plane(tree, 's', 'alpha');

  test('the shares bracket π/25', () => expectBracket(regions, Math.PI / 25, 0.005));

  test('the rectangles lie on their side of the circle', () => {
    for (const [, s, , alpha] of regions.proved) expect(Math.hypot(s, alpha)).toBeLessThanOrEqual(2);
    for (const [s, , alpha] of regions.violated) expect(Math.hypot(s, alpha)).toBeGreaterThan(2);
  });

  test('cut to 200 letters the shares still bracket it, and lose only to undecided', () => {
    const short = shortened(tree, 200);
    expect(short.letters.length).toBeLessThanOrEqual(200);
    expect(short.isCut).toBe(true);
    const coarse = plane(short, 's', 'alpha');
    expectBracket(coarse, Math.PI / 25, 0.5);
    expect(coarse.shares.proved).toBeLessThanOrEqual(regions.shares.proved);
  });
});

describe('coordinates off the plane', () => {
  const domainOfOne = { ...standardSettings, domain: customDomain(new Map([['alpha', [0, 1]]])) };
  const functional = invented('5 - s^2 - alpha^2');

  test('are at their worst: over α up to 1 the margin 4 − s² − α² is negative from s = √3 on', async () => {
    const tree = await treeOf(exactly(condition('Fx >= 1')), functional, 20_000, domainOfOne);
    expectBracket(plane(tree, 's', 'rs'), Math.sqrt(3) / 5, 0.005);
  });

  test.each([0, 0.7])('or held, on the plane before the search or in its tree afterwards: α = %f', async (alpha) => {
    const exact = Math.sqrt(4 - alpha * alpha) / 5;
    const held = conditionAt(exactly(condition('Fx >= 1')), new Map([['alpha', alpha]]));
    expectBracket(plane(await treeOf(held, functional, 2000, domainOfOne), 's', 'rs'), exact, 1e-6);
    const tree = await treeOf(exactly(condition('Fx >= 1')), functional, 20_000, domainOfOne);
    expectBracket(plane(tree, 's', 'rs', new Map([['alpha', alpha]])), exact, 0.01);
  });
});

describe('planes looked at as examples, where coordinates at their worst are held', async () => {
  const narrow = { ...standardSettings, domain: customDomain(new Map([['alpha', [0, 1]]])) };
  const given = exactly(condition('Fx >= 1'));
  const functional = invented('5 - s^2 - alpha^2');
  const tree = await treeOf(given, functional, 40, narrow);
  const example = await treeOf(conditionAt(given, new Map([['alpha', 1]])), functional, 1000, narrow);
  const without = plane(tree, 's', 'rs');
  const together = regionsOnPlane(tree, drawn('s'), drawn('rs'), new Map(), [example]);

  test('add what they show to be violated: at α = 1 all beyond s = √3', () => {
    expect(without.shares.violated).toBeLessThan(1 - Math.sqrt(3) / 5 - 0.005);
    expect(together.shares.violated).toBeCloseTo(1 - Math.sqrt(3) / 5, 6);
  });

  test('and nothing else: what is proved there is not so at every α', () => {
    expect(together.proved).toEqual(without.proved);
    expect(together.boxes).toBe(tree.boxes + example.boxes);
  });
});

test('the worst places are those of most violated cells: ζ = 1 of revPBE against the Lieb-Oxford bound', () => {
  const asked = { ...request(functionalOf('revpbe'), conditionOf('lieb-oxford') as never), cells: 11 };
  const [panel] = value(mapMargins(asked)).panels;
  expect(worstPlaces(panel as NonNullable<typeof panel>, 1e-9)[0]).toEqual(new Map([['zeta', 1]]));
});

test('ζ is drawn as ζ where the boxes run along w = (1 − ζ)^(1/3): ζ F_x ≤ 0.3 F_x holds up to ζ = 0.3', async () => {
  const free = { ...exactly(condition('zeta*Fx <= 0.3*Fx')), at: new Map() };
  const tree = await treeOf(free, invented('1'), 2000);
  expect(tree.axes).toMatchObject([{ name: 'zeta', runs: 'root' }]);
  const regions = plane(tree, 's', 'zeta');
  expectBracket(regions, 0.3, 1e-6);
  const ends = [...regions.proved, ...regions.violated, ...regions.undecided].flatMap(([, , lower, upper]) => [
    lower,
    upper,
  ]);
  expect([Math.min(...ends), Math.max(...ends)]).toEqual([0, 1]);
});

test('revPBE against the Lieb-Oxford bound: at points of proved rectangles it holds for every ζ tried, at those of violated ones not', async () => {
  const given = conditionOf('lieb-oxford') as Condition;
  const functional = functionalOf('revpbe');
  const regions = plane(await treeOf(given, functional, 8000), 's', 'rs');
  expect(regions.shares.violated).toBeGreaterThan(0.1);
  const { graph, node, variables } = buildMargin(new Graph(), given, functional, {
    ...standardSettings,
    limit: limitInFloat64,
  });
  const at = compilePoint(graph, node, variables);
  const zetas = Array.from({ length: 41 }, (_, k) => k / 40);
  const lowest = (s: number, rs: number) =>
    Math.min(...zetas.map((zeta) => at(Float64Array.from(variables, (name) => ({ s, rs, zeta })[name] as number))));
  const middles = (of: PlaneRegions['proved']) => of.map(([a, b, c, d]) => [(a + b) / 2, Math.sqrt(c * d)] as const);
  for (const [s, rs] of middles(regions.proved)) expect(lowest(s, rs)).toBeGreaterThan(-1e-9);
  // Only the worst ζ need violate it; that is 1, which is among those tried.
  for (const [s, rs] of middles(regions.violated)) expect(lowest(s, rs)).toBeLessThan(-1e-9);
});

test('a condition with a limit has no regions, and says why', async () => {
  const answer = await decideRegions(
    conditionOf('correlation-kinetic-bound') as Condition,
    functionalOf('pbe'),
    standardSettings,
    { budget: 10 },
  );
  expect(answer).toMatch(/contains a limit/);
});
