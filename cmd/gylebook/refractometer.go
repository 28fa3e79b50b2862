package main

import (
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

func (b *bench) refractometer(c *cli.Context) error {
	args := asread.Join(c.Args().Slice())
	if len(args) != 2 {
		return missing(c.Command, "the original or the present Brix")
	}
	factor, err := asread.ParseNumber(c.String("factor"))
	if err != nil {
		return err
	}
	if factor.Float() < 0.9 || factor.Float() > 1.2 {
		return dataError("type 1.04, or the mean of your own worts", "--factor: read %s, wanted 0.9 to 1.2", factor)
	}
	s := sheet{name: "refractometer", columns: refractometerColumns}
	if factor.Float() < attenuation.WortCorrectionMin || factor.Float() > attenuation.WortCorrectionMax {
		s.notes = append(s.notes, method.Note{Code: method.OutOfRange, Text: "a wort correction factor is usually 1.02 to 1.06 (common practice)"})
	}
	var brix [2]gravity.Plato
	var typed [2]asread.Reading
	for i, text := range args {
		if typed[i], brix[i], err = b.brix(c, text, &s); err != nil {
			return err
		}
		brix[i] /= gravity.Plato(factor.Float())
	}
	t := tables.Table{Columns: []tables.Column{
		{Head: "relation", Align: tables.Left},
		{Head: "SG 20/20", Align: tables.Right},
		{Head: "°P", Align: tables.Right},
		{Head: "% vol", Align: tables.Right},
		{Head: "in range", Align: tables.Left},
	}}
	var first *attenuation.RefractometerEstimate
	for _, e := range attenuation.RefractometerEstimates(brix[0], brix[1]) {
		if e.Err != nil {
			return e.Err
		}
		if first == nil {
			first = &e
		}
		abv, row := refractometerRow(brix[0], e)
		s.records = append(s.records, record(refractometerColumns, []any{e.Info.ID, float64(e.SG), abv, e.InRange, e.Info.Source.String()}))
		t.Rows = append(t.Rows, row)
		for _, n := range e.Notes {
			if n.Code != method.Caution {
				s.notes = append(s.notes, n)
			}
		}
	}
	s.ladder = &tables.Ladder{
		Answer: []string{fixed(float64(first.SG), 4) + " SG 20/20", "by " + first.Info.ID, "no hydrometer value"},
		Rungs: []tables.Rung{
			{Name: "original", Value: typed[0].Typed.String(), Remark: typed[0].ReadAs() + ", wort extract " + fixed(float64(brix[0]), 2) + " °P"},
			{Name: "present", Value: typed[1].Typed.String(), Remark: typed[1].ReadAs() + ", " + fixed(float64(brix[1]), 2) + " after the factor"},
			{Name: "factor", Value: factor.String(), Remark: "wort correction factor"},
		},
	}
	s.tables = []tables.Table{t}
	s.notes = append(s.notes, cautionRefractometer)
	return b.print(s)
}

// brix reads one refractometer reading and corrects its temperature.
func (b *bench) brix(c *cli.Context, text string, s *sheet) (asread.Reading, gravity.Plato, error) {
	r, err := ask(b, text, func(t string) (asread.Reading, error) { return asread.ParseReading(t, gravity.ScaleBrix) })
	if err != nil {
		return r, 0, err
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
		d, _, notes, err := tempcorr.RefractometerCorrection(v, t.C)
		if err != nil {
			return r, 0, err
		}
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
