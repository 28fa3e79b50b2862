package main

import (
	"fmt"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation"
	"gylebook/gravity"
	"gylebook/tables"
)

// presentMarks are the present gravities over the columns of an alcohol chart.
var presentMarks = []gravity.SG{0.996, 1.000, 1.004, 1.008, 1.012, 1.016, 1.020}

func (b *bench) alcoholChart(c *cli.Context) (sheet, error) {
	conv, basis, err := converterOf(c)
	if err != nil {
		return sheet{}, err
	}
	m, err := attenuation.ABVMethods.Find(c.String("method"))
	if err != nil {
		return sheet{}, err
	}
	def := chartSpans[b.set.scale]
	if b.set.scale == gravity.ScaleSG {
		def = span{1.030, 1.110, 0.005}
	}
	rows, err := b.gravitySpan(c, def)
	if err != nil {
		return sheet{}, err
	}
	s := sheet{name: "table", columns: []string{"original_sg_20_20", "original_extract_pct_mass"}}
	t := tables.Table{
		Title:   "% vol at 20 °C; rows original, columns present gravity (SG 20/20)",
		Columns: []tables.Column{{Head: "OG", Align: tables.Right}, {Head: "°P", Align: tables.Right}},
		Foot:    []string{fmt.Sprintf("method %s (%s), fit %s; the methods' own doubt is ±0.3 %% vol (k=2)", m.ID, m.Source, conv.Fit.ID)},
	}
	for _, pg := range presentMarks {
		text := fixed(float64(pg), 3)
		s.columns = append(s.columns, "abv_pct_20c_at_"+text)
		t.Columns = append(t.Columns, tables.Column{Head: text, Align: tables.Right})
	}
	err = rows.each(func(v float64) error {
		og, err := conv.Convert(b.set.scale, v, basis)
		if err != nil {
			return err
		}
		values := []any{float64(og.SG), float64(og.Extract)}
		cells := []string{fixed(float64(og.SG), 3), fixed(float64(og.Extract), 1)}
		for _, pg := range presentMarks {
			g := attenuation.Gravities{OG: og.SG, FG: pg, OE: og.Extract, AE: conv.Fit.Fn.Extract(pg)}
			var e attenuation.Estimate
			if g.Check() == nil {
				e = attenuation.EstimateBy(m, g)
			}
			if e.Info.ID == "" || e.Err != nil {
				values, cells = append(values, nil), append(cells, "—")
				continue
			}
			if s.explain == nil {
				s.explain = append([]string{firstRow}, attenuation.ExplainAlcohol(g, e)...)
			}
			values, cells = append(values, float64(e.Alcohol.ABV)), append(cells, fixed(float64(e.Alcohol.ABV), 1))
			s.notes = append(s.notes, e.Notes...)
		}
		s.records = append(s.records, record(s.columns, values))
		t.Rows = append(t.Rows, cells)
		return nil
	})
	s.tables = []tables.Table{t}
	s.notes = append(firstOfEach(s.notes), cautionEstimate)
	return s, err
}
