import { Argument, Command, CommanderError, Option } from 'commander';
import { ProblemError } from '../errors/problem.ts';
import { packageVersion } from './package-root.ts';
import { wrongOption } from './problems.ts';
import { exitStatus, faultOf } from './status.ts';
import type { Terminal } from './terminal.ts';

/** Runs one command line (without `node` and the program's name); answers the exit status and never throws. */
export async function runProgram(args: readonly string[], terminal: Terminal, withTrace = false): Promise<number> {
  try {
    return await parseAndRun(args, terminal);
  } catch (error) {
    const { text, status } = faultOf(asProblem(error), withTrace);
    terminal.writeErr(text);
    return status;
  }
}

async function parseAndRun(args: readonly string[], terminal: Terminal): Promise<number> {
  let status: number = exitStatus.fine;
  const program = makeProgram(terminal, (value) => {
    status = value;
  });
  if (args.length === 0) {
    terminal.writeErr(program.helpInformation());
    return exitStatus.faultyRequest;
  }
  try {
    await program.parseAsync(args, { from: 'user' });
  } catch (error) {
    // Help and version are printed already.
    if (error instanceof CommanderError && error.exitCode === 0) return exitStatus.fine;
    throw error;
  }
  return status;
}

/** A fault that commander found in the command line, as a problem. */
function asProblem(error: unknown): unknown {
  if (!(error instanceof CommanderError)) return error;
  const text = error.message.replace(/^error: /, '');
  const hint = /\(Did you mean [\s\S]*\?\)/.exec(text)?.[0];
  const message = text.replace(/\s*\(Did you mean [\s\S]*\?\)/, '').trim();
  const remedy = hint?.slice(1, -1) ?? 'See rungcheck --help, or --help after a command.';
  return new ProblemError([wrongOption(message === '' || message === '(outputHelp)' ? 'no command' : message, remedy)]);
}

const collect = (value: string, previous: readonly string[] | undefined): readonly string[] => [
  ...(previous ?? []),
  value,
];

const examples = (...lines: readonly string[]): string => `\n${lines.join('\n')}`;

function makeProgram(terminal: Terminal, end: (status: number) => void): Command {
  const program = new Command('rungcheck');
  program
    .description(
      'Vets exchange-correlation density functionals against the known exact conditions: which are broken, where in density space, and by how much.',
    )
    .version(packageVersion(), '-V, --version', 'print the version')
    .helpOption('-h, --help', 'print help')
    .helpCommand('help [command]', 'print help for a command')
    .exitOverride()
    .configureOutput({
      writeOut: terminal.writeOut,
      writeErr: () => {},
      getOutHelpWidth: () => Math.min(terminal.width, 100),
      getErrHelpWidth: () => Math.min(terminal.width, 100),
    })
    .addHelpText('after', () =>
      examples(
        'Examples:',
        '  rungcheck vet pbe',
        '  rungcheck new my-gga --rung gga && rungcheck vet ./my-gga.yaml',
        '  rungcheck explain correlation-coordinate-scaling',
        '',
        'Exit status:',
        '  0   nothing fails         1   a condition fails',
        '  2   faulty request        70  fault of rungcheck itself (RUNGCHECK_TRACE=1 shows where)',
        '',
        'Quantities are in Hartree atomic units. Colour follows the terminal, NO_COLOR and FORCE_COLOR.',
      ),
    );
  addVet(program, terminal, end);
  addAt(program, terminal, end);
  addCatalogue(program, terminal, end);
  addSheets(program, terminal, end);
  return program;
}

type End = (status: number) => void;

const list = (flags: string, description: string) =>
  new Option(flags, description).argParser<readonly string[]>(collect);

const constraintsOption = () =>
  list(
    '--constraints <folder>',
    'a folder with condition sheets of your own, beside those of the catalogue; repeatable',
  );

const setOption = () =>
  list(
    '--set <name=value,…>',
    'other values of parameters for this run, marked as a trial in the output: kappa=0.9, mu=10/81',
  );

const outOption = () => new Option('--out <file>', 'write to a file, whole or not at all, instead of standard output');

function addVet(program: Command, terminal: Terminal, end: End): void {
  program
    .command('vet')
    .summary('decide which exact conditions functionals break, where and by how much')
    .description(
      'Scans the domain for violations of every condition that applies, moves the worst point to the true local extremum and confirms it in high precision before it says "violated". "holds" means that no violation was found: not a proof.',
    )
    .argument('<sheet or id...>', 'sheet files (…/name.yaml) or ids of the catalogue (pbe)')
    .addOption(
      new Option('--format <format>', 'table to read, json to keep').choices(['table', 'json']).default('table'),
    )
    .option(
      '--domain <domain>',
      'standard, wide, bounds such as rs=0.01:100,zeta=0:1,s=0:5,alpha=0:5, or a file with such bounds',
      'standard',
    )
    .addOption(
      new Option('--only <ids>', 'only these conditions, separated by commas; repeatable').argParser<readonly string[]>(
        collect,
      ),
    )
    .addOption(constraintsOption())
    .addOption(
      list(
        '--constants <name=value,…>',
        'other values of named constants, as in lieb-oxford=1.6358; explain shows the published ones',
      ),
    )
    .addOption(setOption())
    .option('--exit-zero', 'end with status 0 even when a condition fails')
    .addOption(outOption())
    .addHelpText(
      'after',
      examples(
        'Examples:',
        '  rungcheck vet pbe scan',
        '  rungcheck vet ./mine.yaml --domain wide --format json --out findings.json',
        '  rungcheck vet revpbe --only lieb-oxford --constants lieb-oxford=1.6358',
        '  rungcheck vet pbe --set kappa=0.9 --only exchange-lieb-oxford',
        '',
        'What counts as a failure (exit status 1):',
        '  A violated theorem fails when its local form is necessary, and is a warning when it is sufficient only.',
        '  A conjecture or estimate is a note, a norm a score. A rule of numerical quality fails where real',
        '  densities are (r_s 0.02–10, s ≤ 3, α ≤ 4). A conflict that the rung cannot avoid is a warning.',
        '',
        'Domains:',
        '  standard  r_s 0.01–100, ζ 0–1, s 0–5, α 0–5',
        '  wide      r_s 0.001–1000, ζ 0–1, s 0–100, α 0–10⁹',
        '  Bounds that you do not give are those of standard.',
      ),
    )
    .action(async (sheets, options) => {
      const { vetCommand } = await import('./vet.ts');
      end(vetCommand(sheets, options, terminal));
    });
}

function addAt(program: Command, terminal: Terminal, end: End): void {
  program
    .command('at')
    .summary('energies, enhancement factors and derivatives at points')
    .description(
      'Evaluates the semilocal parts of a functional at one point or at the points of a file. Answers ε_x, ε_c, ε_xc (per particle, hartree) and F_x, F_c, F_xc (over ε_x^unif of the unpolarised density).',
    )
    .argument('<sheet or id>', 'a sheet file (…/name.yaml) or an id of the catalogue (pbe)')
    .option('--rs <number>', 'r_s, Wigner-Seitz radius, bohr')
    .option('--zeta <number>', 'ζ, relative spin polarisation, -1 to 1')
    .option('--s <number>', 's, reduced gradient')
    .option('--alpha <number>', 'α, iso-orbital indicator')
    .option('--q <number>', 'q, reduced Laplacian')
    .option('--points <file>', 'points as comma-separated text, - for standard input')
    .option('--derivatives', 'derivatives too')
    .option('--digits <number>', 'significant digits, 1 to 100, in high precision; double precision without it')
    .addOption(setOption())
    .addOption(
      new Option('--format <format>', 'text to read, csv or json to compute with')
        .choices(['text', 'csv', 'json'])
        .default('text'),
    )
    .addOption(outOption())
    .addHelpText(
      'after',
      examples(
        'Examples:',
        '  rungcheck at pbe --rs 1 --zeta 0 --s 2',
        '  rungcheck at scan --rs 2 --zeta 0.5 --s 1 --alpha 0.3 --derivatives --digits 50',
        '  rungcheck at pbe --points points.csv --format csv > values.csv',
        '',
        'Points:',
        '  A header, then one point a line; columns in any order; blank lines and lines that begin with # are passed over.',
        '  On the uniform-polarisation slice   rs,zeta,s,alpha (and q)',
        '  Anywhere                            n_up,n_dn,sigma_uu,sigma_ud,sigma_dd,tau_up,tau_dn (and lapl_up,lapl_dn)',
        "  with σ_σσ' = ∇n_σ·∇n_σ' and τ = ½Σ|∇φ|². Columns beyond the rung of the functional may be left out.",
        '',
        'Columns of the answer:',
        '  the columns given, then eps_x, eps_c, eps_xc, Fx, Fc, Fxc; empty (csv) or null (json) without a value',
        '  --derivatives, slice     dFx_drs, dFc_drs, d2Fc_drs2, dFxc_drs at fixed ζ, s, α',
        '  --derivatives, anywhere  of the energy per volume by each column given: d_n_up_x … of exchange,',
        '                           d_n_up_c … of correlation, d_n_up … of both',
      ),
    )
    .action(async (sheet, options) => {
      const { atCommand } = await import('./at.ts');
      end(await atCommand(sheet, options, terminal));
    });
}

function addCatalogue(program: Command, terminal: Terminal, end: End): void {
  program
    .command('list')
    .summary('the functionals, or the conditions, of the catalogue')
    .description('Lists the functionals or the conditions that come with rungcheck.')
    .addArgument(new Argument('<what>', 'functionals or constraints').choices(['functionals', 'constraints']))
    .addOption(
      new Option('--format <format>', 'table to read, json to compute with')
        .choices(['table', 'json'])
        .default('table'),
    )
    .addOption(new Option('--rung <rung>', 'functionals of one rung').choices(['lda', 'gga', 'meta-gga']))
    .addOption(
      new Option('--part <part>', 'functionals that give it, or conditions on it').choices([
        'exchange',
        'correlation',
        'exchange-correlation',
      ]),
    )
    .option('--hybrid', 'functionals with exact exchange')
    .option('--match <text>', 'those with the text in their id, name or title')
    .addOption(constraintsOption())
    .addHelpText(
      'after',
      examples(
        'Examples:',
        '  rungcheck list functionals',
        '  rungcheck list functionals --rung meta-gga --hybrid',
        '  rungcheck list constraints --part correlation',
        '  rungcheck list constraints --format json',
      ),
    )
    .action(async (what, options) => {
      const { listCommand } = await import('./list.ts');
      end(listCommand(what, options, terminal));
    });
  program
    .command('explain')
    .summary('one condition: what it says, why, and what a violation means')
    .description(
      'Tells of one condition its statement, its local form and how that comes about, whether the form is necessary or only sufficient, where it is tried and to what tolerance, who holds it, who breaks it, and its sources.',
    )
    .argument('<condition>', 'id of the condition; see rungcheck list constraints')
    .addOption(constraintsOption())
    .addHelpText('after', examples('Example:', '  rungcheck explain lieb-oxford'))
    .action(async (id, options) => {
      const { explainCommand } = await import('./explain.ts');
      end(explainCommand(id, options, terminal));
    });
}

function addSheets(program: Command, terminal: Terminal, end: End): void {
  program
    .command('new')
    .summary('write a commented sheet to start from')
    .description(
      'Writes <id>.yaml in the current folder: a sheet that can be vetted at once, to be changed. Never overwrites.',
    )
    .argument('<id>', 'lower case letters, digits and hyphens')
    .addOption(
      new Option('--rung <rung>', 'what the functional depends on').choices(['lda', 'gga', 'meta-gga']).default('gga'),
    )
    .addHelpText('after', examples('Example:', '  rungcheck new my-gga --rung gga'))
    .action(async (id, options) => {
      const { newCommand } = await import('./new.ts');
      end(newCommand(id, options, terminal));
    });
  program
    .command('schema')
    .summary('the JSON Schema of a sheet, a condition sheet or the findings')
    .description(
      'Prints a JSON Schema (draft 2020-12): of sheets and condition sheets for editors, of findings for programs.',
    )
    .addArgument(new Argument('<what>', 'sheet, constraint or findings').choices(['sheet', 'constraint', 'findings']))
    .addHelpText('after', examples('Example:', '  rungcheck schema sheet > sheet.schema.json'))
    .action(async (what, _options) => {
      const { schemaCommand } = await import('./schema.ts');
      end(schemaCommand(what, terminal));
    });
}
