import { constantValues } from '../constraint/constants.ts';
import { type Problem, ProblemError } from '../errors/problem.ts';
import { drawMap } from '../figure/map.ts';
import { mapMargins } from '../map/margin-map.ts';
import { mapCsv } from '../report/figure-data.ts';
import { jsonText } from '../report/json.ts';
import { loadConditions } from './engine.ts';
import { writeFigure } from './figure-file.ts';
import { type FigureCommandOptions, readFigureRequest } from './figure-request.ts';
import { settle, valueOr, wrongOption } from './problems.ts';
import { progressLine } from './progress.ts';
import { parseAxes } from './slice-option.ts';
import { exitStatus } from './status.ts';
import type { Terminal } from './terminal.ts';

export interface MapOptions extends FigureCommandOptions {
  readonly axes?: string;
  readonly cells?: string;
}

/** Cells along each axis: steps of half a millimetre in a single column; the boundary is four times as fine. */
const defaultCells = 121;

/** `rungcheck map`: where a condition is violated, as a picture or as data. The last word names the condition. */
export async function mapCommand(names: readonly string[], options: MapOptions, terminal: Terminal): Promise<number> {
  const problems: Problem[] = [];
  const request = readFigureRequest(names.slice(0, -1), options, problems);
  const { target, domain } = request;
  const axes = valueOr(options.axes === undefined ? { ok: true, value: {} } : parseAxes(options.axes), {}, problems);
  const cells = options.cells === undefined ? defaultCells : Number(options.cells);
  if (!(Number.isInteger(cells) && cells >= 11 && cells <= 1001)) {
    problems.push(wrongOption(`--cells does not understand ${options.cells}`, 'Give a whole number from 11 to 1001.'));
  }
  if (names.length < 2) {
    problems.push(
      wrongOption(
        'a map needs a functional and a condition',
        'Write them in this order: rungcheck map lyp correlation-non-positive.',
      ),
    );
  }
  const [condition] = names.length < 2 ? [] : valueOr(loadConditions(request.shelf, names.slice(-1)), [], problems);
  if (condition === undefined || target === undefined || domain === undefined || problems.length > 0) {
    throw new ProblemError(problems);
  }
  const progress = progressLine(terminal, Date.now);
  const map = settle(
    mapMargins(
      {
        functionals: request.functionals.map((functional) => ({ functional, parameters: request.parameters })),
        condition,
        domain,
        constants: constantValues(request.constants),
        ...axes,
        slices: request.slices,
        cells,
      },
      (points) => progress.report(condition.definition.id, points),
    ),
  );
  progress.end();
  const figure = { draw: () => drawMap(map, target), csv: () => mapCsv(map), json: () => jsonText(map) };
  await writeFigure(target, figure, terminal);
  return exitStatus.fine;
}
