import { z } from 'zod';
import { expressionField, nameField, stepsField, textField, usesField, wholeNumberField } from './field.ts';
import { signaturePattern } from './names.ts';

const partSteps = stepsField()
  .optional()
  .meta({ description: 'Steps of this part alone, in any order: name: expression.' });

const energyForms = {
  'per-particle': expressionField()
    .optional()
    .meta({ description: 'Energy per particle of the total density, in hartree.' }),
  'per-volume': expressionField().optional().meta({ description: 'Energy per volume, in hartree per cubic bohr.' }),
  from: nameField().optional().meta({ description: 'Alias under uses: the same part of that sheet.' }),
};

const partDescription = 'The one form of the part, or the alias of a sheet whose part is taken whole.';
const partKinds = { error: 'a mapping with one form, or the alias of a sheet' };

const exchange = z
  .strictObject({
    where: partSteps,
    enhancement: expressionField().optional().meta({
      description: 'Enhancement factor F of the unpolarised density, in s, p, alpha …; exact spin scaling is applied.',
    }),
    ...energyForms,
  })
  .meta({ oneOf: oneOf('enhancement', 'per-particle', 'per-volume', 'from') });

const correlation = z
  .strictObject({
    where: partSteps,
    ...energyForms,
    partition: nameField().optional().meta({
      description: 'Alias of the lda sheet whose correlation is split into same-spin and opposite-spin parts.',
    }),
    'same-spin': expressionField().optional().meta({
      description: 'Factor on the same-spin uniform-gas energy of each channel, in quantities ending in _sigma.',
    }),
    'opposite-spin': expressionField().optional().meta({
      description: 'Factor on the opposite-spin uniform-gas energy, in total, _up and _dn quantities.',
    }),
  })
  .meta({
    oneOf: [...oneOf('per-particle', 'per-volume', 'from'), { required: ['partition', 'same-spin', 'opposite-spin'] }],
  });

const combined = z
  .strictObject({ where: partSteps, ...energyForms })
  .meta({ oneOf: oneOf('per-particle', 'per-volume', 'from') });

const parameter = z.union(
  [
    z.string(),
    z.number(),
    z.strictObject({
      value: expressionField('a decimal number or an expression').meta({
        description: 'Exact decimal, or an expression of other parameters.',
      }),
      digits: wholeNumberField(1, 40).optional().meta({
        description: 'Significant digits as printed: the value is known to half a unit of the last.',
      }),
      source: textField().optional().meta({ description: 'Where the value is printed: paper, equation, table.' }),
      meaning: textField().optional().meta({ description: 'What the parameter stands for.' }),
    }),
  ],
  { error: 'a decimal number, an expression, or a mapping with value, digits, source, meaning' },
);

const exactExchange = z.union(
  [
    z.string(),
    z.number(),
    z.strictObject({
      'short-range': expressionField().meta({ description: 'Fraction of exact exchange at short range.' }),
      'long-range': expressionField().meta({ description: 'Fraction of exact exchange at long range.' }),
      omega: expressionField().meta({ description: 'Range-separation parameter, in 1/bohr.' }),
    }),
  ],
  { error: 'a fraction, or a mapping with short-range, long-range and omega' },
);

const signatures = z
  .string()
  .regex(signaturePattern, { error: 'a function with its arguments, such as G(rs, A); quote it inside { }' });

/** The form of a functional sheet. Numbers are text at run time; the JSON Schema shows them as an editor reads them. */
export const functionalSheet = z
  .strictObject({
    name: textField().meta({ description: 'Name of the functional as it is shown.' }),
    year: wholeNumberField(1920, 2100).optional().meta({ description: 'Year of publication.' }),
    rung: z.enum(['lda', 'gga', 'meta-gga']).meta({
      description: 'Rung of the semilocal form: the quantities that it may use.',
    }),
    summary: textField().optional().meta({ description: 'The functional in one line.' }),
    notes: textField().optional().meta({ description: 'Which published variant this is; doubts.' }),
    citations: z.array(textField()).optional().meta({ description: 'Where the functional was published.' }),
    uses: usesField().optional(),
    parameters: z
      .record(nameField(), parameter)
      .optional()
      .meta({ description: 'name: value, or name: { value, digits, source, meaning }.' }),
    functions: z
      .record(signatures, expressionField())
      .optional()
      .meta({ description: 'Functions with arguments: G(a, b): expression.' }),
    where: stepsField().optional().meta({ description: 'Steps that all parts may use: name: expression.' }),
    'exact-exchange': exactExchange.optional().meta({
      description: 'Fraction of exact exchange, global or range-separated.',
    }),
    'non-local': textField().optional().meta({ description: 'Non-local part: named here, not evaluated.' }),
    exchange: z.union([nameField(), exchange], partKinds).optional().meta({ description: partDescription }),
    correlation: z.union([nameField(), correlation], partKinds).optional().meta({ description: partDescription }),
    'exchange-correlation': z
      .union([nameField(), combined], partKinds)
      .optional()
      .meta({
        description: `A combined part in place of exchange and correlation. ${partDescription}`,
      }),
  })
  .meta({
    title: 'Functional sheet',
    description: 'An exchange-correlation functional, in Hartree atomic units.',
    anyOf: [{ required: ['exchange'] }, { required: ['correlation'] }, { required: ['exchange-correlation'] }],
    not: { required: ['exchange-correlation'], anyOf: [{ required: ['exchange'] }, { required: ['correlation'] }] },
  });

function oneOf(...keys: readonly string[]): readonly { readonly required: readonly string[] }[] {
  return keys.map((key) => ({ required: [key] }));
}
