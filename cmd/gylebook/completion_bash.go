package main

import (
	"fmt"
	"strings"
)

// bashTemplate walks over the words before the cursor and finds the command and
// the place of the next value. It runs on bash 3.2, which is why it does without
// mapfile. Bash takes "=" for a word of its own.
const bashTemplate = `# bash completion for gylebook, made by: gylebook completion bash
_gylebook_open() {
  command gylebook complete-open "$@" 2>/dev/null
}

_gylebook() {
  local cur="${COMP_WORDS[COMP_CWORD]}" path='' place=0 flag='' journal='' words='' i word
  for ((i = 1; i < COMP_CWORD; i++)); do
    word="${COMP_WORDS[i]}"
    if [[ $word == '=' ]]; then continue; fi
    if [[ -n $flag ]]; then
      if [[ $flag == --journal ]]; then journal="$word"; fi
      flag=''
      continue
    fi
    case "$word" in
      {{FLAGS}}) flag="$word" ;;
      -*) ;;
      *)
        case "$path:$place:$word" in
{{PATHS}}
          *) place=$((place + 1)) ;;
        esac
        ;;
    esac
  done
  if [[ $cur == '=' ]]; then cur=''; fi
  if [[ -n $flag ]]; then
    case "$flag" in
{{FLAGVALUES}}
    esac
  elif [[ $cur == -* ]]; then
    case "$path" in
{{FLAGSOF}}
    esac
  else
    case "$path:$place" in
{{VALUES}}
    esac
  fi
  case "$words" in
    @files) COMPREPLY=($(compgen -f -- "$cur")) ;;
    @open) COMPREPLY=($(compgen -W "$(_gylebook_open ${journal:+--journal "$journal"})" -- "$cur")) ;;
    *) COMPREPLY=($(compgen -W "$words" -- "$cur")) ;;
  esac
}
complete -o filenames -F _gylebook gylebook
`

func bashScript(commands []completed) string {
	return fill(bashTemplate, cases(commands))
}

// fill puts the parts in place of their names.
func fill(template string, parts map[string]string) string {
	pairs := make([]string, 0, 2*len(parts))
	for name, text := range parts {
		pairs = append(pairs, "{{"+name+"}}", strings.TrimSuffix(text, "\n"))
	}
	return strings.NewReplacer(pairs...).Replace(template)
}

// cases are the branches of case statements, which bash and zsh share.
func cases(commands []completed) map[string]string {
	var paths, flagsOf, flagValues, values strings.Builder
	var withValue []string
	seen := map[string]bool{}
	for _, c := range commands {
		names := make([]string, len(c.flags))
		for i, f := range c.flags {
			names[i] = "--" + f.name
			if !f.takesValue || seen[f.name] {
				continue
			}
			seen[f.name] = true
			withValue = append(withValue, "--"+f.name)
			if f.values != nil {
				fmt.Fprintf(&flagValues, "      --%s) words=%s ;;\n", f.name, quoted(f.values...))
			}
		}
		fmt.Fprintf(&flagsOf, "      %s) words=%s ;;\n", quoted(c.path), quoted(names...))
		for _, below := range c.below {
			fmt.Fprintf(&paths, "          %s) path=%s ;;\n", quoted(c.path+":0:"+below.name()), quoted(below.path))
		}
		if len(c.below) > 0 {
			fmt.Fprintf(&values, "      %s) words=%s ;;\n", quoted(c.path+":0"), quoted(c.names()...))
		}
		for place, list := range c.values {
			if list != nil {
				fmt.Fprintf(&values, "      %s) words=%s ;;\n", quoted(fmt.Sprint(c.path, ":", place)), quoted(list...))
			}
		}
	}
	return map[string]string{
		"FLAGS": strings.Join(withValue, " | "), "PATHS": paths.String(), "FLAGSOF": flagsOf.String(),
		"FLAGVALUES": flagValues.String(), "VALUES": values.String(),
	}
}

// quoted joins words to one word of a shell.
func quoted(words ...string) string {
	return "'" + strings.ReplaceAll(strings.Join(words, " "), "'", `'\''`) + "'"
}
