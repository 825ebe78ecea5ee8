/** The generated functions: a script of its own before this one, in the page and in the worker. */
declare const rungcheckKernels: readonly ((
  values: readonly (readonly Float64Array[])[],
  out: readonly Float64Array[],
  tables: readonly Float64Array[],
  erf: (x: number) => number,
  lambertW: (x: number) => number,
) => void)[];
