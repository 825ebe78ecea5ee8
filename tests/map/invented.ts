import { type Condition, readCondition } from '../../src/constraint/condition.ts';
import { constantValues } from '../../src/constraint/constants.ts';
import { customDomain } from '../../src/constraint/domain.ts';
import { parseConstraintSheet } from '../../src/definition/constraint.ts';
import { failure, type Outcome } from '../../src/errors/problem.ts';
import type { Functional } from '../../src/functional/functional.ts';
import type { MapRequest } from '../../src/map/request.ts';
import { linked, sheet } from '../functional/sheets.ts';

/** An invented meta-GGA whose enhancement factor at ζ = 0 is the given expression. */
export function invented(enhancement: string, ...lines: string[]): Functional {
  return linked('invented', { invented: sheet('meta-gga', ...lines, 'exchange:', `  enhancement: ${enhancement}`) });
}

/** An invented condition at ζ = 0. */
export function condition(requirement: string, ...lines: string[]): Condition {
  const text = [
    'title: Invented condition',
    'statement: invented for a test',
    'force: sufficient',
    'status: theorem',
    'sources: [invented]',
    'part: exchange',
    'rungs: [lda, gga, meta-gga]',
    'at: { zeta: 0 }',
    `requirement: ${requirement}`,
    'tolerance: 1e-9',
    'tolerance-reason: invented',
    'holds: [invented]',
    ...lines,
  ].join('\n');
  const definition = value(parseConstraintSheet(text, { file: 'invented-condition.yaml', id: 'invented-condition' }));
  return value(readCondition(definition, () => failure([])));
}

export function value<Value>(outcome: Outcome<Value>): Value {
  if (!outcome.ok) throw new Error(JSON.stringify(outcome.problems, null, 1));
  return outcome.value;
}

/** s and α from 0 to 5, r_s from 0.01 to 100. */
export function request(functional: Functional, given: Condition, changes: Partial<MapRequest> = {}): MapRequest {
  return {
    functionals: [{ functional, parameters: new Map() }],
    condition: given,
    domain: customDomain(new Map()),
    constants: constantValues(new Map()),
    slices: [new Map()],
    cells: 51,
    ...changes,
  };
}
