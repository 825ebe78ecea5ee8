import type { Face, Run } from './typeface.ts';

/** Words, upright. */
export function words(text: string, face: Face = 'regular'): Run[] {
  return text === '' ? [] : [{ text, face }];
}

/**
 * A formula as the field sets it: variables of one letter italic, words and digits upright, `_xc` and `^(1/3)` lowered
 * and raised, a hyphen as a minus sign.
 */
export function formula(text: string): Run[] {
  const runs: Run[] = [];
  const token = /_(\{[^}]*\}|[\p{L}\p{Nd}]+)|\^(\([^()]*\)|[-−+]?[\p{L}\p{N}.]+)|(\p{L}+)|([\s\S])/gu;
  for (const [, sub, raised, letters, other] of text.matchAll(token)) {
    if (sub !== undefined) runs.push({ text: sub.replace(/^\{|\}$/g, ''), face: subscriptFace(sub), script: 'sub' });
    else if (raised !== undefined) {
      runs.push({ text: raised.replace(/^\(|\)$/g, '').replaceAll('-', '−'), face: 'regular', script: 'super' });
    } else if (letters !== undefined) runs.push({ text: letters, face: isVariable(letters) ? 'italic' : 'regular' });
    else runs.push({ text: other === '-' ? '−' : (other as string), face: 'regular' });
  }
  return joined(runs);
}

/** One letter is a variable, and so is one after ∂ (which is no letter); `unif`, `at` are words. */
function isVariable(letters: string): boolean {
  return [...letters].length === 1;
}

/** The s of r_s is a name of its own; labels such as x, c, xc are upright. */
function subscriptFace(text: string): Face {
  return text === 's' || text === 'σ' ? 'italic' : 'regular';
}

function joined(runs: readonly Run[]): Run[] {
  const result: Run[] = [];
  for (const run of runs) {
    const last = result.at(-1);
    if (last !== undefined && last.face === run.face && last.script === run.script) {
      result[result.length - 1] = { ...last, text: last.text + run.text };
    } else result.push(run);
  }
  return result;
}

/** Runs as one plain text, for descriptions. */
export function plainText(runs: readonly Run[]): string {
  return runs
    .map(({ text, script }) => (script === 'sub' ? `_${text}` : script === 'super' ? `^${text}` : text))
    .join('');
}
