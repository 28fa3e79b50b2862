package exchange

import (
	"fmt"
	"math"
	"strings"

	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/tables/dialect"
)

// gravity takes the typed reading and its scale, and puts right a 1048 that was
// 1.048.
func (rs *Rows) gravity(row *Row, cell, scaleCell string) error {
	if err := rs.sameMark(cell); err != nil {
		return err
	}
	id := scaleCell
	if id == "" && rs.opt.Scale != nil && row.Reading.Instrument != "" {
		id = rs.opt.Scale(row.Reading.Instrument)
	}
	scale := gravity.ScaleSG
	if id != "" {
		var err error
		if scale, err = asread.ParseScale(id); err != nil {
			return err
		}
	}
	text := withMark(cell, '.')
	if scale == gravity.ScaleSG {
		if whole, ok := thousandths(text); ok {
			row.Repairs = append(row.Repairs, Repair{row.Line, colText, cell, whole})
			text = whole
		}
	}
	meant, err := asread.ParseReading(text, scale)
	if err != nil {
		return err
	}
	// A suffix says more than the column: the scale is kept as it was meant.
	if scaleCell == "" {
		scale = meant.Scale
	}
	row.Reading.Gravity = journal.Typed{Text: text, Scale: scale.String()}
	return nil
}

// figures takes the derived columns, with the decimals they have in the file.
func (rs *Rows) figures(row *Row, fields []string) error {
	if !rs.header.derived {
		return nil
	}
	for i, at := range rs.header.figures {
		if at < 0 {
			continue
		}
		cell := strings.TrimSpace(dialect.Strip(fields[at]))
		if cell == "" {
			continue
		}
		name := figureColumns[i].name
		if err := rs.sameMark(cell); err != nil {
			return fmt.Errorf("%s: %w", name, err)
		}
		text := withMark(cell, '.')
		if i == figSG {
			if whole, ok := thousandths(text); ok {
				row.Repairs = append(row.Repairs, Repair{row.Line, name, cell, whole})
				text = whole
			}
		}
		v, err := asread.ParseNumber(text)
		if err != nil { // "#N/A" is no reason to refuse what was typed
			row.claims.set(i, 0)
			row.places[i] = noNumber
			continue
		}
		row.claims.set(i, v.Float())
		row.places[i] = int8(v.Places())
	}
	return nil
}

// claim is what a file has in its derived columns for one reading, kept small: a
// file may have a million of them.
type claim struct {
	value  [figCount]float64
	places [figCount]int8 // or absent, noNumber
}

const (
	absent   = -1
	noNumber = -2
)

func claimOf(row *Row) (claim, bool) {
	c, some := claim{value: row.claims.value, places: row.places}, false
	for i, known := range row.claims.known {
		if !known {
			c.places[i] = absent
		}
		some = some || known
	}
	return c, some
}

// differs reports whether ours is more than one unit of the file's last digit, or of
// our own where that is the coarser, away from the file's figure.
func (c *claim) differs(i int, ours float64) bool {
	if c.places[i] == noNumber {
		return true
	}
	places := min(int(c.places[i]), figureColumns[i].places)
	unit := math.Pow10(-places)
	return !(math.Abs(c.value[i]-ours) <= unit*(1+1e-9))
}

// text returns the file's figure.
func (c *claim) text(i int) string {
	if c.places[i] == noNumber {
		return "not a number"
	}
	return asread.Fixed(c.value[i], int(c.places[i]), asread.HalfEven)
}
