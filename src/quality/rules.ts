import type { RuleName } from '../definition/constraint.ts';
import { digitsLost } from './digits-lost.ts';
import { finiteEverywhere } from './finite-everywhere.ts';
import { knownConstants } from './known-constants.ts';
import { noWiggles } from './no-wiggles.ts';
import { printedDigits } from './printed-digits.ts';
import type { Rule } from './rule.ts';
import { smoothJoins } from './smooth-joins.ts';
import { spinPathsAgree } from './spin-paths-agree.ts';

/** The decider of each rule of numerical quality. */
export const rules: Readonly<Record<RuleName, Rule>> = {
  'finite-everywhere': finiteEverywhere,
  'smooth-joins': smoothJoins,
  'no-wiggles': noWiggles,
  'digits-lost': digitsLost,
  'spin-paths-agree': spinPathsAgree,
  'printed-digits': printedDigits,
  'known-constants': knownConstants,
};
