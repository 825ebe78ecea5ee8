import type { FunctionalDefinition, Step } from '../definition/functional.ts';
import type { Problem } from '../errors/problem.ts';
import type { Expression } from '../expression/expression.ts';
import { type PlacedText, parseExpression } from '../expression/parse.ts';
import type { ExactExchange, Form, Functional, Part } from './functional.ts';
import type { Reading, Site } from './reading.ts';

/** The parsed expressions of a sheet, before its imports are joined. */
export interface ReadSheet extends Pick<Functional, 'parameters' | 'functions' | 'steps' | 'parts' | 'exactExchange'> {
  readonly importParameters: ReadonlyMap<string, ReadonlyMap<string, Expression>>;
}

/** Parses every expression of a definition; each that cannot be parsed is a problem and left out. */
export function readSheet(definition: FunctionalDefinition): {
  sheet: ReadSheet;
  readings: Reading[];
  problems: Problem[];
} {
  const readings: Reading[] = [];
  const problems: Problem[] = [];
  const read = (source: PlacedText, site: Site): Expression | undefined => {
    const outcome = parseExpression(source);
    if (!outcome.ok) {
      problems.push(...outcome.problems);
      return undefined;
    }
    readings.push({ source, expression: outcome.value, site });
    return outcome.value;
  };
  const readSteps = (steps: readonly Step[], siteOf: (name: string) => Site) =>
    keyed(steps, (step) => read(step.value, siteOf(step.name)));

  const sheet: ReadSheet = {
    importParameters: new Map(
      definition.uses.map(({ alias, parameters }) => [
        alias,
        readSteps(parameters, (parameter) => ({ kind: 'import', alias, parameter })),
      ]),
    ),
    parameters: keyed(definition.parameters, (parameter) =>
      map(read(parameter.value, { kind: 'parameter', name: parameter.name }), (value) => ({
        definition: parameter,
        value,
      })),
    ),
    functions: keyed(definition.functions, (fn) =>
      map(read(fn.body, { kind: 'function', name: fn.name, arguments: fn.arguments }), (body) => ({
        arguments: fn.arguments,
        body,
      })),
    ),
    steps: readSteps(definition.where, (name) => ({ kind: 'step', part: undefined, name })),
    parts: keyed(definition.parts, (part): Part | undefined => {
      const steps = readSteps(part.where, (name) => ({ kind: 'step', part: part.name, name }));
      const form = readForm(part.form, (source, insideChannel) =>
        read(source, { kind: 'form', part: part.name, insideChannel }),
      );
      return map(form, (known) => ({ name: part.name, steps, form: known }));
    }),
    exactExchange: map(definition.exactExchange, (exact) =>
      readExactExchange(exact, (source) => read(source, { kind: 'exact-exchange' })),
    ),
  };
  return { sheet, readings, problems };
}

function readForm(
  form: FunctionalDefinition['parts'][number]['form'],
  read: (source: PlacedText, insideChannel: boolean) => Expression | undefined,
): Form | undefined {
  if (form.kind === 'from') return { kind: 'from', alias: form.alias };
  if (form.kind === 'pairs') {
    const sameSpin = read(form.sameSpin, true);
    const oppositeSpin = read(form.oppositeSpin, false);
    if (sameSpin === undefined || oppositeSpin === undefined) return undefined;
    return { kind: 'pairs', partition: form.partition, sameSpin, oppositeSpin };
  }
  return map(read(form.value, false), (value) => ({ kind: form.kind, value }));
}

function readExactExchange(
  exact: NonNullable<FunctionalDefinition['exactExchange']>,
  read: (source: PlacedText) => Expression | undefined,
): ExactExchange | undefined {
  if (exact.kind === 'global') return map(read(exact.fraction), (fraction) => ({ kind: 'global', fraction }));
  const shortRange = read(exact.shortRange);
  const longRange = read(exact.longRange);
  const omega = read(exact.omega);
  if (shortRange === undefined || longRange === undefined || omega === undefined) return undefined;
  return { kind: 'range-separated', shortRange, longRange, omega };
}

function keyed<Item extends { readonly name: Key }, Key extends string, Value>(
  items: readonly Item[],
  make: (item: Item) => Value | undefined,
): Map<Key, Value> {
  return new Map(items.flatMap((item) => map(make(item), (value): [Key, Value][] => [[item.name, value]]) ?? []));
}

function map<From, To>(value: From | undefined, change: (value: From) => To): To | undefined {
  return value === undefined ? undefined : change(value);
}
