import type { ConstraintDefinition, Force } from '../definition/constraint.ts';
import type { Gate, Verdict } from '../finding/finding.ts';
import type { Functional } from '../functional/functional.ts';

/** What a local violation means for the statement: it may differ by rung, and for functionals with exact exchange. */
export function forceOf(definition: ConstraintDefinition, functional: Functional): Force {
  const { forceFor, force } = definition;
  const hybrid = functional.exactExchange === undefined ? undefined : forceFor.hybrid;
  return hybrid ?? forceFor[functional.definition.rung] ?? force;
}

/**
 * What a verdict means for the exit status, with the reason in plain words:
 * theorem with a necessary or defining local form → fail; theorem with a sufficient form → warn; conjecture and
 * estimate → note; norm → score; rule → fail inside the realistic box, else warn. A condition with
 * its own gate says so itself; one that the rung cannot meet, together with another, warns instead of failing.
 */
export function gateOf(
  definition: ConstraintDefinition,
  functional: Functional,
  verdict: Verdict,
  insideRealisticBox: boolean,
): { gate: Gate; reason: string } {
  if (verdict !== 'violated') return { gate: 'pass', reason: passReasons[verdict] };
  const ordinary = ordinaryGate(definition, functional, insideRealisticBox);
  const { rung } = functional.definition;
  const conflict = definition.cannotMeet.find(({ rungs }) => rungs.includes(rung));
  if (conflict === undefined) return ordinary;
  const together = conflict.with === undefined ? '' : ` together with ${conflict.with}`;
  const reason = `a ${rung} cannot meet it${together}: ${conflict.reason}`;
  // What cannot be met is not a failure; it does not become more than it would have been either.
  return { gate: ordinary.gate === 'fail' ? 'warn' : ordinary.gate, reason };
}

function ordinaryGate(
  definition: ConstraintDefinition,
  functional: Functional,
  insideRealisticBox: boolean,
): { gate: Gate; reason: string } {
  if (definition.gate !== undefined) return { gate: definition.gate.level, reason: definition.gate.reason };
  switch (definition.status) {
    case 'theorem':
      return forceOf(definition, functional) === 'sufficient'
        ? {
            gate: 'warn',
            reason:
              'a sufficient condition: a violation here is a warning until an integral over a real density confirms or clears it',
          }
        : { gate: 'fail', reason: 'a theorem whose local form is necessary' };
    case 'conjecture':
      return { gate: 'note', reason: 'a conjecture, not a theorem' };
    case 'estimate':
      return { gate: 'note', reason: 'an estimate, not a theorem' };
    case 'norm':
      return { gate: 'score', reason: 'a norm: a value the exact functional has for one system' };
    case 'rule':
      return insideRealisticBox
        ? {
            gate: 'fail',
            reason: 'a rule of numerical quality, broken where real densities are (r_s 0.02–10, s ≤ 3, α ≤ 4)',
          }
        : { gate: 'warn', reason: 'a rule of numerical quality, broken only outside r_s 0.02–10, s ≤ 3, α ≤ 4' };
  }
}

const passReasons: Record<Exclude<Verdict, 'violated'>, string> = {
  proved: 'proved over the stated domain',
  holds: 'no violation found; not a proof',
  undecided: 'not decided; see the reason',
  'not-applicable': 'does not apply',
};

/** Whether a point lies where the densities of atoms, molecules and solids mostly are. */
export function isRealistic(point: Readonly<Record<string, number | undefined>>): boolean {
  const within = (name: string, lower: number, upper: number) => {
    const value = point[name];
    return value === undefined || (value >= lower && value <= upper);
  };
  return (
    within('rs', 0.02, 10) &&
    within('s', 0, 3) &&
    within('alpha', 0, 4) &&
    within('s_up', 0, 3) &&
    within('s_dn', 0, 3) &&
    within('alpha_up', 0, 4) &&
    within('alpha_dn', 0, 4)
  );
}
