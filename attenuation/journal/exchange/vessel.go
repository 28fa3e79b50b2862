package exchange

import (
	"context"
	"fmt"
	"strings"

	"gylebook/attenuation/journal"
)

// settle gives the batches that are made their vessels: two open ones are not in
// one. When the earlier of them ended is not known from their readings alone.
func (d *draft) settle(ctx context.Context) error {
	newest := make(map[string]string)
	for _, id := range d.made {
		v := strings.ToLower(d.p.batches[id].body.Vessel)
		if had := newest[v]; had == "" || d.p.batches[id].later(d.p.batches[had]) {
			newest[v] = id
		}
	}
	delete(newest, "")
	here := make(map[string]string)
	if len(newest) > 0 {
		if err := d.openVessels(ctx); err != nil {
			return err
		}
		for v, ids := range d.vessels {
			here[strings.ToLower(v)] = strings.Join(ids, " and ")
		}
	}
	var older, ousted []string
	for _, id := range d.made {
		f := d.p.batches[id]
		switch v := strings.ToLower(f.body.Vessel); {
		case v == "":
		case here[v] != "":
			ousted = append(ousted, fmt.Sprintf("%s (%s holds %s)", id, f.body.Vessel, here[v]))
			f.body.Vessel = ""
		case newest[v] != id:
			older = append(older, fmt.Sprintf("%s (%s)", id, f.body.Vessel))
			f.body.Vessel = ""
		}
		d.out = append(d.out, f.body)
		for _, g := range f.ogs {
			d.out = append(d.out, g)
		}
	}
	d.bare(older, "for a newer one of the file has it")
	d.bare(ousted, "for an open one of the journal has it")
	return nil
}

// later reports whether f began after g, by its readings.
func (f *facts) later(g *facts) bool {
	if !f.body.Opened.Equal(g.body.Opened) {
		return f.body.Opened.After(g.body.Opened)
	}
	return f.last.After(g.last)
}

// bare notes the batches that are made without a vessel.
func (d *draft) bare(list []string, why string) {
	const named = 12
	what := "batches are"
	switch len(list) {
	case 0:
		return
	case 1:
		what = "batch is"
	}
	names := strings.Join(list[:min(named, len(list))], ", ")
	if more := len(list) - named; more > 0 {
		names += fmt.Sprintf(" and %d more", more)
	}
	d.report.Notes = append(d.report.Notes, fmt.Sprintf("%d %s made without a vessel, %s: %s", len(list), what, why, names))
}

// openVessels finds which open batches of the journal are in which vessel.
func (d *draft) openVessels(ctx context.Context) error {
	if d.vessels != nil {
		return nil
	}
	open, err := d.r.OpenLast(ctx, 1)
	if err != nil {
		return err
	}
	d.vessels = make(map[string][]string)
	for _, rec := range open {
		v := journal.View{Record: rec}.Vessel()
		d.vessels[v] = append(d.vessels[v], rec.Batch.ID)
	}
	return nil
}

// inVessel returns the one open batch in a vessel, or why there is none.
func (d *draft) inVessel(ctx context.Context, vessel string) (id, why string, err error) {
	if err := d.openVessels(ctx); err != nil {
		return "", "", err
	}
	switch ids := d.vessels[vessel]; len(ids) {
	case 1:
		return ids[0], "", nil
	case 0:
		known := make([]string, 0, len(d.vessels))
		for v := range d.vessels {
			known = append(known, v)
		}
		return "", fmt.Sprintf("no open batch in vessel %.40q%s", vessel, nearest(vessel, known)), nil
	default:
		return "", fmt.Sprintf("vessel %s holds %s, wanted %s too", vessel, strings.Join(ids, " and "), colBatch), nil
	}
}
