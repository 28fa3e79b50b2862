package tables

import (
	"encoding/json"
	"reflect"
	"strings"
	"testing"
)

// Records inside a record are a list of objects, in order, and empty when there
// are none.
func TestNestedRecords(t *testing.T) {
	d := Document{Records: []Record{{
		{"batch", "B1"},
		{"readings", []Record{{{"sg", 1.012}, {"notes", []Note(nil)}}, {{"sg", nil}}}},
		{"events", []Record(nil)},
	}}}
	var b strings.Builder
	if err := d.WriteJSON(&b); err != nil {
		t.Fatal(err)
	}
	var got struct{ Records []map[string]any }
	if err := json.Unmarshal([]byte(b.String()), &got); err != nil {
		t.Fatalf("%v in %s", err, b.String())
	}
	want := []map[string]any{{
		"batch":    "B1",
		"readings": []any{map[string]any{"sg": 1.012, "notes": []any{}}, map[string]any{"sg": nil}},
		"events":   []any{},
	}}
	if !reflect.DeepEqual(got.Records, want) {
		t.Errorf("got %v, wanted %v", got.Records, want)
	}
}

// What is refused in a record is refused inside one too, with its place; CSV has
// no cell for records.
func TestNestedRecordErrors(t *testing.T) {
	for name, inner := range map[string]Record{
		`record 1: readings 2: field "at" stands twice`: {{"at", 1}, {"at", 2}},
		`record 1: readings 2: field "at" holds a int8`: {{"at", int8(1)}},
	} {
		d := Document{Records: []Record{{{"readings", []Record{{{"at", 1}}, inner}}}}}
		var b strings.Builder
		if err := d.WriteJSON(&b); err == nil || !strings.HasPrefix(err.Error(), name) {
			t.Errorf("error %v, wanted %s…", err, name)
		}
		if b.Len() > 0 {
			t.Errorf("%q was written before the error", b.String())
		}
	}
	var b strings.Builder
	d := Document{Records: []Record{{{"readings", []Record{}}}}}
	if err := d.WriteCSV(&b); err == nil || b.Len() > 0 {
		t.Errorf("error %v after %q, wanted a refusal and nothing written", err, b.String())
	}
}
