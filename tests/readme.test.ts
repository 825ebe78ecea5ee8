import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { vetFunctional } from '../src/constraint/vet.ts';
import { parseFunctionalSheet } from '../src/definition/functional.ts';
import { conditionOf, functionalOf, shelf, standardSettings } from './constraint/catalogue.ts';

const readme = readFileSync('README.md', 'utf8');

/** The first fenced block of a language. */
function block(language: string): string {
  const match = new RegExp(`\`\`\`${language}\\n([\\s\\S]*?)\`\`\``).exec(readme);
  if (match === null) throw new Error(`no ${language} block in the README`);
  return match[1] as string;
}

describe('the walk-through of the README', () => {
  test('its sheet is the demo sheet, but for the notes', () => {
    const parse = (text: string) => {
      const outcome = parseFunctionalSheet(text, { file: 'tern.yaml', id: 'tern' });
      if (!outcome.ok) throw new Error(JSON.stringify(outcome.problems));
      const { parameters, parts, uses } = outcome.value;
      return JSON.stringify({
        parameters: parameters.map(({ name, value, digits }) => [name, value.text, digits]),
        parts: parts.map(({ name, where, form }) => [name, where.map((step) => [step.name, step.value.text]), form]),
        uses: uses.map(({ alias, sheet }) => [alias, sheet]),
      }).replace(/"(line|column)":\d+,?/g, '');
    };
    expect(parse(block('yaml'))).toBe(parse(readFileSync('functionals/demo/tern.yaml', 'utf8')));
  });

  test('its table of violations is what a vet of that sheet finds', () => {
    const functional = functionalOf('functionals/demo/tern.yaml');
    const lines = block('text')
      .split('\n')
      .filter((line) => line.startsWith('✗ violated'));
    expect(lines.length).toBeGreaterThan(5);
    for (const line of lines) {
      const [, , id, margin, share, unit] = line.split(/\s+/) as [string, string, string, string, string, string];
      const [finding] = vetFunctional(functional, [conditionOf(id)], standardSettings).findings;
      expect(finding?.verdict, id).toBe('violated');
      expect(Number(finding?.margin?.toPrecision(3)), id).toBe(Number(margin));
      expect(unit).toBe('%');
      expect((finding?.violatedShare ?? 0) * 100, id).toBeCloseTo(Number(share), 1);
    }
  });

  test('the corrected sheet fails nothing', () => {
    const constraints = shelf.constraintIds().map(conditionOf);
    const { findings } = vetFunctional(
      functionalOf('functionals/demo/tern-corrected.yaml'),
      constraints,
      standardSettings,
    );
    expect(findings.filter(({ gate }) => gate === 'fail').map(({ constraint }) => constraint)).toEqual([]);
  });
});
