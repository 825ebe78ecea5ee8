import type { z } from 'zod';
import type { SourcePlace } from '../errors/problem.ts';
import { advice, type ProblemCollector, shown } from './collector.ts';
import { entryOf, plainData, type SheetNode } from './tree.ts';

type Issue = z.core.$ZodIssue;
type Path = readonly PropertyKey[];

/** Checks a sheet against its schema: missing and unknown keys and values of the wrong kind, each at its place. */
export function checkShape(root: SheetNode, schema: z.ZodType, problems: ProblemCollector): void {
  const result = schema.safeParse(plainData(root), { error: expectation });
  for (const issue of result.error?.issues ?? []) report(issue, [], root, schema, problems);
}

/** What was expected, in words that follow "must be"; a schema with an `error` of its own says it itself. */
function expectation(issue: z.core.$ZodRawIssue): string {
  if (issue.code === 'invalid_value') return `one of ${issue.values.map(String).join(', ')}`;
  if (issue.code === 'invalid_type') return kinds[issue.expected] ?? issue.expected;
  return 'a value of another kind';
}

const kinds: Readonly<Record<string, string>> = {
  object: 'a mapping of keys',
  record: 'a mapping of names',
  array: 'a list',
  string: 'a text',
};

function report(issue: Issue, base: Path, root: SheetNode, schema: z.ZodType, problems: ProblemCollector): void {
  const path = [...base, ...issue.path];
  const at = locate(root, path);
  if (at.node?.kind === 'faulty') return;
  if (issue.code === 'unrecognized_keys') {
    reportUnknownKeys(issue.keys, path, at.node, schema, problems);
  } else if (issue.code === 'invalid_key') {
    const key = shown(String(path.at(-1)));
    const expected = issue.issues[0]?.message ?? 'a name';
    problems.add('wrong-value', at.keyPlace, `${key} must be ${expected}`, 'Rename it.');
  } else if (at.node === undefined) {
    const key = String(path.at(-1));
    const where = path.length < 2 ? 'the sheet' : pathText(path.slice(0, -1));
    problems.add('missing-key', at.keyPlace, `${where} has no ${key}`, `Add ${key}: it must be ${issue.message}.`);
  } else if (issue.code === 'invalid_union' && reportBranch(issue, path, root, schema, problems)) {
    return;
  } else if (at.node.kind === 'empty') {
    const message = path.length === 0 ? 'the sheet is empty' : `${pathText(path)} has no value`;
    problems.add('wrong-value', at.keyPlace, message, `It must be ${issue.message}; give it, or remove the key.`);
  } else {
    const { node } = at;
    const text = node.kind === 'scalar' ? node.value.text : undefined;
    const found = text === undefined ? foundKinds[node.kind] : `"${shown(text)}"`;
    const known = issue.code === 'invalid_value' ? issue.values.map(String) : [];
    problems.add('wrong-value', node.place, `${pathText(path)} must be ${issue.message}, not ${found}`, () =>
      advice(text ?? '', known, `Write ${issue.message}.`),
    );
  }
}

const foundKinds: Readonly<Record<string, string>> = { mapping: 'a mapping', list: 'a list' };

/** Of a value that is either a text or a mapping: the problems inside the mapping, when it is one. */
function reportBranch(
  issue: z.core.$ZodIssueInvalidUnion,
  path: Path,
  root: SheetNode,
  schema: z.ZodType,
  problems: ProblemCollector,
): boolean {
  const branch = issue.errors.find((issues) => issues.length > 0 && !issues.some(isWrongKind));
  for (const inner of branch ?? []) report(inner, path, root, schema, problems);
  return branch !== undefined;
}

function isWrongKind(issue: Issue): boolean {
  return issue.path.length === 0 && issue.code !== 'unrecognized_keys';
}

function reportUnknownKeys(
  keys: readonly string[],
  path: Path,
  node: SheetNode | undefined,
  schema: z.ZodType,
  problems: ProblemCollector,
): void {
  const known = Object.keys(objectAt(schema, path)?.shape ?? {});
  const where = path.length === 0 ? '' : ` in ${pathText(path)}`;
  for (const key of keys) {
    const entry = entryOf(node, key);
    if (entry === undefined) continue;
    problems.add('unknown-key', entry.keyPlace, `unknown key ${shown(key)}${where}`, () =>
      advice(key, known, `The keys here are ${known.join(', ')}.`),
    );
  }
}

/** The node at a path and the place of its key; without the node, the place of what should hold it. */
function locate(root: SheetNode, path: Path): { readonly node: SheetNode | undefined; readonly keyPlace: SourcePlace } {
  let node: SheetNode | undefined = root;
  let keyPlace = root.place;
  for (const step of path) {
    if (node?.kind === 'list' && typeof step === 'number') {
      node = node.items[step];
      keyPlace = node?.place ?? keyPlace;
      continue;
    }
    const entry = entryOf(node, String(step));
    node = entry?.node;
    keyPlace = entry?.keyPlace ?? keyPlace;
  }
  return { node, keyPlace };
}

function objectAt(schema: z.ZodType, path: Path): z.ZodObject | undefined {
  let candidates = [schema];
  for (const step of path) candidates = candidates.flatMap(alternatives).flatMap((one) => child(one, step));
  return candidates.flatMap(alternatives).find((one) => one.def.type === 'object') as z.ZodObject | undefined;
}

function alternatives(schema: z.ZodType): z.ZodType[] {
  const { type } = schema.def;
  if (type === 'optional') return alternatives((schema as z.ZodOptional<z.ZodType>).def.innerType);
  if (type === 'union') return (schema as z.ZodUnion<z.ZodType[]>).options.flatMap(alternatives);
  return [schema];
}

function child(schema: z.ZodType, step: PropertyKey): z.ZodType[] {
  const { type } = schema.def;
  if (type === 'array') return [(schema as z.ZodArray<z.ZodType>).element];
  if (type === 'record') return [(schema as z.ZodRecord<z.ZodString, z.ZodType>).valueType];
  const inner = type === 'object' ? (schema as z.ZodObject).shape[String(step)] : undefined;
  return inner === undefined ? [] : [inner as z.ZodType];
}

/** `exchange.where.ec`, `citations item 2`. */
function pathText(path: Path): string {
  if (path.length === 0) return 'the sheet';
  const parts = path.map((step) => (typeof step === 'number' ? ` item ${step + 1}` : `.${shown(String(step))}`));
  return parts.join('').replace(/^\./, '');
}
