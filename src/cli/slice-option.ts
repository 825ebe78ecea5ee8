import { type DomainCoordinate, domainCoordinates } from '../constraint/domain.ts';
import { failure, type Outcome, type Problem, success } from '../errors/problem.ts';
import { suggestion } from '../errors/suggest.ts';
import { toNumber } from '../number/rational.ts';
import { parseAssignments } from './options.ts';
import { limitProblems } from './point-limits.ts';
import { wrongOption } from './problems.ts';

/** `zeta=0,alpha=1`, one slice for each time the option is given; one slice that fixes nothing without it. */
export function parseSlices(texts: readonly string[]): Outcome<ReadonlyMap<DomainCoordinate, number>[]> {
  if (texts.length === 0) return success([new Map()]);
  const problems: Problem[] = [];
  const slices = texts.map((text) => {
    const given = parseAssignments('--at', [text], domainCoordinates);
    if (!given.ok) {
      problems.push(...given.problems);
      return new Map();
    }
    problems.push(
      ...limitProblems(
        Object.fromEntries([...given.value].map(([name, { value }]) => [name, String(toNumber(value))])),
        {},
      ),
    );
    return new Map([...given.value].map(([name, { value }]) => [name as DomainCoordinate, toNumber(value)]));
  });
  return problems.length > 0 ? failure(problems) : success(slices);
}

/** `s,rs`: one or two coordinates. */
export function parseAxes(text: string): Outcome<{ readonly x?: DomainCoordinate; readonly y?: DomainCoordinate }> {
  const names = text.split(',').map((name) => name.trim());
  const unknown = names.filter((name) => !isCoordinate(name));
  if (unknown.length > 0 || names.length > 2) {
    const known = `The coordinates are ${domainCoordinates.join(', ')}.`;
    const remedy = unknown[0] === undefined ? known : suggestion(unknown[0], domainCoordinates, known);
    return failure([wrongOption(`--axes does not understand ${text}`, remedy)]);
  }
  const [x, y] = names as DomainCoordinate[];
  return success({ ...(x === undefined ? {} : { x }), ...(y === undefined ? {} : { y }) });
}

export function isCoordinate(name: string): name is DomainCoordinate {
  return (domainCoordinates as readonly string[]).includes(name);
}
