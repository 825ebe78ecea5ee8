import type { Condition } from '../constraint/condition.ts';
import type { Expression } from '../expression/expression.ts';

/** Powers of hartree and bohr. */
interface Unit {
  readonly hartree: number;
  readonly bohr: number;
}

const none: Unit = { hartree: 0, bohr: 0 };

/** The unit of a condition's margin, as `hartree/bohr`: empty where it has none; undefined where the text does not tell. */
export function marginUnit({ definition, requirement }: Condition): string | undefined {
  if (definition.relative) return '';
  const unit = unitOf(requirement.left) ?? unitOf(requirement.right);
  return unit === undefined ? undefined : unitText(unit);
}

function unitText({ hartree, bohr }: Unit): string {
  const power = (name: string, exponent: number) =>
    exponent === 1 ? name : `${name}^${String(exponent).replace('-', '−')}`;
  const parts = [...(hartree === 0 ? [] : [power('hartree', hartree)]), ...(bohr === 0 ? [] : [power('bohr', bohr)])];
  return parts.join(' ');
}

function unitOf(expression: Expression): Unit | undefined {
  switch (expression.kind) {
    case 'number':
      return none;
    case 'name':
      return unitOfName(expression.name);
    case 'member':
    case 'member-call':
      return expression.name === 'enhancement' ? none : { hartree: 1, bohr: 0 };
    case 'negation':
      return unitOf(expression.operand);
    case 'arithmetic':
      return unitOfArithmetic(expression);
    case 'conditional':
      return unitOf(expression.whenTrue);
    case 'call':
      return unitOfCall(expression);
  }
}

function unitOfName(name: string): Unit | undefined {
  if (name.startsWith('eps')) return { hartree: 1, bohr: 0 };
  if (name === 'rs') return { hartree: 0, bohr: 1 };
  // Other quantities (n, kF, tau …) are not met in the conditions of the catalogue.
  return /^(F(x|c|xc)|s|p|t|q|alpha|zeta|phi|pi|exactExchange|[A-Z])$/.test(name) ? none : undefined;
}

function unitOfArithmetic({ op, left, right }: Extract<Expression, { kind: 'arithmetic' }>): Unit | undefined {
  const a = unitOf(left);
  const b = unitOf(right);
  if (a === undefined || b === undefined) return undefined;
  if (op === '+' || op === '-') return a;
  if (op === '*') return { hartree: a.hartree + b.hartree, bohr: a.bohr + b.bohr };
  if (op === '/') return { hartree: a.hartree - b.hartree, bohr: a.bohr - b.bohr };
  const exponent = exponentOf(right);
  if (a.hartree === 0 && a.bohr === 0) return none;
  return exponent === undefined ? undefined : { hartree: a.hartree * exponent, bohr: a.bohr * exponent };
}

function exponentOf(expression: Expression): number | undefined {
  if (expression.kind === 'number') return expression.value.valueOf();
  if (expression.kind !== 'arithmetic' || expression.op !== '/') return undefined;
  const [top, bottom] = [exponentOf(expression.left), exponentOf(expression.right)];
  return top === undefined || bottom === undefined ? undefined : top / bottom;
}

function unitOfCall({ name, args }: Extract<Expression, { kind: 'call' }>): Unit | undefined {
  const [first, second] = args.map((argument) => unitOf(argument));
  if (name === 'd') {
    return first && second && { hartree: first.hartree - second.hartree, bohr: first.bohr - second.bohr };
  }
  // Of the functions only these keep the unit of their argument; the others take and give plain numbers.
  return ['limit', 'spinscaled', 'swapped', 'abs', 'min', 'max'].includes(name) ? first : none;
}
