import type { Finding, FunctionalFindings, Remark } from './finding.ts';

/** A violation that a project has decided to live with. */
export interface Acceptance {
  readonly constraint: string;
  readonly functional: string;
  readonly reason: string;
  /** The lowest margin that is accepted. */
  readonly margin?: number;
  /** The violation may lie only within these bounds. */
  readonly region?: ReadonlyMap<string, readonly [lower: number, upper: number]>;
  /** Year-month-day from which on the acceptance is to be looked at again. */
  readonly review?: string;
  readonly place: { readonly file: string; readonly line: number; readonly column: number };
}

/**
 * Findings with the gate of accepted violations changed to `accepted`, and remarks on acceptances that do not fit: the
 * violation is gone, or larger than accepted, or a date of review has come. `today` is year-month-day.
 */
export function applyAcceptances(
  functionals: readonly FunctionalFindings[],
  acceptances: readonly Acceptance[],
  today: string,
): { readonly functionals: FunctionalFindings[]; readonly remarks: Remark[] } {
  const remarks: Remark[] = [];
  const changed = functionals.map((functional) => ({
    ...functional,
    findings: functional.findings.map((finding) => {
      const suited = acceptances.filter(
        ({ functional: id, constraint }) => id === functional.id && constraint === finding.constraint,
      );
      return suited.reduce((current, acceptance) => {
        const remark = (kind: Remark['kind'], text: string) => remarks.push(remarkOn(acceptance, kind, text));
        if (acceptance.review !== undefined && today >= acceptance.review) {
          remark(
            'review-due',
            `the acceptance was to be looked at again by ${acceptance.review}: ${acceptance.reason}`,
          );
        }
        if (finding.verdict !== 'violated') {
          remark('acceptance-unused', `the acceptance no longer applies: the verdict is ${finding.verdict}; remove it`);
          return current;
        }
        const excess = excessOf(finding, acceptance);
        if (excess === undefined) return accepted(current, acceptance);
        remark('acceptance-exceeded', `the violation is larger than accepted: ${excess}`);
        return current;
      }, finding);
    }),
  }));
  return { functionals: changed, remarks };
}

/** Acceptances that no finding of a complete run was about. */
export function strayAcceptances(
  acceptances: readonly Acceptance[],
  functionals: readonly string[],
  constraints: readonly string[],
): Remark[] {
  return acceptances.flatMap((acceptance) => {
    const { functional, constraint } = acceptance;
    const missing = functionals.includes(functional)
      ? constraints.includes(constraint)
        ? ''
        : constraint
      : functional;
    if (missing === '') return [];
    return [remarkOn(acceptance, 'acceptance-unused', `the acceptance no longer applies: ${missing} is not vetted`)];
  });
}

function accepted(finding: Finding, { reason }: Acceptance): Finding {
  return { ...finding, gate: 'accepted', gateReason: `accepted by the project: ${reason}` };
}

/** In what a violation goes beyond its acceptance; undefined when it does not. */
function excessOf(finding: Finding, { margin, region }: Acceptance): string | undefined {
  if (margin !== undefined && !((finding.margin ?? Number.NaN) >= margin)) {
    return `the margin is ${finding.margin}, accepted down to ${margin}`;
  }
  if (region === undefined) return undefined;
  if (finding.moreRegions > 0) return `${finding.moreRegions} of its regions are too small to be told, so none is sure`;
  for (const [name, [lower, upper]] of region) {
    const found = finding.regions.flatMap(({ bounds }) => bounds.filter(({ coordinate }) => coordinate === name));
    const at = finding.witness?.[name as keyof typeof finding.witness];
    const ends = [...found.flatMap((bound) => [bound.lower, bound.upper]), ...(at === undefined ? [] : [at])];
    const outside = ends.find((end) => !(end >= lower && end <= upper));
    if (outside !== undefined) return `it reaches ${name} = ${outside}, accepted within ${lower} to ${upper}`;
  }
  return undefined;
}

function remarkOn({ constraint, functional, place }: Acceptance, kind: Remark['kind'], text: string): Remark {
  return { kind, constraint, functional, text, ...place };
}
