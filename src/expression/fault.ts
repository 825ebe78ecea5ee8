import type { ProblemCode } from '../errors/problem.ts';

/** A fault in an expression; `offset` is its place in the text. */
export interface ExpressionFault {
  readonly code: ProblemCode;
  readonly message: string;
  readonly remedy: string;
  readonly offset: number;
}

/** Thrown within the parser only; its entry points turn it into a problem. */
export class FaultSignal extends Error {
  readonly fault: ExpressionFault;
  constructor(fault: ExpressionFault) {
    super(fault.message);
    this.fault = fault;
  }
}

export function fault(code: ProblemCode, message: string, remedy: string, offset: number): FaultSignal {
  return new FaultSignal({ code, message, remedy, offset });
}
