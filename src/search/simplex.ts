import { clamp } from './compass.ts';
import type { Position, UnitFunction } from './unit-function.ts';

/** Width of the simplex at which it has converged. */
const smallest = 1e-12;

/**
 * Simplex search of Nelder and Mead, Comput. J. 7, 308 (1965), with the factors of Gao and Han, Comput.
 * Optim. Appl. 51, 259 (2012), which keep it moving in more than a few dimensions. It runs in the
 * coordinates that are not at an end of the box; places outside are drawn in. Never worse than the start.
 */
export function simplex(problem: UnitFunction, start: Position, size: number): Position {
  const free = problem.free.filter((axis) => {
    const unit = start.unit[axis] as number;
    return unit > 0 && unit < 1;
  });
  const n = free.length;
  if (n < 2 || start.value === Infinity) return start;
  const at = (unit: Float64Array): Position => ({ unit, value: problem.evaluate(unit) });
  const vertices: Position[] = [start];
  for (const axis of free) {
    const unit = start.unit.slice();
    const value = unit[axis] as number;
    unit[axis] = value + size <= 1 ? value + size : Math.max(0, value - size);
    vertices.push(at(unit));
  }
  const [expansion, contraction, reduction] = [1 + 2 / n, 0.75 - 1 / (2 * n), n === 1 ? 0.5 : 1 - 1 / n];
  const limit = 300 * n;
  for (let iteration = 0; iteration < limit && !problem.exhausted(); iteration += 1) {
    vertices.sort((a, b) => (a.value < b.value ? -1 : a.value > b.value ? 1 : 0));
    const best = vertices[0] as Position;
    const worst = vertices[n] as Position;
    const second = vertices[n - 1] as Position;
    if (width(vertices, free) < smallest || best.value === worst.value) break;
    const centre = best.unit.slice();
    for (const axis of free) {
      let sum = 0;
      for (let vertex = 0; vertex < n; vertex += 1) sum += (vertices[vertex] as Position).unit[axis] as number;
      centre[axis] = sum / n;
    }
    const along = (factor: number) => {
      const unit = centre.slice();
      for (const axis of free) {
        const middle = centre[axis] as number;
        unit[axis] = clamp(middle + factor * (middle - (worst.unit[axis] as number)));
      }
      return at(unit);
    };
    const reflected = along(1);
    if (reflected.value < best.value) {
      const expanded = along(expansion);
      vertices[n] = expanded.value < reflected.value ? expanded : reflected;
    } else if (reflected.value < second.value) {
      vertices[n] = reflected;
    } else {
      const outside = reflected.value < worst.value;
      const contracted = along(outside ? contraction : -contraction);
      if (contracted.value < (outside ? reflected.value : worst.value)) vertices[n] = contracted;
      else {
        for (let vertex = 1; vertex <= n; vertex += 1) {
          const { unit } = vertices[vertex] as Position;
          vertices[vertex] = at(best.unit.map((value, axis) => value + reduction * ((unit[axis] as number) - value)));
        }
      }
    }
  }
  return vertices.reduce((best, vertex) => (vertex.value < best.value ? vertex : best), start);
}

function width(vertices: readonly Position[], free: readonly number[]): number {
  const first = vertices[0] as Position;
  let largest = 0;
  for (const { unit } of vertices) {
    for (const axis of free)
      largest = Math.max(largest, Math.abs((unit[axis] as number) - (first.unit[axis] as number)));
  }
  return largest;
}
