package main

import (
	"fmt"
	"slices"
	"strings"
)

// fishTemplate holds one function that prints "PATH:PLACE" for the words before
// the cursor; the complete lines below it ask for theirs.
const fishTemplate = `# fish completion for gylebook, made by: gylebook completion fish
function __gylebook_place
    set -l path ''
    set -l place 0
    set -l flag ''
    for word in (commandline -opc)[2..-1]
        if test -n "$flag"
            set flag ''
            continue
        end
        switch $word
            case {{FLAGS}}
                set flag $word
            case '-*'
            case '*'
                switch "$path:$place:$word"
{{PATHS}}
                    case '*'
                        set place (math $place + 1)
                end
        end
    end
    echo "$path:$place"
end

function __gylebook_at
    test (__gylebook_place) = $argv[1]
end

function __gylebook_in
    string match -q -- "$argv[1]:*" (__gylebook_place)
end

function __gylebook_open
    set -l journal
    set -l last ''
    for word in (commandline -opc)
        if test "$last" = --journal
            set journal --journal $word
        end
        set last $word
    end
    command gylebook complete-open $journal 2>/dev/null
end

complete -c gylebook -f
{{COMPLETE}}
`

func fishScript(commands []completed) string {
	var lines, paths strings.Builder
	line := func(condition, path, rest string, args ...any) {
		fmt.Fprintf(&lines, "complete -c gylebook -n %s %s\n", fishQuoted(condition+" "+fishQuoted(path)), fmt.Sprintf(rest, args...))
	}
	var withValue []string
	seen := map[string]bool{}
	for _, c := range commands {
		for _, below := range c.below {
			fmt.Fprintf(&paths, "                    case %s\n                        set path %s\n", fishQuoted(c.path+":0:"+below.name()), fishQuoted(below.path))
			line("__gylebook_at", c.path+":0", "-a %s -d %s", below.name(), fishQuoted(below.usage))
		}
		for place, values := range c.values {
			if values != nil {
				line("__gylebook_at", fmt.Sprint(c.path, ":", place), "%s", fishValues(values))
			}
		}
		for _, f := range c.flags {
			if f.takesValue && !seen[f.name] {
				seen[f.name] = true
				withValue = append(withValue, "--"+f.name)
			}
			value := ""
			switch {
			case f.takesValue && slices.Contains(f.values, fileNames):
				value = " -r -F"
			case f.takesValue:
				value = strings.TrimRight(" -x "+fishValues(f.values), " ")
			}
			line("__gylebook_in", c.path, "-l %s -d %s%s", f.name, fishQuoted(f.usage), value)
		}
	}
	return fill(fishTemplate, map[string]string{
		"FLAGS": strings.Join(withValue, " "), "PATHS": paths.String(), "COMPLETE": lines.String(),
	})
}

// fishValues are the options that offer values.
func fishValues(values []string) string {
	switch {
	case values == nil:
		return ""
	case values[0] == openNames:
		return "-a '(__gylebook_open)'"
	case values[0] == fileNames:
		return "-F"
	}
	return "-a " + fishQuoted(strings.Join(values, " "))
}

func fishQuoted(text string) string {
	return "'" + strings.NewReplacer(`\`, `\\`, "'", `\'`).Replace(text) + "'"
}
