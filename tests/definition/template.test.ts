import { describe, expect, test } from 'vitest';
import { type FunctionalDefinition, parseFunctionalSheet, type Rung } from '../../src/definition/functional.ts';
import { newSheet } from '../../src/definition/template.ts';
import { acceptedValue } from './sheets.ts';

/** Names that no sheet defines: functions, constants and the quantities of each rung (the sheet form). */
const builtin = ['exp', 'log', 'pi'];
const quantities: Readonly<Record<Rung, readonly string[]>> = {
  lda: ['n', 'rs', 'zeta', 'phi'],
  gga: ['n', 'rs', 'zeta', 'phi', 's', 'p', 't'],
  'meta-gga': ['n', 'rs', 'zeta', 'phi', 's', 'p', 't', 'tau', 'alpha', 'q'],
};

function expressionsOf({ parameters, where, functions, parts }: FunctionalDefinition): readonly string[] {
  return [
    ...[...parameters, ...where].map(({ value }) => value.text),
    ...functions.map(({ body }) => body.text),
    ...parts.flatMap(({ where: steps, form }) => [
      ...steps.map(({ value }) => value.text),
      ...('value' in form ? [form.value.text] : []),
    ]),
  ];
}

describe.each(['lda', 'gga', 'meta-gga'] as const)('the sheet to start from, %s', (rung) => {
  const text = newSheet('my-functional', rung);
  const sheet = acceptedValue(parseFunctionalSheet(text, { file: 'my-functional.yaml', id: 'my-functional' }));
  const names = expressionsOf(sheet).flatMap((one) => one.match(/(?<![.\w])[A-Za-z]\w*/g) ?? []);

  test('is of its rung, has both parts, cites its forms and says that they are placeholders', () => {
    expect(sheet.rung).toBe(rung);
    expect(sheet.parts.map(({ name }) => name)).toEqual(['exchange', 'correlation']);
    expect(sheet.citations.length).toBeGreaterThan(0);
    expect(text).toContain('PLACEHOLDER');
  });

  test('uses every parameter', () => {
    expect(sheet.parameters.filter(({ name }) => !names.includes(name))).toEqual([]);
  });

  test('uses only names that it defines and quantities of its rung', () => {
    const steps = sheet.parts.flatMap(({ where }) => where);
    const defined = [...sheet.parameters, ...sheet.where, ...steps].map(({ name }) => name);
    const known = [...builtin, ...quantities[rung], ...defined, ...sheet.uses.map(({ alias }) => alias)];
    expect(names.filter((name) => !known.includes(name))).toEqual([]);
  });
});
