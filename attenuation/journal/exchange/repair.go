package exchange

import (
	"fmt"
	"strings"

	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/tables/dialect"
)

// gravity takes the typed reading and its scale, and puts right a 1048 that was
// 1.048. damaged tells whether a whole number may be such damage.
func (rs *Rows) gravity(row *Row, cell, scaleCell string, damaged bool) error {
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
	if scale == gravity.ScaleSG && damaged {
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

// wholeSG is above every specific gravity that is written with its point.
const wholeSG = 2

// damaged reports whether a whole number in entered_text may have been one with a
// point: in a file of another hand always, in an export of ours, where 1048 is what
// was typed, when the point is gone from its sg_20_20 too.
func damaged(schema, sg string) bool {
	if schema == "" {
		return true
	}
	v, err := asread.ParseNumber(withMark(sg, '.'))
	return err == nil && v.Float() > wholeSG
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
