import { Resvg } from '@resvg/resvg-js';
import { describe, expect, test } from 'vitest';
import { drawMap } from '../../src/figure/map.ts';
import { drawPlot } from '../../src/figure/plot.ts';
import { svgDocument } from '../../src/figure/svg.ts';
import { curveOf, curvesOf, hostile, mapOf, panelOf, regionsTo } from './made-up.ts';

const options = { width: 86, points: 7, caption: true };
const map = mapOf(
  panelOf((s) => 2 - s),
  panelOf((s, alpha) => (alpha < 1 ? null : s), hostile),
);
const proved = mapOf(
  { ...panelOf((s) => 2 - s), regions: regionsTo(3) },
  { ...panelOf((s, alpha) => (alpha < 1 ? null : s), hostile), regions: regionsTo(5) },
);
const curves = curvesOf(
  curveOf('First', (s) => 1 + s / 4),
  curveOf(hostile, (s) => (s < 1 ? null : 1 + s / 5)),
  curveOf('第三', (s) => 1 + s / 6),
);
const figures = [
  ['a map', () => svgDocument(drawMap(map, options))],
  ['a map of what is proved', () => svgDocument(drawMap(proved, options))],
  ['curves', () => svgDocument(drawPlot(curves, options))],
] as const;

describe.each(figures)('%s', (_, draw) => {
  const svg = draw();

  test('is XML that an SVG reader takes, of the width asked for (86 mm at 96 dots to the inch)', () => {
    expect(new Resvg(svg).width).toBeCloseTo(325, 0);
  });

  test('keeps a hostile name as text', () => {
    expect(svg).not.toContain('<script');
    expect(svg).toContain('&lt;script&gt;alert(&quot;x&quot;)&lt;/script&gt; &amp; &#39;y&#39; ]]&gt;');
  });

  test('is the same each time', () => expect(draw()).toBe(svg));

  test('has no number that is none', () => expect(svg).not.toMatch(/NaN|Infinity|undefined|null/));

  test('tells in words what it shows', () => expect(svg).toMatch(/<title>.+<\/title><desc>.+<\/desc>/));
});

test('the violated region is hatched and has a line at its inner edge: s = 2 of 0 … 5', () => {
  const svg = svgDocument(drawMap(mapOf(panelOf((s) => 2 - s)), { ...options, caption: false }));
  const [, x, width] = /<rect x="([\d.]+)" y="[\d.]+" width="([\d.]+)"/.exec(svg) ?? [];
  const edge = Math.round((Number(x) + Number(width) * 0.4) * 1000) / 1000;
  expect(svg).toMatch(
    new RegExp(`<path d="M${edge} [\\d.]+L${edge} [\\d.]+" fill="none" stroke="#1a1a1a" stroke-width="0.4"/>`),
  );
  expect(svg).toMatch(/clip-path="url\(#map-0-violated\)"/);
});

describe('a map of what is proved', () => {
  const draw = (violated: number) =>
    drawMap(mapOf({ ...panelOf((s) => 2 - s), regions: regionsTo(violated) }), options);
  const fills = { proved: '#b4d0e7', violated: '#f0a987', undecided: '#f8f0c4' };
  const count = (text: string, part: string) => text.split(part).length - 1;

  test.each([
    [3, ['proved', 'violated', 'undecided']],
    [2, ['proved', 'violated']],
    [5, ['proved', 'undecided']],
  ] as const)(
    'up to %d: fills and legend entries of the states that are there, and no others: %j',
    (violated, states) => {
      const { content } = draw(violated);
      for (const [state, colour] of Object.entries(fills)) {
        const isThere = (states as readonly string[]).includes(state);
        // Once in the panel, once in the legend; two of the states have a pattern above the colour.
        expect(count(content, `fill="${colour}"`)).toBe(isThere ? 2 : 0);
        expect(count(content, `fill="url(#map-${state})"`)).toBe(isThere && state !== 'proved' ? 2 : 0);
      }
    },
  );

  test('a rectangle stands where its bounds say: the undecided one from s = 2 to 3 of 0 … 5', () => {
    const { content } = draw(3);
    const [, x, width] = /<rect x="([\d.]+)" y="[\d.]+" width="([\d.]+)"[^>]*fill="none"/.exec(content) ?? [];
    const [, from, to] = /d="M([\d.]+) [\d.]+H([\d.]+)V[\d.]+H[\d.]+Z" fill="#f8f0c4"/.exec(content) ?? [];
    expect(Number(from)).toBeCloseTo(Number(x) + Number(width) * 0.4, 2);
    expect(Number(to)).toBeCloseTo(Number(x) + Number(width) * 0.6, 2);
  });

  test('says what it is worth: boxes, rewrites, tolerance, and what the lines are not', () => {
    const { description } = draw(3);
    for (const words of ['1 234 boxes', 'exact rewrites', '10^−9', 'budget of boxes ended', 'no proof']) {
      expect(description).toContain(words);
    }
  });
});

test('a letter without an outline stays text', () => {
  expect(svgDocument(drawPlot(curves, options))).toMatch(/<text [^>]+>第三<\/text>/);
});

test('larger letters enlarge lines and marks with them: the drawing is that of a smaller width', () => {
  const large = drawMap(map, { width: 172, points: 14, caption: true });
  const small = drawMap(map, options);
  expect(large).toEqual({ ...small, scale: 2 });
});
