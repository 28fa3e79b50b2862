package tables

import (
	"encoding/json"
	"errors"
	"io"
	"math"
	"reflect"
	"strconv"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

func TestWriteJSON(t *testing.T) {
	reading := 12.4
	d := Document{
		Schema:      "gylebook.correct/1",
		GeneratedAt: "2026-03-01T08:30:00Z",
		Records: []Record{{
			{"batch", `pale <12> & "dry"`},
			{"reading", &reading},
			{"third", 1.0 / 3},
			{"tiny", 0.000001},
			{"count", 3},
			{"hot", true},
			{"missing", (*float64)(nil)},
			{"nothing", nil},
			{"nan", math.NaN()},
			{"inf", math.Inf(-1)},
			{"tags", []string{"a", "b"}},
			{"notes", []Note{{"hot-sample", "26 °C"}}},
			{"quiet", []Note(nil)},
		}},
		Summary: Record{{"rows", 1}},
	}
	want := `{
  "schema": "gylebook.correct/1",
  "generated_at": "2026-03-01T08:30:00Z",
  "records": [
    {
      "batch": "pale <12> & \"dry\"",
      "reading": 12.4,
      "third": 0.3333333333333333,
      "tiny": 0.000001,
      "count": 3,
      "hot": true,
      "missing": null,
      "nothing": null,
      "nan": null,
      "inf": null,
      "tags": [
        "a",
        "b"
      ],
      "notes": [
        {
          "code": "hot-sample",
          "text": "26 °C"
        }
      ],
      "quiet": []
    }
  ],
  "summary": {
    "rows": 1
  },
  "notes": []
}
`
	got := render(t, d.WriteJSON)
	same(t, got, want)

	var back struct {
		Records []struct {
			Third float64
			Notes []Note
		}
	}
	if err := json.Unmarshal([]byte(got), &back); err != nil {
		t.Fatal(err)
	}
	if back.Records[0].Third != 1.0/3 {
		t.Errorf("1/3 read back as %v", back.Records[0].Third)
	}
	if !reflect.DeepEqual(back.Records[0].Notes, []Note{{"hot-sample", "26 °C"}}) {
		t.Errorf("notes read back as %v", back.Records[0].Notes)
	}
}

func TestWriteJSONEmpty(t *testing.T) {
	same(t, render(t, Document{Columns: []string{"og"}}.WriteJSON), `{
  "schema": "",
  "generated_at": "",
  "records": [],
  "notes": []
}
`)
}

// The keys of every object come in the order in which they were given.
func TestWriteJSONKeyOrder(t *testing.T) {
	d := Document{
		Records: []Record{{{"z", 1.5}, {"a", "x"}, {"m", nil}}},
		Summary: Record{{"y", 2}, {"b", 3}},
		Notes:   []Note{{"assumed", "20 °C"}},
	}
	want := []string{"schema", "generated_at", "records", "z", "a", "m", "summary", "y", "b", "notes", "code", "text"}
	var keys []string
	var inObject []bool // the open brackets
	key := true         // the next string of an object is a key
	dec := json.NewDecoder(strings.NewReader(render(t, d.WriteJSON)))
	for {
		tok, err := dec.Token()
		if errors.Is(err, io.EOF) {
			break
		}
		if err != nil {
			t.Fatal(err)
		}
		if delim, ok := tok.(json.Delim); ok {
			if delim == '{' || delim == '[' {
				inObject = append(inObject, delim == '{')
			} else {
				inObject = inObject[:len(inObject)-1]
			}
			key = true
			continue
		}
		if len(inObject) > 0 && inObject[len(inObject)-1] {
			if key {
				keys = append(keys, tok.(string))
			}
			key = !key
		}
	}
	if !reflect.DeepEqual(keys, want) {
		t.Errorf("keys %v, want %v", keys, want)
	}
}

func TestWriteRefuses(t *testing.T) {
	for name, r := range map[string]Record{
		"float32": {{"og", float32(1)}},
		"twice":   {{"og", 1.0}, {"og", 2.0}},
	} {
		var b strings.Builder
		d := Document{Records: []Record{{{"og", 1.5}}, r}}
		for form, write := range map[string]func(io.Writer) error{"json": d.WriteJSON, "csv": d.WriteCSV} {
			err := write(&b)
			if err == nil || !strings.HasPrefix(err.Error(), `record 2: field "og" `) {
				t.Errorf("%s, %s: error %v", name, form, err)
			}
		}
		if err := (Document{Summary: r}).WriteJSON(&b); err == nil || !strings.HasPrefix(err.Error(), `summary: field "og" `) {
			t.Errorf("%s in the summary: error %v", name, err)
		}
		if b.Len() > 0 {
			t.Errorf("%s: wrote %q before failing", name, b.String())
		}
	}
}

func TestRecordGet(t *testing.T) {
	r := Record{{"og", 1.048}, {"fg", nil}}
	if r.Get("og") != 1.048 || r.Get("fg") != nil || r.Get("abv") != nil {
		t.Errorf("Get = %v, %v, %v", r.Get("og"), r.Get("fg"), r.Get("abv"))
	}
}

func TestNumber(t *testing.T) {
	for in, want := range map[float64]string{
		0: "0", math.Copysign(0, -1): "0", -0.5: "-0.5", 1.0480: "1.048",
		1e-6: "0.000001", -1e15: "-1000000000000000", 0.30000000000000004: "0.30000000000000004",
		1e21: "1e+21", 5e-7: "5e-07",
	} {
		if got := number(in); got != want {
			t.Errorf("number(%g) = %s, want %s", in, got, want)
		}
	}
}

func TestNumberRoundTrip(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		x := rapid.OneOf(rapid.Float64(), rapid.Float64Range(-1e15, 1e15)).Draw(t, "x")
		if plain(x) == nil {
			return // NaN and infinities never reach number
		}
		s := number(x)
		if back, err := strconv.ParseFloat(s, 64); err != nil || back != x {
			t.Fatalf("%g printed as %s, read back as %g, %v", x, s, back, err)
		}
		if a := math.Abs(x); a >= 1e-6 && a <= 1e15 && strings.Contains(s, "e") {
			t.Fatalf("%g printed as %s", x, s)
		}
		if !json.Valid([]byte(s)) {
			t.Fatalf("%s is no JSON number", s)
		}
	})
}

// Whatever the text, the JSON is valid and gives the text back, what is not
// UTF-8 replaced, and nothing in it steers a terminal.
func TestWriteJSONAnyText(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		name, text, x := anyText().Draw(t, "name"), anyText().Draw(t, "text"), rapid.Float64().Draw(t, "x")
		d := Document{Records: []Record{{{name, text}, {name + "'", x}}}, Notes: []Note{{text, text}}}
		var b strings.Builder
		if err := d.WriteJSON(&b); err != nil {
			t.Fatal(err)
		}
		for _, r := range b.String() {
			if r != '\n' && steers(r) {
				t.Fatalf("%U in %q", r, b.String())
			}
		}
		var back struct {
			Records []map[string]any
			Notes   []Note
		}
		if err := json.Unmarshal([]byte(b.String()), &back); err != nil {
			t.Fatalf("%v in %q", err, b.String())
		}
		valid := string([]rune(text))
		if got := back.Records[0][string([]rune(name))]; got != valid {
			t.Fatalf("%q came back as %q", valid, got)
		}
		if back.Notes[0] != (Note{valid, valid}) {
			t.Fatalf("note %q came back as %q", valid, back.Notes[0])
		}
	})
}
