import { failure, type Outcome, type SourcePlace, success } from '../errors/problem.ts';
import { ProblemCollector } from './collector.ts';
import { decimalNumber } from './field.ts';
import { projectSheet } from './project-sheet.ts';
import { checkShape } from './shape.ts';
import { entriesOf, entryOf, given, itemsOf, type SheetNode, scalarOf, textOf } from './tree.ts';
import { parseYaml } from './yaml.ts';

/** A text of the project file with its place. */
export interface PlacedName {
  readonly text: string;
  readonly place: SourcePlace;
}

export interface AcceptanceDefinition {
  readonly constraint: string;
  readonly functional: string;
  readonly reason: string;
  readonly margin?: number;
  readonly region?: ReadonlyMap<string, readonly [lower: number, upper: number]>;
  readonly review?: string;
  readonly place: SourcePlace;
}

/** What a project file says; paths are as written, from the folder of the file. */
export interface ProjectDefinition {
  readonly sheets: readonly PlacedName[];
  readonly constraints: readonly PlacedName[];
  readonly only?: readonly PlacedName[];
  readonly except: readonly PlacedName[];
  /** In the form of the --domain option. */
  readonly domain?: PlacedName;
  readonly constants: readonly (PlacedName & { readonly name: string })[];
  readonly tolerances: readonly (PlacedName & { readonly name: string })[];
  readonly compare: { readonly margin?: number; readonly share?: number };
  readonly accept: readonly AcceptanceDefinition[];
}

/** The project that a file defines, or every problem of its form, each at its line and column. */
export function parseProjectFile(text: string, file: string): Outcome<ProjectDefinition> {
  const problems = new ProblemCollector();
  const root = parseYaml(text, file, problems);
  if (root === undefined) return failure(problems.sorted());
  checkShape(root, projectSheet, problems);
  const only = entryOf(root, 'only');
  if (only !== undefined && entryOf(root, 'except') !== undefined) {
    problems.add('wrong-value', only.keyPlace, 'the file has both only and except', 'Keep one of the two.');
  }
  return problems.empty ? success(read(root)) : failure(problems.sorted());
}

/** Reads a file that the schema accepts. */
function read(root: SheetNode): ProjectDefinition {
  const compare = entryOf(root, 'compare')?.node;
  const domain = entryOf(root, 'domain')?.node;
  return {
    sheets: namesIn(root, 'sheets'),
    constraints: namesIn(root, 'constraints'),
    ...given('only', entryOf(root, 'only') === undefined ? undefined : namesIn(root, 'only')),
    except: namesIn(root, 'except'),
    ...given('domain', domain === undefined ? undefined : { text: domainText(domain), place: domain.place }),
    constants: valuesIn(root, 'constants'),
    tolerances: valuesIn(root, 'tolerances'),
    compare: { ...given('margin', numberOf(compare, 'margin')), ...given('share', numberOf(compare, 'share')) },
    accept: itemsOf(root, 'accept').map(acceptanceOf),
  };
}

function acceptanceOf(item: SheetNode): AcceptanceDefinition {
  const region = entryOf(item, 'region');
  return {
    constraint: textOf(item, 'constraint') ?? '',
    functional: textOf(item, 'functional') ?? '',
    reason: textOf(item, 'reason') ?? '',
    ...given('margin', numberOf(item, 'margin')),
    ...given(
      'region',
      region === undefined ? undefined : new Map(entriesOf(region.node).map(({ key, node }) => [key, boundsOf(node)])),
    ),
    ...given('review', textOf(item, 'review')),
    place: item.place,
  };
}

function boundsOf(node: SheetNode): readonly [number, number] {
  const [lower, upper] = (node.kind === 'list' ? node.items : []).map((end) =>
    decimalNumber(scalarOf(end)?.text ?? ''),
  );
  return [lower ?? Number.NaN, upper ?? Number.NaN];
}

function domainText(node: SheetNode): string {
  const text = scalarOf(node)?.text;
  return (
    text ??
    entriesOf(node)
      .map(({ key, node: held }) => `${key}=${boundsOf(held).join(':')}`)
      .join(',')
  );
}

function namesIn(root: SheetNode, key: string): PlacedName[] {
  return itemsOf(root, key).flatMap((item) => {
    const text = scalarOf(item)?.text.trim();
    return text === undefined ? [] : [{ text, place: item.place }];
  });
}

function valuesIn(root: SheetNode, key: string): (PlacedName & { readonly name: string })[] {
  return entriesOf(entryOf(root, key)?.node).flatMap(({ key: name, keyPlace, node }) => {
    const text = scalarOf(node)?.text.trim();
    return text === undefined ? [] : [{ name, text, place: keyPlace }];
  });
}

function numberOf(node: SheetNode | undefined, key: string): number | undefined {
  const text = textOf(node, key);
  return text === undefined ? undefined : decimalNumber(text);
}
