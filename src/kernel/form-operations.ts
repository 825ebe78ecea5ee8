import type { Scratch } from '../interval/scratch.ts';
import { productDown, productUp } from '../interval/widen.ts';
import { part } from './form-layout.ts';
import {
  absoluteText,
  applyText,
  copyText,
  extremeText,
  hullText,
  productText,
  shareText,
  sumText,
} from './form-text.ts';

type Values = Float64Array;
export type Unary = (V: Values, o: number, x: number) => void;
export type Binary = (V: Values, o: number, x: number, y: number) => void;
/** Applies the parabola in the scratch to x. */
export type Apply = (V: Values, o: number, x: number, R: Scratch) => void;

/** The operations, each made once for each set of axes. */
export interface FormOperations {
  readonly add: (x: number, y: number) => Binary;
  readonly sub: (x: number, y: number) => Binary;
  readonly mul: (x: number, y: number) => Binary;
  readonly min: (x: number, y: number) => Binary;
  readonly max: (x: number, y: number) => Binary;
  /** The hull of two nodes' intervals, as a node of the given axes. */
  readonly hull: (x: number, y: number, to: number) => Binary;
  readonly neg: (x: number) => Unary;
  readonly abs: (x: number) => Unary;
  /** x as a node of more axes. */
  readonly copy: (x: number, to: number) => Unary;
  readonly apply: (x: number) => Apply;
  /** Tightens the interval of x/(x + y) by what it is for x, y ≥ 0. */
  readonly share: (to: number) => Binary;
  /** Makes a form of one axis run along its own interval from end to end. */
  readonly renew: (V: Values, o: number) => void;
}

/** Operations on forms by the masks of the operands' axes; the result has the axes of both. */
export function makeFormOperations(scratch: Scratch): FormOperations {
  const made = new Map<string, unknown>();
  const once = <T>(key: string, parameters: readonly string[], body: () => string): T => {
    const known = made.get(key) as T | undefined;
    if (known !== undefined) return known;
    const make = new Function('S', 'multiply', `"use strict"; return (${parameters.join(', ')}) => {\n${body()}\n};`);
    const result = make(scratch, multiply) as T;
    made.set(key, result);
    return result;
  };
  const binary = (name: string, text: (x: number, y: number) => string) => (x: number, y: number) =>
    once<Binary>(`${name} ${x} ${y}`, ['V', 'o', 'x', 'y'], () => text(x, y));
  const unary = (name: string, text: (x: number) => string) => (x: number) =>
    once<Unary>(`${name} ${x}`, ['V', 'o', 'x'], () => text(x));
  return {
    add: binary('add', (x, y) => sumText(x, y, '+')),
    sub: binary('sub', (x, y) => sumText(x, y, '-')),
    mul: binary('mul', productText),
    min: binary('min', (x, y) => extremeText(x, y, 'min')),
    max: binary('max', (x, y) => extremeText(x, y, 'max')),
    hull: (x, y, to) => once<Binary>(`hull ${x} ${y} ${to}`, ['V', 'o', 'x', 'y'], () => hullText(x, y, to)),
    neg: unary('neg', (x) => copyText(x, x, '-')),
    abs: unary('abs', absoluteText),
    copy: (x, to) => once<Unary>(`copy ${x} ${to}`, ['V', 'o', 'x'], () => copyText(x, to, '')),
    share: (to) => once<Binary>(`share ${to}`, ['V', 'o', 'x', 'y'], () => shareText(to)),
    renew,
    apply: (x) => once<Apply>(`apply ${x}`, ['V', 'o', 'x', 'R'], () => applyText(x)),
  };
}

function renew(V: Values, o: number): void {
  const [lower, upper] = [V[o + part.lower] as number, V[o + part.upper] as number];
  if (!(upper - lower < Number.POSITIVE_INFINITY)) return;
  const centre = lower + (upper - lower) * 0.5;
  const half = Math.max(upper - centre, centre - lower) * (1 + 2 ** -50);
  V[o + part.centre] = centre;
  V[o + part.error] = 0;
  V[o + part.linear] = half;
  V[o + part.bent] = 0;
  V[o + part.coefficients] = half;
  V[o + part.coefficients + 1] = 0;
}

/** The product of the intervals in registers 0, 1 and 2, 3 where the code in line does not suffice. */
function multiply(scratch: Scratch): void {
  const [al, au, bl, bu] = scratch as unknown as [number, number, number, number];
  const lower = Math.min(productDown(al, bl), productDown(al, bu), productDown(au, bl), productDown(au, bu));
  const upper = Math.max(productUp(al, bl), productUp(al, bu), productUp(au, bl), productUp(au, bu));
  const valid = lower <= upper;
  scratch[0] = valid ? lower : Number.NEGATIVE_INFINITY;
  scratch[1] = valid ? upper : Number.POSITIVE_INFINITY;
}
