import type { ConstraintDefinition } from '../definition/constraint.ts';
import type { Problem } from '../errors/problem.ts';
import type { Expression } from '../expression/expression.ts';
import type { PlacedText } from '../expression/parse.ts';
import { quantityOf } from '../functional/quantities.ts';
import { coordinatesOf } from './coordinates.ts';

/** Values of coordinates and of a table's further columns. */
export type SweptPoint = ReadonlyMap<string, Expression>;

/** More points than this take longer than they tell. */
const mostPoints = 500;

/** The points of a sheet: each row of its table combined with each value of its sweep; one without names if it has neither. */
export function readPoints(
  definition: ConstraintDefinition,
  read: (source: PlacedText) => Expression | undefined,
  problems: Problem[],
): SweptPoint[] {
  const { table, sweep } = definition;
  problems.push(...nameProblems(definition));
  let points: SweptPoint[] = [new Map()];
  if (table !== undefined) {
    points = table.rows.map(
      (row) => new Map(row.flatMap((cell, index) => entry(table.columns[index]?.text, read(cell)))),
    );
  }
  for (const { name, values } of sweep) {
    const given = values.map((value) => read(value));
    points = points.flatMap((point) => given.map((value) => new Map([...point, ...entry(name, value)])));
  }
  if (points.length > mostPoints) {
    problems.push({
      code: 'wrong-value',
      message: `sweep and table make ${points.length} points`,
      remedy: `Keep them to ${mostPoints}.`,
      ...(sweep[0]?.place ?? table?.place),
    });
  }
  return points;
}

function entry(name: string | undefined, value: Expression | undefined): [string, Expression][] {
  return name === undefined || value === undefined ? [] : [[name, value]];
}

/** A coordinate given twice, and a column whose name means something else. */
function nameProblems({ at, sweep, table, space, constants }: ConstraintDefinition): Problem[] {
  const fixed = at.map(({ name }) => name);
  const swept = sweep.map(({ name }) => name);
  const coordinates = coordinatesOf(space);
  const clashes = sweep.filter(({ name }) => fixed.includes(name)).map(({ name, place }) => ({ name, place }));
  const columns = (table?.columns ?? []).map((column) => ({ name: column.text, place: column.placeAt(0) }));
  const repeated = columns.filter(
    ({ name }, index) =>
      fixed.includes(name) || swept.includes(name) || columns.findIndex((other) => other.name === name) !== index,
  );
  const taken = columns.filter(
    ({ name }) =>
      !coordinates.includes(name) && (quantityOf(name) !== undefined || constants.some((other) => other.name === name)),
  );
  return [
    ...[...clashes, ...repeated].map(({ name, place }): Problem => {
      return { code: 'duplicate-key', message: `${name} is given twice`, remedy: 'Give it in one place.', ...place };
    }),
    ...taken.map(({ name, place }): Problem => {
      const message = `the column ${name} has a name that means something else`;
      return { code: 'reserved-name', message, remedy: 'Choose another name.', ...place };
    }),
  ];
}
