package tables

import (
	"errors"
	"io"
	"os"
	"strings"
	"testing"

	"github.com/olekukonko/tablewriter/pkg/twwidth"
	"pgregory.net/rapid"
)

// TestMain takes the tester's locale out of the measure: ° is one column.
func TestMain(m *testing.M) {
	twwidth.SetEastAsian(false)
	os.Exit(m.Run())
}

// anyText yields Unicode, raw bytes and what breaks formats.
func anyText() *rapid.Generator[string] {
	return rapid.OneOf(
		rapid.String(),
		rapid.Map(rapid.SliceOf(rapid.Byte()), func(b []byte) string { return string(b) }),
		rapid.StringOf(rapid.RuneFrom([]rune("a1 ,;\"'|\\<>&=+-@\t\r\n\x00\x1b\u0085\u202e°酒"))),
	)
}

func render(t *testing.T, write func(io.Writer) error) string {
	t.Helper()
	var b strings.Builder
	if err := write(&b); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

func same(t *testing.T, got, want string) {
	t.Helper()
	if got != want {
		t.Errorf("got:\n%s\nwant:\n%s\ngot  %q\nwant %q", got, want, got, want)
	}
}

var errBroken = errors.New("broken pipe")

type brokenWriter struct{}

func (brokenWriter) Write([]byte) (int, error) { return 0, errBroken }

// shortWriter takes half and says nothing, against the contract of io.Writer.
type shortWriter struct{}

func (shortWriter) Write(p []byte) (int, error) { return len(p) / 2, nil }

func TestWriteErrorsComeBack(t *testing.T) {
	d := Document{Records: []Record{{{"og", 1.048}}}}
	table := Table{Columns: []Column{{"og", Right}}, Rows: [][]string{{"1.048"}}}
	for name, write := range map[string]func(io.Writer) error{
		"json":     d.WriteJSON,
		"csv":      d.WriteCSV,
		"text":     func(w io.Writer) error { return table.WriteText(w, 80) },
		"narrow":   func(w io.Writer) error { return table.WriteText(w, 40) },
		"stacked":  table.WriteStacked,
		"markdown": table.WriteMarkdown,
	} {
		if err := write(brokenWriter{}); !errors.Is(err, errBroken) {
			t.Errorf("%s: error %v, want %v", name, err, errBroken)
		}
		if err := write(shortWriter{}); !errors.Is(err, io.ErrShortWrite) {
			t.Errorf("%s: error %v, want %v", name, err, io.ErrShortWrite)
		}
	}
}

func TestParseFormat(t *testing.T) {
	for in, want := range map[string]Format{"text": Text, "JSON": JSON, " csv ": CSV, "Markdown": Markdown} {
		if got, err := ParseFormat(in); err != nil || got != want {
			t.Errorf("ParseFormat(%q) = %q, %v, want %q", in, got, err, want)
		}
	}
	for _, in := range []string{"", "yaml"} {
		got, err := ParseFormat(in)
		if err == nil || got != "" {
			t.Fatalf("ParseFormat(%q) = %q, %v, want an error", in, got, err)
		}
		if !strings.Contains(err.Error(), "text, json, csv, markdown") {
			t.Errorf("error %q does not list the known formats", err)
		}
	}
}
