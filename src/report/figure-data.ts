import type { CurveSet } from '../finding/curves.ts';
import type { MarginMap } from '../finding/margin-map.ts';
import { regionStates } from '../finding/regions.ts';
import { roundTripText } from './number-text.ts';

/** A map's data as comma-separated text: its cells, or its rectangles where it was asked what is proved. */
export function mapCsv(map: MarginMap): string {
  return map.panels.some(({ regions }) => regions !== undefined) ? regionsCsv(map) : cellsCsv(map);
}

/**
 * One rectangle a line: the functional, its bounds along the coordinates shown, the fixed coordinates, and its state:
 * proved, violated, undecided.
 */
function regionsCsv({ x, y, panels }: MarginMap): string {
  const parameters = [...new Set(panels.flatMap((panel) => Object.keys(panel.parameters)))];
  const fixed = [...new Set(panels.flatMap((panel) => Object.keys(panel.fixed)))];
  const bounds = [x, y].flatMap(({ name }) => [`${name}_lower`, `${name}_upper`]);
  const lines = panels.flatMap((panel) =>
    regionStates.flatMap((state) =>
      (panel.regions?.[state] ?? []).map((rectangle) => [
        panel.functional.id,
        ...parameters.map((name) => panel.parameters[name] ?? ''),
        ...rectangle.map((bound) => cellText(bound)),
        ...fixed.map((name) => cellText(panel.fixed[name])),
        state,
      ]),
    ),
  );
  return csv([['functional', ...parameters, ...bounds, ...fixed, 'state'], ...lines]);
}

/**
 * A map as comma-separated text, one cell a line: the functional, the coordinates (shown, fixed and worst) and the margin;
 * empty where there is no value or the margin does not depend on a coordinate.
 */
function cellsCsv({ x, y, panels }: MarginMap): string {
  const others = ['rs', 'zeta', 's', 'alpha', 'q'].filter(
    (name) =>
      name !== x.name && name !== y.name && panels.some(({ fixed, worstAt }) => name in fixed || name in worstAt),
  );
  const parameters = [...new Set(panels.flatMap((panel) => Object.keys(panel.parameters)))];
  const header = ['functional', ...parameters, x.name, y.name, ...others, 'margin'];
  const lines = panels.flatMap((panel) =>
    panel.margins.map((margin, cell) => [
      panel.functional.id,
      ...parameters.map((name) => panel.parameters[name] ?? ''),
      cellText(x.values[cell % x.values.length]),
      cellText(y.values[Math.floor(cell / x.values.length)]),
      ...others.map((name) => cellText(panel.fixed[name] ?? panel.worstAt[name]?.[cell])),
      cellText(margin),
    ]),
  );
  return csv([header, ...lines]);
}

/** Curves as comma-separated text, one point a line. */
export function curvesCsv({ along, panels }: CurveSet): string {
  const curves = panels.flatMap((panel) => panel.curves);
  const parameters = [...new Set(curves.flatMap((curve) => Object.keys(curve.parameters)))];
  const fixed = [...new Set(curves.flatMap((curve) => Object.keys(curve.fixed)))];
  const header = ['functional', ...parameters, ...fixed, along.name, ...panels.map(({ quantity }) => quantity)];
  const [first] = panels;
  const lines = (first?.curves ?? []).flatMap((curve, index) =>
    along.values.map((value, point) => [
      curve.functional.id,
      ...parameters.map((name) => curve.parameters[name] ?? ''),
      ...fixed.map((name) => cellText(curve.fixed[name])),
      cellText(value),
      ...panels.map((panel) => cellText(panel.curves[index]?.values[point])),
    ]),
  );
  return csv([header, ...lines]);
}

function cellText(value: number | null | undefined): string {
  return value === null || value === undefined || Number.isNaN(value) ? '' : roundTripText(value);
}

function csv(rows: readonly (readonly string[])[]): string {
  return rows.map((cells) => `${cells.map(quoted).join(',')}\n`).join('');
}

function quoted(cell: string): string {
  return /[",\n\r]/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell;
}
