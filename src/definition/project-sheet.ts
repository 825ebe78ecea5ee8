import { z } from 'zod';
import { decimalNumber, idField, nonNegativeField, textField } from './field.ts';
import { decimalPattern } from './project-values.ts';

const coordinateNames = ['rs', 'zeta', 's', 'alpha', 'q'] as const;

/** A decimal number or a quotient of two: text in the file, so that it is exact. */
function exactField() {
  const error = 'a decimal number, or a quotient of two';
  return z.union([z.number(), z.string().regex(decimalPattern, { error })], { error });
}

function numberField() {
  const error = 'a decimal number';
  return z.preprocess(
    (value) => (typeof value === 'string' ? (decimalNumber(value) ?? value) : value),
    z.number({ error }),
  );
}

const bounds = z
  .array(numberField(), { error: 'two numbers: [lower, upper]' })
  .length(2, { error: 'two numbers: [lower, upper]' });

const texts = (what: string) => z.array(textField(), { error: `a list of ${what}` });

const dateField = () => {
  const error = 'a date: year-month-day';
  return z.string({ error }).regex(/^\d{4}-(0[1-9]|1[0-2])-(0[1-9]|[12]\d|3[01])$/, { error });
};

const acceptance = z
  .strictObject({
    constraint: idField('a constraint id').meta({ description: 'The condition that is violated.' }),
    functional: idField('a functional id').meta({ description: 'The functional that violates it.' }),
    reason: textField().meta({ description: 'Why the project lives with it.' }),
    margin: numberField().optional().meta({ description: 'The lowest margin that is accepted.' }),
    region: z
      .record(z.string(), bounds)
      .optional()
      .meta({ description: 'The violation may lie only here: { s: [2, 5], zeta: [0.9, 1] }.' }),
    review: dateField().optional().meta({ description: 'From this day on it is said that the acceptance is due.' }),
  })
  .meta({ description: 'An accepted violation. It is reported when it no longer applies, or is exceeded.' });

/** The form of a project file. */
export const projectSheet = z
  .strictObject({
    sheets: texts('sheets')
      .min(1, { error: 'a list with at least one sheet' })
      .meta({ description: 'What is vetted: sheet files, folders of sheets, or ids of the catalogue.' }),
    constraints: texts('folders').optional().meta({ description: 'Folders with condition sheets of your own.' }),
    only: z.array(idField('a constraint id')).optional().meta({ description: 'Only these conditions.' }),
    except: z.array(idField('a constraint id')).optional().meta({ description: 'All conditions but these.' }),
    domain: z
      .union(
        [textField(), z.strictObject(Object.fromEntries(coordinateNames.map((name) => [name, bounds.optional()])))],
        {
          error: 'standard, wide, a file with bounds, or { rs: [lower, upper], … }',
        },
      )
      .optional()
      .meta({ description: 'standard, wide, a file with bounds, or { rs: [0.01, 10], s: [0, 3] }.' }),
    constants: z
      .record(z.string(), exactField())
      .optional()
      .meta({ description: 'Values of named constants: { lieb-oxford: 1.6358 }.' }),
    tolerances: z
      .record(z.string(), nonNegativeField())
      .optional()
      .meta({ description: 'Other tolerances of conditions: { correlation-uniform-gas: 0.03 }.' }),
    compare: z
      .strictObject({
        margin: nonNegativeField()
          .optional()
          .meta({ description: 'Relative to the recorded margin; 0.001 without it.' }),
        share: nonNegativeField().optional().meta({ description: 'In shares of the domain; 0.001 without it.' }),
      })
      .optional()
      .meta({ description: 'How much a margin or a violated share may differ from a recorded one.' }),
    accept: z.array(acceptance).optional().meta({ description: 'Violations that the project lives with.' }),
  })
  .meta({ title: 'Project file', description: 'rungcheck.yaml: what rungcheck vet does in this folder.' });
