package page

import (
	"html/template"

	"gylebook/tables"
)

// caution is the code of a note that warns of harm.
const caution = "caution"

var notesPage = Parsed("notes", `
{{- with .Cautions}}<ul class="cautions">
{{- range .}}
<li><strong>Caution:</strong> {{.}}</li>
{{- end}}
</ul>
{{end}}
{{- with .Notes}}<ul class="notes">
{{- range .}}
<li>{{.}}</li>
{{- end}}
</ul>
{{end}}`)

// Notes are the cautions (notes with the code "caution"), each with that word
// before it, then the other notes as a list. A text that comes twice is shown
// once; no notes are nothing at all.
func Notes(notes []tables.Note) template.HTML {
	var d struct{ Cautions, Notes []string }
	seen := map[string]bool{}
	for _, n := range notes {
		for _, text := range Texts([]string{n.Text}) {
			switch {
			case seen[text]:
			case n.Code == caution:
				d.Cautions = append(d.Cautions, text)
			default:
				d.Notes = append(d.Notes, text)
			}
			seen[text] = true
		}
	}
	return fill(notesPage, d)
}

// Cautions are the texts as notes with the code "caution".
func Cautions(texts []string) template.HTML {
	notes := make([]tables.Note, len(texts))
	for i, text := range texts {
		notes[i] = tables.Note{Code: caution, Text: text}
	}
	return Notes(notes)
}
