import type { Curve, CurveSet } from '../../src/finding/curves.ts';
import type { MapPanel, MarginMap } from '../../src/finding/margin-map.ts';
import type { PlaneRegions, Rectangle } from '../../src/finding/regions.ts';

const axis = (name: string, upper: number) => ({
  name,
  scale: 'linear' as const,
  values: Array.from({ length: 21 }, (_, k) => (upper * k) / 20),
});

/** A name that would end an element or an attribute if it were not escaped. */
export const hostile = '<script>alert("x")</script> & \'y\' ]]>';

export function panelOf(margin: (s: number, alpha: number) => number | null, name = 'Invented'): MapPanel {
  const margins = Array.from({ length: 441 }, (_, cell) => margin((cell % 21) * 0.25, Math.floor(cell / 21) * 0.25));
  return {
    functional: { id: 'invented', name, rung: 'meta-gga' },
    parameters: {},
    fixed: { zeta: 0 },
    worstOver: [{ name: 'rs', lower: 0.01, upper: 100, points: 49 }],
    margins,
    worstAt: { rs: margins.map(() => 100) },
    region: [
      [
        [2, 0],
        [5, 0],
        [5, 5],
        [2, 5],
        [2, 0],
      ],
    ],
    lowest: { margin: -3, point: { s: 5, alpha: 0, rs: 100 } },
    violatedCells: 252,
    points: 441 * 49,
  };
}

export function mapOf(...panels: readonly MapPanel[]): MarginMap {
  return {
    format: 'rungcheck map',
    formatVersion: 1,
    condition: {
      id: 'invented-bound',
      title: 'Invented bound',
      requirement: 'F_x ≤ 2 at ζ = 0',
      force: 'sufficient',
      status: 'theorem',
      tolerance: 1e-9,
      relative: false,
      unit: 'bohr^−1',
      constants: { 'lieb-oxford': 1.679 },
    },
    domain: 'standard',
    x: axis('s', 5),
    y: axis('alpha', 5),
    panels,
  };
}

/** Proved below s = 2 of 0 … 5, violated from `violated` on, undecided between. */
export function regionsTo(violated: number): PlaneRegions {
  const strip = (lower: number, upper: number): Rectangle[] => (lower < upper ? [[lower, upper, 0, 5]] : []);
  return {
    proved: strip(0, 2),
    undecided: strip(2, violated),
    violated: strip(violated, 5),
    shares: { proved: 0.4, undecided: (violated - 2) / 5, violated: (5 - violated) / 5 },
    boxes: 1234,
    stop: 'budget',
    rewrites: ['merge-logarithms'],
  };
}

export function curveOf(name: string, value: (s: number) => number | null): Curve {
  const { values } = axis('s', 5);
  const functional = { id: name.toLowerCase(), name, rung: 'gga' };
  return { functional, parameters: {}, fixed: { zeta: 0 }, values: values.map(value) };
}

export function curvesOf(...curves: readonly Curve[]): CurveSet {
  const bound = {
    condition: 'invented-bound',
    title: 'Invented bound',
    relation: '<=' as const,
    value: 1.804,
    force: 'sufficient',
    status: 'theorem',
  };
  return {
    format: 'rungcheck plot',
    formatVersion: 1,
    along: axis('s', 5),
    panels: [{ quantity: 'Fx', curves, bounds: [bound] }],
  };
}
