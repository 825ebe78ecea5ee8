import { Argument, type Command } from 'commander';
import { shells } from '../report/completion.ts';
import { type End, examples } from './program-options.ts';
import { exitStatus } from './status.ts';
import type { Terminal } from './terminal.ts';

/** The command that prints completion scripts; they know every command, option and choice of the program. */
export function addCompletion(program: Command, terminal: Terminal, end: End): void {
  program
    .command('completion')
    .summary('a script that completes commands, options and ids in your shell')
    .description('Prints a completion script for bash, zsh or fish. It knows the ids of the catalogue.')
    .addArgument(new Argument('<shell>', 'the shell').choices(shells))
    .addHelpText(
      'after',
      examples(
        'Examples:',
        '  source <(rungcheck completion bash)                  # in ~/.bashrc',
        '  rungcheck completion zsh > ~/.zfunc/_rungcheck       # a folder of fpath',
        '  rungcheck completion fish > ~/.config/fish/completions/rungcheck.fish',
      ),
    )
    .action(async (shell: (typeof shells)[number]) => {
      const { completionCommand } = await import('./completion.ts');
      completionCommand(program, shell, terminal);
      end(exitStatus.fine);
    });
}
