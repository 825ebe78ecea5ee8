import { Argument, Command, CommanderError, Option } from 'commander';
import { ProblemError } from '../errors/problem.ts';
import { wrongOption } from './problems.ts';
import { addCompletion } from './program-completion.ts';
import { addFigures } from './program-figures.ts';
import { constraintsOption, type End, examples, outOption, setOption } from './program-options.ts';
import { addProofs } from './program-prove.ts';
import { addRender } from './program-render.ts';
import { addReport } from './program-report.ts';
import { addVet } from './program-vet.ts';
import { exitStatus, faultOf } from './status.ts';
import type { Terminal } from './terminal.ts';
import { versionText } from './version-text.ts';

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
  const asksVersion = args.some((arg) => arg === '--version' || arg === '-V');
  const program = makeProgram(
    terminal,
    (value) => {
      status = value;
    },
    asksVersion,
  );
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

/** The program with all its commands; the version is only worked out when it is asked for. */
function makeProgram(terminal: Terminal, end: (status: number) => void, asksVersion: boolean): Command {
  const program = new Command('rungcheck');
  program
    .description(
      'Vets exchange-correlation density functionals against the known exact conditions: which are broken, where in density space, and by how much.',
    )
    .version(asksVersion ? versionText() : '', '-V, --version', 'print the version, and that of the catalogue')
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
        '  0   nothing fails         1   a condition fails, or something is worse than recorded',
        '  2   faulty request        70  fault of rungcheck itself (RUNGCHECK_TRACE=1 shows where)',
        '',
        'Quantities are in Hartree atomic units. Colour follows the terminal, NO_COLOR and FORCE_COLOR.',
      ),
    );
  addVet(program, terminal, end);
  addProofs(program, terminal, end);
  addRender(program, terminal, end);
  addAt(program, terminal, end);
  addFigures(program, terminal, end);
  addReport(program, terminal, end);
  addCatalogue(program, terminal, end);
  addSheets(program, terminal, end);
  addCompletion(program, terminal, end);
  return program;
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
    .option(
      '--for <sheet or id>',
      'ask it of a functional too: verdict, witness, the margin around it, limiting sequences',
    )
    .option('--margins', 'ask it of the functionals known to hold or to break it, and show their margins')
    .addOption(constraintsOption())
    .addHelpText(
      'after',
      examples(
        'Examples:',
        '  rungcheck explain lieb-oxford',
        '  rungcheck explain lieb-oxford --margins',
        '  rungcheck explain exchange-gradient-second-order --for pbe',
      ),
    )
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
    .summary('the JSON Schema of a sheet, a condition sheet, a project file, findings or a state')
    .description(
      'Prints a JSON Schema (draft 2020-12): of sheets, condition sheets and project files for editors, of findings and states for programs.',
    )
    .addArgument(
      new Argument('<what>', 'of which file').choices(['sheet', 'constraint', 'project', 'findings', 'state']),
    )
    .addHelpText('after', examples('Example:', '  rungcheck schema sheet > sheet.schema.json'))
    .action(async (what, _options) => {
      const { schemaCommand } = await import('./schema.ts');
      end(schemaCommand(what, terminal));
    });
}
