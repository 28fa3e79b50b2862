package main

import (
	"fmt"
	"strconv"

	"github.com/urfave/cli/v2"

	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/gravity/method"
	"gylebook/tables"
	"gylebook/tempcorr"
)

// temperatureMarks are the readings over the columns of a temperature chart.
var temperatureMarks = map[gravity.Scale][]float64{
	gravity.ScaleSG:       {0.990, 1.000, 1.020, 1.040, 1.060, 1.080, 1.100},
	gravity.ScalePlato:    {-2, 0, 5, 10, 15, 20, 25},
	gravity.ScaleBrix:     {-2, 0, 5, 10, 15, 20, 25},
	gravity.ScalePoints:   {-10, 0, 20, 40, 60, 80, 100},
	gravity.ScaleOechsle:  {0, 20, 40, 60, 80, 100},
	gravity.ScaleKMW:      {0, 4, 8, 12, 16, 20},
	gravity.ScaleBaume:    {0, 2, 4, 6, 8, 10, 12},
	gravity.ScaleTwaddell: {0, 4, 8, 12, 16, 20},
	gravity.ScaleDensity:  {1000, 1020, 1040, 1060, 1080, 1100},
}

func (b *bench) temperatureChart(c *cli.Context) (sheet, error) {
	r, err := b.readerOf(c)
	if err != nil {
		return sheet{}, err
	}
	if r.method == "" && r.oe > 0 {
		r.method = "fermenting"
	}
	m, err := tempcorr.Methods.Find(r.method)
	if err != nil {
		return sheet{}, err
	}
	rows, err := b.degreesOf(c, span{5, 35, 1}, span{40, 96, 2})
	if err != nil {
		return sheet{}, err
	}
	scale := b.set.scale
	f := tempcorr.Float{Scale: scale, Basis: r.basis, Expansion: r.body.Expansion}
	s := sheet{name: "table", columns: []string{"sample_temp_c"}}
	p := scale.Info().Decimals
	best := "15 and 25 °C"
	if rows.unit == asread.F {
		best = "59 and 77 °F"
	}
	t := tables.Table{
		Title:   fmt.Sprintf("add to a reading in %s %s, %s; %s", scale.Info().Symbol, r.basis, r.body.ID, r.liquid()),
		Columns: []tables.Column{{Head: rows.head(), Align: tables.Right}},
		Foot:    []string{fmt.Sprintf("%s (%s); best between %s; instrument error not included", m.ID, m.Source.Where, best)},
	}
	marks := temperatureMarks[scale]
	if len(marks) == 0 {
		return s, usageError("", "--scale: read %s, wanted a scale that a hydrometer is divided in", scale)
	}
	for _, mark := range marks {
		text := markText(scale, mark)
		s.columns = append(s.columns, "correction_"+scale.String()+"_at_"+text)
		t.Columns = append(t.Columns, tables.Column{Head: text, Align: tables.Right})
	}
	err = rows.each(func(temp gravity.Celsius, text string) error {
		if temp < tempcorr.MinTemp || temp > tempcorr.MaxTemp {
			return &method.RangeError{What: "sample temperature", Got: float64(temp), Lo: 0, Hi: 60, Unit: "°C"}
		}
		values := []any{float64(temp)}
		cells := []string{text}
		for _, mark := range marks {
			got, err := m.Fn(f, mark, tempcorr.Sample{T: temp, OE: r.oe})
			if err != nil {
				return err
			}
			if s.explain == nil {
				if s.explain, err = explainMark(scale, r, mark, temp); err != nil {
					return err
				}
			}
			values = append(values, got-mark)
			cells = append(cells, asread.Signed(got-mark, p))
		}
		s.records = append(s.records, record(s.columns, values))
		t.Rows = append(t.Rows, cells)
		return nil
	})
	s.tables = []tables.Table{t}
	return s, err
}

// markText is a reading over a column.
func markText(scale gravity.Scale, mark float64) string {
	if scale == gravity.ScaleSG {
		return fixed(mark, 3)
	}
	return strconv.FormatFloat(mark, 'f', -1, 64)
}

// liquid says what a chart holds for.
func (r reader) liquid() string {
	if r.og != "" {
		return "fermenting from " + r.og
	}
	return "before fermentation"
}

// explainMark is the correction of one reading step by step; a chart has no
// typed digits, so the reading itself is exact.
func explainMark(scale gravity.Scale, r reader, mark float64, temp gravity.Celsius) ([]string, error) {
	by := tempcorr.New(scale, r.basis, r.body)
	seen := tempcorr.Observation{Reading: mark, T: temp, ReadAt: r.meniscus, OE: r.oe, Method: r.method}
	res, err := tempcorr.Correct(by, seen)
	if err != nil {
		return nil, err
	}
	return append([]string{firstRow}, tempcorr.Explain(by, seen, res)...), nil
}
