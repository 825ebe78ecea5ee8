import { compilePoint } from '../kernel/float64.ts';
import type { Claim } from './claim.ts';
import { polarisationRoot } from './forms.ts';

const points = 40;
/** More than round-off makes of two ways to compute a margin, in most places; fewer may be worse by cancellation. */
const closeness = 1e-6;
const mostFar = 4;

/** Whether two claims of one margin agree at sample points in double precision: a guard against a wrong rewrite. */
export function sameMargin(plain: Claim, rewritten: Claim): boolean {
  const before = compilePoint(plain.graph, plain.forms[0] as number, plain.variables);
  const after = rewritten.forms.map((form) => compilePoint(rewritten.graph, form, rewritten.variables));
  let far = 0;
  for (let count = 1; count <= points; count++) {
    const place = rewritten.axes.map(({ lower, upper }, axis) => {
      const unit = (count * (axis + 1) * 0.6180339887498949) % 1;
      return lower + unit * (Math.min(upper, lower + 5) - lower);
    });
    const at = new Map(rewritten.variables.map((name, axis) => [name, place[axis] as number]));
    const w = at.get(polarisationRoot);
    if (w !== undefined) at.set('zeta', 1 - w ** 3);
    // What only the plain margin depends on may be anything.
    const value = before(Float64Array.from(plain.variables, (name) => at.get(name) ?? 0.5));
    for (const form of after) {
      const difference = Math.abs(value - form(Float64Array.from(place)));
      if (difference > closeness * (1 + Math.abs(value))) far++;
    }
  }
  return far <= mostFar;
}
