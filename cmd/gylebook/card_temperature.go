package main

import (
	"cmp"

	"github.com/urfave/cli/v2"

	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/gravity/method"
	"gylebook/tables"
	"gylebook/tables/report"
	"gylebook/tempcorr"
)

// temperatureCard is the correction of every reading of one instrument, as it is at
// the time of printing.
func (b *bench) temperatureCard(c *cli.Context) (report.Card, error) {
	r, err := b.readerOf(c)
	if err != nil {
		return report.Card{}, err
	}
	scale := b.set.scale
	marks := temperatureMarks[scale]
	if len(marks) == 0 {
		return report.Card{}, usageError("", "--scale: read %s, wanted a scale that a hydrometer is divided in", scale)
	}
	h, err := r.hydrometer("", scale)
	if err != nil {
		return report.Card{}, err
	}
	rows, err := b.degreesOf(c, span{6, 34, 2}, span{44, 92, 3})
	if err != nil {
		return report.Card{}, err
	}
	t := &tables.Table{Title: "add to the reading", Columns: []tables.Column{{Head: rows.head(), Align: tables.Right}}}
	for _, mark := range marks {
		t.Columns = append(t.Columns, tables.Column{Head: markText(scale, mark), Align: tables.Right})
	}
	var used method.Info
	err = rows.each(func(temp gravity.Celsius, text string) error {
		row := []string{text}
		for _, mark := range marks {
			res, err := tempcorr.Correct(h, tempcorr.Observation{Reading: mark, T: temp, ReadAt: r.meniscus, OE: r.oe, Method: r.method})
			if err != nil {
				return err
			}
			used = res.Method
			row = append(row, asread.Signed(res.Corrected-mark, scale.Info().Decimals))
		}
		t.Rows = append(t.Rows, row)
		return nil
	})
	return report.Card{
		Title: "Correction for " + cmp.Or(h.ID, "a hydrometer"), Table: t, Made: b.made(),
		Basis: b.cardBasis(r, h, used), Cautions: []string{cautionHot.Text},
	}, err
}

// cardBasis states what the card holds for.
func (b *bench) cardBasis(r reader, h tempcorr.Hydrometer, m method.Info) []string {
	own := "own error of the instrument not included"
	if r.named != nil {
		own = "own error of the instrument included: " + r.named.how
		if len(h.Certificate) == 0 {
			own = "own error of the instrument not known: " + r.named.how
		}
	}
	return []string{
		"hydrometer in " + h.Scale.Info().Name + " " + h.Basis.String() + ", " + h.Body.ID + ", read at the " + string(r.meniscus),
		own,
		"liquid " + r.liquid() + "; relation " + m.ID + " (" + m.Source.String() + ")",
	}
}
