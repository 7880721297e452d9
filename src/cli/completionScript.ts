import type { CompletedCommand, Shell } from './completionFacts.ts';

/** The script by which a shell completes command lines of `rimwright`. */
export function completionScript(shell: Shell, commands: readonly CompletedCommand[]): string {
  return WRITERS[shell](commands);
}

const WRITERS: Record<Shell, (commands: readonly CompletedCommand[]) => string> = {
  bash(commands) {
    const cases = commands.map(({ name, options, names }) => {
      const valued = options.filter(({ takesValue }) => takesValue).map(({ long }) => long);
      return `    ${name})
      options="${options.map(({ long }) => long).join(' ')}"
      valued=" ${valued.join(' ')} "
      names="${names.join(' ')}" ;;`;
    });
    return `# Completes rimwright in bash: eval "$(rimwright completion bash)"
_rimwright() {
  local word="\${COMP_WORDS[COMP_CWORD]}" before="\${COMP_WORDS[COMP_CWORD - 1]}" reply
  local options="" valued="" names="" files="files"
  case "\${COMP_WORDS[1]}" in
${cases.join('\n')}
  esac
  if [ "$COMP_CWORD" -eq 1 ]; then
    names="${commands.map(({ name }) => name).join(' ')} --help --version"
    files=""
  elif [[ "$valued" == *" $before "* ]]; then
    names=""
  elif [[ "$word" == -* ]]; then
    names="$options"
    files=""
  fi
  COMPREPLY=()
  while IFS= read -r reply; do
    COMPREPLY+=("$reply")
  done < <(compgen -W "$names" -- "$word"; [ -z "$files" ] || compgen -f -- "$word")
}
complete -o filenames -F _rimwright rimwright
`;
  },

  zsh(commands) {
    const described = (name: string, about: string) => `      ${quoted(`${name}:${about}`)}`;
    const cases = commands.map(
      ({ name, options, names }) => `    ${name})
      options=(
${options.map(({ long, about }) => `  ${described(long, about)}`).join('\n')}
      )
      names=(${names.join(' ')}) ;;`,
    );
    return `#compdef rimwright
# Completes rimwright in zsh: eval "$(rimwright completion zsh)"
_rimwright() {
  local -a commands options names
  if (( CURRENT == 2 )); then
    commands=(
${commands.map(({ name, summary }) => described(name, summary)).join('\n')}
    )
    _describe command commands
    return
  fi
  case "$words[2]" in
${cases.join('\n')}
  esac
  if [[ "$PREFIX" == -* ]]; then
    _describe -o option options
  else
    compadd -a names
    _files
  fi
}
compdef _rimwright rimwright
`;
  },

  fish(commands) {
    const lines = commands.flatMap(({ name, summary, options, names }) => {
      const within = `complete -c rimwright -n '__fish_seen_subcommand_from ${name}'`;
      return [
        `complete -c rimwright -f -n __fish_use_subcommand -a ${name} -d ${quotedInFish(summary)}`,
        ...options.map(({ long, about, takesValue }) => {
          const value = takesValue ? ' -r' : '';
          return `${within} -l ${long.slice(2)}${value} -d ${quotedInFish(about)}`;
        }),
        ...(names.length === 0 ? [] : [`${within} -a '${names.join(' ')}'`]),
      ];
    });
    return `# Completes rimwright in fish: rimwright completion fish | source
${lines.join('\n')}
`;
  },
};

/** A text as one word of a POSIX shell. */
function quoted(text: string): string {
  return `'${text.replaceAll("'", "'\\''")}'`;
}

function quotedInFish(text: string): string {
  return `'${text.replaceAll('\\', '\\\\').replaceAll("'", "\\'")}'`;
}
