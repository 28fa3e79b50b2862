package main

import (
	"fmt"
	"slices"
	"strings"

	"github.com/urfave/cli/v2"

	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/gravity/method"
	"gylebook/tables"
)

func (b *bench) convertCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "convert", Usage: "one gravity on every scale",
		ArgsUsage:   "VALUE…",
		Description: `No temperature correction is made. "-" reads stdin, one value a line.`,
		Flags: append([]cli.Flag{
			&cli.StringFlag{Name: "to", Usage: "`LIST` scales to show: " + scaleIDs() + ", long"},
			&cli.StringFlag{Name: "modulus", Value: "145", Usage: "`M` modulus of the Baumé scale: 145 on SG 20/20, or 144.3 on SG 15/4"},
		}, append(fitFlags(), rowsFlags("reading")...)...),
	}, `gylebook convert 1.048
		gylebook convert 12P 90Oe 1046kg/m3
		gylebook convert 1.048 --to plato,gpl
		gylebook convert 1.090 --fit nbs --explain`, b.convert)
}

// fitFlags choose the relation between SG and extract, and the pair.
func fitFlags() []cli.Flag {
	return []cli.Flag{
		&cli.StringFlag{Name: "fit", Usage: "`ID` relation between SG and extract: " + ids(gravity.Fits)},
		&cli.StringFlag{Name: "basis", Value: "20/20", Usage: "`PAIR` reference of a typed relative density: 20/20, 60/60F, 15/15, 17.5/17.5, 15/4, 20/4"},
	}
}

// converterOf reads the fit, the pair and the modulus.
func converterOf(c *cli.Context) (gravity.Converter, gravity.Pair, error) {
	conv := gravity.NewConverter()
	var err error
	if conv.Fit, err = gravity.Fits.Find(c.String("fit")); err != nil {
		return conv, gravity.Pair{}, err
	}
	switch m := c.String("modulus"); m {
	case "", "145":
	case "144.3", "144,3":
		conv.Modulus = gravity.Modulus1443
	default:
		return conv, gravity.Pair{}, usageError("", "--modulus: read %.20q, wanted 145 or 144.3", m)
	}
	pair, err := basisOf(c)
	return conv, pair, err
}

// basisOf reads --basis, a usage error when it cannot be read.
func basisOf(c *cli.Context) (gravity.Pair, error) {
	text := c.String("basis")
	if text == "" {
		return gravity.Pair2020, nil
	}
	pair, err := asread.ParsePair(text)
	if err != nil {
		return pair, usageError(hintOf(err), "--basis: %v", err)
	}
	return pair, nil
}

// converted is one value on every scale.
type converted struct {
	typed asread.Reading
	fig   gravity.Figures
	half  gravity.Figures // half a typed place higher, for the ±
}

func convertOne(conv gravity.Converter, pair gravity.Pair, typed asread.Reading) (converted, error) {
	one := converted{typed: typed}
	var err error
	if one.fig, err = conv.Convert(typed.Scale, typed.Value, pair); err != nil {
		return one, err
	}
	// Near the end of a scale half a place higher may not exist; then no ±.
	if one.half, err = conv.Convert(typed.Scale, typed.Value+typed.Step/2, pair); err != nil {
		one.half = one.fig
	}
	if typed.Scale.IsMass() || typed.Scale == gravity.ScaleDensity || typed.Scale == gravity.ScaleGPL || pair == gravity.Pair2020 {
		return one, nil
	}
	one.fig.Notes = append(one.fig.Notes, method.Note{
		Code: method.OtherBasis, Text: "converted from " + pair.String() + " as a sucrose solution; a fermented liquid expands otherwise",
	})
	return one, nil
}

func (b *bench) convert(c *cli.Context) error {
	if c.IsSet("rows") {
		return b.convertRows(c)
	}
	if err := rowsAlone(c); err != nil {
		return err
	}
	if c.Args().Len() == 0 {
		return missing(c.Command, "a value")
	}
	conv, pair, err := converterOf(c)
	if err != nil {
		return err
	}
	show, err := scaleList(c.String("to"))
	if err != nil {
		return err
	}
	var done []converted
	refused := b.each(c, false, func(fields []string) error {
		if len(fields) != 1 {
			return dataError("one value a line", "read %d values, wanted one", len(fields))
		}
		typed, err := b.reading(fields[0])
		if err != nil {
			return err
		}
		one, err := convertOne(conv, pair, typed)
		if err == nil {
			done = append(done, one)
		}
		return err
	})
	return b.finish(refused, len(done), func() error { return b.print(convertSheet(conv, pair, show, done)) })
}

// column is one scale as it is shown.
type column struct {
	id, field string
	label     string
	unit      string
	places    int
	of        func(gravity.Figures) float64
}

var columns = []column{
	{"sg", "sg_20_20", "specific gravity", "SG 20/20", 4, func(f gravity.Figures) float64 { return float64(f.SG) }},
	{"points", "gravity_points", "gravity points", "points", 1, func(f gravity.Figures) float64 { return float64(f.Points) }},
	{"plato", "extract_pct_mass", "extract by mass", "°P", 2, func(f gravity.Figures) float64 { return float64(f.Extract) }},
	{"gpl", "extract_g_per_l", "extract", "g/L", 1, func(f gravity.Figures) float64 { return float64(f.GPL) }},
	{"density", "density_kg_m3_20c", "density at 20 °C", "kg/m³", 2, func(f gravity.Figures) float64 { return float64(f.Density) }},
	{"oechsle", "oechsle", "Oechsle", "°Oe", 1, func(f gravity.Figures) float64 { return f.Oechsle }},
	{"kmw", "kmw", "KMW", "°KMW", 2, func(f gravity.Figures) float64 { return f.KMW }},
	{"baume", "baume", "Baumé", "°Bé", 2, func(f gravity.Figures) float64 { return f.Baume }},
	{"twaddell", "twaddell", "Twaddell", "°Tw", 2, func(f gravity.Figures) float64 { return f.Twaddell }},
	{"long", "long_lb_per_barrel", "long", "lb/brl", 1, func(f gravity.Figures) float64 { return f.Long }},
}

// scaleList picks the columns of --to; all but long when it is empty.
func scaleList(list string) ([]column, error) {
	if strings.TrimSpace(list) == "" {
		return columns[:len(columns)-1], nil
	}
	var picked []column
	for _, id := range strings.Split(list, ",") {
		id = strings.TrimSpace(id)
		if id == "long" {
			if long := columns[len(columns)-1]; !slices.ContainsFunc(picked, func(p column) bool { return p.id == long.id }) {
				picked = append(picked, long)
			}
			continue
		}
		scale, err := asread.ParseScale(id)
		if err != nil {
			return nil, usageError("", "--to: %v, long", err)
		}
		if scale == gravity.ScaleBrix {
			scale = gravity.ScalePlato
		}
		for _, col := range columns {
			if col.id == scale.String() && !slices.ContainsFunc(picked, func(p column) bool { return p.id == col.id }) {
				picked = append(picked, col)
			}
		}
	}
	return picked, nil
}

func scaleIDs() string {
	var all []string
	for _, s := range gravity.Scales() {
		all = append(all, s.ID)
	}
	return strings.Join(all, ", ")
}

// convertFields names the fields of a record.
func convertFields(show []column) []string {
	names := []string{"input", "read_as", "fit"}
	for _, col := range show {
		names = append(names, col.field)
		if col.id == "baume" {
			names = append(names, "baume_modulus")
		}
	}
	return append(names, "notes")
}

func convertRecord(conv gravity.Converter, show []column, names []string, one converted) tables.Record {
	values := []any{one.typed.Input, one.typed.ReadAs(), conv.Fit.ID}
	for _, col := range show {
		values = append(values, col.of(one.fig))
		if col.id == "baume" {
			values = append(values, float64(conv.Modulus))
		}
	}
	return record(names, append(values, neutral(one.fig.Notes)))
}

func convertSheet(conv gravity.Converter, pair gravity.Pair, show []column, done []converted) sheet {
	s := sheet{name: "convert", columns: convertFields(show)}
	for _, one := range done {
		s.records = append(s.records, convertRecord(conv, show, s.columns, one))
		s.explain = append(s.explain, gravity.ExplainConversion(conv, one.typed.Scale, one.typed.Value, pair, one.fig)...)
	}
	switch {
	case len(done) == 1:
		s.ladder = convertLadder(conv, pair, show, done[0])
	case len(done) > 1:
		s.tables = []tables.Table{convertTable(conv, show, done)}
	}
	return s
}

func convertLadder(conv gravity.Converter, pair gravity.Pair, show []column, one converted) *tables.Ladder {
	read := one.typed.ReadAs()
	if one.typed.Scale == gravity.ScaleSG {
		read += " on " + pair.String()
	}
	l := &tables.Ladder{Rungs: []tables.Rung{{Name: "read", Value: one.typed.Typed.String(), Remark: read}}}
	for _, col := range show {
		v := col.of(one.fig)
		text := fixed(v, col.places) + " " + col.unit
		if col.id == "plato" || col.id == "sg" || len(show) == 1 {
			l.Answer = append(l.Answer, text)
		}
		half := col.of(one.half) - v
		remark := fmt.Sprintf("%s ±%s", col.unit, fixed(max(half, -half), col.places+1))
		switch col.id {
		case "plato":
			remark += " °P, °Bx, % mass; fit " + conv.Fit.ID
			remark = strings.Replace(remark, "°P ±", "±", 1)
		case "baume":
			remark += fmt.Sprintf("; modulus %g on SG %s", float64(conv.Modulus), baumePair(conv))
		}
		l.Rungs = append(l.Rungs, tables.Rung{Name: col.label, Value: fixed(v, col.places), Remark: remark})
	}
	if len(l.Answer) == 0 {
		l.Answer = []string{fixed(show[0].of(one.fig), show[0].places) + " " + show[0].unit}
	}
	l.Lines = []string{"± is half the last place typed; the fit's own error is in gylebook sources " + conv.Fit.ID}
	return l
}

func baumePair(conv gravity.Converter) gravity.Pair {
	fn, _ := gravity.RelativeScale(gravity.ScaleBaume, conv.Modulus)
	return fn.Pair
}

func convertTable(conv gravity.Converter, show []column, done []converted) tables.Table {
	t := tables.Table{Columns: []tables.Column{{Head: "read", Align: tables.Left}}}
	for _, col := range show {
		t.Columns = append(t.Columns, tables.Column{Head: col.unit, Align: tables.Right})
	}
	for _, one := range done {
		row := []string{one.typed.ReadAs()}
		for _, col := range show {
			row = append(row, fixed(col.of(one.fig), col.places))
		}
		t.Rows = append(t.Rows, row)
	}
	t.Foot = []string{fmt.Sprintf("fit %s; Baumé modulus %g on SG %s", conv.Fit.ID, float64(conv.Modulus), baumePair(conv))}
	return t
}
