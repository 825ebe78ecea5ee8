import { type Problem, ProblemError } from '../errors/problem.ts';
import { densityColumns, evaluatePoints, type PointSpace, sliceColumns } from '../evaluate/points.ts';
import type { Functional } from '../functional/functional.ts';
import { parseDecimal } from '../number/rational.ts';
import { gapsIn, type PointsReport, pointsCsv, pointsJson, pointsText } from '../report/points.ts';
import { exactValues, findFunctional, openCatalogue, parameterProblems } from './engine.ts';
import { readInputFile } from './input-file.ts';
import { parseAssignments, parseDigits } from './options.ts';
import { outputProblems, writeOutputFile } from './output-file.ts';
import { isInadmissible, limitProblems } from './point-limits.ts';
import { type GivenPoints, parsePoints } from './points-file.ts';
import { valueOr, wrongOption } from './problems.ts';
import { exitStatus } from './status.ts';
import { plainWidth, type Terminal } from './terminal.ts';

export interface AtOptions {
  readonly rs?: string;
  readonly zeta?: string;
  readonly s?: string;
  readonly alpha?: string;
  readonly q?: string;
  readonly points?: string;
  readonly derivatives?: boolean;
  readonly digits?: string;
  readonly set?: readonly string[];
  readonly format: 'text' | 'csv' | 'json';
  readonly out?: string;
}

/** `rungcheck at`: energies and derivatives at points; answers the exit status. */
export async function atCommand(sheet: string, options: AtOptions, terminal: Terminal): Promise<number> {
  const problems: Problem[] = [];
  const { out, format } = options;
  if (out !== undefined) problems.push(...outputProblems(out));
  const functional = valueOr(findFunctional(openCatalogue([]), sheet), undefined, problems);
  const parameters = valueOr(parseAssignments('--set', options.set ?? []), new Map(), problems);
  const digits = options.digits === undefined ? undefined : valueOr(parseDigits(options.digits), undefined, problems);
  const given = await givenPoints(options, terminal, problems);
  if (functional !== undefined) problems.push(...parameterProblems([functional], parameters.keys()));
  if (functional !== undefined && given !== undefined) problems.push(...pointProblems(functional, given, options));
  if (functional === undefined || given === undefined || problems.length > 0) throw new ProblemError(problems);

  const answer = evaluatePoints(functional, {
    space: spaceOf(given),
    points: given.points,
    derivatives: options.derivatives === true,
    ...(digits === undefined ? {} : { digits }),
    parameters: exactValues(parameters),
  });
  const absent = answer.columns.filter((name) => !givesColumn(functional, name));
  const notes = [...gapNotes(given, { ...answer, absent }), ...admissibilityNotes(given)];
  const report: PointsReport = {
    functional: functional.definition.id,
    parameters: Object.fromEntries([...parameters].map(([name, { text }]) => [name, text])),
    inputColumns: given.columns,
    inputs: given.points,
    ...answer,
    absent,
    notes,
  };
  const look = { width: out === undefined ? terminal.width : plainWidth, colour: out === undefined && terminal.colour };
  const render = { csv: pointsCsv, json: pointsJson, text: (data: PointsReport) => pointsText(data, look) };
  const text = render[format](report);
  if (out === undefined) terminal.writeOut(text);
  else writeOutputFile(out, text);
  if (format === 'csv') for (const note of notes) terminal.writeErr(`note: ${note}\n`);
  return exitStatus.fine;
}

const allColumns: readonly string[] = [...sliceColumns, ...densityColumns];

async function givenPoints(
  options: AtOptions,
  terminal: Terminal,
  problems: Problem[],
): Promise<GivenPoints | undefined> {
  const single = sliceColumns.flatMap((name) => {
    const text = options[name];
    return text === undefined ? [] : [[name, text.trim()] as const];
  });
  if (options.points === undefined) return singlePoint(single, problems);
  if (single.length > 0) {
    problems.push(
      wrongOption(`--points and --${single[0]?.[0]} are both given`, 'Give one point or a file of points.'),
    );
    return undefined;
  }
  const fromInput = options.points === '-';
  const text = fromInput ? await terminal.readInput() : valueOr(readInputFile(options.points), undefined, problems);
  if (text === undefined) return undefined;
  return valueOr(parsePoints(text, fromInput ? 'standard input' : options.points, allColumns), undefined, problems);
}

function singlePoint(
  given: readonly (readonly [name: string, text: string])[],
  problems: Problem[],
): GivenPoints | undefined {
  if (given.length === 0) {
    problems.push(wrongOption('no point is given', 'Give --rs, --zeta, --s, --alpha, or --points with a file.'));
    return undefined;
  }
  const wrong = given.filter(([, text]) => parseDecimal(text) === undefined);
  for (const [name, text] of wrong) {
    problems.push(wrongOption(`--${name} is not a decimal number: ${text}`, 'Write a number such as 0.5 or 1e-3.'));
  }
  if (wrong.length > 0) return undefined;
  // An unpolarised density unless the point says otherwise; the answer shows it.
  const point = given.some(([name]) => name === 'zeta')
    ? given
    : [...given.slice(0, 1), ['zeta', '0'] as const, ...given.slice(1)];
  return { columns: point.map(([name]) => name), points: [Object.fromEntries(point)], lines: [] };
}

function spaceOf({ columns }: GivenPoints): PointSpace {
  return columns.some((name) => (densityColumns as readonly string[]).includes(name)) ? 'density' : 'slice';
}

/** The columns that a rung needs, by space. */
const needed: Record<PointSpace, Record<Functional['definition']['rung'], readonly string[]>> = {
  slice: { lda: ['rs', 'zeta'], gga: ['rs', 'zeta', 's'], 'meta-gga': ['rs', 'zeta', 's', 'alpha'] },
  density: {
    lda: ['n_up', 'n_dn'],
    gga: ['n_up', 'n_dn', 'sigma_uu', 'sigma_ud', 'sigma_dd'],
    'meta-gga': ['n_up', 'n_dn', 'sigma_uu', 'sigma_ud', 'sigma_dd', 'tau_up', 'tau_dn'],
  },
};

function pointProblems({ definition }: Functional, given: GivenPoints, { points }: AtOptions): Problem[] {
  const space = spaceOf(given);
  const file = points === undefined ? {} : { file: points === '-' ? 'standard input' : points };
  const foreign = given.columns.filter(
    (name) => space === 'density' && (sliceColumns as readonly string[]).includes(name),
  );
  if (foreign.length > 0) {
    const message = `the columns mix two kinds of points: ${given.columns.join(', ')}`;
    return [{ code: 'wrong-points', ...file, message, remedy: `Leave out ${foreign.join(', ')}, or the densities.` }];
  }
  const missing = needed[space][definition.rung].filter((name) => !given.columns.includes(name));
  if (missing.length > 0) {
    const message = `a ${definition.rung} needs ${missing.join(', ')}`;
    const remedy =
      points === undefined ? `Give ${missing.map((name) => `--${name}`).join(', ')} too.` : 'Add the columns.';
    return [{ code: 'wrong-points', ...file, message, remedy }];
  }
  return given.points.flatMap((point, index) => {
    const line = given.lines[index];
    return limitProblems(point, { ...file, ...(line === undefined ? {} : { line }) });
  });
}

/** Whether a column of the answer is of a part that the functional has. */
function givesColumn({ parts }: Functional, column: string): boolean {
  const whole = parts.has('exchange-correlation');
  if (/^(eps_x|Fx|dFx_.*|d_.*_x)$/.test(column)) return parts.has('exchange');
  if (/^(eps_c|Fc|d2?Fc_.*|d_.*_c)$/.test(column)) return parts.has('correlation');
  return whole || (parts.has('exchange') && parts.has('correlation'));
}

function gapNotes(given: GivenPoints, answer: Pick<PointsReport, 'columns' | 'rows' | 'absent'>): string[] {
  const gaps = answer.rows.flatMap((row, index) => (gapsIn(answer, row).length > 0 ? [index + 1] : []));
  if (gaps.length === 0) return [];
  const listed = `${gaps.slice(0, 10).join(', ')}${gaps.length > 10 ? ', …' : ''}`;
  const isBare = !given.columns.some((name) => name === 'q' || name.startsWith('lapl_'));
  // A functional of the Laplacian has no value anywhere without it.
  const missesLaplacian =
    isBare && gaps.length === answer.rows.length && answer.rows.every(([first]) => first === null);
  const hint = missesLaplacian ? '; if it depends on the Laplacian, give q (or lapl_up, lapl_dn)' : '';
  return [`${gaps.length === 1 ? 'point' : 'points'} ${listed} without a finite value in some column${hint}`];
}

function admissibilityNotes({ points }: GivenPoints): string[] {
  const outside = points.filter(isInadmissible).length;
  if (outside === 0) return [];
  return [
    `${outside} of ${points.length} points belong to no density (τ_σ below |∇n_σ|²/(8n_σ), or |∇n↑·∇n↓| above |∇n↑||∇n↓|); evaluated as given`,
  ];
}
