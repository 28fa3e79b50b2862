package exchange

import (
	"context"
	"fmt"
	"strings"

	"gylebook/attenuation/journal"
)

// inVessel returns the one open batch in a vessel, or why there is none.
func (d *draft) inVessel(ctx context.Context, vessel string) (id, why string, err error) {
	if d.vessels == nil {
		open, err := d.r.Open(ctx)
		if err != nil {
			return "", "", err
		}
		d.vessels = make(map[string][]string)
		for _, rec := range open {
			v := journal.View{Record: rec}.Vessel()
			d.vessels[v] = append(d.vessels[v], rec.Batch.ID)
		}
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
