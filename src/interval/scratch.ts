/**
 * The registers through which generated code and the functions of this folder pass numbers: arguments and results in
 * one typed array, because a double that crosses a call is allocated otherwise.
 */
export type Scratch = Float64Array;

export const register = {
  /** In: the argument's interval. Out: the result's. */
  lower: 0,
  upper: 1,
  /** Out: f(x) = offset + slope·(x − middle) + bend·(x − middle)² ± error on the interval. */
  slope: 2,
  offset: 3,
  error: 4,
  /** Out: 0, or whether the argument leaves the domain. */
  outside: 5,
  bend: 6,
  middle: 7,
} as const;

/** `outside`: the interval only touches an end of the domain at which the function has no finite value. */
export const touches = 2;
/** `outside`: the interval reaches beyond the domain. */
export const leaves = 1;

export function makeScratch(): Scratch {
  return new Float64Array(8);
}
