package main

import (
	"errors"
	"fmt"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation"
	"gylebook/gravity"
	"gylebook/gravity/method"
	"gylebook/tables"
)

func (b *bench) attenuationCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "attenuation", Usage: "extracts, apparent and real attenuation, alcohol, energy",
		ArgsUsage: "OG PG",
		Description: `Gravities are corrected readings; real extract is Balling's. "-" reads stdin, OG and PG a line.
			With --limit the distance to the end of a forced fermentation of the same wort, and the carbon dioxide still to come.`,
		Flags: append([]cli.Flag{
			&cli.StringFlag{Name: "limit", Usage: "`AE` gravity that a forced fermentation ended at"},
		}, append(pairFlags(), rowsFlags("og", "pg")...)...),
	}, `gylebook attenuation 1.048 1.010
		gylebook attenuation 12P 2.6P --limit 2.0P
		gylebook attenuation 1.048 1.010 --csv`, b.attenuation)
}

// attenuated is one pair with its attenuations.
type attenuated struct {
	pair
	a     attenuation.Attenuation
	u     attenuation.AttenuationU
	uABV  attenuation.Propagated
	limit *gravity.Figures
}

func (b *bench) attenuation(c *cli.Context) error {
	if c.IsSet("rows") {
		return b.attenuationRows(c)
	}
	if err := rowsAlone(c); err != nil {
		return err
	}
	var done []attenuated
	refused := b.pairs(c, func(p pair) error {
		one := attenuated{pair: p}
		var err error
		if one.a, err = attenuation.Attenuate(p.g); err != nil {
			return err
		}
		if one.u, err = attenuation.PropagateAttenuation(p.fog.SG, p.fpg.SG, p.fit, p.uOG, p.uPG); err != nil {
			return err
		}
		if one.a.ABV > 0 {
			if one.uABV, err = attenuation.PropagateABV(attenuation.ABVMethods.Default().Fn, p.fog.SG, p.fpg.SG, p.fit, p.uOG, p.uPG); err != nil {
				return err
			}
		}
		if text := c.String("limit"); text != "" {
			if one.limit, err = b.limitOf(c, text, one.a.OE); err != nil {
				return err
			}
		}
		done = append(done, one)
		return nil
	})
	return b.finish(refused, len(done), func() error { return b.print(b.attenuationSheet(done)) })
}

// limitOf reads the apparent extract of a forced fermentation.
func (b *bench) limitOf(c *cli.Context, text string, oe gravity.Plato) (*gravity.Figures, error) {
	conv, basis, err := converterOf(c)
	if err != nil {
		return nil, err
	}
	typed, err := b.reading(text)
	if err != nil {
		return nil, err
	}
	f, err := conv.ConvertFermented(typed.Scale, typed.Value, basis, oe)
	if err != nil {
		return nil, err
	}
	if f.Extract >= oe {
		return nil, dataError("type the gravity at which the forced sample stood still",
			"--limit: read %s, wanted below the original extract %s °P", typed.ReadAs(), fixed(float64(oe), 2))
	}
	return &f, nil
}

var attenuationColumns = []string{
	"original_extract_pct_mass", "apparent_extract_pct_mass", "real_extract_pct_mass", "apparent_attenuation_pct",
	"apparent_attenuation_points_pct", "real_attenuation_pct", "rdf_pct", "abw_pct", "abv_pct_20c",
	"energy_kcal_per_100ml", "residual_extract_g_per_l", "limit_difference_pct", "notes",
}

// void says that a present gravity above the original was let pass: there is no
// attenuation to give.
func (one attenuated) void() bool { return errors.Is(one.g.Check(), attenuation.ErrOrder) }

// difference is limit minus apparent attenuation, nil without a limit.
func (one attenuated) difference() *float64 {
	if one.limit == nil || one.void() {
		return nil
	}
	d := attenuation.LimitDifference(one.a.OE, one.a.AE, one.limit.Extract)
	return &d
}

func (one attenuated) record(columns []string) tables.Record {
	a := one.a
	values := []any{
		float64(a.OE), float64(a.AE), float64(a.RE), a.Apparent, a.ApparentPoints, a.Real, a.RDF,
		float64(a.ABW), float64(a.ABV), a.EnergyKcal100mL, float64(a.ResidualGPL), number(one.difference()), neutral(one.notesOf()),
		one.og.Input, one.pg.Input,
	}
	if one.void() {
		// All but the two extracts as read.
		for i := 2; i < 12; i++ {
			values[i] = nil
		}
	}
	return record(columns, values)
}

func (b *bench) attenuationSheet(done []attenuated) sheet {
	columns := b.lineFields(attenuationColumns, "original_input", "present_input")
	s := sheet{name: "attenuation", columns: columns}
	for _, one := range done {
		s.records = append(s.records, one.record(columns))
		if !one.void() {
			s.explain = append(s.explain, attenuation.ExplainAttenuation(one.g, one.a)...)
		}
		if one.limit != nil {
			s.notes = append(s.notes, cautionContainers)
		}
	}
	switch {
	case len(done) == 1:
		s.ladder = done[0].ladder()
	case len(done) > 1:
		s.tables = []tables.Table{attenuationTable(done)}
	}
	return s
}

// notesOf are the notes of the readings and, with a limit, the carbon dioxide
// that what is left can give.
func (one attenuated) notesOf() []method.Note {
	notes := append([]method.Note{}, one.notes...)
	if d := one.difference(); d != nil {
		if *d < 0 {
			notes = append(notes, method.Note{Code: method.OutOfRange, Text: "the present gravity is below the limit of attenuation: was the forced sample at its end?"})
		}
		points := float64(one.g.FG.Points() - one.limit.SG.Points())
		g, vol := attenuation.CO2ToCome(points)
		if g > 0 {
			notes = append(notes, method.Note{Code: "co2-to-come", Text: fmt.Sprintf(
				"%s points to the limit: up to %s g/L or %s volumes of CO2 more, besides what is dissolved and what priming adds",
				fixed(points, 1), fixed(g, 1), fixed(vol, 1))})
		}
	}
	return notes
}

func (one attenuated) ladder() *tables.Ladder {
	a, u := one.a, one.u
	if one.void() {
		return &tables.Ladder{
			Answer: []string{"no attenuation: the present gravity is not below the original"},
			Rungs: []tables.Rung{
				{Name: "original", Value: fixed(float64(one.g.OG), 4), Remark: "SG 20/20, read as " + one.og.ReadAs()},
				{Name: "present", Value: fixed(float64(one.g.FG), 4), Remark: "SG 20/20, read as " + one.pg.ReadAs()},
			},
		}
	}
	pm := func(p attenuation.Propagated, places int) string { return "±" + fixed(p.Expanded, places) }
	l := &tables.Ladder{
		Answer: []string{
			fixed(a.Apparent, 1) + " % apparent " + pm(u.Apparent, 1),
			fixed(a.Real, 1) + " % real " + pm(u.Real, 1),
			fixed(float64(a.ABV), 2) + " % vol " + pm(one.uABV, 2),
		},
		Rungs: []tables.Rung{
			{Name: "original", Value: fixed(float64(one.g.OG), 4), Remark: "SG 20/20, read as " + one.og.ReadAs()},
			{Name: "present", Value: fixed(float64(one.g.FG), 4), Remark: "SG 20/20, read as " + one.pg.ReadAs()},
			{Name: "original extract", Value: fixed(float64(a.OE), 2), Remark: "°P"},
			{Name: "apparent extract", Value: fixed(float64(a.AE), 2), Remark: "°P"},
			{Name: "real extract", Value: fixed(float64(a.RE), 2), Remark: "°P " + pm(u.RE, 2) + " (Balling)"},
			{Name: "apparent attenuation", Value: fixed(a.Apparent, 1), Remark: "% on extract; " + fixed(a.ApparentPoints, 1) + " % on points"},
			{Name: "real attenuation", Value: fixed(a.Real, 1), Remark: "% on extract"},
			{Name: "RDF", Value: fixed(a.RDF, 1), Remark: "% (ASBC)"},
			{Name: "alcohol", Value: fixed(float64(a.ABV), 2), Remark: "% vol at 20 °C; " + fixed(float64(a.ABW), 2) + " % mass (balling)"},
			{Name: "energy", Value: fixed(a.EnergyKcal100mL, 1), Remark: "kcal per 100 mL (ASBC, ash as 0.1 g/100 g)"},
			{Name: "residual extract", Value: fixed(float64(a.ResidualGPL), 1), Remark: "g/L at 20 °C"},
		},
	}
	if d := one.difference(); d != nil {
		l.Rungs = append(l.Rungs, tables.Rung{
			Name: "to the limit", Value: fixed(*d, 1),
			Remark: fmt.Sprintf("%% apparent attenuation; %s gravity points above the forced sample", fixed(float64(one.g.FG.Points()-one.limit.SG.Points()), 1)),
		})
	}
	l.Lines = []string{"± is k=2 from the digits typed, for % vol with the method's own 0.3; instrument error not included"}
	return l
}

func attenuationTable(done []attenuated) tables.Table {
	right := func(head string) tables.Column { return tables.Column{Head: head, Align: tables.Right} }
	t := tables.Table{
		Columns: []tables.Column{{Head: "original"}, {Head: "present"}, right("OE °P"), right("AE °P"), right("RE °P"), right("apparent %"), right("real %"), right("RDF %"), right("% vol")},
		Foot:    []string{"attenuations on extract; by Balling; instrument error not included"},
	}
	for _, one := range done {
		if one.void() {
			t.Rows = append(t.Rows, []string{one.og.ReadAs(), one.pg.ReadAs(), fixed(float64(one.a.OE), 2), fixed(float64(one.a.AE), 2), "—", "—", "—", "—", "—"})
			continue
		}
		a := one.a
		t.Rows = append(t.Rows, []string{
			one.og.ReadAs(), one.pg.ReadAs(), fixed(float64(a.OE), 2), fixed(float64(a.AE), 2), fixed(float64(a.RE), 2),
			fixed(a.Apparent, 1), fixed(a.Real, 1), fixed(a.RDF, 1), fixed(float64(a.ABV), 2),
		})
	}
	return t
}
