import type { Functional } from '../../../src/functional/functional.ts';
import { sums } from './sums.ts';
import { type GeneralValues, type PartName, type ReferenceRow, referenceRow, type SliceValues } from './values.ts';

/** What one part of a sheet must equal. */
export interface Expectation {
  readonly part: PartName;
  readonly row: ReferenceRow;
  /** Where the row comes from, when not from the functional of the sheet itself. */
  readonly origin: string;
}

/**
 * The expectations of a sheet: its own rows; for a part taken from another sheet unchanged, the row of
 * that sheet; for a listed sum, the sum of the rows of its terms. `missing` are the parts without any.
 */
export function expectationsOf(functional: Functional): { expectations: Expectation[]; missing: PartName[] } {
  const { id } = functional.definition;
  const combined = referenceRow(id, 'exchange-correlation');
  if (combined !== undefined) {
    return { expectations: [{ part: 'exchange-correlation', row: combined, origin: id }], missing: [] };
  }
  const found = [...functional.parts.keys()].map((part) => ({ part, row: rowOf(functional, part) }));
  return {
    expectations: found.flatMap(({ part, row }) => (row === undefined ? [] : [{ part, row, origin: row.functional }])),
    missing: found.flatMap(({ part, row }) => (row === undefined ? [part] : [])),
  };
}

function rowOf(functional: Functional, part: PartName): ReferenceRow | undefined {
  const { id } = functional.definition;
  const own = referenceRow(id, part);
  if (own !== undefined) return own;
  const terms = sums[id]?.[part];
  if (terms !== undefined) return weightedSum(terms);
  const form = functional.parts.get(part)?.form;
  const imported = form?.kind === 'from' ? functional.imports.get(form.alias) : undefined;
  // With changed parameters the imported sheet's row says nothing, unless they are those of exchange alone.
  if (
    imported === undefined ||
    [...imported.parameters.keys()].some((name) => affects(imported.functional, part, name))
  ) {
    return undefined;
  }
  return rowOf(imported.functional, part);
}

/** Whether a parameter can reach a part: judged by the text of the sheet, wherever in doubt yes. */
function affects(functional: Functional, part: PartName, parameter: string): boolean {
  const definition = functional.definition.parts.find(({ name }) => name === part);
  const shared = [...functional.definition.where, ...functional.definition.functions];
  if (definition === undefined || shared.length > 0 || definition.form.kind === 'from') return true;
  const reaching = new Set([parameter]);
  for (let size = 0; size !== reaching.size; ) {
    size = reaching.size;
    for (const { name, value } of functional.definition.parameters) {
      if (namesIn(value.text).some((used) => reaching.has(used))) reaching.add(name);
    }
  }
  const texts = [...definition.where.map(({ value }) => value.text), JSON.stringify(definition.form)];
  return texts.some((text) => namesIn(text).some((name) => reaching.has(name)));
}

function namesIn(text: string): string[] {
  return text.match(/[A-Za-z][A-Za-z0-9_]*/g) ?? [];
}

/** Weight and row of each term. */
export type Sum = readonly (readonly [weight: number, functional: string, part: PartName])[];

function weightedSum(terms: Sum): ReferenceRow | undefined {
  const rows = terms.map(([weight, functional, part]) => ({ weight, row: referenceRow(functional, part) }));
  const first = rows[0]?.row;
  if (first === undefined) return undefined;
  const total = (value: (row: ReferenceRow) => number) =>
    rows.reduce((sum, { weight, row }) => sum + weight * (row === undefined ? Number.NaN : value(row)), 0);
  const at = <Key extends 'general' | 'slice'>(row: ReferenceRow, key: Key, index: number) =>
    row[key][index] as ReferenceRow[Key][number];
  return {
    functional: terms.map(([weight, functional]) => `${weight} ${functional}`).join(' + '),
    part: first.part,
    general: first.general.map((_, i): GeneralValues => {
      const all = (key: 'd_n' | 'd_sigma' | 'd_tau', count: number) =>
        Array.from({ length: count }, (__, k) => total((row) => at(row, 'general', i)[key]?.[k] ?? 0));
      return {
        eps: total((row) => at(row, 'general', i).eps),
        d_n: all('d_n', 2),
        d_sigma: all('d_sigma', 3),
        d_tau: all('d_tau', 2),
      };
    }),
    slice: first.slice.map((_, i): SliceValues => {
      const of = (key: keyof SliceValues) => total((row) => at(row, 'slice', i)[key]);
      return {
        F: of('F'),
        dF_drs: of('dF_drs'),
        dF_drs_error: of('dF_drs_error'),
        d2F_drs2: of('d2F_drs2'),
        d2F_drs2_error: of('d2F_drs2_error'),
      };
    }),
  };
}
