import { z } from 'zod';
import { expressionField, idField, nameField, nonNegativeField, textField, usesField, yesNoField } from './field.ts';

export const forces = ['necessary-and-sufficient', 'sufficient', 'definition'] as const;
export const statuses = ['theorem', 'conjecture', 'estimate', 'norm', 'rule'] as const;
export const gateLevels = ['fail', 'warn', 'note', 'score'] as const;
export const constrainedParts = ['exchange', 'correlation', 'exchange-correlation'] as const;
export const spaces = ['slice', 'spin'] as const;
/** Rules of numerical quality, which code decides and not a comparison. */
export const ruleNames = [
  'finite-everywhere',
  'smooth-joins',
  'no-wiggles',
  'digits-lost',
  'spin-paths-agree',
  'printed-digits',
  'known-constants',
] as const;

const rungs = z.array(z.enum(['lda', 'gga', 'meta-gga'])).min(1, { error: 'a list with at least one rung' });
const coordinate = expressionField('a decimal number or an expression').optional();
const valueList = (what: string) =>
  z
    .array(expressionField('a decimal number or an expression'), { error: 'a list of values' })
    .min(1, { error: 'a list with at least one value' })
    .optional()
    .meta({ description: `Values of ${what}.` });
const forceFor = (whom: string) =>
  z
    .enum(forces)
    .optional()
    .meta({ description: `Force ${whom}.` });

const conflict = z.strictObject({
  rungs: rungs.meta({ description: 'Rungs that cannot meet both conditions.' }),
  with: idField('a constraint id').optional().meta({ description: 'The other condition.' }),
  reason: textField().meta({ description: 'Why the two exclude each other.' }),
});

const counterexample = z.strictObject({
  id: idField('a functional id').meta({ description: 'Functional that breaks the condition.' }),
  where: textField().optional().meta({ description: 'Where it does, in words.' }),
  source: textField().optional().meta({ description: 'Who showed it.' }),
});

/** The form of a constraint sheet. Numbers are text at run time; the JSON Schema shows them as an editor reads them. */
export const constraintSheet = z
  .strictObject({
    title: textField().meta({ description: 'The condition in a few words.' }),
    statement: textField().meta({ description: 'The condition on the energy functional.' }),
    'local-form': textField().optional().meta({ description: 'The pointwise form that is checked, as in a paper.' }),
    derivation: textField()
      .optional()
      .meta({ description: 'From the statement to the local form, in two or three lines.' }),
    force: z.enum(forces).meta({ description: 'What a local violation means for the statement.' }),
    'force-for': z
      .strictObject({
        lda: forceFor('of an LDA'),
        gga: forceFor('of a GGA'),
        'meta-gga': forceFor('of a meta-GGA'),
        hybrid: forceFor('of a functional with exact exchange'),
      })
      .optional()
      .meta({ description: 'Force for one rung, or for functionals with exact exchange, where it differs.' }),
    status: z.enum(statuses).meta({ description: 'How well the condition is established.' }),
    gate: z
      .enum(gateLevels)
      .optional()
      .meta({ description: 'What a violation does, if not what force and status say.' }),
    'gate-reason': textField().optional().meta({ description: 'Why the gate differs; required with gate.' }),
    sources: z
      .array(textField())
      .min(1, { error: 'a list with at least one source' })
      .meta({ description: 'Literature.' }),
    part: z.enum(constrainedParts).meta({ description: 'Part of the energy that the condition is about.' }),
    rungs: rungs.meta({ description: 'Rungs to which the condition applies.' }),
    space: z.enum(spaces).optional().meta({
      description: 'slice (default): rs, zeta, s, alpha at uniform polarisation; spin: the general spin space.',
    }),
    at: z
      .strictObject({ rs: coordinate, zeta: coordinate, s: coordinate, alpha: coordinate, q: coordinate })
      .optional()
      .meta({ description: 'Coordinates with a fixed value.' }),
    sweep: z
      .strictObject({
        rs: valueList('the Wigner-Seitz radius'),
        zeta: valueList('the polarisation'),
        s: valueList('the reduced gradient'),
        alpha: valueList('the iso-orbital indicator'),
        q: valueList('the reduced Laplacian'),
      })
      .optional()
      .meta({
        description: 'Coordinates with a list of values, all combined: the condition is asked at these points.',
      }),
    table: z
      .strictObject({
        columns: z
          .array(nameField())
          .min(1, { error: 'a list with at least one name' })
          .meta({ description: 'Names of the columns.' }),
        rows: z
          .array(z.array(expressionField('a decimal number or an expression'), { error: 'a list of values' }))
          .min(1, { error: 'a list with at least one row' })
          .meta({ description: 'Lists of values, one for each column.' }),
      })
      .optional()
      .meta({
        description:
          'Points and data: columns named after coordinates give the points, others are names for the requirement.',
      }),
    uses: usesField().optional(),
    constants: z
      .record(nameField(), idField('the name of a selectable constant'))
      .optional()
      .meta({ description: 'name: selectable constant.' }),
    requirement: expressionField('a comparison of two expressions').optional().meta({
      description: 'left >= right, left <= right or left == right, in Fx, Fc, Fxc, d(f, rs), limit(f, rs, inf) ….',
    }),
    rule: z.enum(ruleNames).optional().meta({
      description: 'Instead of a requirement: a rule of numerical quality, of which tolerance is the threshold.',
    }),
    relative: yesNoField().optional().meta({ description: 'For ==: compare relative to the right-hand side.' }),
    tolerance: nonNegativeField().meta({ description: 'Largest margin below zero that is still accepted.' }),
    'tolerance-reason': textField().optional().meta({ description: 'Why this tolerance.' }),
    'cannot-meet': z.array(conflict).optional().meta({ description: 'Conditions that a rung cannot meet together.' }),
    holds: z.array(idField('a functional id')).optional().meta({ description: 'Functionals known to hold it.' }),
    breaks: z.array(counterexample).optional().meta({ description: 'Functionals known to break it.' }),
    traps: z.array(textField()).optional().meta({ description: 'What has led to false verdicts.' }),
  })
  .meta({
    title: 'Constraint sheet',
    description: 'An exact condition on an exchange-correlation functional.',
    oneOf: [{ required: ['requirement'] }, { required: ['rule'] }],
    dependentRequired: { gate: ['gate-reason'], 'gate-reason': ['gate'] },
  });
