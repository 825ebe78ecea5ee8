import type { SourcePlace } from '../errors/problem.ts';
import type { SourceText } from './source-text.ts';

/** What a sheet says, before its meaning: texts, mappings and lists, each with its place. */
export type SheetNode =
  | { readonly kind: 'scalar'; readonly value: SourceText; readonly place: SourcePlace }
  | MappingNode
  | { readonly kind: 'list'; readonly items: readonly SheetNode[]; readonly place: SourcePlace }
  /** A key without a value. */
  | { readonly kind: 'empty'; readonly place: SourcePlace }
  /** Something already reported as a problem; nothing more is said about it. */
  | { readonly kind: 'faulty'; readonly place: SourcePlace };

export interface MappingNode {
  readonly kind: 'mapping';
  readonly entries: ReadonlyMap<string, MappingEntry>;
  readonly place: SourcePlace;
}

export interface MappingEntry {
  readonly key: string;
  readonly keyPlace: SourcePlace;
  readonly node: SheetNode;
}

/** The same as plain data for a schema: strings, objects without prototype, arrays, null. */
export function plainData(node: SheetNode): unknown {
  switch (node.kind) {
    case 'scalar':
      return node.value.text;
    case 'list':
      return node.items.map(plainData);
    case 'mapping': {
      const data: Record<string, unknown> = Object.create(null);
      for (const [key, entry] of node.entries) data[key] = plainData(entry.node);
      return data;
    }
    default:
      return null;
  }
}

/** The entry of a key, or undefined when the node is no mapping or lacks it. */
export function entryOf(node: SheetNode | undefined, key: string): MappingEntry | undefined {
  return node?.kind === 'mapping' ? node.entries.get(key) : undefined;
}

/** All entries in the order of the file; none when the node is no mapping. */
export function entriesOf(node: SheetNode | undefined): readonly MappingEntry[] {
  return node?.kind === 'mapping' ? [...node.entries.values()] : [];
}

/** The value of a key that holds one text, or undefined. */
export function sourceOf(node: SheetNode | undefined, key: string): SourceText | undefined {
  return scalarOf(entryOf(node, key)?.node);
}

export function scalarOf(node: SheetNode | undefined): SourceText | undefined {
  return node?.kind === 'scalar' ? node.value : undefined;
}

/** The text of a key without the white space around it, or undefined. */
export function textOf(node: SheetNode | undefined, key: string): string | undefined {
  return sourceOf(node, key)?.text.trim();
}

/** The items of a key that holds a list; none when it does not. */
export function itemsOf(node: SheetNode | undefined, key: string): readonly SheetNode[] {
  const list = entryOf(node, key)?.node;
  return list?.kind === 'list' ? list.items : [];
}

/** The texts of a key that holds a list of texts. */
export function textsOf(node: SheetNode | undefined, key: string): readonly string[] {
  return itemsOf(node, key).flatMap((item) => (item.kind === 'scalar' ? [item.value.text.trim()] : []));
}

/** An object with the key when the value is given, and without it when it is undefined. */
export function given<Key extends string, Value>(key: Key, value: Value | undefined): { readonly [K in Key]?: Value } {
  return (value === undefined ? {} : { [key]: value }) as { readonly [K in Key]?: Value };
}
