import { type Command, Option } from 'commander';
import { figureFormats } from './figure-file.ts';
import {
  constantsOption,
  constraintsOption,
  domainOption,
  type End,
  examples,
  list,
  setOption,
} from './program-options.ts';
import type { Terminal } from './terminal.ts';

/** The commands that draw. */
export function addFigures(program: Command, terminal: Terminal, end: End): void {
  const map = program
    .command('map')
    .summary('where a condition is violated: a picture over two coordinates')
    .description(
      'Draws the signed margin of a condition over two coordinates: the violated region hatched, a line at zero, the lowest point marked with its coordinates. A coordinate that is neither shown nor fixed is at its worst: each point has the smallest margin over it.',
    )
    .argument('<functionals and condition...>', 'sheets or ids of functionals, then the id of one condition')
    .addOption(list('--at <name=value,…>', 'fix coordinates, zeta=0,alpha=1; given again: another slice beside it'))
    .option(
      '--axes <x,y>',
      'the coordinates shown, from rs, zeta, s, alpha, q (default: those that suit the condition)',
    )
    .option('--cells <number>', 'cells along each axis (default: 121; the violated region is four times as fine)')
    .option(
      '--prove',
      'show what interval arithmetic proves on the plane: regions proved to hold, proved to violate, undecided',
    )
    .option('--boxes <budget>', 'boxes to spend on the proof of each panel (default: 100000)')
    .addHelpText(
      'after',
      examples(
        'Examples:',
        '  rungcheck map lyp correlation-coordinate-scaling --out lyp.svg',
        '  rungcheck map pbe scan lieb-oxford --width 178mm --out lieb-oxford.png',
        '  rungcheck map p86 correlation-coordinate-scaling --at zeta=0 --at zeta=1 --axes s,rs --out p86.svg',
        '  rungcheck map lyp correlation-non-positive --axes s,zeta --at rs=1 --prove --out regions.svg',
        '  rungcheck map lyp correlation-non-positive --format csv > cells.csv',
        '',
        'Data:',
        '  .csv   one cell a line: functional, coordinates (the worst ones too), margin; each line is a point for at',
        '  .json  the same with the axes, the violated region as rings, and the lowest point of each panel',
        '  With --prove .csv has one rectangle of the plane a line with its state, .json has both.',
      ),
    )
    .action(async (names, options) => {
      const { mapCommand } = await import('./map.ts');
      end(await mapCommand(names, options, terminal));
    });
  const plot = program
    .command('plot')
    .summary('enhancement factors along a coordinate, with the bounds that apply')
    .description(
      'Draws enhancement factors, their derivatives or energies per particle of several functionals or parameter values along one coordinate. Bounds are those of the catalogue that speak of the quantity at the slice drawn; the strokes are on the forbidden side.',
    )
    .argument('<sheet or id...>', 'sheet files (…/name.yaml) or ids of the catalogue (pbe)')
    .option(
      '--quantity <names>',
      'Fx, Fc, Fxc, dFx_drs, dFc_drs, d2Fc_drs2, dFxc_drs, eps_x, eps_c, eps_xc; several: a panel each',
      'Fx',
    )
    .option('--along <coordinate>', 'rs, zeta, s, alpha or q', 's')
    .addOption(
      list(
        '--at <name=value,…>',
        'the other coordinates (default: rs=1,zeta=0,s=0,alpha=1,q=0); given again: another curve',
      ),
    )
    .option('--vary <name=value,value,…>', 'a curve for each of these values of a parameter')
    .option('--no-bounds', 'draw no bounds')
    .addHelpText(
      'after',
      examples(
        'Examples:',
        '  rungcheck plot pbe pbesol revpbe --out fx.svg',
        '  rungcheck plot pbe --vary kappa=0.552,0.804,1.245 --out kappa.png',
        '  rungcheck plot scan --along s --at alpha=0 --at alpha=1 --at alpha=5 --out alpha.svg',
        '  rungcheck plot p86 pbe lyp --quantity Fc,dFc_drs --along rs --at s=2 --width 178mm --out fc.svg',
      ),
    )
    .action(async (sheets, options) => {
      const { plotCommand } = await import('./plot.ts');
      end(await plotCommand(sheets, options, terminal));
    });
  for (const command of [map, plot]) for (const option of figureOptions()) command.addOption(option);
}

/** The options that all figures have. */
const figureOptions = () => [
  domainOption(),
  constantsOption(),
  constraintsOption(),
  setOption(),
  new Option('--out <file>', 'where it goes; .svg, .png, .csv or .json says as what'),
  new Option('--format <format>', 'when the file name does not say').choices(figureFormats),
  new Option('--width <length>', 'of the figure: 86mm (one column), 178mm (two), 10in').default('86mm'),
  new Option('--text <size>', 'height of the letters, lines and marks to match; for slides larger').default('7pt'),
  new Option('--pixels <number>', 'width of a PNG (default: 400 dots to the inch)'),
  new Option('--no-caption', 'leave out the caption below the figure'),
];
