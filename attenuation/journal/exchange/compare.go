package exchange

import "math"

// compareRow lists the figures that a row has otherwise than the journal.
func (d *draft) compareRow(row *planned, batch string, c *claim, ours *figures) {
	line := row.line
	unsure := row.unsure()
	for i := range figureColumns {
		if c.places[i] == absent || ours.known[i] && !c.differs(i, ours.value[i], unsure) {
			continue
		}
		d.report.DiffersCount++
		if !d.report.listsDifference(line) {
			continue // a file of another hand may differ in every cell
		}
		d.report.differ(Difference{line, batch, figureColumns[i].name, c.text(i), ours.text(i)})
	}
}

// unsure is what our own table leaves open of a temperature [°C]: one typed in °F
// is rounded in it.
func (p *planned) unsure() float64 {
	if !p.own {
		return 0
	}
	t, err := p.reading.Temp.Temperature()
	if err != nil || t.Typed.Places() < finer {
		return 0
	}
	return math.Pow10(-t.Typed.Places()) / 2
}
