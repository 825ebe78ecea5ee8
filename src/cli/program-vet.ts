import { type Command, Option } from 'commander';
import { vetFormatNames } from './formats.ts';
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

/** The commands that vet, and what is done with findings and states. */
export function addVet(program: Command, terminal: Terminal, end: End): void {
  vetOptions(
    program
      .command('vet')
      .summary('decide which exact conditions functionals break, where and by how much')
      .description(
        'Scans the domain for violations of every condition that applies, moves the worst point to the true local extremum and confirms it in high precision before it says "violated". "holds" means that no violation was found: not a proof.',
      )
      .argument(
        '[sheet or id...]',
        'sheet files (…/name.yaml) or ids of the catalogue (pbe); without any, those of rungcheck.yaml',
      ),
  ).action(async (sheets: readonly string[], options) => {
    const { vetCommand } = await import('./vet.ts');
    end(await vetCommand(sheets, options, terminal));
  });
  tellOptions(
    program
      .command('merge')
      .summary('join the findings of shards')
      .description(
        'Joins the findings files that all the shards of one run have written; the result is, byte for byte, what the run without shards would have told.',
      )
      .argument('<findings.json...>', 'the files of all shards, in any order'),
  )
    .addOption(constraintsOption())
    .addHelpText(
      'after',
      examples(
        'Example:',
        '  rungcheck vet --shard 1/2 --format json --out 1.json',
        '  rungcheck vet --shard 2/2 --format json --out 2.json',
        '  rungcheck merge 1.json 2.json --against state.json --write junit=out.xml',
      ),
    )
    .action(async (files: readonly string[], options) => {
      const { mergeCommand } = await import('./merge.ts');
      end(await mergeCommand(files, options, terminal));
    });
  workOptions(
    program
      .command('compare')
      .summary('what a state or sheet has worse or better than another')
      .description(
        'Compares two recorded states (or findings files), or vets two sheets and compares their findings. Exit status 1 when the second is worse: a new violation, a lower margin, a larger violated share, a weaker verdict, a functional or condition gone.',
      )
      .argument('<before>', 'a state or findings file (….json), or a sheet or id')
      .argument('<after>', 'another of the same kind')
      .addOption(
        new Option('--format <format>', 'text to read, json to keep').choices(['text', 'json']).default('text'),
      )
      .option('--margin <number>', 'how much a margin may differ, relative to the first (default: 0.001)')
      .option('--share <number>', 'how much a violated share may differ, in shares of the domain (default: 0.001)')
      .addOption(domainOption())
      .addOption(list('--only <ids>', 'only these conditions, separated by commas; repeatable'))
      .addOption(constraintsOption())
      .addOption(constantsOption()),
  )
    .addHelpText(
      'after',
      examples('Examples:', '  rungcheck compare old.json new.json', '  rungcheck compare pbe ./mine.yaml'),
    )
    .action(async (before: string, after: string, options) => {
      const { compareCommand } = await import('./compare.ts');
      end(await compareCommand(before, after, options, terminal));
    });
}

function vetOptions(command: Command): Command {
  return workOptions(tellOptions(command))
    .option(
      '--domain <domain>',
      'standard, wide, bounds such as rs=0.01:100,zeta=0:1,s=0:5,alpha=0:5, or a file with such bounds (default: standard)',
    )
    .addOption(list('--only <ids>', 'only these conditions, separated by commas; repeatable'))
    .addOption(constraintsOption())
    .addOption(constantsOption())
    .addOption(setOption())
    .option('--prove', 'try to prove what holds, over the whole domain, and to certify what is violated')
    .option('--boxes <budget>', 'boxes to spend on the proof of each condition (default: 100000)')
    .option('--watch', 'vet again whenever a sheet is saved, with what has changed marked; Ctrl-C ends')
    .option('--shard <i/n>', 'only every n-th sheet, from the i-th on; see rungcheck merge')
    .addHelpText('after', vetHelp);
}

/** Options on how the findings are come by. */
function workOptions(command: Command): Command {
  return command
    .option('--jobs <n>', 'worker threads (default: one for each core)')
    .option('--cache <folder>', "where findings are kept (default: in the user's folder for caches)")
    .option('--no-cache', 'find everything anew, and keep nothing');
}

/** Options on what becomes of the findings. */
function tellOptions(command: Command): Command {
  return command
    .addOption(
      new Option('--format <format>', 'form of the output: table to read, json to keep, others as for --write')
        .choices(vetFormatNames)
        .default('table'),
    )
    .addOption(outOption())
    .addOption(
      list('--write <format=file>', `write the findings to a file as well; repeatable: ${vetFormatNames.join(', ')}`),
    )
    .option('--record <state.json>', 'write the present state, to be held against later; ends with status 0')
    .option('--against <state.json>', 'fail on what is worse than recorded, and on nothing else')
    .option('--exit-zero', 'end with status 0 even when a condition fails')
    .option('--project <file>', 'the project file (default: rungcheck.yaml, when there is one)')
    .option('--no-project', 'pass over rungcheck.yaml');
}

const vetHelp = examples(
  'Examples:',
  '  rungcheck vet pbe scan',
  '  rungcheck vet ./mine.yaml --domain wide --format json --out findings.json',
  '  rungcheck vet revpbe --only lieb-oxford --constants lieb-oxford=1.6358',
  '  rungcheck vet pbe --set kappa=0.9 --only exchange-lieb-oxford',
  '  rungcheck vet --record state.json                    # what rungcheck.yaml names, as it is now',
  '  rungcheck vet --against state.json --write junit=out.xml --write sarif=out.sarif',
  '  rungcheck vet ./mine.yaml --watch',
  '',
  'What counts as a failure (exit status 1):',
  '  A violated theorem fails when its local form is necessary, and is a warning when it is sufficient only.',
  '  A conjecture or estimate is a note, a norm a score. A rule of numerical quality fails where real',
  '  densities are (r_s 0.02–10, s ≤ 3, α ≤ 4). A conflict that the rung cannot avoid is a warning.',
  '  With --against: a new violation, a margin or violated share worse beyond the tolerance, a weaker verdict,',
  '  a functional or a condition gone.',
  '',
  'Exit status:',
  '  0 nothing fails · 1 something fails · 2 a faulty request, or a sheet that could not be vetted (the others',
  '  are) · 70 a fault of rungcheck · 130, 143 ended by Ctrl-C, SIGTERM',
  '',
  'Project file rungcheck.yaml (rungcheck schema project):',
  '  sheets: [functionals/, pbe]                          # folders, files, ids',
  '  domain: standard',
  '  accept:',
  '    - { constraint: lieb-oxford, functional: mine, reason: known since 2024, margin: -0.02, review: 2027-06-01 }',
  '',
  'Domains:',
  '  standard  r_s 0.01–100, ζ 0–1, s 0–5, α 0–5',
  '  wide      r_s 0.001–1000, ζ 0–1, s 0–100, α 0–10⁹',
  '  Bounds that you do not give are those of standard.',
);
