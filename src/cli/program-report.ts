import type { Command } from 'commander';
import {
  constantsOption,
  constraintsOption,
  domainOption,
  type End,
  examples,
  list,
  outOption,
  setOption,
} from './program-options.ts';
import type { Terminal } from './terminal.ts';

/** The page to send to a co-author or a referee. */
export function addReport(program: Command, terminal: Terminal, end: End): void {
  program
    .command('report')
    .summary('one page to publish: verdicts, maps to explore, curves, formulas, sources')
    .description(
      'Vets functionals and writes one HTML file that asks nothing of the network: the verdicts in a table to sort and filter, each condition with its statement, margin, worst point and an interactive map of the margin, curves of the enhancement factors, the formulas typeset from the sheets, parameters with their sources, how it was asked, and the references. Several functionals: a column each, the differences in front.',
    )
    .argument(
      '[sheet or id...]',
      'sheet files (…/name.yaml) or ids of the catalogue (pbe); without any, those of rungcheck.yaml',
    )
    .addOption(outOption())
    .addOption(domainOption().default(undefined))
    .addOption(list('--only <ids>', 'only these conditions, separated by commas; repeatable'))
    .addOption(constraintsOption())
    .addOption(constantsOption())
    .addOption(setOption())
    .option('--prove', 'try to prove what holds; the maps then show what is proved to hold, to violate, undecided')
    .option('--boxes <budget>', 'boxes to spend on the proof of each condition (default: 100000)')
    .option('--jobs <n>', 'worker threads (default: one for each core)')
    .option('--cache <folder>', "where findings are kept (default: in the user's folder for caches)")
    .option('--no-cache', 'find everything anew, and keep nothing')
    .option('--project <file>', 'the project file (default: rungcheck.yaml, when there is one)')
    .option('--no-project', 'pass over rungcheck.yaml')
    .addHelpText(
      'after',
      examples(
        'Examples:',
        '  rungcheck report scan --out scan.html',
        '  rungcheck report pbe pbesol revpbe rpbe --out comparison.html',
        '  rungcheck report ./mine.yaml --domain wide --out mine.html',
        '  rungcheck report pbe --prove --out pbe.html',
        '',
        'The page draws its maps itself, in any current browser; without scripts everything but maps and curves is there.',
        'Ends with status 0 whatever the verdicts are.',
      ),
    )
    .action(async (sheets: readonly string[], options) => {
      const { reportCommand } = await import('./report.ts');
      end(await reportCommand(sheets, options, terminal));
    });
}
