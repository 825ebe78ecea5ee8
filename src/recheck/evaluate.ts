import { putProduct, putSum } from './combine.ts';
import { isLess } from './decimal.ts';
import { putEntire, type Row, rowLength, slot } from './form.ts';
import { putCopy, putEither, putExtreme, type Source } from './mixture.ts';
import type { Condition, Group, Operand, Program, Step } from './program.ts';
import { putConstant, putVariable, runAlong, unaryWriter } from './single.ts';
import { tightenShare } from './tighten.ts';

type Runner = (boxes: Float64Array, offset: number) => void;
type ChoiceOperands = readonly [Operand, Operand, Operand, Operand];

/** Whether the output has a value wherever it counts, and its bounds: mantissas and exponents of ten. */
export interface Bounds {
  readonly defined: boolean;
  readonly lower: number;
  readonly lowerPower: number;
  readonly upper: number;
  readonly upperPower: number;
}

/** Numbers kept from box to box, at most. */
const mostKept = 4e6;

/** More than there are parts of an axis, or of several. */
const manyParts = 2 ** 26;

/** A function from the box at an offset (lower, upper of each axis in turn) to bounds of the program's output over it. */
export function makeEvaluator({ groups, output }: Program): (boxes: Float64Array, offset: number) => Bounds {
  const rows = makeRows(groups);
  return (boxes, offset) => {
    rows.enter(boxes, offset);
    return rows.boundsOf(output);
  };
}

export interface EvaluatedRows {
  /** Computes all rows over the box at an offset. */
  enter(boxes: Float64Array, offset: number): void;
  /** What the row of a node then holds. */
  boundsOf(operand: Operand): Bounds;
}

/** The rows of all steps. Nodes that depend on some of the axes only are kept from box to box. */
export function makeRows(groups: readonly Group[]): EvaluatedRows {
  const last = groups.length - 1;
  const lengths = groups.map(({ axes, steps }) => rowLength(axes.length) * steps.length);
  const strides = groups.map(({ axes }) => rowLength(axes.length));
  const whole = new Float64Array(lengths[last] as number);
  const here: Row[] = groups.map(() => whole);
  const runners = groups.map(({ steps, axes }, index) => steps.map((step) => prepare(step, axes, index)));
  const kept = groups.map(() => new Map<number, Row>());
  const own = groups[last]?.axes ?? [];
  const ends = own.map(() => new Map<number, Map<number, number>>());
  const parts = new Int32Array(own.length);
  const combinations = new Map<number, number>();
  let numbers = 0;

  return { enter, boundsOf };

  function enter(boxes: Float64Array, offset: number): void {
    if (numbers > mostKept) forget();
    for (let axis = 0; axis < own.length; axis++)
      parts[axis] = partOf(axis, boxes[offset + 2 * axis] as number, boxes[offset + 2 * axis + 1] as number);
    for (let index = 0; index < last; index++) here[index] = known(index, boxes, offset);
    for (const step of runners[last] as Runner[]) step(boxes, offset);
  }

  function boundsOf(operand: Operand): Bounds {
    const at = offsetOf(operand);
    const row = rowOf(operand);
    return {
      defined: row[at + slot.defined] === 1,
      lower: row[at + slot.lower] as number,
      lowerPower: row[at + slot.lower + 1] as number,
      upper: row[at + slot.upper] as number,
      upperPower: row[at + slot.upper + 1] as number,
    };
  }

  function known(index: number, boxes: Float64Array, offset: number): Row {
    const store = kept[index] as Map<number, Row>;
    const key = keyOf((groups[index] as Group).axes);
    let rows = store.get(key);
    if (rows === undefined) {
      rows = new Float64Array(lengths[index] as number);
      here[index] = rows;
      for (const step of runners[index] as Runner[]) step(boxes, offset);
      store.set(key, rows);
      numbers += rows.length;
    }
    return rows;
  }

  function forget(): void {
    for (const store of [...kept, ...ends, combinations]) store.clear();
    numbers = 0;
  }

  /** A number of the part of an axis between two ends, the same one while it is remembered. */
  function partOf(axis: number, lower: number, upper: number): number {
    const byLower = ends[axis] as Map<number, Map<number, number>>;
    let byUpper = byLower.get(lower);
    if (byUpper === undefined) {
      byUpper = new Map();
      byLower.set(lower, byUpper);
    }
    let part = byUpper.get(upper);
    if (part === undefined) {
      part = numbers++;
      byUpper.set(upper, part);
    }
    return part;
  }

  /** Of pairs of numbers one number each, so that it stays exact for any number of axes. */
  function keyOf(axes: readonly number[]): number {
    let key = 0;
    for (const axis of axes) {
      const pair = key * manyParts + (parts[axis] as number) + 1;
      let combination = combinations.get(pair);
      if (combination === undefined) {
        combination = ++numbers;
        combinations.set(pair, combination);
      }
      key = combination;
    }
    return key;
  }

  /** The step as a function that writes its row. */
  function prepare(step: Step, axes: readonly number[], group: number): Runner {
    const at = step.row * rowLength(axes.length);
    const plain = writer(step, axes, at, group);
    const write: Runner = step.isSole
      ? (boxes, offset) => {
          plain(boxes, offset);
          runAlong(here[group] as Row, at);
        }
      : plain;
    if (step.conditions.length === 0) return write;
    return (boxes, offset) => {
      if (step.conditions.every(mayHold)) write(boxes, offset);
      else putEntire(here[group] as Row, at, axes.length);
    };
  }

  function rowOf({ group }: Operand): Row {
    return here[group] as Row;
  }

  function offsetOf({ group, row }: Operand): number {
    return row * (strides[group] as number);
  }

  function mayHold({ strict, left, right, outcome }: Condition): boolean {
    return mayBe(rowOf(left), offsetOf(left), rowOf(right), offsetOf(right), strict, outcome);
  }

  function writer(step: Step, axes: readonly number[], at: number, own: number): Runner {
    const { node, operands, cross, touchingIsSafe, least, other } = step;
    const count = axes.length;
    const [a, b] = operands as [Operand, Operand];
    switch (node.kind) {
      case 'rational':
      case 'pi':
        return () => putConstant(here[own] as Row, at, node);
      case 'variable':
        return (boxes, offset) => {
          const from = offset + 2 * (axes[0] as number);
          putVariable(here[own] as Row, at, boxes[from] as number, boxes[from + 1] as number);
        };
      case 'power':
      case 'inverse':
      case 'unary': {
        const apply = unaryWriter(node, count, touchingIsSafe, least);
        const from = offsetOf(a);
        // Of the same axes as its operand.
        return () => apply(here[own] as Row, at, rowOf(a), from);
      }
      case 'binary': {
        const fromA = offsetOf(a);
        const fromB = offsetOf(b);
        if (node.op === 'min' || node.op === 'max') return extremeWriter(node.op === 'min', a, b, count, at, own);
        if (node.op === 'add' || node.op === 'sub') {
          const sign = node.op === 'add' ? 1 : -1;
          return () => {
            const target = here[own] as Row;
            const rowA = rowOf(a);
            const rowB = rowOf(b);
            putSum(target, at, count, rowA, fromA, a.embedding, rowB, fromB, b.embedding, sign);
            target[at] = (rowA[fromA] as number) * (rowB[fromB] as number);
          };
        }
        const fromOther = other === undefined ? 0 : offsetOf(other);
        // A divisor comes inverted.
        return () => {
          const target = here[own] as Row;
          const rowA = rowOf(a);
          const rowB = rowOf(b);
          putProduct(target, at, count, rowA, fromA, a.embedding, rowB, fromB, b.embedding, cross);
          target[at] = (rowA[fromA] as number) * (rowB[fromB] as number);
          if (other !== undefined) tightenShare(target, at, count, rowA, fromA, rowOf(other), fromOther);
        };
      }
      case 'choice':
        return choiceWriter(node.op === 'ifLess', operands as ChoiceOperands, count, at, own);
    }
  }

  function choiceWriter(
    strict: boolean,
    [left, right, whenTrue, whenFalse]: ChoiceOperands,
    count: number,
    at: number,
    own: number,
  ): Runner {
    const fromA = offsetOf(left);
    const fromB = offsetOf(right);
    return () => {
      const rowA = rowOf(left);
      const rowB = rowOf(right);
      const holds = mayBe(rowA, fromA, rowB, fromB, strict, true);
      const fails = mayBe(rowA, fromA, rowB, fromB, strict, false);
      const target = here[own] as Row;
      if (holds && fails) putEither(target, at, count, sourceOf(whenTrue), sourceOf(whenFalse));
      else putCopy(target, at, count, sourceOf(holds ? whenTrue : whenFalse));
      target[at] = (target[at] as number) * (rowA[fromA] as number) * (rowB[fromB] as number);
    };
  }

  function extremeWriter(isLeast: boolean, a: Operand, b: Operand, count: number, at: number, own: number): Runner {
    return () => {
      const first = sourceOf(a);
      const second = sourceOf(b);
      const target = here[own] as Row;
      if (!isAbove(first.row, first.at, second.row, second.at)) putCopy(target, at, count, isLeast ? first : second);
      else if (!isAbove(second.row, second.at, first.row, first.at))
        putCopy(target, at, count, isLeast ? second : first);
      else putExtreme(target, at, count, first, second, isLeast);
      target[at] = (first.row[first.at] as number) * (second.row[second.at] as number);
    };
  }

  function sourceOf(operand: Operand): Source {
    return { row: rowOf(operand), at: offsetOf(operand), embedding: operand.embedding };
  }
}

/** Whether some value of a is above some value of b: its upper end above the lower. */
function isAbove(a: Row, atA: number, b: Row, atB: number): boolean {
  return isLess(
    b[atB + slot.lower] as number,
    b[atB + slot.lower + 1] as number,
    a[atA + slot.upper] as number,
    a[atA + slot.upper + 1] as number,
  );
}

function isNotBelow(a: Row, atA: number, b: Row, atB: number): boolean {
  return !isLess(
    a[atA + slot.upper] as number,
    a[atA + slot.upper + 1] as number,
    b[atB + slot.lower] as number,
    b[atB + slot.lower + 1] as number,
  );
}

/** Whether a < b (strict) or a ≤ b may come out as `outcome`. */
function mayBe(a: Row, atA: number, b: Row, atB: number, strict: boolean, outcome: boolean): boolean {
  if (outcome) return strict ? isAbove(b, atB, a, atA) : isNotBelow(b, atB, a, atA);
  return strict ? isNotBelow(a, atA, b, atB) : isAbove(a, atA, b, atB);
}
