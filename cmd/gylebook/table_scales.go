package main

import (
	"fmt"

	"github.com/urfave/cli/v2"

	"gylebook/gravity"
	"gylebook/tables"
)

// chartSpans are the default rows of the scales chart.
var chartSpans = map[gravity.Scale]span{
	gravity.ScaleSG: {1.000, 1.120, 0.004}, gravity.ScalePlato: {0, 30, 1}, gravity.ScaleBrix: {0, 30, 1},
	gravity.ScalePoints: {0, 120, 4}, gravity.ScaleOechsle: {0, 120, 4}, gravity.ScaleKMW: {0, 25, 1},
	gravity.ScaleBaume: {0, 16, 0.5}, gravity.ScaleTwaddell: {0, 24, 1}, gravity.ScaleDensity: {1000, 1120, 5},
	gravity.ScaleGPL: {0, 300, 10},
}

func (b *bench) scalesChart(c *cli.Context) (sheet, error) {
	conv, basis, err := converterOf(c)
	if err != nil {
		return sheet{}, err
	}
	rows, err := b.gravitySpan(c, chartSpans[b.set.scale])
	if err != nil {
		return sheet{}, err
	}
	s := sheet{name: "table"}
	show := columns[:len(columns)-1]
	t := tables.Table{Foot: []string{fmt.Sprintf("fit %s (%s); relative densities on SG 20/20; Baumé modulus %g on SG %s",
		conv.Fit.ID, conv.Fit.Source.Author, float64(conv.Modulus), baumePair(conv))}}
	for _, col := range show {
		s.columns = append(s.columns, col.field)
		t.Columns = append(t.Columns, tables.Column{Head: col.unit, Align: tables.Right})
	}
	err = rows.each(func(v float64) error {
		f, err := conv.Convert(b.set.scale, v, basis)
		if err != nil {
			return err
		}
		if s.explain == nil {
			s.explain = append([]string{firstRow}, gravity.ExplainConversion(conv, b.set.scale, v, basis, f)...)
		}
		var r tables.Record
		var cells []string
		for _, col := range show {
			r = append(r, tables.Field{Name: col.field, Value: col.of(f)})
			cells = append(cells, fixed(col.of(f), col.places))
		}
		s.records = append(s.records, r)
		s.notes = append(s.notes, f.Notes...)
		t.Rows = append(t.Rows, cells)
		return nil
	})
	s.tables = []tables.Table{t}
	s.notes = firstOfEach(s.notes)
	return s, err
}
