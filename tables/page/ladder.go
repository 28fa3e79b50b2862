package page

import (
	"html/template"
	"regexp"
	"strings"
	"sync"
	"unicode/utf8"

	"gylebook/tables"
)

var ladderPage = Parsed("ladder", `<div class="ladder">
{{- if or .Number .Lead}}
<p class="answer{{if .Wordy}} wordy{{end}}"><strong>{{with .Number}}<b>{{.}}</b>{{end}}{{.Lead}}</strong>{{range .More}} <span>{{.}}</span>{{end}}</p>
{{- end}}
{{- if .Rungs}}
<dl class="rungs{{if .Signs}} signs{{end}}">
{{- range .Rungs}}
<div><dt>{{.Name}}</dt><dd class="value">{{with .Sign}}<span class="sign">{{.}}</span>{{end}}{{.Value}}</dd>{{with .Remark}}<dd class="remark">{{.}}</dd>{{end}}</div>
{{- end}}
</dl>
{{- end}}
{{- if .Lines}}
<ul class="lines">
{{- range .Lines}}
<li>{{.}}</li>
{{- end}}
</ul>
{{- end}}
</div>
`)

// wordy is the number of characters above which an answer is a sentence, which
// is set smaller than a figure.
const wordy = 28

type rung struct{ Name, Sign, Value, Remark string }

// figure is the number that an answer begins with, if it does.
var figure = sync.OnceValue(func() *regexp.Regexp { return regexp.MustCompile(`^[+−-]?[0-9]+([.,][0-9]+)*(\s|$)`) })

// Ladder is the answer large, the rungs as a list of terms and values, the free
// lines as a list below. Values stand under each other with one column for
// their sign, as they do on a terminal.
func Ladder(l tables.Ladder) template.HTML {
	var d struct {
		Number, Lead string
		Wordy, Signs bool
		More, Lines  []string
		Rungs        []rung
	}
	if answer := Texts(l.Answer); len(answer) > 0 {
		d.Number = figure().FindString(answer[0])
		d.Lead, d.More = answer[0][len(d.Number):], answer[1:]
		d.Wordy = utf8.RuneCountInString(answer[0]) > wordy
	}
	d.Lines = Texts(l.Lines)
	for _, r := range l.Rungs {
		sign, value := signed(Text(r.Value))
		d.Signs = d.Signs || sign != ""
		d.Rungs = append(d.Rungs, rung{Text(r.Name), sign, value, Text(r.Remark)})
	}
	return fill(ladderPage, d)
}

// signed cuts the sign off a value.
func signed(value string) (sign, rest string) {
	for _, s := range []string{"+", "-", "−"} {
		if rest, ok := strings.CutPrefix(value, s); ok && rest != "" {
			return s, rest
		}
	}
	return "", value
}
