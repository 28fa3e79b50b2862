package main

import "strings"

// zshNames are the names that differ from the bash script's.
var zshNames = strings.NewReplacer(") words=", ") list=", ") path=", ") path_=")

// zshTemplate is the bash script in zsh's words: "=" does not part words, and
// text is not taken apart without ${=…}.
const zshTemplate = `#compdef gylebook
# zsh completion for gylebook, made by: gylebook completion zsh
_gylebook_open() {
  command gylebook complete-open "$@" 2>/dev/null
}

_gylebook() {
  local cur="${words[CURRENT]}" path_='' flag='' journal='' list='' word
  local -i place=0 i
  for ((i = 2; i < CURRENT; i++)); do
    word="${words[i]}"
    if [[ -n $flag ]]; then
      if [[ $flag == --journal ]]; then journal="$word"; fi
      flag=''
      continue
    fi
    case "$word" in
      --journal=*) journal="${word#*=}" ;;
      {{FLAGS}}) flag="$word" ;;
      -*) ;;
      *)
        case "$path_:$place:$word" in
{{PATHS}}
          *) place=$((place + 1)) ;;
        esac
        ;;
    esac
  done
  if [[ -z $flag && $cur == --*=* ]]; then
    flag="${cur%%=*}"
    compset -P '*='
  fi
  if [[ -n $flag ]]; then
    case "$flag" in
{{FLAGVALUES}}
    esac
  elif [[ $cur == -* ]]; then
    case "$path_" in
{{FLAGSOF}}
    esac
  else
    case "$path_:$place" in
{{VALUES}}
    esac
  fi
  case "$list" in
    @files) _files ;;
    @open) compadd -- ${(f)"$(_gylebook_open ${journal:+--journal} ${journal:+"$journal"})"} ;;
    *) compadd -- ${=list} ;;
  esac
}

if [[ "${funcstack[1]}" == _gylebook ]]; then
  _gylebook "$@"
else
  compdef _gylebook gylebook
fi
`

func zshScript(commands []completed) string {
	parts := cases(commands)
	for name, text := range parts {
		// zsh keeps "words" and "path" for itself.
		parts[name] = zshNames.Replace(text)
	}
	return fill(zshTemplate, parts)
}
