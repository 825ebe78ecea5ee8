import { constantValues } from '../constraint/constants.ts';
import { domainCoordinates } from '../constraint/domain.ts';
import { type Problem, ProblemError } from '../errors/problem.ts';
import { drawPlot } from '../figure/plot.ts';
import { drawnCurves, type QuantityName, quantityNames } from '../map/curves.ts';
import type { MappedFunctional } from '../map/request.ts';
import { curvesCsv } from '../report/figure-data.ts';
import { jsonText } from '../report/json.ts';
import { conditionIds, loadConditions, parameterProblems } from './engine.ts';
import { writeFigure } from './figure-file.ts';
import { type FigureCommandOptions, readFigureRequest } from './figure-request.ts';
import { parseExact, splitList } from './options.ts';
import { settle, valueOr, wrongOption } from './problems.ts';
import { isCoordinate } from './slice-option.ts';
import { exitStatus } from './status.ts';
import type { Terminal } from './terminal.ts';

export interface PlotOptions extends FigureCommandOptions {
  readonly quantity: string;
  readonly along: string;
  readonly vary?: string;
  readonly bounds: boolean;
}

const curvePoints = 401;

/** `rungcheck plot`: enhancement factors and their like along a coordinate, as a picture or as data. */
export async function plotCommand(
  sheets: readonly string[],
  options: PlotOptions,
  terminal: Terminal,
): Promise<number> {
  const problems: Problem[] = [];
  const request = readFigureRequest(sheets, options, problems);
  const { shelf, target, domain, functionals, parameters } = request;
  const quantities = splitList([options.quantity]).filter((name, index, all) => all.indexOf(name) === index);
  for (const name of quantities) {
    if (!(quantityNames as readonly string[]).includes(name)) {
      problems.push(wrongOption(`--quantity does not know ${name}`, `There are ${quantityNames.join(', ')}.`));
    }
  }
  const { along } = options;
  if (!isCoordinate(along)) {
    problems.push(
      wrongOption(`--along does not know ${along}`, `The coordinates are ${domainCoordinates.join(', ')}.`),
    );
  }
  const varied = options.vary === undefined ? [] : readVaried(options.vary, problems);
  const names = new Set(varied.map(({ name }) => name));
  problems.push(
    ...parameterProblems(functionals, names).map((problem) => ({
      ...problem,
      message: problem.message.replace('--set', '--vary'),
    })),
  );
  const conditions = options.bounds ? valueOr(loadConditions(shelf, conditionIds(shelf)), [], problems) : [];
  if (target === undefined || domain === undefined || !isCoordinate(along) || problems.length > 0) {
    throw new ProblemError(problems);
  }
  const drawn = functionals.flatMap((functional): MappedFunctional[] =>
    varied.length === 0
      ? [{ functional, parameters }]
      : varied.map(({ name, value }) => ({ functional, parameters: new Map([...parameters, [name, value]]) })),
  );
  const curves = settle(
    drawnCurves({
      functionals: drawn,
      quantities: quantities as QuantityName[],
      along,
      domain,
      slices: request.slices,
      conditions,
      constants: constantValues(request.constants),
      points: curvePoints,
    }),
  );
  const figure = { draw: () => drawPlot(curves, target), csv: () => curvesCsv(curves), json: () => jsonText(curves) };
  await writeFigure(target, figure, terminal);
  return exitStatus.fine;
}

/** `kappa=0.804,1.0`: one parameter and its values. */
function readVaried(text: string, problems: Problem[]) {
  const [, name = '', list = ''] = /^\s*([^=\s]+)\s*=\s*(.+)$/.exec(text) ?? [];
  const items = splitList([list]).map((item) => ({ item, name, value: parseExact(item) }));
  const faulty = items.find(({ value }) => value === undefined);
  if (items.length === 0 || faulty !== undefined) {
    problems.push(
      wrongOption(
        `--vary does not understand ${faulty?.item ?? text}`,
        'Write a parameter and its values, as in --vary kappa=0.804,1.0.',
      ),
    );
  }
  return items.flatMap(({ value }) => (value === undefined ? [] : [{ name, value }]));
}
