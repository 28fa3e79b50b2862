package main

import (
	"encoding/json"
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"github.com/rogpeppe/go-internal/testscript"
)

// member is one name and value of an object, in the order of the text.
type member struct {
	name  string
	value any // string, bool, json.Number, nil, or json.RawMessage for what is nested
}

type object []member

func (o *object) UnmarshalJSON(data []byte) error {
	dec := json.NewDecoder(strings.NewReader(string(data)))
	if _, err := dec.Token(); err != nil {
		return err
	}
	for dec.More() {
		name, err := dec.Token()
		if err != nil {
			return err
		}
		var raw json.RawMessage
		if err := dec.Decode(&raw); err != nil {
			return err
		}
		m := member{name: fmt.Sprint(name), value: raw}
		if raw[0] != '{' && raw[0] != '[' {
			one := json.NewDecoder(strings.NewReader(string(raw)))
			one.UseNumber()
			if err := one.Decode(&m.value); err != nil {
				return err
			}
		}
		*o = append(*o, m)
	}
	return nil
}

func (o object) names() []string {
	names := make([]string, len(o))
	for i, m := range o {
		names[i] = m.name
	}
	return names
}

// document is what every command prints with --json.
type document struct {
	Schema  string   `json:"schema"`
	Records []object `json:"records"`
	Summary object   `json:"summary"`
	Notes   []object `json:"notes"`
}

func lastDocument(ts *testscript.TestScript) document {
	var d document
	if err := json.Unmarshal([]byte(ts.ReadFile("stdout")), &d); err != nil {
		ts.Fatalf("stdout is no document: %v", err)
	}
	return d
}

// field [N] NAME VALUE [TOLERANCE] compares one value of the JSON on stdout: of
// record N, counted from 1, else of the first; of the summary when NAME begins
// with "summary.". A number is compared within the tolerance, or exactly; VALUE
// null stands for null; any other text is compared as it stands.
func field(ts *testscript.TestScript, neg bool, args []string) {
	n := 1
	if len(args) > 0 {
		if k, err := strconv.Atoi(args[0]); err == nil {
			n, args = k, args[1:]
		}
	}
	if neg || len(args) < 2 || len(args) > 3 {
		ts.Fatalf("usage: field [N] NAME VALUE [TOLERANCE]")
	}
	d := lastDocument(ts)
	name, summary := strings.CutPrefix(args[0], "summary.")
	in := d.Summary
	if !summary {
		if n < 1 || n > len(d.Records) {
			ts.Fatalf("record %d of %d", n, len(d.Records))
		}
		in = d.Records[n-1]
	}
	k := slices.IndexFunc(in, func(m member) bool { return m.name == name })
	if k < 0 {
		ts.Fatalf("no field %s among %s", name, strings.Join(in.names(), ", "))
	}
	got := in[k].value
	number, isNumber := got.(json.Number)
	switch {
	case isNumber:
		x, err := number.Float64()
		ts.Check(err)
		want, err := strconv.ParseFloat(args[1], 64)
		ts.Check(err)
		tolerance := 0.0
		if len(args) == 3 {
			tolerance, err = strconv.ParseFloat(args[2], 64)
			ts.Check(err)
		}
		if !(math.Abs(x-want) <= tolerance) {
			ts.Fatalf("%s is %v, wanted %v within %v", name, x, want, tolerance)
		}
	case len(args) == 3:
		ts.Fatalf("%s is %v, wanted a number", name, got)
	case got == nil && args[1] != "null", got != nil && fmt.Sprint(got) != args[1]:
		ts.Fatalf("%s is %v, wanted %s", name, got, args[1])
	}
}

// fields [summary] NAME… demands that every record of the JSON on stdout, or the
// summary, has exactly these names in this order; "..." at the end allows more.
func fields(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) == 0 {
		ts.Fatalf("usage: fields [summary] NAME…")
	}
	d := lastDocument(ts)
	in := d.Records
	if args[0] == "summary" {
		in, args = []object{d.Summary}, args[1:]
	}
	if len(in) == 0 {
		ts.Fatalf("no records")
	}
	more := args[len(args)-1] == "..."
	if more {
		args = args[:len(args)-1]
	}
	for i, o := range in {
		names := o.names()
		if more && len(names) > len(args) {
			names = names[:len(args)]
		}
		if !slices.Equal(names, args) {
			ts.Fatalf("record %d has %s, wanted %s", i+1, strings.Join(names, " "), strings.Join(args, " "))
		}
	}
}
