import type { SheetKind } from './sources.ts';

/** The ids of the sheets that a text uses; undefined where it is not well formed. The parser is loaded when needed. */
export async function readUses(
  kind: SheetKind,
  text: string,
  origin: { readonly id: string; readonly file: string },
): Promise<readonly string[] | undefined> {
  if (kind === 'functional') {
    const { parseFunctionalSheet } = await import('../definition/functional.ts');
    const read = parseFunctionalSheet(text, origin);
    return read.ok ? read.value.uses.map(({ sheet }) => sheet) : undefined;
  }
  const { parseConstraintSheet } = await import('../definition/constraint.ts');
  const read = parseConstraintSheet(text, origin);
  return read.ok ? read.value.uses.map(({ sheet }) => sheet) : undefined;
}
