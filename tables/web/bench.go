package web

import (
	"net/http"
	"slices"
	"strings"
)

// benchForm is one small form of the bench.
type benchForm struct {
	What, Heading, Do string
	Fields            []benchField
	Answer            *Answer
	Problem           *problem
}

type benchField struct {
	ID, Name, Label, Hint, Value string
	Numeric                      bool // a keypad of digits does
	Listed                       bool // chosen from Choices, and left out when there are none
	Choices                      []Choice
	Wrong                        bool // it is what the problem of the form is about
}

// Described is the ids of what is said about the field.
func (f benchField) Described() string {
	var ids []string
	if f.Hint != "" {
		ids = append(ids, f.ID+"-hint")
	}
	if f.Wrong {
		ids = append(ids, f.ID+"-wrong")
	}
	return strings.Join(ids, " ")
}

// benchForms are the forms, and what a value that is needed looks like. A list to
// choose from is shown if the Desk offers one.
func benchForms() []benchForm {
	return []benchForm{
		{What: "correct", Heading: "Correct a reading", Do: "Correct", Fields: []benchField{
			{Name: "reading", Label: "Reading", Hint: "as 1.050 or 12P", Numeric: true},
			{Name: "temp", Label: "Temperature", Hint: "as 28", Numeric: true},
			{Name: "og", Label: "Original gravity", Hint: "if it has fermented", Numeric: true},
			{Name: "instrument", Label: "Instrument", Listed: true},
		}},
		{What: "convert", Heading: "Convert between scales", Do: "Convert", Fields: []benchField{
			{Name: "value", Label: "Value", Hint: "with its scale: 1.048, 12P, 48pt, 90Oe"},
			{Name: "from", Label: "Scale", Listed: true},
		}},
		{What: "abv", Heading: "Alcohol", Do: "Estimate", Fields: []benchField{
			{Name: "og", Label: "Original gravity", Hint: "as 1.048", Numeric: true},
			{Name: "fg", Label: "Present gravity", Hint: "as 1.010", Numeric: true},
		}},
	}
}

// needed are the fields that a form cannot do without.
var needed = map[string][]string{"correct": {"reading", "temp"}, "convert": {"value"}, "abv": {"og", "fg"}}

// showBench is the page of what needs no journal. The URL holds what was typed, so
// that an answer can be sent to somebody.
func (s *Server) showBench(v *visit) error {
	asked, err := v.query()
	if err != nil {
		return err
	}
	offer, err := s.desk.BenchForm(v.r.Context())
	if err != nil {
		return err
	}
	status, title, found := http.StatusOK, "Bench", asked["what"] == ""
	forms := benchForms()
	for i := range forms {
		f := &forms[i]
		here := f.What == asked["what"]
		for k := range f.Fields {
			field := &f.Fields[k]
			field.ID = f.What + "-" + field.Name
			if here {
				field.Value = asked[field.Name]
			}
			switch field.Name {
			case "instrument":
				field.Choices = offer.Instruments
				if _, chosen := asked[field.Name]; !here || !chosen {
					field.Value = offer.Instrument // and what is shown is computed with
				}
			case "from":
				field.Choices = offer.Scales
			}
		}
		if !here {
			continue
		}
		found, title = true, f.Heading+" – Bench"
		if err := s.compute(v, f, asked); err != nil {
			if !mistyped(err) {
				return err
			}
			f.Problem, status = problemOf(err, f.ids()...)
			for k := range f.Fields {
				f.Fields[k].Wrong = f.Fields[k].ID == f.Problem.Field
			}
			title = "Not read: " + title
		}
	}
	if !found {
		return &Refused{Status: http.StatusNotFound, Text: "the bench has no such form", Hint: "it has correct, convert and abv"}
	}
	return v.show(status, "bench", page{Title: title, Here: "bench", Main: forms})
}

// ids are those of the form's fields, in order.
func (f benchForm) ids() []string {
	var ids []string
	for _, field := range f.Fields {
		ids = append(ids, field.ID)
	}
	return ids
}

// compute fills in the answer of a form.
func (s *Server) compute(v *visit, f *benchForm, asked values) error {
	var names []string
	needs, typed := map[string]string{}, map[string]string{}
	for _, field := range f.Fields {
		names = append(names, field.Name)
		if slices.Contains(needed[f.What], field.Name) {
			needs[field.Name] = "type it " + field.Hint
		}
		if field.Value != "" {
			typed[field.Name] = field.Value
		}
	}
	err := asked.check(names, needs)
	if err == nil {
		var a Answer
		a, err = s.desk.Bench(v.r.Context(), f.What, typed)
		f.Answer = &a
	}
	if err != nil {
		f.Answer = nil
		r := refused(err)
		if r.Field != "" {
			r.Field = f.What + "-" + r.Field
		}
		if r.Status == http.StatusInternalServerError {
			return err
		}
		return r
	}
	return nil
}
