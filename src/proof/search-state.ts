import type { ClaimFields, SearchState } from '../finding/certificate.ts';
import { reachable } from '../graph/traverse.ts';
import { rationalText } from '../number/rational.ts';
import { digestOf, hashOf } from './certificate.ts';
import type { Claim } from './claim.ts';

/** The hash of the formulas that a claim is decided by. */
export function formsHash({ graph, forms }: Claim): string {
  const ids = reachable(graph, forms);
  const places = new Map(ids.map((id, place) => [id, place]));
  const nodes = ids.map((id) => {
    const node = graph.node(id);
    const args = 'args' in node ? node.args.map((argument) => places.get(argument)) : [];
    switch (node.kind) {
      case 'rational':
        return rationalText(node.value);
      case 'power':
        return [rationalText(node.exponent), ...args];
      case 'variable':
        return [node.name];
      case 'pi':
        return ['pi', 'constant'];
      default:
        return [node.kind, node.op, ...args];
    }
  });
  return hashOf([JSON.stringify([nodes, forms.map((form) => places.get(form))])]);
}

/** What a claim is, as one text: two claims of the same text are decided by the same boxes. */
export function claimIdentity(fields: ClaimFields, claim: Claim): string {
  return JSON.stringify([fields, formsHash(claim)]);
}

/** The state of a search that has judged the boxes of these letters; see BoxSearch. */
export function searchStateOf(fields: ClaimFields, claim: Claim, judged: string, engineVersion: string): SearchState {
  const body = {
    format: 'rungcheck search' as const,
    formatVersion: 1 as const,
    engineVersion,
    ...fields,
    forms: formsHash(claim),
    judged,
  };
  return { ...body, digest: digestOf(body) };
}

const words: readonly (readonly [keyof ClaimFields, string])[] = [
  ['functional', 'another functional'],
  ['functionalHash', 'another text of the sheet, or of one that it uses'],
  ['constraint', 'another condition'],
  ['constraintHash', 'another text of the condition, or of a sheet that it uses'],
  ['tolerance', 'another tolerance'],
  ['constants', 'other values of constants'],
  ['parameters', 'other values of parameters'],
  ['domain', 'another domain'],
  ['rewrites', 'other rewrites'],
  ['variables', 'other boxes'],
];

/** What a state is of that a claim is not, in words; undefined when it is of this claim. */
export function stateDifference(state: SearchState, fields: ClaimFields, claim: Claim): string | undefined {
  const differs = ([name]: (typeof words)[number]) => JSON.stringify(state[name]) !== JSON.stringify(fields[name]);
  const found = words.find(differs);
  if (found !== undefined) {
    const [name, text] = found;
    return typeof state[name] === 'object' || name.endsWith('Hash') ? text : `${text} (${state[name]})`;
  }
  return state.forms === formsHash(claim) ? undefined : 'other formulas for the same margin';
}
