import type { Argument, Command, Option } from 'commander';
import { type Completed, type CompletedCommand, completionScript, type shells } from '../report/completion.ts';
import { idsIn } from '../shelf/sheet-files.ts';
import { catalogueFolders } from './catalogue.ts';
import { settle } from './problems.ts';
import type { Terminal } from './terminal.ts';

/** `rungcheck completion`: the script for a shell, from the definition of the program itself. */
export function completionCommand(program: Command, shell: (typeof shells)[number], terminal: Terminal): void {
  const folders = settle(catalogueFolders([]));
  const functionals = idsIn(folders.functionals);
  const constraints = idsIn(folders.constraints);
  const commands = program.commands.map(
    (command): CompletedCommand => ({
      name: command.name(),
      summary: command.summary(),
      words: command.registeredArguments.flatMap((argument) => wordsOf(argument, functionals, constraints)),
      files: command.registeredArguments.some((argument) => /sheet|json/.test(argument.name())),
      options: command.options.map((option) => completedOption(option, constraints)),
    }),
  );
  terminal.writeOut(completionScript(shell, commands));
}

function wordsOf(
  argument: Argument,
  functionals: readonly string[],
  constraints: readonly string[],
): readonly string[] {
  if (argument.argChoices !== undefined) return argument.argChoices;
  const name = argument.name();
  return [...(/sheet|functional/.test(name) ? functionals : []), ...(/condition/.test(name) ? constraints : [])];
}

function completedOption(option: Option, constraints: readonly string[]): Completed {
  const value = option.required || option.optional;
  return {
    name: option.long ?? option.flags,
    summary: option.description,
    value: !value ? 'none' : option.argChoices !== undefined || option.long === '--only' ? 'words' : 'file',
    words: option.argChoices ?? (option.long === '--only' ? constraints : []),
  };
}
