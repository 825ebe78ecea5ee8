import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { dirname, join } from 'node:path';
import { differenceCiede2000, differenceEuclidean, filterDeficiencyDeuter, filterDeficiencyProt, parse } from 'culori';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { divergingColour } from '../../src/figure/colour.ts';
import { innerLines, regionsAbove } from '../../src/figure/contour.ts';
import { placeLabels } from '../../src/figure/labels.ts';
import { breakLines } from '../../src/figure/paragraph.ts';
import { coordinateScale } from '../../src/figure/scale.ts';
import { escapeXml } from '../../src/figure/svg.ts';
import { lineWidth } from '../../src/figure/typeface.ts';
import { formula, plainText, words } from '../../src/figure/typeset.ts';
import { readFaces } from './glyphs/read.ts';

describe('contours', () => {
  const count = 101;
  const at = (k: number) => -2 + (4 * k) / (count - 1);
  const field = (f: (x: number, y: number) => number) => ({
    values: Array.from({ length: count * count }, (_, k) => f(at(k % count), at(Math.floor(k / count)))),
    width: count,
    height: count,
  });

  test('of 1 − x² − y² at zero lie on the unit circle', () => {
    const [region] = regionsAbove(
      field((x, y) => 1 - x * x - y * y),
      [0],
    );
    const places = region?.rings.flat() ?? [];
    expect(places.length).toBeGreaterThan(100);
    for (const [u, v] of places) expect(Math.hypot(4 * u - 2, 2 - 4 * v)).toBeCloseTo(1, 3);
  });

  test('of x at zero are the line in the middle, without the edge of the box', () => {
    const lines = regionsAbove(
      field((x) => x),
      [0],
    ).flatMap(innerLines);
    expect(lines).toHaveLength(1);
    for (const [u] of lines.flat()) expect(u).toBeCloseTo(0.5, 12);
  });
});

describe('the diverging scale of colour', () => {
  const colour = (part: number) => parse(divergingColour(part)) as NonNullable<ReturnType<typeof parse>>;
  const parts = Array.from({ length: 21 }, (_, k) => -1 + k / 10);

  test('has even steps in Oklab on either side (distances between neighbours; round-off of 8-bit colour allowed)', () => {
    const distance = differenceEuclidean('oklab');
    const steps = parts.slice(1).map((part, k) => distance(colour(part), colour(parts[k] as number)));
    for (const [k, step] of steps.entries()) expect(step / (steps[k < 10 ? 0 : 19] as number)).toBeCloseTo(1, 0.8);
  });

  test('tells the sides apart for readers with protanopia and deuteranopia (CIEDE2000 above 10 from a quarter of the range)', () => {
    for (const deficiency of [filterDeficiencyProt(1), filterDeficiencyDeuter(1)]) {
      for (const size of [0.25, 0.5, 1]) {
        expect(differenceCiede2000()(deficiency(colour(-size)), deficiency(colour(size)))).toBeGreaterThan(10);
      }
    }
  });
});

describe('labels at the ends of curves', () => {
  test('keep their distance, their order and the limits, and stay where they want when they can (property)', () => {
    const heights = fc.array(fc.double({ min: 0, max: 100, noNaN: true }), { minLength: 1, maxLength: 12 });
    fc.assert(
      fc.property(heights, (wanted) => {
        const placed = placeLabels(wanted, 5, 0, 100);
        const order = [...wanted.keys()].sort((a, b) => (wanted[a] as number) - (wanted[b] as number));
        const sorted = order.map((index) => placed[index] as number);
        for (const [k, height] of sorted.entries()) {
          expect(height).toBeGreaterThanOrEqual(-1e-9);
          expect(height).toBeLessThanOrEqual(100 + 1e-9);
          if (k > 0) expect(height - (sorted[k - 1] as number)).toBeGreaterThanOrEqual(5 - 1e-9);
        }
      }),
      { seed: 11, numRuns: 300 },
    );
    expect(placeLabels([10, 30, 31], 5, 0, 100)).toEqual([10, 28, 33]);
  });
});

describe('axes', () => {
  const labels = (scale: 'logarithmic' | 'linear' | 'compact', values: number[], length = 60) =>
    coordinateScale({ name: 'x', scale, values }, { length, size: 2.5, direction: 'across' }).ticks.flatMap(
      ({ label }) => (label.length === 0 ? [] : [plainText(label)]),
    );

  test('logarithmic ones have powers of ten', () =>
    expect(labels('logarithmic', [0.001, 1000])).toEqual(['10^−3', '0.01', '0.1', '1', '10', '100', '1000']));
  test('linear ones round numbers', () =>
    expect(labels('linear', [-1, 1])).toEqual(['−1.0', '−0.5', '0', '0.5', '1.0']));
  test('compact ones run to infinity', () =>
    expect(labels('compact', [0, Number.POSITIVE_INFINITY])).toEqual(['0', '0.3', '1', '2', '3', '5', '10', '∞']));
});

describe('typesetting', () => {
  test('variables are italic, words and digits upright, indices lowered, powers raised', () => {
    expect(formula('r_s ∂F_xc/∂r_s ≤ 2^(1/3) at ζ')).toEqual([
      { text: 'r', face: 'italic' },
      { text: 's', face: 'italic', script: 'sub' },
      { text: ' ∂', face: 'regular' },
      { text: 'F', face: 'italic' },
      { text: 'xc', face: 'regular', script: 'sub' },
      { text: '/∂', face: 'regular' },
      { text: 'r', face: 'italic' },
      { text: 's', face: 'italic', script: 'sub' },
      { text: ' ≤ 2', face: 'regular' },
      { text: '1/3', face: 'regular', script: 'super' },
      { text: ' at ', face: 'regular' },
      { text: 'ζ', face: 'italic' },
    ]);
  });

  test('lines are no wider than asked, and nothing is lost (law)', () => {
    const text = 'Correlation energy under uniform coordinate scaling for every functional of the catalogue';
    const lines = breakLines(words(text), 40, 2.5);
    expect(lines.length).toBeGreaterThan(1);
    for (const line of lines) expect(lineWidth(line, 2.5)).toBeLessThanOrEqual(40);
    expect(lines.map(plainText).join(' ')).toBe(text);
  });

  test('characters that XML forbids are dropped', () => expect(escapeXml('a\u0000b\u001b\ud800c\ufffe')).toBe('abc'));
});

test('the outlines are those of the font files', () => {
  const folder = dirname(createRequire(import.meta.url).resolve('@expo-google-fonts/source-sans-3/package.json'));
  const written: unknown = JSON.parse(readFileSync('src/figure/glyphs.json', 'utf8'));
  expect(readFaces((path) => readFileSync(join(folder, path)))).toEqual(written);
});
