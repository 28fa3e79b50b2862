package main

import (
	"errors"
	"fmt"
	"strconv"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation"
	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/gravity/method"
	"gylebook/tables"
	"gylebook/tempcorr"
)

func (b *bench) refractometerCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "refractometer", Usage: "present gravity from original and present Brix",
		ArgsUsage: "OG-BRIX PRESENT-BRIX",
		Description: `Both readings are divided by the wort correction factor, the mean of refractometer reading over
			hydrometer °P on your own worts. --temp corrects an instrument without automatic compensation; never use it on
			one that compensates.`,
		Flags: []cli.Flag{
			&cli.StringFlag{Name: "factor", Value: "1.04", Usage: "`F` wort correction factor, 1.02 to 1.06 in practice"},
			&cli.StringFlag{Name: "temp", Usage: "`T` temperature of both samples, 5C to 30C"},
		},
	}, `gylebook refractometer 12.1 6.4
		gylebook refractometer 12.1 6.4 --factor 1.03 --json`, b.refractometer)
}

var refractometerColumns = []string{"method", "sg_20_20", "abv_pct_20c", "in_range", "source"}

// refracted is one pair of Brix readings with every relation's present gravity.
type refracted struct {
	typed [2]asread.Reading
	brix  [2]gravity.Plato // at 20 °C, divided by the factor
	all   []attenuation.RefractometerEstimate
}

func (b *bench) refractometer(c *cli.Context) error {
	if c.Args().Len() == 0 {
		return missing(c.Command, "the original and the present Brix")
	}
	factor, err := flagNumber("factor", c.String("factor"))
	if err != nil {
		return err
	}
	if factor.Float() < 0.9 || factor.Float() > 1.2 {
		return dataError("type 1.04, or the mean of your own worts", "--factor: read %s, wanted 0.9 to 1.2", factor)
	}
	s := sheet{name: "refractometer"}
	if factor.Float() < attenuation.WortCorrectionMin || factor.Float() > attenuation.WortCorrectionMax {
		s.notes = append(s.notes, method.Note{Code: method.OutOfRange, Text: "a wort correction factor is usually 1.02 to 1.06 (common practice)"})
	}
	var done []refracted
	refused := b.each(c, true, func(fields []string) error {
		if len(fields) != 2 {
			return usageError("", "wanted two values, read %d; usage: gylebook %s %s", len(fields), c.Command.Name, c.Command.ArgsUsage)
		}
		one, err := b.refract(c, fields, factor, &s)
		if err == nil {
			done = append(done, one)
		}
		return err
	})
	return b.finish(refused, len(done), func() error {
		s.columns = b.lineFields(refractometerColumns, "original_input", "present_input")
		refractometerSheet(&s, done, factor)
		return b.print(s)
	})
}

// refract reads and estimates one pair.
func (b *bench) refract(c *cli.Context, fields []string, factor asread.Value, s *sheet) (refracted, error) {
	var one refracted
	var err error
	for i, text := range fields {
		if one.typed[i], one.brix[i], err = b.brix(c, text, s); err != nil {
			return one, err
		}
		at20 := float64(one.brix[i])
		one.brix[i] /= gravity.Plato(factor.Float())
		s.explain = append(s.explain, fmt.Sprintf("%s: %.4f °Bx at 20 °C / %s = %.4f", [2]string{"original", "present"}[i], at20, factor, float64(one.brix[i])))
	}
	one.all = attenuation.RefractometerEstimates(one.brix[0], one.brix[1])
	for _, e := range one.all {
		if errors.Is(e.Err, attenuation.ErrOrder) {
			return one, dataError(hintOf(e.Err), "present reading %s is not below the original %s", one.typed[1].ReadAs(), one.typed[0].ReadAs())
		}
		if e.Err != nil {
			return one, e.Err
		}
	}
	s.explain = append(s.explain, attenuation.ExplainRefractometer(one.brix[0], one.brix[1], one.all)...)
	return one, nil
}

// refractometerSheet fills the sheet: one record a relation and pair.
func refractometerSheet(s *sheet, done []refracted, factor asread.Value) {
	t := tables.Table{Columns: []tables.Column{
		{Head: "relation", Align: tables.Left},
		{Head: "SG 20/20", Align: tables.Right},
		{Head: "°P", Align: tables.Right},
		{Head: "% vol", Align: tables.Right},
		{Head: "in range", Align: tables.Left},
	}}
	if len(done) > 1 {
		t.Columns = append([]tables.Column{{Head: "original"}, {Head: "present"}}, t.Columns...)
	}
	for _, one := range done {
		for _, e := range one.all {
			abv, row := refractometerRow(one.brix[0], e)
			s.records = append(s.records, record(s.columns, []any{
				e.Info.ID, float64(e.SG), abv, e.InRange, e.Info.Source.String(), one.typed[0].Input, one.typed[1].Input,
			}))
			if len(done) > 1 {
				row = append([]string{one.typed[0].ReadAs(), one.typed[1].ReadAs()}, row...)
			}
			t.Rows = append(t.Rows, row)
			for _, n := range e.Notes {
				if n.Code != method.Caution {
					s.notes = append(s.notes, n)
				}
			}
		}
	}
	s.tables = []tables.Table{t}
	s.notes = append(s.notes, cautionRefractometer)
	if len(done) == 1 {
		s.ladder = done[0].ladder(factor)
	}
}

func (one refracted) ladder(factor asread.Value) *tables.Ladder {
	lo, hi := one.all[0].SG, one.all[0].SG
	for _, e := range one.all {
		lo, hi = min(lo, e.SG), max(hi, e.SG)
	}
	return &tables.Ladder{
		Answer: []string{
			fixed(float64(one.all[0].SG), 4) + " SG 20/20",
			fixed(float64(lo), 4) + " to " + fixed(float64(hi), 4) + " by " + strconv.Itoa(len(one.all)) + " relations",
		},
		Rungs: []tables.Rung{
			{Name: "original", Value: one.typed[0].Typed.String(), Remark: one.typed[0].ReadAs() + ", wort extract " + fixed(float64(one.brix[0]), 2) + " °P"},
			{Name: "present", Value: one.typed[1].Typed.String(), Remark: one.typed[1].ReadAs() + ", " + fixed(float64(one.brix[1]), 2) + " after the factor"},
			{Name: "factor", Value: factor.String(), Remark: "wort correction factor; for juice and must measure your own"},
		},
	}
}

// brix reads one refractometer reading and corrects its temperature.
func (b *bench) brix(c *cli.Context, text string, s *sheet) (asread.Reading, gravity.Plato, error) {
	r, err := ask(b, text, func(t string) (asread.Reading, error) { return asread.ParseReading(t, gravity.ScaleBrix) })
	if err != nil {
		return r, 0, dataError("type degrees Brix, such as 12.1", "read %.40q, wanted degrees Brix", text)
	}
	if !r.Scale.IsMass() {
		return r, 0, dataError("type 12.1 or 12.1Bx", "read %s, wanted degrees Brix", r.ReadAs())
	}
	v := gravity.Plato(r.Value)
	if text := c.String("temp"); text != "" {
		t, err := b.temperature(text)
		if err != nil {
			return r, 0, err
		}
		d, table, notes, err := tempcorr.RefractometerCorrection(v, t.C)
		if err != nil {
			return r, 0, err
		}
		s.explain = append(s.explain, fmt.Sprintf("%s: at %s add %+.4f (%s: %s)", r.ReadAs(), t.ReadAs(), float64(d), table.ID, table.Source))
		v += d
		s.notes = append(s.notes, notes...)
	}
	return r, v, nil
}

// refractometerRow adds the alcohol that the relation's gravity implies, by the
// default method; nil where it gives none.
func refractometerRow(original gravity.Plato, e attenuation.RefractometerEstimate) (any, []string) {
	fit := gravity.Fits.Default().Fn
	row := []string{e.Info.ID, fixed(float64(e.SG), 4), fixed(float64(fit.Extract(e.SG)), 2), "—", "yes"}
	if !e.InRange {
		row[4] = "no"
	}
	og, err := fit.SG(original)
	if err != nil {
		return nil, row
	}
	g := attenuation.Gravities{OG: og, FG: e.SG, OE: original, AE: fit.Extract(e.SG)}
	a := attenuation.EstimateBy(attenuation.ABVMethods.Default(), g)
	if a.Err != nil {
		return nil, row
	}
	row[3] = fixed(float64(a.Alcohol.ABV), 2)
	return float64(a.Alcohol.ABV), row
}
