import { failure, type Outcome, type SourcePlace, success } from '../errors/problem.ts';
import { ProblemCollector, shown } from './collector.ts';
import type {
  ExactExchange,
  FunctionalDefinition,
  FunctionDefinition,
  Import,
  ParameterDefinition,
  Part,
  Rung,
  Step,
} from './functional-definition.ts';
import { functionalSheet } from './functional-sheet.ts';
import { namePattern, signaturePattern, splitSignature } from './names.ts';
import { partsIn } from './part.ts';
import { checkShape } from './shape.ts';
import { checkId, importsIn, type SheetOrigin, stepsIn } from './steps.ts';
import { entriesOf, entryOf, given, type SheetNode, scalarOf, sourceOf, textOf, textsOf } from './tree.ts';
import { parseYaml } from './yaml.ts';

export type {
  ExactExchange,
  Form,
  FunctionalDefinition,
  FunctionDefinition,
  Import,
  ParameterDefinition,
  Part,
  PartName,
  Rung,
  Step,
} from './functional-definition.ts';

/**
 * The functional that a sheet defines, or every problem of the sheet's form, each at its line and column.
 * Expressions are kept as text and not looked into. Never throws for any text.
 */
export function parseFunctionalSheet(text: string, origin: SheetOrigin): Outcome<FunctionalDefinition> {
  const problems = new ProblemCollector();
  checkId(origin, problems);
  const root = parseYaml(text, origin.file, problems);
  if (root === undefined) return failure(problems.sorted());
  checkShape(root, functionalSheet, problems);
  if (root.kind !== 'mapping') return failure(problems.sorted());
  const definition = read(root, text, origin, problems);
  checkNames(definition, problems);
  return problems.empty ? success(definition) : failure(problems.sorted());
}

/** Reads what is well formed and leaves out the rest, which the schema has reported. */
function read(root: SheetNode, text: string, origin: SheetOrigin, problems: ProblemCollector): FunctionalDefinition {
  const year = textOf(root, 'year');
  return {
    id: origin.id,
    file: origin.file,
    text,
    name: textOf(root, 'name') ?? origin.id,
    ...given('year', year === undefined ? undefined : Number(year)),
    rung: textOf(root, 'rung') as Rung,
    ...given('summary', textOf(root, 'summary')),
    ...given('notes', textOf(root, 'notes')),
    citations: textsOf(root, 'citations'),
    ...given('nonLocal', textOf(root, 'non-local')),
    uses: importsIn(entryOf(root, 'uses')?.node),
    parameters: parametersIn(entryOf(root, 'parameters')?.node),
    functions: functionsIn(entryOf(root, 'functions')?.node, problems),
    where: stepsIn(entryOf(root, 'where')?.node),
    ...given('exactExchange', exactExchangeIn(entryOf(root, 'exact-exchange')?.node)),
    parts: partsIn(root, problems),
  };
}

function parametersIn(node: SheetNode | undefined): readonly ParameterDefinition[] {
  return entriesOf(node).flatMap(({ key, keyPlace, node: held }) => {
    const value = scalarOf(held) ?? sourceOf(held, 'value');
    if (value === undefined) return [];
    const digits = textOf(held, 'digits');
    const parameter = {
      name: key,
      value,
      ...given('digits', digits === undefined ? undefined : Number(digits)),
      ...given('source', textOf(held, 'source')),
      ...given('meaning', textOf(held, 'meaning')),
      place: keyPlace,
    };
    return [parameter];
  });
}

function functionsIn(node: SheetNode | undefined, problems: ProblemCollector): readonly FunctionDefinition[] {
  return entriesOf(node).flatMap(({ key, keyPlace, node: held }) => {
    const body = scalarOf(held);
    if (body === undefined || !signaturePattern.test(key)) return [];
    const signature = splitSignature(key);
    const seen = new Set<string>();
    for (const argument of signature.arguments) {
      if (seen.has(argument)) {
        const message = `${signature.name} has two arguments called ${shown(argument)}`;
        problems.add('wrong-value', keyPlace, message, 'Rename one of them.');
      }
      seen.add(argument);
    }
    return [{ ...signature, body, place: keyPlace }];
  });
}

function exactExchangeIn(node: SheetNode | undefined): ExactExchange | undefined {
  const fraction = scalarOf(node);
  if (fraction !== undefined) return { kind: 'global', fraction };
  const [shortRange, longRange, omega] = ['short-range', 'long-range', 'omega'].map((key) => sourceOf(node, key));
  if (shortRange === undefined || longRange === undefined || omega === undefined) return undefined;
  return { kind: 'range-separated', shortRange, longRange, omega };
}

interface Named {
  readonly name: string;
  readonly what: string;
  readonly place: SourcePlace;
}

/** One name, one meaning: across imports, parameters, functions and shared steps, and in each part with its own steps. */
function checkNames({ uses, parameters, functions, where, parts }: FunctionalDefinition, problems: ProblemCollector) {
  const shared = new Map<string, Named>();
  const all: readonly Named[] = [
    ...uses.map(({ alias, place }: Import) => ({ name: alias, what: 'an alias', place })),
    ...parameters.map(({ name, place }) => ({ name, what: 'a parameter', place })),
    ...functions.map(({ name, place }) => ({ name, what: 'a function', place })),
    ...where.map(({ name, place }: Step) => ({ name, what: 'a step', place })),
  ];
  for (const named of all) define(named, shared, problems);
  for (const part of parts as readonly Part[]) {
    const local = new Map(shared);
    for (const { name, place } of part.where) define({ name, what: 'a step', place }, local, problems);
  }
}

function define(named: Named, known: Map<string, Named>, problems: ProblemCollector): void {
  const first = known.get(named.name);
  if (first === undefined) {
    known.set(named.name, named);
    return;
  }
  if (!namePattern.test(named.name)) return;
  const message = `${shown(named.name)} is ${named.what} here and ${first.what} in line ${first.place.line}`;
  problems.add('duplicate-key', named.place, message, 'Give one of the two another name.');
}
