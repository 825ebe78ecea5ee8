import type { Condition } from '../constraint/condition.ts';
import type { Certificate } from '../finding/certificate.ts';
import type { Functional } from '../functional/functional.ts';
import { argumentsOf, type Graph, type Node, type NodeId } from '../graph/graph.ts';
import { reachable, variablesOf } from '../graph/traverse.ts';
import { evaluateDecimal } from '../kernel/decimal.ts';
import { decimalContext, exactDecimal } from '../number/decimal.ts';
import { parseDecimal, type Rational } from '../number/rational.ts';
import { certifiedDomain, constraintHash, digestOf, functionalHash } from './certificate.ts';
import { type Claim, claimOf } from './claim.ts';
import { polarisationRoot, type RewriteName, rewriteNames } from './forms.ts';
import { type Leaves, leavesOf } from './leaves.ts';
import { makeRecheck, type RecheckWork, recheckWork } from './recheck.ts';

export type Verification =
  | { readonly ok: true; readonly leaves: number }
  | { readonly ok: false; readonly reason: string };

const refused = (reason: string): Verification & { readonly ok: false } => ({ ok: false, reason });

/** A certificate of which only the boxes are left to be evaluated. */
export interface OpenVerification {
  readonly ok: true;
  readonly claim: Claim;
  readonly work: RecheckWork;
  readonly leaves: Leaves;
}

/**
 * Checks a certificate again: that it is whole, that it is for these sheets, that its boxes cover the domain, that the
 * rewrites it names do not change the margin at sample points, and that the margin is at least −tolerance on each of
 * its boxes by decimal arithmetic.
 */
export function verifyCertificate(
  certificate: Certificate,
  condition: Condition,
  functional: Functional,
): Verification {
  const open = openVerification(certificate, condition, functional);
  return open.ok ? verificationOf(open, makeRecheck(open.work)(open.leaves.boxes)) : open;
}

/** What is found once the boxes are evaluated; `failing` is the index of one that does not hold, −1 for none. */
export function verificationOf({ claim, leaves }: OpenVerification, failing: number): Verification {
  if (failing < 0) return { ok: true, leaves: leaves.letters.length };
  const words = claim.axes.map((_axis, axis) => {
    const at = 2 * (failing * claim.axes.length + axis);
    return `${claim.variables[axis]} ${leaves.boxes[at]}…${leaves.boxes[at + 1]}`;
  });
  return refused(`box ${(leaves.letters[failing] as number) + 1} cannot be verified: ${words.join(', ')}`);
}

/** All the checks but that of the boxes. */
export function openVerification(
  certificate: Certificate,
  condition: Condition,
  functional: Functional,
): OpenVerification | (Verification & { readonly ok: false }) {
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
  const { tree, boxes } = certificate;
  if (tree.length !== boxes) return refused(`it tells of ${tree.length} boxes and not of ${boxes}`);
  const leaves = leavesOf(claim.axes, tree);
  return typeof leaves === 'string' ? refused(leaves) : { ok: true, claim, work: recheckWork(claim), leaves };
}

function valuesOf(texts: Readonly<Record<string, string>>): Map<string, Rational> {
  return new Map(
    Object.entries(texts).map(([name, text]) => {
      const [top = '', bottom = '1'] = text.split('/');
      return [name, (parseDecimal(top) as Rational).div(parseDecimal(bottom) as Rational)];
    }),
  );
}

function axesDifference(claim: Claim, certificate: Certificate): string | undefined {
  const { axes, variables } = claim;
  const own = axes.map(({ lower, upper, scale, divisions }, index) => ({
    name: variables[index],
    lower: Number.isFinite(lower) ? lower : null,
    upper: Number.isFinite(upper) ? upper : null,
    scale,
    divisions,
  }));
  return JSON.stringify(own) === JSON.stringify(certificate.variables) && coversPolarisation(claim, certificate)
    ? undefined
    : 'its boxes are not those of the domain that it names';
}

/** Whether every ζ = 1 − w³ of the domain comes from a w between the ends. */
function coversPolarisation({ axes, variables }: Claim, { domain }: Certificate): boolean {
  const axis = axes[variables.indexOf(polarisationRoot)];
  if (axis === undefined) return true;
  const zeta = domain.find(({ name }) => name === 'zeta');
  // Digits enough for the cube of any ordinary double.
  const context = decimalContext(400);
  const cube = (w: number) => context.from(exactDecimal(w)).pow(3);
  const distance = (value: number) => context.from(1).minus(exactDecimal(value));
  return cube(axis.lower).lte(distance(zeta?.upper ?? 1)) && cube(axis.upper).gte(distance(zeta?.lower ?? -1));
}

const samples = 12;
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
  // In one graph, so that what both have in common is evaluated once.
  const { graph, forms } = rewritten;
  const margins = [copyInto(graph, plain.graph, plain.forms[0] as NodeId), ...forms];
  let compared = 0;
  for (let count = 0; count < samples; count++) {
    const point = new Map(
      [...variablesOf(graph, margins)].map((name) => {
        // What only the margin as written depends on, in 0…1.
        const axis = rewritten.axes[rewritten.variables.indexOf(name)] ?? { lower: 0, upper: 1 };
        const lower = Math.max(axis.lower, -1e3);
        return [name, context.from(lower + next() * (Math.min(axis.upper, lower + 1e3) - lower))] as const;
      }),
    );
    const w = point.get(polarisationRoot);
    if (w !== undefined) point.set('zeta', context.from(1).minus(w.pow(3)));
    const [a, ...others] = evaluateDecimal(graph, margins, point, sampleDigits);
    if (a === undefined || !a.isFinite()) continue;
    compared++;
    for (const b of others) if (!a.minus(b).abs().lte(a.abs().plus(1).times('1e-25'))) return false;
  }
  return compared > samples / 2;
}

function copyInto(graph: Graph, from: Graph, output: NodeId): NodeId {
  const images = new Map<NodeId, NodeId>();
  for (const id of reachable(from, [output])) {
    const node = from.node(id);
    const args = argumentsOf(node).map((part) => images.get(part) as NodeId);
    images.set(id, graph.intern('args' in node ? ({ ...node, args } as unknown as Node) : node));
  }
  return images.get(output) as NodeId;
}
