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
	for id := range d.made() {
		v := strings.ToLower(d.p.batches[id].vessel)
		if had := newest[v]; had == "" || d.later(id, had) {
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
	var older, ousted named
	for id, t := range d.made() {
		vessel := d.p.batches[id].vessel
		switch v := strings.ToLower(vessel); {
		case v == "":
		case here[v] != "":
			ousted.add("%s (%s holds %s)", id, vessel, here[v])
			t.bare = true
		case newest[v] != id:
			older.add("%s (%s)", id, vessel)
			t.bare = true
		}
	}
	d.bare(older, "for a newer one of the file has it")
	d.bare(ousted, "for an open one of the journal has it")
	return nil
}

// later reports whether one batch that is made began after another, by its readings.
func (d *draft) later(id, than string) bool {
	f, g := d.p.batches[id], d.p.batches[than]
	a, b := f.opened(d.p.opt.Location), g.opened(d.p.opt.Location)
	if !a.Equal(b) {
		return a.After(b)
	}
	return f.last > g.last
}

// named counts things and names the first few.
type named struct {
	names []string
	all   int
}

func (l *named) add(format string, args ...any) {
	if l.all++; l.all <= 12 {
		l.names = append(l.names, fmt.Sprintf(format, args...))
	}
}

// bare notes the batches that are made without a vessel.
func (d *draft) bare(list named, why string) {
	what := "batches are"
	switch list.all {
	case 0:
		return
	case 1:
		what = "batch is"
	}
	names := strings.Join(list.names, ", ")
	if more := list.all - len(list.names); more > 0 {
		names += fmt.Sprintf(" and %d more", more)
	}
	d.report.Notes = append(d.report.Notes, fmt.Sprintf("%d %s made without a vessel, %s: %s", list.all, what, why, names))
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

// house finds the batch of rows that name a vessel alone, or refuses them.
func (d *draft) house(ctx context.Context, vessel string) error {
	rows := d.p.unnamed[vessel]
	id, why, err := d.inVessel(ctx, vessel)
	if err != nil {
		return err
	}
	if why != "" {
		return d.refuseAll([]*rowList{rows}, why, &cursor{s: &d.p.rows}, newUnpacker())
	}
	d.homes[vessel], d.housed[id] = id, rows
	if d.p.batches[id] != nil {
		return nil // found already
	}
	t := new(target)
	d.others[id] = t
	d.order = append(d.order, id)
	return d.aim(ctx, id, t)
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
