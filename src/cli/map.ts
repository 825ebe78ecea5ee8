import { constantValues } from '../constraint/constants.ts';
import type { DomainCoordinate } from '../constraint/domain.ts';
import { type Problem, ProblemError } from '../errors/problem.ts';
import { drawMap } from '../figure/map.ts';
import type { MapPanel, MarginMap } from '../finding/margin-map.ts';
import type { RegionTree } from '../finding/regions.ts';
import { drawnAxis } from '../map/axes.ts';
import { mapMargins } from '../map/margin-map.ts';
import { regionsOnPlane, worstPlaces } from '../map/regions.ts';
import type { MapRequest } from '../map/request.ts';
import { conditionAt, decideRegions } from '../proof/regions.ts';
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
import { proofBudget } from './vet-request.ts';

export interface MapOptions extends FigureCommandOptions {
  readonly axes?: string;
  readonly cells?: string;
  readonly prove?: boolean;
  /** Boxes for the proof of each panel. */
  readonly boxes?: string;
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
  const budget = valueOr(proofBudget(options), undefined, problems);
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
  const asked: MapRequest = {
    functionals: request.functionals.map((functional) => ({ functional, parameters: request.parameters })),
    condition,
    domain,
    constants: constantValues(request.constants),
    ...axes,
    slices: request.slices,
    cells,
  };
  const drawn = settle(mapMargins(asked, (points) => progress.report(condition.definition.id, points)));
  progress.end();
  const map = budget === undefined ? drawn : await withRegions(drawn, asked, budget, terminal);
  const figure = { draw: () => drawMap(map, target), csv: () => mapCsv(map), json: () => jsonText(map) };
  await writeFigure(target, figure, terminal);
  return exitStatus.fine;
}

type DrawnAxis = ReturnType<typeof drawnAxis>;

/** The map with what boxes prove on the plane of each panel. */
async function withRegions(map: MarginMap, asked: MapRequest, budget: number, terminal: Terminal): Promise<MarginMap> {
  const { condition, domain, constants, slices } = asked;
  const [x, y] = [map.x, map.y].map(({ name }) => drawnAxis(domain, name as DomainCoordinate)) as [
    DrawnAxis,
    DrawnAxis,
  ];
  const progress = progressLine(terminal, Date.now, 'boxes');
  const options = { budget, onBoxes: (boxes: number) => progress.report(condition.definition.id, boxes) };
  const planes = asked.functionals.flatMap((mapped) => slices.map((slice) => ({ ...mapped, slice })));
  const panels: MapPanel[] = [];
  for (const [index, { functional, parameters, slice }] of planes.entries()) {
    const panel = map.panels[index] as MapPanel;
    const decide = async (held: ReadonlyMap<DomainCoordinate, number>, share: number) => {
      const asked = conditionAt(condition, new Map([...slice, ...held]));
      const own = { ...options, budget: Math.ceil(budget * share) };
      const tree = await decideRegions(asked, functional, { domain, constants, parameters }, own);
      if (typeof tree !== 'string') return tree;
      const message = `${condition.definition.id} is not provable by boxes: ${tree}`;
      throw new ProblemError([wrongOption(message, 'Leave --prove out, or choose another condition.')]);
    };
    const worst = worstPlaces(panel, condition.definition.tolerance);
    const tree = await decide(new Map(), worst.length === 0 ? 1 : 0.5);
    const examples: RegionTree[] = [];
    for (const place of worst) examples.push(await decide(place, 0.5 / worst.length));
    panels.push({ ...panel, regions: regionsOnPlane(tree, x, y, new Map(), examples) });
  }
  progress.end();
  return { ...map, panels };
}
