import { erf, lambertW } from '../kernel/special.ts';
import type { KernelRecord } from '../page/page-data.ts';

/** Fills `out` with one output over the product of the axes, or at a list of points; row-major in the order of the record. */
export function runKernel(
  index: number,
  record: KernelRecord,
  columns: readonly Float64Array[],
  out: readonly Float64Array[],
): void {
  const values = record.together ? [columns] : columns.map((column) => [column]);
  const lengths = values.map(([first]) => (first as Float64Array).length);
  const tables = record.tables.map(
    ({ axes, width }) => new Float64Array(axes.reduce((size, axis) => size * (lengths[axis] as number), width)),
  );
  rungcheckKernels[index]?.(values, out, tables, erf, lambertW);
}

/** The outputs at one point, by name; a coordinate that the kernel does not name is ignored. */
export function evaluateAt(
  index: number,
  record: KernelRecord,
  point: Readonly<Record<string, number>>,
): Record<string, number> {
  const columns = record.variables.map((name) => Float64Array.of(point[name] ?? Number.NaN));
  const out = record.outputs.map(() => new Float64Array(1));
  runKernel(index, record, columns, out);
  return Object.fromEntries(record.outputs.map((name, position) => [name, out[position]?.[0] as number]));
}
