import { extname } from 'node:path';
import { failure, type Outcome, type Problem, success } from '../errors/problem.ts';
import type { FigureOptions } from '../figure/options.ts';
import { type Drawing, svgDocument } from '../figure/svg.ts';
import { outputProblems, writeOutputFile } from './output-file.ts';
import { wrongOption } from './problems.ts';
import type { Terminal } from './terminal.ts';

export const figureFormats = ['svg', 'png', 'csv', 'json'] as const;
type FigureFormat = (typeof figureFormats)[number];

export interface FigureFlags {
  readonly out?: string;
  readonly format?: FigureFormat;
  readonly width: string;
  readonly text: string;
  readonly pixels?: string;
  readonly caption: boolean;
}

export interface FigureTarget extends FigureOptions {
  readonly out?: string;
  readonly format: FigureFormat;
  /** Of a PNG. */
  readonly pixels: number;
}

/** Dots to the inch of a PNG whose width in pixels is not given. */
const printResolution = 400;

/** Where a figure goes and how large it is; all that is wrong with the options at once. */
export function figureTarget(flags: FigureFlags): Outcome<FigureTarget> {
  const problems: Problem[] = [];
  const { out } = flags;
  if (out !== undefined) problems.push(...outputProblems(out));
  const format = flags.format ?? formatOf(out);
  if (format === undefined) {
    const message = out === undefined ? 'it is not said where the figure goes' : `no format is known for ${out}`;
    problems.push(wrongOption(message, 'Give --out name.svg, .png, .csv or .json; or --format svg, csv or json.'));
  }
  if (format === 'png' && out === undefined) problems.push(wrongOption('a PNG needs a file', 'Give --out name.png.'));
  const width = measured('--width', flags.width, { mm: 1, cm: 10, in: 25.4 }, [40, 600], 'mm', problems);
  const points = measured('--text', flags.text, { pt: 1 }, [4, 40], 'pt', problems);
  const pixels = flags.pixels === undefined ? Math.round((width / 25.4) * printResolution) : Number(flags.pixels);
  if (!(Number.isInteger(pixels) && pixels >= 100 && pixels <= 12_000)) {
    problems.push(
      wrongOption(`--pixels does not understand ${flags.pixels}`, 'Give a whole number from 100 to 12000.'),
    );
  }
  if (problems.length > 0 || format === undefined) return failure(problems);
  return success({ ...(out === undefined ? {} : { out }), format, width, points, pixels, caption: flags.caption });
}

function formatOf(out: string | undefined): FigureFormat | undefined {
  const ending = out === undefined ? '' : extname(out).slice(1).toLowerCase();
  return figureFormats.find((format) => format === ending);
}

function measured(
  option: string,
  text: string,
  units: Readonly<Record<string, number>>,
  [least, most]: readonly [number, number],
  unit: string,
  problems: Problem[],
): number {
  const match = /^(\d+(?:\.\d+)?)\s*([a-z]*)$/.exec(text.trim());
  const factor = units[match?.[2] === '' ? unit : (match?.[2] ?? '')];
  const value = Number(match?.[1]) * (factor ?? Number.NaN);
  if (value >= least && value <= most) return value;
  problems.push(
    wrongOption(`${option} does not understand ${text}`, `Give a length from ${least} to ${most} ${unit}.`),
  );
  return least;
}

/** Writes the figure, or its data, in the format of the target. */
export async function writeFigure(
  target: FigureTarget,
  figure: { readonly draw: () => Drawing; readonly csv: () => string; readonly json: () => string },
  terminal: Terminal,
): Promise<void> {
  const { format, out } = target;
  if (format === 'png') return writeOutputFile(out as string, await pngOf(svgDocument(figure.draw()), target.pixels));
  const text = format === 'svg' ? svgDocument(figure.draw()) : figure[format]();
  if (out === undefined) terminal.writeOut(text);
  else writeOutputFile(out, text);
}

async function pngOf(svg: string, pixels: number): Promise<Uint8Array> {
  const { Resvg } = await import('@resvg/resvg-js');
  // Letters are outlines; only names in scripts beyond Latin and Greek ask for a font of the system.
  const font = { loadSystemFonts: svg.includes('<text') };
  return new Resvg(svg, { fitTo: { mode: 'width', value: pixels }, font }).render().asPng();
}
