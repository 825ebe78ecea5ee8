import {
  customDomain,
  type Domain,
  type DomainCoordinate,
  domainCoordinates,
  standardDomain,
  wideDomain,
} from '../constraint/domain.ts';
import { failure, type Outcome, type Problem, success } from '../errors/problem.ts';
import { suggestion } from '../errors/suggest.ts';
import { parseDecimal, toNumber } from '../number/rational.ts';

/** Within these a coordinate has a meaning; the lowest r_s is not zero, where the axis is logarithmic. */
const meaningful: Readonly<Record<DomainCoordinate, readonly [number, number]>> = {
  rs: [1e-30, 1e30],
  zeta: [-1, 1],
  s: [0, 1e30],
  alpha: [0, 1e30],
  q: [-1e30, 1e30],
};

const form = 'Write standard, wide, bounds such as rs=0.01:100,zeta=0:1,s=0:5,alpha=0:5, or a file with such bounds.';

/** `standard`, `wide`, bounds such as `rs=0.01:10,s=0:3`, or a file with such bounds (one or several a line, # comments). */
export function parseDomain(text: string, readFile: (path: string) => Outcome<string>): Outcome<Domain> {
  if (text === 'standard') return success(standardDomain);
  if (text === 'wide') return success(wideDomain);
  if (/^\s*[A-Za-z_]+\s*=/.test(text)) return domainFrom([{ text, place: {} }]);
  const file = readFile(text);
  if (!file.ok) {
    const asWord = suggestion(text, ['standard', 'wide'], form);
    return failure(file.problems.map((problem) => ({ ...problem, remedy: asWord })));
  }
  const lines = file.value.split(/\r?\n/).map((line, index) => ({
    text: line.replace(/^\uFEFF/, '').replace(/#.*$/, ''),
    place: { file: text, line: index + 1 },
  }));
  return domainFrom(lines, text);
}

interface PlacedLine {
  readonly text: string;
  readonly place: { readonly file?: string; readonly line?: number };
}

function domainFrom(lines: readonly PlacedLine[], file?: string): Outcome<Domain> {
  const problems: Problem[] = [];
  const bounds = new Map<DomainCoordinate, readonly [number, number]>();
  for (const { text, place } of lines) {
    for (const item of text.split(',').map((part) => part.trim())) {
      if (item === '') continue;
      const read = boundsIn(item);
      if (!read.ok) problems.push(...read.problems.map((problem) => ({ ...problem, ...place })));
      else if (bounds.has(read.value.name))
        problems.push({ ...wrong(`${read.value.name} has bounds twice`), ...place });
      else bounds.set(read.value.name, read.value.bounds);
    }
  }
  if (problems.length === 0 && bounds.size === 0) {
    problems.push({ ...wrong('the domain has no bounds'), ...(file === undefined ? {} : { file }) });
  }
  return problems.length > 0 ? failure(problems) : success(customDomain(bounds));
}

function boundsIn(
  item: string,
): Outcome<{ readonly name: DomainCoordinate; readonly bounds: readonly [number, number] }> {
  const match = /^([^=\s]+)\s*=\s*([^:\s]+)\s*:\s*([^:\s]+)$/.exec(item);
  if (match === null) return failure([wrong(`the domain does not understand ${item}`)]);
  const [, name = '', lowerText = '', upperText = ''] = match;
  if (!isCoordinate(name)) {
    const remedy = suggestion(name, domainCoordinates, `The coordinates are ${domainCoordinates.join(', ')}.`);
    return failure([{ ...wrong(`the domain has no coordinate ${name}`), remedy }]);
  }
  const [lower, upper] = [lowerText, upperText].map((text) => {
    const value = parseDecimal(text);
    return value === undefined ? Number.NaN : toNumber(value);
  }) as [number, number];
  if (Number.isNaN(lower) || Number.isNaN(upper)) {
    const remedy = 'Give two decimal numbers; for a domain without end a large one, such as 1e9.';
    return failure([{ ...wrong(`the bounds of ${name} are not numbers: ${lowerText}:${upperText}`), remedy }]);
  }
  const [least, most] = meaningful[name];
  if (!(lower >= least && upper <= most && lower <= upper)) {
    const range = name === 'rs' ? 'above 0' : `from ${least} to ${most}`;
    const remedy = `Give a lower and an upper bound, ${range}; equal bounds fix the coordinate.`;
    return failure([
      { ...wrong(`the bounds ${lowerText}:${upperText} of ${name} span nothing that can be looked at`), remedy },
    ]);
  }
  return success({ name, bounds: [lower, upper] });
}

function isCoordinate(name: string): name is DomainCoordinate {
  return (domainCoordinates as readonly string[]).includes(name);
}

function wrong(message: string): Problem {
  return { code: 'wrong-option', message, remedy: form };
}
