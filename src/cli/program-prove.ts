import { type Command, Option } from 'commander';
import { constantsOption, constraintsOption, type End, examples, setOption } from './program-options.ts';
import type { Terminal } from './terminal.ts';

/** The commands that prove, and check a proof again. */
export function addProofs(program: Command, terminal: Terminal, end: End): void {
  program
    .command('prove')
    .summary('prove a condition over a whole domain by interval arithmetic')
    .description(
      'Divides the domain into boxes until interval arithmetic, rounded outward, proves the condition (to its tolerance) or its violation on each, or the budget of boxes ends. A proof holds wherever the formula has a value. Ctrl-C ends the search and tells what it has found. Exit status 0 when proved, 1 when violated or not decided, 130 when interrupted.',
    )
    .argument('<sheet or id>', 'a sheet file (…/name.yaml) or an id of the catalogue (pbe)')
    .argument('<condition>', 'the id of a condition')
    .option(
      '--domain <domain>',
      'standard, wide, unbounded (every r_s, s and α), bounds such as rs=0.01:100,zeta=0:1,s=0:5,alpha=0:5, or a file',
      'standard',
    )
    .option('--boxes <budget>', 'boxes to look at, at most, those in --state included', '1000000')
    .option('--jobs <n>', 'threads; the result does not depend on them (default: one for each core)')
    .option('--tolerance <number>', 'another tolerance than that of the condition')
    .option('--certificate <file>', 'write what rungcheck verify needs to check the proof again')
    .option(
      '--state <file>',
      'keep the search in a file when the boxes end or Ctrl-C interrupts it; with a file that is there it goes on from it',
    )
    .addOption(new Option('--format <format>', 'text to read, json to keep').choices(['text', 'json']).default('text'))
    .addOption(constraintsOption())
    .addOption(constantsOption())
    .addOption(setOption())
    .addHelpText(
      'after',
      examples(
        'Examples:',
        '  rungcheck prove pbe correlation-non-positive --certificate pbe.json && rungcheck verify pbe.json',
        '  rungcheck prove pbe exchange-lieb-oxford --domain unbounded',
        '  rungcheck prove r2scan correlation-interaction-monotonic --boxes 1e7 --state r2scan.json',
      ),
    )
    .action(async (sheet: string, constraint: string, options) => {
      const { proveCommand } = await import('./prove.ts');
      end(await proveCommand(sheet, constraint, options, terminal));
    });
  program
    .command('verify')
    .summary('check the certificate of a proof again, with other arithmetic')
    .description(
      'Checks a certificate of rungcheck prove: its digest, the sheets it is for, that its boxes cover the domain, that the rewrites it names leave the margin as it is, and the margin on every box by decimal arithmetic with directed rounding. Exit status 1 when it is refused.',
    )
    .argument('<certificate>', 'a file of rungcheck prove --certificate')
    .option('--sheet <file>', 'the sheet, when it is not one of the catalogue')
    .option('--jobs <n>', 'threads; the result does not depend on them (default: one for each core)')
    .addOption(constraintsOption())
    .action(async (file: string, options) => {
      const { verifyCommand } = await import('./verify.ts');
      end(await verifyCommand(file, options, terminal));
    });
}
