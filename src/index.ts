/*
 * The library surface: what a functional developer's own script needs. Everything else is internal.
 *
 *     import { openShelf, readCondition, vetFunctional, standardDomain, constantValues } from 'rungcheck';
 */
export { type Condition, readCondition } from './constraint/condition.ts';
export { constantValues, type SelectableConstant, selectableConstants } from './constraint/constants.ts';
export { type Constraint, readConstraint } from './constraint/constraint.ts';
export type { Settings } from './constraint/decide.ts';
export { customDomain, type Domain, standardDomain, wideDomain } from './constraint/domain.ts';
export { type Progress, vetFunctional } from './constraint/vet.ts';
export { type ConstraintDefinition, parseConstraintSheet } from './definition/constraint.ts';
export { type FunctionalDefinition, parseFunctionalSheet } from './definition/functional.ts';
export { constraintSheetSchema, functionalSheetSchema } from './definition/json-schema.ts';
export { type Outcome, type Problem, ProblemError, problemText } from './errors/problem.ts';
export { evaluatePoints, type PointsAnswer, type PointsRequest } from './evaluate/points.ts';
export { type Finding, type Findings, type FunctionalFindings, findingsJsonSchema } from './finding/finding.ts';
export type { Functional } from './functional/functional.ts';
export { linkFunctional } from './functional/link.ts';
export type { ShelfFolders } from './shelf/sheet-files.ts';
export { openShelf, type Shelf } from './shelf/shelf.ts';
