import type { Position, UnitFunction } from './unit-function.ts';

/** Steps below which a value that stays the same all round ends the search. */
const flatStep = 1e-6;
const shrink = 1 / 4;

/**
 * Tries steps along each coordinate, repeats and doubles what led lower (the pattern move of Hooke and
 * Jeeves, J. ACM 8, 212 (1961)), and quarters the step when nothing did, down to `smallest`. `flat`
 * says that the value did not change at all round the result at a step of 1e-6 or less.
 */
export function compass(
  problem: UnitFunction,
  start: Position,
  step: number,
  smallest: number,
): { readonly position: Position; readonly flat: boolean } {
  const signs = new Float64Array(start.unit.length).fill(1);
  let base = start;
  for (let size = step; size >= smallest && !problem.exhausted(); size *= shrink) {
    for (;;) {
      const probe = explore(problem, base, size, signs);
      if (!(probe.position.value < base.value)) {
        if (probe.flat && size <= flatStep) return { position: base, flat: true };
        break;
      }
      base = followPattern(problem, base, probe.position, size, signs);
    }
  }
  return { position: base, flat: false };
}

function followPattern(
  problem: UnitFunction,
  from: Position,
  to: Position,
  size: number,
  signs: Float64Array,
): Position {
  let [previous, current] = [from, to];
  for (;;) {
    const ahead = current.unit.map((value, axis) => clamp(2 * value - (previous.unit[axis] as number)));
    const trial = explore(problem, { unit: ahead, value: problem.evaluate(ahead) }, size, signs).position;
    if (!(trial.value < current.value)) return current;
    [previous, current] = [current, trial];
  }
}

/** The lowest place reached by one step along each coordinate in turn; `signs` remembers which way led lower. */
function explore(problem: UnitFunction, start: Position, size: number, signs: Float64Array) {
  let position = start;
  let flat = true;
  for (const axis of problem.free) {
    for (const direction of [signs[axis] as number, -(signs[axis] as number)]) {
      const from = position.unit[axis] as number;
      const moved = clamp(from + direction * size);
      if (moved === from) continue;
      const unit = position.unit.slice();
      unit[axis] = moved;
      const value = problem.evaluate(unit);
      if (value !== position.value) flat = false;
      if (!(value < position.value)) continue;
      position = { unit, value };
      signs[axis] = direction;
      break;
    }
  }
  return { position, flat };
}

export function clamp(unit: number): number {
  return Math.min(1, Math.max(0, unit));
}
