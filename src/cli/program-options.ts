import { Option } from 'commander';

/** Tells the program the exit status of a command. */
export type End = (status: number) => void;

/** Lines for the end of a help text. */
export const examples = (...lines: readonly string[]): string => `\n${lines.join('\n')}`;

/** An option that may be given several times. */
export const list = (flags: string, description: string) =>
  new Option(flags, description).argParser<readonly string[]>(
    (value: string, previous: readonly string[] | undefined): readonly string[] => [...(previous ?? []), value],
  );

export const constraintsOption = () =>
  list(
    '--constraints <folder>',
    'a folder with condition sheets of your own, beside those of the catalogue; repeatable',
  );

export const setOption = () =>
  list(
    '--set <name=value,…>',
    'other values of parameters for this run, marked as a trial in the output: kappa=0.9, mu=10/81',
  );

export const constantsOption = () =>
  list(
    '--constants <name=value,…>',
    'other values of named constants, as in lieb-oxford=1.6358; explain shows the published ones',
  );

export const domainOption = () =>
  new Option(
    '--domain <domain>',
    'standard, wide, bounds such as rs=0.01:100,zeta=0:1,s=0:5,alpha=0:5, or a file with such bounds',
  ).default('standard');

export const outOption = () =>
  new Option('--out <file>', 'write to a file, whole or not at all, instead of standard output');
