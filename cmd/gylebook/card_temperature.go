package main

import (
	"cmp"
	"math"
	"strconv"

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
	def, head := span{6, 34, 2}, "°C"
	if b.set.units == asread.F {
		def, head = span{44, 92, 3}, "°F"
	}
	rows, err := spanOf(c, def, func(text string) (float64, error) {
		t, err := b.temperature(text)
		if b.set.units == asread.F {
			return t.C.Fahrenheit(), err
		}
		return float64(t.C), err
	})
	if err != nil {
		return report.Card{}, err
	}
	t := &tables.Table{Title: "add to the reading", Columns: []tables.Column{{Head: head, Align: tables.Right}}}
	for _, mark := range marks {
		t.Columns = append(t.Columns, tables.Column{Head: markText(scale, mark), Align: tables.Right})
	}
	var used method.Info
	err = rows.each(func(v float64) error {
		temp := gravity.Celsius(v)
		if b.set.units == asread.F {
			temp = gravity.FromFahrenheit(v)
		}
		row := []string{fixed(v, 0)}
		if v != math.Trunc(v) {
			row[0] = fixed(v, 1)
		}
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

// markText is a reading over a column.
func markText(scale gravity.Scale, mark float64) string {
	if scale == gravity.ScaleSG {
		return fixed(mark, 3)
	}
	return strconv.FormatFloat(mark, 'f', -1, 64)
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
	liquid := "before fermentation"
	if r.og != "" {
		liquid = "fermenting from " + r.og
	}
	return []string{
		"hydrometer in " + h.Scale.Info().Name + " " + h.Basis.String() + ", " + h.Body.ID + ", read at the " + string(r.meniscus),
		own,
		"liquid " + liquid + "; relation " + m.ID + " (" + m.Source.String() + ")",
	}
}
