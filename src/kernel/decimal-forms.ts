import type { Graph, Node, NodeId } from '../graph/graph.ts';
import { reachable } from '../graph/traverse.ts';
import { Decimal, decimalContext } from '../number/decimal.ts';
import { type Rational, rational } from '../number/rational.ts';
import {
  around,
  type DecimalFunction,
  type DecimalInterval,
  decimalFunctions,
  decimalPower,
  formDigits,
} from './decimal-function.ts';
import { type Guard, guardsOf, isNonZero } from './guards.ts';

/*
 * A second evaluator over boxes, for checking what the first has proved: directed rounding in decimal arithmetic. For
 * every node an interval, and a form centre + Σ parts·ε ± error whose numbers are rounded to nearest, with more than
 * what that can lose added to the error.
 */

const Near = Decimal.clone({ defaults: true, precision: formDigits });
const Down = Decimal.clone({ defaults: true, precision: formDigits, rounding: Decimal.ROUND_FLOOR });
const Up = Decimal.clone({ defaults: true, precision: formDigits, rounding: Decimal.ROUND_CEIL });
/** More than the rounding of the few operations behind one number, relative to their magnitudes. */
const slop = new Up('1e-21');
const zero = new Near(0);
const infinity = new Near(Number.POSITIVE_INFINITY);
const reciprocal = decimalPower(rational(-1));
const context = decimalContext(formDigits);

interface Form {
  readonly lower: Decimal;
  readonly upper: Decimal;
  readonly centre: Decimal;
  readonly parts: readonly Decimal[];
  readonly error: Decimal;
  readonly defined: boolean;
}

export interface DecimalBounds {
  readonly lower: Decimal;
  readonly upper: Decimal;
  readonly defined: boolean;
}

/**
 * A function from boxes, lower and upper bound of each variable, to bounds of the output over them. Nodes that depend on
 * some of the variables only are kept from box to box.
 */
export function makeDecimalForms(
  graph: Graph,
  output: NodeId,
  variables: readonly string[],
  nonZero: ReadonlySet<string>,
): (box: readonly (readonly [number, number])[]) => DecimalBounds {
  const ids = reachable(graph, [output]);
  const guards = guardsOf(graph, ids, [output]);
  const axesOf = new Map<NodeId, number>();
  for (const id of ids) {
    const node = graph.node(id);
    const own = node.kind === 'variable' ? 1 << variables.indexOf(node.name) : 0;
    axesOf.set(id, 'args' in node ? node.args.reduce((mask, part) => mask | (axesOf.get(part) as number), 0) : own);
  }
  const whole = (1 << variables.length) - 1;
  const kept = new Map<string, Form>();

  return (box) => {
    const ends = box.map((pair) => pair.join(':'));
    if (kept.size > 400_000) kept.clear();
    const here = new Map<NodeId, Form>();
    const { lower, upper, defined } = formOf(output);
    return { lower, upper, defined };

    function formOf(id: NodeId): Form {
      const known = here.get(id);
      if (known !== undefined) return known;
      const mask = axesOf.get(id) as number;
      const key = mask === whole ? undefined : `${id} ${ends.filter((_, axis) => mask & (1 << axis)).join(' ')}`;
      const form = (key === undefined ? undefined : kept.get(key)) ?? computed(id);
      here.set(id, form);
      if (key !== undefined) kept.set(key, form);
      return form;
    }

    function computed(id: NodeId): Form {
      const node = graph.node(id);
      switch (node.kind) {
        case 'rational':
          return constantForm(rationalInterval(node.value));
        case 'pi':
          return constantForm(around(context.pi));
        case 'variable':
          return variableForm(
            box[variables.indexOf(node.name)] as readonly [number, number],
            variables.indexOf(node.name),
          );
        case 'unary':
          if (node.op === 'neg') return negated(formOf(node.args[0]));
          if (node.op === 'abs') return absolute(formOf(node.args[0]));
          return applied(decimalFunctions[node.op], formOf(node.args[0]), isSafe(node.args[0], id));
        case 'power':
          return applied(decimalPower(node.exponent), formOf(node.args[0]), isSafe(node.args[0], id));
        case 'binary':
          return binaryForm(id, node);
        case 'choice':
          return choiceForm(node);
      }
    }

    function isSafe(operand: NodeId, user: NodeId): boolean {
      return isNonZero(graph, operand, guards.get(user) as ReadonlyMap<string, Guard>, nonZero);
    }

    function binaryForm(id: NodeId, node: Extract<Node, { kind: 'binary' }>): Form {
      const [a, b] = [formOf(node.args[0]), formOf(node.args[1])];
      switch (node.op) {
        case 'add':
          return sum(a, b);
        case 'sub':
          return sum(a, negated(b));
        case 'mul':
          return product(a, b);
        case 'div':
          return product(a, applied(reciprocal, b, isSafe(node.args[1], id)));
        default: {
          const [low, high] = node.op === 'min' ? [a, b] : [b, a];
          if (low.upper.lte(high.lower)) return { ...a, defined: a.defined && b.defined };
          if (high.upper.lte(low.lower)) return { ...b, defined: a.defined && b.defined };
          const pick = (x: Decimal, y: Decimal) => (node.op === 'min' ? Near.min(x, y) : Near.max(x, y));
          return level([pick(a.lower, b.lower), pick(a.upper, b.upper)], a.defined && b.defined);
        }
      }
    }

    function choiceForm(node: Extract<Node, { kind: 'choice' }>): Form {
      const [a, b] = [formOf(node.args[0]), formOf(node.args[1])];
      const strict = node.op === 'ifLess';
      const mayHold = strict ? a.lower.lt(b.upper) : a.lower.lte(b.upper);
      const mayFail = strict ? a.upper.gte(b.lower) : a.upper.gt(b.lower);
      const compared = a.defined && b.defined;
      if (!mayFail || !mayHold) {
        const branch = formOf(mayHold ? node.args[2] : node.args[3]);
        return { ...branch, defined: compared && branch.defined };
      }
      const [first, second] = [formOf(node.args[2]), formOf(node.args[3])];
      return level(
        [Near.min(first.lower, second.lower), Near.max(first.upper, second.upper)],
        compared && first.defined && second.defined,
      );
    }
  };
}

/** Exact for a decimal of few digits, so that 1 − α is not negative at α = 1. */
function rationalInterval(value: Rational): DecimalInterval {
  const nearest = context.fromRational(value);
  const isExact = value.n < 10n ** 12n && 10n ** 12n % value.d === 0n;
  return isExact ? [nearest, nearest] : around(nearest);
}

function constantForm(interval: DecimalInterval): Form {
  return level(interval, true);
}

function variableForm([lower, upper]: readonly [number, number], axis: number): Form {
  // The shortest text of a double is not its value: all its digits are.
  const [from, to] = [exact(lower), exact(upper)];
  if (!Number.isFinite(lower) || !Number.isFinite(upper)) return level([from, to], true);
  const centre = new Near(from).plus(to).div(2);
  const half = Up.max(new Up(to).minus(centre), new Up(centre).minus(from)).times(slop.plus(1));
  const parts = Array.from({ length: axis + 1 }, (_, index) => (index === axis ? half : zero));
  return { lower: from, upper: to, centre, parts, error: zero, defined: true };
}

function exact(value: number): Decimal {
  if (!Number.isFinite(value) || Number.isInteger(value)) return new Near(value);
  let shift = 0;
  let scaled = value;
  for (; !Number.isInteger(scaled); shift++) scaled *= 2;
  return new Decimal(`${BigInt(scaled) * 5n ** BigInt(shift)}e-${shift}`);
}

/** A form that is the middle of an interval. */
function level([lower, upper]: DecimalInterval, defined: boolean): Form {
  const isWhole = !(lower.isFinite() && upper.isFinite());
  const centre = isWhole ? zero : new Near(lower).plus(upper).div(2);
  const error = isWhole
    ? infinity
    : Up.max(new Up(upper).minus(centre), new Up(centre).minus(lower))
        .times(slop.plus(1))
        .plus(magnitude(centre).times(slop));
  if (lower.lte(upper)) return { lower, upper, centre, parts: [], error, defined };
  return { lower: infinity.neg(), upper: infinity, centre: zero, parts: [], error: infinity, defined };
}

function magnitude(x: Decimal): Decimal {
  return new Up(x.abs());
}

function negated({ lower, upper, centre, parts, error, defined }: Form): Form {
  return {
    lower: upper.neg(),
    upper: lower.neg(),
    centre: centre.neg(),
    parts: parts.map((part) => part.neg()),
    error,
    defined,
  };
}

function absolute(x: Form): Form {
  if (x.lower.gte(0)) return x;
  if (x.upper.lte(0)) return negated(x);
  return level([zero, Near.max(x.lower.neg(), x.upper)], x.defined);
}

/** The form with its interval tightened by its range; the middle of the interval where that is narrower. */
function settled(
  interval: DecimalInterval,
  centre: Decimal,
  parts: readonly Decimal[],
  error: Decimal,
  defined: boolean,
): Form {
  if (!centre.isFinite() || !error.isFinite()) return level(interval, defined);
  const radius = parts.reduce((total, part) => total.plus(part.abs()), new Up(error));
  const lower = Near.max(interval[0], new Down(centre).minus(radius));
  const upper = Near.min(interval[1], new Up(centre).plus(radius));
  if (!lower.lte(upper)) return level(interval, defined);
  if (error.times(2).gt(new Up(upper).minus(lower))) return level([lower, upper], defined);
  return { lower, upper, centre, parts, error, defined };
}

const part = (form: Form, axis: number): Decimal => form.parts[axis] ?? zero;
const axesUnion = (a: Form, b: Form): number[] =>
  Array.from({ length: Math.max(a.parts.length, b.parts.length) }, (_, axis) => axis);

function sum(a: Form, b: Form): Form {
  const interval: DecimalInterval = [new Down(a.lower).plus(b.lower), new Up(a.upper).plus(b.upper)];
  const defined = a.defined && b.defined;
  if (interval[0].isNaN() || interval[1].isNaN()) return level([infinity.neg(), infinity], defined);
  const centre = new Near(a.centre).plus(b.centre);
  const parts = axesUnion(a, b).map((axis) => new Near(part(a, axis)).plus(part(b, axis)));
  const size = parts.reduce((total, value) => total.plus(value.abs()), magnitude(centre));
  return settled(interval, centre, parts, new Up(a.error).plus(b.error).plus(size.times(slop)), defined);
}

function radiusOf(form: Form): Decimal {
  return form.parts.reduce((total, value) => total.plus(value.abs()), new Up(form.error));
}

function product(a: Form, b: Form): Form {
  const defined = a.defined && b.defined;
  const interval = productInterval(a, b);
  if (!a.error.isFinite() || !b.error.isFinite()) return level(interval, defined);
  const axes = axesUnion(a, b);
  // ε² lies between 0 and 1, so that half of each square joins the centre.
  const squares = axes.map((axis) => new Near(part(a, axis)).times(part(b, axis)));
  const half = squares.reduce((total, square) => total.plus(square), new Near(0)).div(2);
  const centre = new Near(a.centre).times(b.centre).plus(half);
  const parts = axes.map((axis) =>
    new Near(a.centre).times(part(b, axis)).plus(new Near(b.centre).times(part(a, axis))),
  );
  const [ra, rb] = [radiusOf(a), radiusOf(b)];
  const spread = new Up(ra).times(rb);
  const halves = squares.reduce((total, square) => new Down(total).plus(square.abs()), new Down(0)).div(2);
  const size = magnitude(a.centre).plus(ra).times(magnitude(b.centre).plus(rb)).times(slop).times(4);
  const error = magnitude(a.centre)
    .times(b.error)
    .plus(magnitude(b.centre).times(a.error))
    .plus(spread.times(slop.plus(1)).minus(halves))
    .plus(size);
  return settled(interval, centre, parts, error, defined);
}

/** An infinite end is a bound and no value, so that with 0 it gives 0. */
function productInterval(a: Form, b: Form): DecimalInterval {
  const times = (Rounded: typeof Up, x: Decimal, y: Decimal) =>
    x.isZero() || y.isZero() ? zero : new Rounded(x).times(y);
  const pairs = [
    [a.lower, b.lower],
    [a.lower, b.upper],
    [a.upper, b.lower],
    [a.upper, b.upper],
  ] as const;
  return [Near.min(...pairs.map(([x, y]) => times(Down, x, y))), Near.max(...pairs.map(([x, y]) => times(Up, x, y)))];
}

const entire: DecimalInterval = [infinity.neg(), infinity];

/** f of a form: its image, and the chord with what f departs from it. */
function applied(f: DecimalFunction, x: Form, touchingIsSafe: boolean): Form {
  const place = f.domain(x.lower, x.upper);
  const defined = x.defined && (place === 'inside' || (place === 'touches' && touchingIsSafe));
  if (place === 'outside') return level(entire, false);
  // An interval of negative numbers approaches 0 from below: −0 has the sign of that limit, +0 that from above.
  const last = x.upper.isZero() && x.lower.isNegative() ? new Near(-0) : x.upper;
  const first = x.lower.isZero() ? zero : x.lower;
  const ends = [around(f.value(first)), around(f.value(last))] as const;
  const direction = f.direction(x.lower, x.upper);
  const curvature = f.curvature(x.lower, x.upper);
  const image: DecimalInterval =
    direction === 1
      ? [ends[0][0], ends[1][1]]
      : direction === -1
        ? [ends[1][0], ends[0][1]]
        : // Convex and not monotonic are only even powers and cosh, lowest at 0.
          curvature === 1
          ? [f.value(zero), Near.max(ends[0][1], ends[1][1])]
          : entire;
  if (image[0].isNaN() || image[1].isNaN()) return level(entire, defined);
  const isBounded = [...image, x.lower, x.upper, x.centre, x.error].every((value) => value.isFinite());
  if (curvature === 0 || f.slope === undefined || !isBounded || !x.upper.gt(x.lower)) return level(image, defined);
  const middle = new Near(x.lower).plus(x.upper).div(2);
  const slope = new Near(ends[1][0]).minus(ends[0][0]).div(new Near(x.upper).minus(x.lower));
  const value = f.value(middle);
  const tangent = around(f.slope(middle, value));
  const over = (Rounded: typeof Up, at: Decimal, height: Decimal) => new Rounded(height).minus(slope.times(at));
  const rest = magnitude(slope).times(Up.max(x.lower.abs(), x.upper.abs())).times(slop).times(4);
  const tilt = Up.max(magnitude(tangent[0].minus(slope)), magnitude(tangent[1].minus(slope)));
  const reach = new Up(x.upper).minus(x.lower).div(2).times(tilt).times(slop.plus(1));
  const [highEnd, lowEnd] = [0, 1].map((end) =>
    curvature === 1
      ? over(Up, end === 0 ? x.lower : x.upper, ends[end as 0 | 1][1])
      : over(Down, end === 0 ? x.lower : x.upper, ends[end as 0 | 1][0]),
  ) as [Decimal, Decimal];
  const far = curvature === 1 ? Near.max(highEnd, lowEnd) : Near.min(highEnd, lowEnd);
  // The tangent at the middle is no further than half the width away from any point.
  const near =
    curvature === 1
      ? over(Down, middle, around(value)[0]).minus(reach)
      : over(Up, middle, around(value)[1]).plus(reach);
  const offset = new Near(far).plus(near).div(2);
  const departure = new Up(far.minus(near).abs()).div(2).plus(rest).plus(magnitude(offset).times(slop));
  const centre = new Near(x.centre).times(slope).plus(offset);
  const parts = x.parts.map((own) => new Near(own).times(slope));
  const size = parts.reduce(
    (total, own) => total.plus(own.abs()),
    magnitude(centre).plus(magnitude(x.centre).times(slope.abs())),
  );
  const error = magnitude(slope).times(x.error).plus(departure).plus(size.times(slop));
  return settled(image, centre, parts, error, defined);
}
