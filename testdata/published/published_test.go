package published

import (
	"io/fs"
	"slices"
	"strings"
	"testing"
)

// mayBeEmpty lists the published columns in which a printed table leaves a cell
// blank; every other published cell must hold something.
var mayBeEmpty = map[string][]string{
	"water_points":         {"uncertainty"},      // the quoted values have none
	"uk_beer_duty_factors": {"printed_ABV_from"}, // the first band has no lower end
	"individuals_chart":    {"data"},             // one set prints its results without them
}

func TestEveryFile(t *testing.T) {
	onDisk, err := fs.Glob(files, "*.csv")
	if err != nil {
		t.Fatal(err)
	}
	all, err := All()
	if err != nil {
		t.Fatal(err)
	}
	if len(all) == 0 || len(all) != len(onDisk) {
		t.Fatalf("%d files parsed of %d embedded", len(all), len(onDisk))
	}
	if !slices.IsSortedFunc(all, func(a, b *File) int { return strings.Compare(a.Name, b.Name) }) {
		t.Error("files are not sorted by name")
	}
	for _, f := range all {
		t.Run(f.Name, func(t *testing.T) {
			if f.Source == "" || f.Status == "" || f.Units == "" {
				t.Errorf("source %q, status %q, units %q: wanted all three", f.Source, f.Status, f.Units)
			}
			for _, r := range f.Rows {
				checkRow(t, f, r)
			}
		})
	}
}

func checkRow(t *testing.T, f *File, r Row) {
	t.Helper()
	for _, col := range f.Columns {
		if col == colTol || col == colWhy || slices.Contains(mayBeEmpty[f.Name], col) {
			continue
		}
		if r.Text(col) == "" {
			t.Errorf("%s: %s is empty", r.Where(), col)
		}
	}
	if r.Text(colTol) != "" && r.Text(colWhy) == "" {
		t.Errorf("%s: tolerance %q has no reason", r.Where(), r.Text(colTol))
	}
}

func TestLoad(t *testing.T) {
	f, err := Load("water_iapws95")
	if err != nil {
		t.Fatal(err)
	}
	if f.Name != "water_iapws95" || f.Columns[0] != "t_C" {
		t.Errorf("name %q, columns %v", f.Name, f.Columns)
	}
	// The row printed as "20,998.2072".
	for _, r := range f.Rows {
		if r.Text("t_C") != "20" {
			continue
		}
		if x, err := r.Float("rho_kg_m3"); err != nil || x != 998.2072 {
			t.Errorf("density at 20 °C is %v, %v", x, err)
		}
		return
	}
	t.Error("no row for 20 °C")
}

func TestLoadUnknown(t *testing.T) {
	for _, name := range []string{"", "nothing", "../published/water_points", "water_points.csv"} {
		_, err := Load(name)
		if err == nil || !strings.Contains(err.Error(), "water_points") {
			t.Errorf("Load(%q) = %v, wanted an error listing the known files", name, err)
		}
	}
}

// Quoted cells may hold commas.
func TestQuotedCell(t *testing.T) {
	f, err := Load("water_points")
	if err != nil {
		t.Fatal(err)
	}
	if got := f.Rows[0].Text("kind"); got != "true, air-free" {
		t.Errorf("kind is %q", got)
	}
}
