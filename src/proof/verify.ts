import type { Condition } from '../constraint/condition.ts';
import type { Certificate } from '../finding/certificate.ts';
import type { Functional } from '../functional/functional.ts';
import { evaluateDecimal } from '../kernel/decimal.ts';
import { makeDecimalForms } from '../kernel/decimal-forms.ts';
import { decimalContext } from '../number/decimal.ts';
import { parseDecimal, type Rational } from '../number/rational.ts';
import { type BranchAxis, boxLetters, middleOf, relativeWidth, rootBoxes } from '../search/branch.ts';
import { certifiedDomain, constraintHash, digestOf, functionalHash } from './certificate.ts';
import { type Claim, claimOf } from './claim.ts';
import { polarisationRoot, type RewriteName, rewriteNames } from './forms.ts';

export type Verification =
  | { readonly ok: true; readonly leaves: number }
  | { readonly ok: false; readonly reason: string };

const refused = (reason: string): Verification => ({ ok: false, reason });

/**
 * Checks a certificate again: that it is whole, that it is for these sheets, that its boxes cover the domain, that the
 * rewrites it names do not change the margin at sample points, and that the margin is at least −tolerance on each of
 * its boxes by the decimal evaluator.
 */
export function verifyCertificate(
  certificate: Certificate,
  condition: Condition,
  functional: Functional,
  onLeaves: (leaves: number) => void = () => {},
): Verification {
  if (digestOf(certificate) !== certificate.digest)
    return refused('its content does not match its digest: it was changed');
  if (functionalHash(functional) !== certificate.functionalHash)
    return refused(`it is for another text of ${certificate.functional}, or of a sheet that one uses`);
  if (constraintHash(condition) !== certificate.constraintHash)
    return refused(`it is for another text of ${certificate.constraint}, or of a sheet that one uses`);
  const settings = {
    domain: certifiedDomain(certificate),
    constants: valuesOf(certificate.constants),
    parameters: valuesOf(certificate.parameters),
  };
  const unknown = certificate.rewrites.find((name) => !(rewriteNames as readonly string[]).includes(name));
  if (unknown !== undefined) return refused(`it names a rewrite that does not exist: ${unknown}`);
  const ofTolerance = { ...condition, definition: { ...condition.definition, tolerance: certificate.tolerance } };
  const claim = claimOf(ofTolerance, functional, settings, certificate.rewrites as RewriteName[]);
  if (typeof claim === 'string') return refused(claim);
  const difference = axesDifference(claim, certificate);
  if (difference !== undefined) return refused(difference);
  const plain = claimOf(ofTolerance, functional, settings, []);
  if (typeof plain === 'string') return refused(plain);
  if (claim.rewrites.length > 0 && !agree(plain, claim)) return refused('the rewrites change the margin');
  return checkBoxes(claim, certificate, onLeaves);
}

function valuesOf(texts: Readonly<Record<string, string>>): Map<string, Rational> {
  return new Map(
    Object.entries(texts).map(([name, text]) => {
      const [top = '', bottom = '1'] = text.split('/');
      return [name, (parseDecimal(top) as Rational).div(parseDecimal(bottom) as Rational)];
    }),
  );
}

function axesDifference({ axes, variables }: Claim, certificate: Certificate): string | undefined {
  const own = axes.map(({ lower, upper, scale, divisions }, index) => ({
    name: variables[index],
    lower: Number.isFinite(lower) ? lower : null,
    upper: Number.isFinite(upper) ? upper : null,
    scale,
    divisions,
  }));
  return JSON.stringify(own) === JSON.stringify(certificate.variables)
    ? undefined
    : 'its boxes are not those of the domain that it names';
}

/** How often a box that the decimal forms do not prove at once is halved. */
const mostHalvings = 6;

const samples = 24;
const sampleDigits = 40;

/** Whether the margin as written and as rewritten agree at sample points to 25 digits, wherever the first has a value. */
function agree(plain: Claim, rewritten: Claim): boolean {
  const context = decimalContext(sampleDigits);
  let state = 1;
  // A full-period generator: the same points every time.
  const next = () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return (state + 0.5) / 2 ** 32;
  };
  let compared = 0;
  for (let count = 0; count < samples; count++) {
    const point = new Map(
      rewritten.variables.map((name, index) => {
        const { lower, upper } = rewritten.axes[index] as BranchAxis;
        return [name, context.from(lower + next() * (Math.min(upper, lower + 1e3) - lower))] as const;
      }),
    );
    const w = point.get(polarisationRoot);
    if (w !== undefined) point.set('zeta', context.from(1).minus(w.pow(3)));
    const [a] = evaluateDecimal(plain.graph, [plain.forms[0] as number], point, sampleDigits);
    const [b] = evaluateDecimal(rewritten.graph, [rewritten.forms[0] as number], point, sampleDigits);
    if (a === undefined || b === undefined || !a.isFinite()) continue;
    compared++;
    if (!a.minus(b).abs().lte(a.abs().plus(1).times('1e-25'))) return false;
  }
  return compared > samples / 2;
}

function checkBoxes(claim: Claim, { tree, boxes }: Certificate, onLeaves: (leaves: number) => void): Verification {
  const { axes, variables, forms, graph, tolerance } = claim;
  if (tree.length !== boxes) return refused(`it tells of ${tree.length} boxes and not of ${boxes}`);
  const evaluators = forms.map((form) => makeDecimalForms(graph, form, variables, new Set(['rs'])));
  const width = 2 * axes.length + 1;
  const roots = rootBoxes(axes);
  let level: (readonly (readonly [number, number])[])[] = Array.from({ length: roots.length / width }, (_, row) =>
    axes.map(
      (_axis, axis) => [roots[row * width + 2 * axis] as number, roots[row * width + 2 * axis + 1] as number] as const,
    ),
  );
  let read = 0;
  let leaves = 0;
  while (level.length > 0) {
    const next: (readonly (readonly [number, number])[])[] = [];
    for (const box of level) {
      const letter = tree[read++];
      if (letter === boxLetters.proved) {
        leaves++;
        onLeaves(1);
        if (!holds(box, mostHalvings))
          return refused(`box ${read} cannot be verified: ${box.map((pair) => pair.join('…')).join(', ')}`);
        continue;
      }
      const axis = letter === undefined ? Number.NaN : Number.parseInt(letter, 10);
      const divided = box[axis];
      const middle = divided && middleOf(divided[0], divided[1], (axes[axis] as BranchAxis).scale);
      if (divided === undefined || middle === undefined) return refused(`box ${read} is neither proved nor divided`);
      next.push(box.with(axis, [divided[0], middle]), box.with(axis, [middle, divided[1]]));
    }
    level = next;
  }
  function holds(box: readonly (readonly [number, number])[], halvings: number): boolean {
    const proved = evaluators.some((evaluate) => {
      const { lower, defined } = evaluate(box);
      return defined && lower.gte(-tolerance);
    });
    if (proved || halvings === 0) return proved;
    // The decimal forms are not the same as those of the search: a box may need to be halved for them.
    const widths = axes.map(({ lower, upper, scale }, axis) =>
      relativeWidth(...(box[axis] as [number, number]), lower, upper, scale),
    );
    const axis = widths.indexOf(Math.max(...widths));
    const [from, to] = box[axis] as readonly [number, number];
    const middle = middleOf(from, to, (axes[axis] as BranchAxis).scale);
    if (middle === undefined) return false;
    return holds(box.with(axis, [from, middle]), halvings - 1) && holds(box.with(axis, [middle, to]), halvings - 1);
  }

  return read === tree.length ? { ok: true, leaves } : refused('it tells of more boxes than the domain has');
}
