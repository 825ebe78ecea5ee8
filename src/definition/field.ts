import { z } from 'zod';
import { parseDecimal, toNumber } from '../number/rational.ts';
import { idPattern, namePattern } from './names.ts';

/** Kinds of value that sheets are made of. An `error` says what is expected, in words that follow "must be". */

/** A text with something in it. */
export function textField(): z.ZodString {
  return z.string({ error: 'a text' }).regex(/\S/, { error: 'a text' });
}

/** An expression or exact decimal. In a sheet it is always text; editors see a bare number as a number. */
export function expressionField(expected = 'an expression') {
  return z.union([z.string(), z.number()], { error: expected });
}

export function wholeNumberField(least: number, most: number) {
  const error = `a whole number from ${least} to ${most}`;
  return z.preprocess(
    (value) => (typeof value === 'string' && /^\d{1,9}$/.test(value) ? Number(value) : value),
    z.int({ error }).min(least, { error }).max(most, { error }),
  );
}

export function nonNegativeField() {
  const error = 'a decimal number that is not negative';
  return z.preprocess(
    (value) => (typeof value === 'string' ? (decimalNumber(value) ?? value) : value),
    z.number({ error }).min(0, { error }),
  );
}

export function yesNoField() {
  return z.preprocess(
    (value) => (value === 'true' ? true : value === 'false' ? false : value),
    z.boolean({ error: 'true or false' }),
  );
}

export function decimalNumber(text: string): number | undefined {
  const exact = parseDecimal(text);
  return exact === undefined ? undefined : toNumber(exact);
}

export function nameField() {
  const error = 'a name: a letter, then letters, digits and _';
  return z.string({ error }).regex(namePattern, { error });
}

export function idField(what = 'a sheet id') {
  const error = `${what}: lower case letters, digits and hyphens`;
  return z.string({ error }).regex(idPattern, { error });
}

/** Names with their expressions. */
export function stepsField() {
  return z.record(nameField(), expressionField());
}

export function usesField() {
  const changed = z
    .strictObject({
      sheet: idField().meta({ description: 'Id of the other sheet: its file name without .yaml.' }),
      parameters: stepsField().optional().meta({ description: 'Parameters of that sheet with their changed values.' }),
    })
    .meta({ description: 'Another sheet with changed parameters.' });
  return z
    .record(nameField(), z.union([idField(), changed], { error: 'a sheet id, or a mapping with sheet and parameters' }))
    .meta({ description: 'Other sheets: alias: id, or alias: { sheet: id, parameters: { name: value } }.' });
}
