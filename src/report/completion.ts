export const shells = ['bash', 'zsh', 'fish'] as const;

/** An option that is completed; `value` says what may follow it. */
export interface Completed {
  readonly name: string;
  readonly summary: string;
  readonly value: 'none' | 'words' | 'file';
  readonly words: readonly string[];
}

export interface CompletedCommand {
  readonly name: string;
  readonly summary: string;
  /** What the arguments may be. */
  readonly words: readonly string[];
  /** Whether an argument may be a file as well. */
  readonly files: boolean;
  readonly options: readonly Completed[];
}

/** A completion script. Names and choices of the program are plain words, so that they need no quoting. */
export function completionScript(shell: (typeof shells)[number], commands: readonly CompletedCommand[]): string {
  return { bash: bashScript, zsh: zshScript, fish: fishScript }[shell](commands);
}

function bashScript(commands: readonly CompletedCommand[]): string {
  const cases = commands.map(({ name, words, files, options }) => {
    const values = options
      .filter(({ value }) => value !== 'none')
      .map(({ name: option, value, words: known }) =>
        value === 'words'
          ? `        ${option}) COMPREPLY=($(compgen -W '${known.join(' ')}' -- "$word")); return ;;`
          : `        ${option}) COMPREPLY=($(compgen -f -- "$word")); return ;;`,
      );
    const all = [...options.map((option) => option.name), '--help', ...words];
    const byFile = files ? ' $(compgen -f -- "$word")' : '';
    return [
      `    ${name})`,
      '      case "$before" in',
      ...values,
      '      esac',
      `      COMPREPLY=($(compgen -W '${all.join(' ')}' -- "$word")${byFile})`,
      '      ;;',
    ].join('\n');
  });
  return `# Completion of rungcheck for bash: source <(rungcheck completion bash)
_rungcheck() {
  local word="\${COMP_WORDS[COMP_CWORD]}" before="\${COMP_WORDS[COMP_CWORD-1]}"
  if [ "$COMP_CWORD" -eq 1 ]; then
    COMPREPLY=($(compgen -W '${commands.map(({ name }) => name).join(' ')} help --help --version' -- "$word"))
    return
  fi
  case "\${COMP_WORDS[1]}" in
${cases.join('\n')}
  esac
}
complete -o filenames -F _rungcheck rungcheck
`;
}

function zshScript(commands: readonly CompletedCommand[]): string {
  const quoted = (text: string) => `'${text.replaceAll("'", "'\\''")}'`;
  const plain = (text: string) => text.replace(/[[\]:\\]/g, ' ');
  const cases = commands.map(({ name, words, files, options }) => {
    const specs = options.map(({ name: option, summary, value, words: known }) => {
      const after = value === 'none' ? '' : value === 'words' ? `:value:(${known.join(' ')})` : ':value:_files';
      return `        ${quoted(`*${option}[${plain(summary)}]${after}`)}`;
    });
    const known = words.length === 0 ? '' : `(${words.join(' ')})`;
    const action = files
      ? known === ''
        ? '_files'
        : `_alternative "ids:id:${known}" "files:file:_files"`
      : known || '_default';
    return [
      `    ${name})`,
      '      _arguments \\',
      ...specs.map((spec) => `${spec} \\`),
      `        ${quoted(`*:argument:${action.startsWith('_alternative') ? `{${action}}` : action}`)}`,
      '      ;;',
    ].join('\n');
  });
  return `#compdef rungcheck
# Completion of rungcheck for zsh: save as _rungcheck in a folder of fpath.
_rungcheck() {
  local -a commands
  commands=(
${commands.map(({ name, summary }) => `    ${quoted(`${name}:${plain(summary)}`)}`).join('\n')}
  )
  if (( CURRENT == 2 )); then
    _describe command commands
    return
  fi
  local command="\${words[2]}"
  shift words
  (( CURRENT-- ))
  case "$command" in
${cases.join('\n')}
  esac
}
_rungcheck "$@"
`;
}

function fishScript(commands: readonly CompletedCommand[]): string {
  const quoted = (text: string) => `'${text.replaceAll('\\', '\\\\').replaceAll("'", "\\'")}'`;
  const lines = commands.flatMap(({ name, summary, words, files, options }) => {
    const inside = `complete -c rungcheck -n '__fish_seen_subcommand_from ${name}'`;
    return [
      `complete -c rungcheck -n __fish_use_subcommand -f -a ${name} -d ${quoted(summary)}`,
      ...(words.length === 0 && files ? [] : [`${inside} ${files ? '' : '-f '}-a ${quoted(words.join(' '))}`]),
      ...options.map(({ name: option, summary: told, value, words: known }) => {
        const after = value === 'none' ? '' : value === 'words' ? ` -x -a ${quoted(known.join(' '))}` : ' -r';
        return `${inside} -l ${option.replace(/^--/, '')}${after} -d ${quoted(told)}`;
      }),
    ];
  });
  return `# Completion of rungcheck for fish.\n${lines.join('\n')}\n`;
}
