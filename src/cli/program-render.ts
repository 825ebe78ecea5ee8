import { type Command, Option } from 'commander';
import type { VetFormat } from './formats.ts';
import { type End, examples, outOption } from './program-options.ts';
import type { Terminal } from './terminal.ts';

const formats: readonly VetFormat[] = [
  'table',
  'markdown',
  'latex',
  'json',
  'jsonl',
  'junit',
  'sarif',
  'github',
  'azure',
  'gitlab',
];

/** Findings that were saved before. */
export function addRender(program: Command, terminal: Terminal, end: End): void {
  program
    .command('render')
    .summary('saved findings in another format, without computing them again')
    .description('Writes the findings of an earlier vet in any of the formats of vet; ends with its exit status.')
    .argument('<findings.json>', 'a file of vet --format json, - for standard input')
    .addOption(
      new Option(
        '--format <format>',
        'the format, when the name of --out does not say (.txt, .json, .md, .tex)',
      ).choices(formats),
    )
    .option('--exit-zero', 'end with status 0 even when a condition fails')
    .addOption(outOption())
    .addHelpText('after', examples('Example:', '  rungcheck render findings.json --out table-s1.tex'))
    .action(async (path, options) => {
      const { renderCommand } = await import('./render.ts');
      end(await renderCommand(path, options, terminal));
    });
}
