package main

import (
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"math"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"strings"

	"gylebook/attenuation"
	"gylebook/attenuation/curve"
	"gylebook/gravity"
)

// course is one fermentation of a file, in points and hours since its first
// reading.
type course struct {
	name, class string
	kind        curve.Kind
	hours       []float64
	points      []float64
	plateau     float64 // range within which its end counts as flat, points
}

// columns are those a file must have; others are passed over.
var columns = []string{"series", "hours", "gravity_value", "unit"}

// assumedMust is the original gravity of a course given as carbon dioxide, which
// says how far the gravity fell but not from where.
const assumedMust = 90.0

// readFolder reads every .csv file of a folder, in the order of their names.
func readFolder(dir string) ([]course, error) {
	names, err := filepath.Glob(filepath.Join(dir, "*.csv"))
	if err != nil {
		return nil, fmt.Errorf("folder %.200q: %w", dir, err)
	}
	if len(names) == 0 {
		if _, err := os.Stat(dir); err != nil {
			return nil, fmt.Errorf("courses: %w", err)
		}
		return nil, fmt.Errorf("no .csv file in %.200q, wanted files with the columns %s", dir, strings.Join(columns, ", "))
	}
	slices.Sort(names)
	var all []course
	for _, name := range names {
		cs, err := readFile(name)
		if err != nil {
			return nil, err
		}
		all = append(all, cs...)
	}
	return all, nil
}

func readFile(name string) ([]course, error) {
	f, err := os.Open(name)
	if err != nil {
		return nil, fmt.Errorf("courses: %w", err)
	}
	defer f.Close() // read only, nothing to lose
	cs, err := readCourses(f, strings.TrimSuffix(filepath.Base(name), ".csv"))
	if err != nil {
		return nil, fmt.Errorf("%s: %w", filepath.Base(name), err)
	}
	return cs, nil
}

// readCourses reads one file; stem is its name without the ending.
func readCourses(in io.Reader, stem string) ([]course, error) {
	r := csv.NewReader(in)
	r.Comment = '#'
	r.TrimLeadingSpace = true
	head, err := r.Read()
	if errors.Is(err, io.EOF) {
		return nil, errors.New("no line but comments, wanted a header and rows")
	}
	if err != nil {
		return nil, err
	}
	at := make([]int, len(columns))
	for k, c := range columns {
		if at[k] = slices.Index(head, c); at[k] < 0 {
			return nil, fmt.Errorf("no column %s in the header %.80q, wanted %s", c, strings.Join(head, ","), strings.Join(columns, ", "))
		}
	}
	byName := make(map[string]*course)
	var order []string
	for {
		row, err := r.Read()
		if errors.Is(err, io.EOF) {
			break
		}
		if err != nil {
			return nil, err
		}
		line, _ := r.FieldPos(0)
		hours, err := number(row[at[1]])
		if err != nil {
			return nil, fmt.Errorf("line %d: hours %w", line, err)
		}
		value, err := number(row[at[2]])
		if err != nil {
			return nil, fmt.Errorf("line %d: gravity_value %w", line, err)
		}
		points, err := toPoints(value, row[at[3]])
		if err != nil {
			return nil, fmt.Errorf("line %d: %w", line, err)
		}
		name := row[at[0]]
		c := byName[name]
		if c == nil {
			c = &course{name: name, class: classOf(stem, name), kind: kindOf(stem, name), plateau: plateauOf(stem)}
			byName[name] = c
			order = append(order, name)
		}
		c.hours, c.points = append(c.hours, hours), append(c.points, points)
	}
	if len(order) == 0 {
		return nil, errors.New("a header and no row, wanted readings")
	}
	cs := make([]course, len(order))
	for k, name := range order {
		cs[k] = byName[name].inOrder()
	}
	return cs, nil
}

// number reads a finite decimal.
func number(s string) (float64, error) {
	x, err := strconv.ParseFloat(strings.TrimSpace(s), 64)
	if err != nil || math.IsNaN(x) || math.IsInf(x, 0) {
		return 0, fmt.Errorf("is %.40q, wanted a number", s)
	}
	return x, nil
}

// toPoints converts a value of a unit to points.
func toPoints(v float64, unit string) (float64, error) {
	switch unit {
	case "sg_points", "sg_points_derived":
		return v, nil
	case "degP", "degBrix_app":
		sg, err := gravity.Fits.Default().Fn.SG(gravity.Plato(v))
		if err != nil {
			return 0, fmt.Errorf("gravity_value: %w", err)
		}
		return float64(sg.Points()), nil
	case "co2_g_per_L":
		perPoint, _ := attenuation.CO2ToCome(1)
		return assumedMust - v/perPoint, nil
	}
	return 0, fmt.Errorf("unknown unit %.40q, known: degP, degBrix_app, sg_points, sg_points_derived, co2_g_per_L", unit)
}

// inOrder sorts by time and puts the first reading at hour 0.
func (c course) inOrder() course {
	index := make([]int, len(c.hours))
	for k := range index {
		index[k] = k
	}
	slices.SortStableFunc(index, func(a, b int) int {
		if c.hours[a] < c.hours[b] {
			return -1
		}
		if c.hours[a] > c.hours[b] {
			return 1
		}
		return 0
	})
	return c.pick(index)
}

// pick keeps the readings named and counts hours from the first of them.
func (c course) pick(index []int) course {
	out := c
	out.hours, out.points = make([]float64, len(index)), make([]float64, len(index))
	for k, i := range index {
		out.hours[k], out.points[k] = c.hours[i]-c.hours[index[0]], c.points[i]
	}
	return out
}

// kindOf takes wine for what says so in the name of the file or the series.
func kindOf(stem, name string) curve.Kind {
	both := strings.ToLower(stem + " " + name)
	for _, k := range []curve.Kind{curve.Cider, curve.Mead, curve.Wine} {
		if strings.Contains(both, k.String()) {
			return k
		}
	}
	if strings.Contains(both, "must") {
		return curve.Wine
	}
	return curve.Beer
}

// classOf groups courses that may be each other's history: those of a file and
// a kind, pilot runs (PS) at 22 °C and the cooler ones apart.
func classOf(stem, name string) string {
	class := stem + "/" + kindOf(stem, name).String()
	if f := strings.Split(name, "_"); len(f) > 3 && f[2] == "PS" {
		if f[3] == "22" {
			return class + "/22"
		}
		return class + "/cool"
	}
	return class
}

// plateauOf is wider for small-scale beer, read to 0.1 °P.
func plateauOf(stem string) float64 {
	if stem == "beer_lab" {
		return 2.2
	}
	return 1.5
}
