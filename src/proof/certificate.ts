import { createHash } from 'node:crypto';
import type { Condition } from '../constraint/condition.ts';
import { customDomain, type Domain, type DomainCoordinate, domainCoordinates } from '../constraint/domain.ts';
import type { Certificate, ClaimFields } from '../finding/certificate.ts';
import type { Functional } from '../functional/functional.ts';
import { type Rational, rationalText } from '../number/rational.ts';
import type { SharedResult } from '../search/share-blocks.ts';
import type { Claim, ClaimSettings } from './claim.ts';

/** The hash of a functional: of its sheet and of all that it uses. */
export function functionalHash({ definition, imports }: Functional): string {
  const used = definition.uses.map(({ alias }) => functionalHash(imports.get(alias)?.functional as Functional));
  return hashOf(['functional', definition.id, definition.text, ...used]);
}

export function constraintHash({ definition, imports }: Condition): string {
  const used = definition.uses.map(({ alias }) => functionalHash(imports.get(alias) as Functional));
  return hashOf(['constraint', definition.id, definition.text, ...used]);
}

/** The hash of something that JSON can say. */
export function hashOf(content: object): string {
  return createHash('sha256').update(JSON.stringify(content)).digest('hex');
}

/** What is claimed, in the words of certificates. */
export function claimFields(
  condition: Condition,
  functional: Functional,
  settings: ClaimSettings,
  claim: Claim,
): ClaimFields {
  const end = (value: number) => (Number.isFinite(value) ? value : null);
  return {
    functional: functional.definition.id,
    functionalHash: functionalHash(functional),
    constraint: condition.definition.id,
    constraintHash: constraintHash(condition),
    statement: condition.definition.requirement.text,
    tolerance: claim.tolerance,
    constants: textsOf(settings.constants),
    parameters: textsOf(settings.parameters),
    domain: domainCoordinates.map((name) => {
      const { lower, upper } = settings.domain.axes[name];
      return { name, lower: end(lower), upper: end(upper) };
    }),
    rewrites: [...claim.rewrites],
    variables: claim.axes.map(({ lower, upper, scale, divisions }, index) => ({
      name: claim.variables[index] as string,
      lower: end(lower),
      upper: end(upper),
      scale,
      divisions: [...divisions],
    })),
  };
}

/** The certificate of a decided proof. */
export function certificateOf(
  condition: Condition,
  functional: Functional,
  settings: ClaimSettings,
  claim: Claim,
  result: SharedResult,
  engineVersion: string,
): Certificate {
  const body = {
    format: 'rungcheck certificate' as const,
    formatVersion: 1 as const,
    engineVersion,
    ...claimFields(condition, functional, settings, claim),
    boxes: result.boxes,
    deepest: result.deepest,
    tree: result.tree,
  };
  return { ...body, digest: digestOf(body) };
}

/** The digest of the other fields of a certificate or state, in their order. */
export function digestOf(file: object): string {
  const { digest: _, ...body } = file as { readonly digest?: string };
  return hashOf(body);
}

function textsOf(values: ReadonlyMap<string, Rational>): Record<string, string> {
  return Object.fromEntries([...values].map(([name, value]) => [name, rationalText(value)]));
}

/** The domain that a certificate names. */
export function certifiedDomain({ domain }: Certificate): Domain {
  return customDomain(
    new Map(
      domain.map(({ name, lower, upper }) => [
        name as DomainCoordinate,
        [lower ?? Number.NEGATIVE_INFINITY, upper ?? Number.POSITIVE_INFINITY] as const,
      ]),
    ),
  );
}
