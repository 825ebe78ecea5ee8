import { Composer, type CST, isAlias, isMap, isScalar, isSeq, Lexer, type ParsedNode, Parser, Scalar } from 'yaml';
import { type ProblemCollector, shown } from './collector.ts';
import { type ScalarStyle, scalarText, TextFile } from './source-text.ts';
import type { MappingEntry, SheetNode } from './tree.ts';
import { yamlRemedy } from './yaml-remedy.ts';

/** 256 KiB of ASCII. */
const longestSheet = 262_144;
const deepestSheet = 16;
/** Reading time grows with the tokens: this many take well under a second, and a long sheet has a tenth of them. */
const mostTokens = 20_000;

/**
 * The content of a YAML text. All scalars stay text, so that decimals are kept as written.
 * Undefined when the text is too large, too deep or not YAML; all problems found go to the collector. Never throws for
 * any text, and takes time linear in its length.
 */
export function parseYaml(text: string, fileName: string, problems: ProblemCollector): SheetNode | undefined {
  const file = new TextFile(fileName, text);
  if (text.length > longestSheet) {
    problems.add(
      'file-too-large',
      file.placeAt(0),
      `the file has ${text.length} characters; a sheet may have ${longestSheet}`,
      'Split it into sheets that use each other.',
    );
    return undefined;
  }
  const tokens = tokensOf(file, problems);
  if (tokens === undefined) return undefined;
  // The library's own check for duplicate keys takes quadratic time; `convert` does it in linear time.
  const composer = new Composer({ schema: 'failsafe', uniqueKeys: false, prettyErrors: false, logLevel: 'silent' });
  const [document] = composer.compose(tokens, true, text.length);
  if (document === undefined) return undefined;
  const faults = [...document.errors, ...document.warnings];
  for (const { code, message, pos } of faults) {
    const said = shown(message.charAt(0).toLowerCase() + message.slice(1), 200);
    problems.add('yaml-syntax', file.placeAt(pos[0]), `not YAML: ${said}`, () => yamlRemedy(code, file.lineAt(pos[0])));
  }
  const root = convert(document.contents as ParsedNode | null, file, problems, 0);
  return faults.length === 0 ? root : undefined;
}

/** The tokens of the only document, or undefined when they are too many, too deep or there is a second document. */
function tokensOf(file: TextFile, problems: ProblemCollector): CST.Token[] | undefined {
  const tokens: CST.Token[] = [];
  const parser = new Parser();
  let count = 0;
  let documents = 0;
  for (const lexeme of new Lexer().lex(file.text)) {
    const place = file.placeAt(parser.offset);
    for (const token of parser.next(lexeme)) {
      tokens.push(token);
      if (token.type === 'document') documents++;
    }
    if (++count > mostTokens) {
      problems.add(
        'file-too-large',
        place,
        `the file has more than ${mostTokens} YAML tokens`,
        'Split it into sheets that use each other.',
      );
      return undefined;
    }
    if (tooDeep(parser)) {
      problems.add(
        'yaml-depth',
        place,
        `values are nested more than ${deepestSheet} deep`,
        'No key of a sheet needs more than five levels; check brackets and indentation here.',
      );
      return undefined;
    }
    if (documents > 0 && parser.stack[0]?.type === 'document') {
      problems.add(
        'yaml-syntax',
        file.placeAt(parser.stack[0].offset),
        'not one YAML document: a second one begins here',
        'Write one sheet in each file, and remove this line.',
      );
      return undefined;
    }
  }
  tokens.push(...parser.end());
  return tokens;
}

function tooDeep(parser: Parser): boolean {
  if (parser.stack.length <= deepestSheet) return false;
  return parser.stack.filter(({ type }) => collections.has(type)).length > deepestSheet;
}

const collections: ReadonlySet<string> = new Set(['block-map', 'block-seq', 'flow-collection']);

const styles: Readonly<Record<string, ScalarStyle>> = {
  [Scalar.PLAIN]: 'plain',
  [Scalar.QUOTE_SINGLE]: 'single-quoted',
  [Scalar.QUOTE_DOUBLE]: 'double-quoted',
  [Scalar.BLOCK_FOLDED]: 'block',
  [Scalar.BLOCK_LITERAL]: 'block',
};

/** `at`: the offset to name for a node that is not there. */
function convert(node: ParsedNode | null, file: TextFile, problems: ProblemCollector, at: number): SheetNode {
  if (node === null) return { kind: 'empty', place: file.placeAt(at) };
  const [start, end] = node.range;
  const place = file.placeAt(start);
  const anchor = isAlias(node) ? undefined : node.anchor;
  if (isAlias(node) || anchor !== undefined) {
    const what = isAlias(node) ? `the alias *${shown(node.source)}` : `the anchor &${shown(anchor ?? '')}`;
    problems.add(
      'yaml-alias',
      place,
      `${what} has no place in a sheet`,
      'Write the value itself; quote an expression that begins with * or &.',
    );
    return { kind: 'faulty', place };
  }
  if (isScalar(node)) {
    const text = typeof node.value === 'string' ? node.value : '';
    const style = styles[node.type ?? Scalar.PLAIN] ?? 'plain';
    // An absent value is a plain scalar without characters; the place to name is that of its key.
    if (style === 'plain' && text === '') return { kind: 'empty', place: file.placeAt(at) };
    const value = scalarText(file, text, style, start, end);
    return { kind: 'scalar', value, place };
  }
  if (isSeq(node)) {
    const items = (node.items as (ParsedNode | null)[]).map((item) => convert(item, file, problems, start));
    return { kind: 'list', items, place };
  }
  if (!isMap(node)) return { kind: 'faulty', place };
  const entries = new Map<string, MappingEntry>();
  for (const { key, value } of node.items as { key: ParsedNode; value: ParsedNode | null }[]) {
    const keyStart = key.range[0];
    const entry = { keyPlace: file.placeAt(keyStart), node: convert(value, file, problems, keyStart) };
    addEntry(entries, key, entry, problems);
  }
  return { kind: 'mapping', entries, place };
}

function addEntry(
  entries: Map<string, MappingEntry>,
  keyNode: ParsedNode,
  { keyPlace, node }: Omit<MappingEntry, 'key'>,
  problems: ProblemCollector,
): void {
  if (isAlias(keyNode) || keyNode.anchor !== undefined) {
    problems.add('yaml-alias', keyPlace, 'an anchor or alias has no place in a sheet', 'Write the key itself.');
    return;
  }
  const key = isScalar(keyNode) ? String(keyNode.value) : '';
  if (key === '' || key === '__proto__') {
    const remedy = 'Write a name before the colon.';
    problems.add('yaml-syntax', keyPlace, `a key must be a plain name${key === '' ? '' : `, not ${key}`}`, remedy);
    return;
  }
  const first = entries.get(key);
  if (first !== undefined) {
    const remedy = `Keep one of the two; the first is in line ${first.keyPlace.line}.`;
    problems.add('duplicate-key', keyPlace, `the key ${shown(key)} is given twice`, remedy);
    return;
  }
  entries.set(key, { key, keyPlace, node });
}
