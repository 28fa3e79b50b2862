package sqlstore

import (
	"time"

	"gylebook/attenuation/journal"
)

var batches = table[journal.Batch]{
	name:    "batch",
	columns: []string{"id", "product", "vessel", "volume_l", "yeast", "generation", "parent", "pitched", "opened", "began_ms", "note"},
	dest: func(b *journal.Batch) []any {
		return []any{
			&b.ID, &b.Product, &b.Vessel, &b.Volume, &b.Yeast, &b.Generation, &b.Parent,
			optionalStamp{&b.Pitched},
			stampOf{&b.Opened},
			millisOf{func() time.Time { return began(b) }},
			&b.Note,
		}
	},
	args: func(b *journal.Batch) []any {
		var pitched any
		if b.Pitched != nil {
			pitched = stamp(*b.Pitched)
		}
		return []any{
			b.ID, b.Product, b.Vessel, b.Volume, b.Yeast, b.Generation, b.Parent, pitched, stamp(b.Opened),
			millisecond(began(b)), b.Note,
		}
	},
}

var ogs = table[journal.OG]{
	name:    "batch_og",
	columns: []string{"batch", "at", "at_ms", "gravity_text", "gravity_scale", "temp_text", "temp_unit", "instrument"},
	dest: func(o *journal.OG) []any {
		return []any{&o.Batch, stampOf{&o.At}, millis(&o.At), &o.Gravity.Text, &o.Gravity.Scale, &o.Temp.Text, &o.Temp.Unit, &o.Instrument}
	},
	args: func(o *journal.OG) []any {
		return []any{o.Batch, stamp(o.At), millisecond(o.At), o.Gravity.Text, o.Gravity.Scale, o.Temp.Text, o.Temp.Unit, o.Instrument}
	},
}

var limits = table[journal.Limit]{
	name:    "batch_limit",
	columns: []string{"batch", "at", "at_ms", "gravity_text", "gravity_scale"},
	dest: func(l *journal.Limit) []any {
		return []any{&l.Batch, stampOf{&l.At}, millis(&l.At), &l.Gravity.Text, &l.Gravity.Scale}
	},
	args: func(l *journal.Limit) []any {
		return []any{l.Batch, stamp(l.At), millisecond(l.At), l.Gravity.Text, l.Gravity.Scale}
	},
}

var volumes = table[journal.Volume]{
	name:    "batch_volume",
	columns: []string{"batch", "at", "at_ms", "volume_l"},
	dest:    func(v *journal.Volume) []any { return []any{&v.Batch, stampOf{&v.At}, millis(&v.At), &v.Volume} },
	args:    func(v *journal.Volume) []any { return []any{v.Batch, stamp(v.At), millisecond(v.At), v.Volume} },
}

var closes = table[journal.Close]{
	name:    "batch_close",
	columns: []string{"batch", "at", "at_ms", "note"},
	dest:    func(c *journal.Close) []any { return []any{&c.Batch, stampOf{&c.At}, millis(&c.At), &c.Note} },
	args:    func(c *journal.Close) []any { return []any{c.Batch, stamp(c.At), millisecond(c.At), c.Note} },
}

var readings = table[journal.Reading]{
	name:   "reading",
	copies: true,
	columns: []string{
		"batch", "vessel", "taken_at", "taken_ms", "time_quality", "gravity_text", "gravity_scale", "temp_text", "temp_unit",
		"instrument", "gassy", "keep_reason", "note",
	},
	dest: func(r *journal.Reading) []any {
		return []any{
			&r.Batch, &r.Vessel,
			stampOf{&r.TakenAt},
			millis(&r.TakenAt), &r.Quality, &r.Gravity.Text, &r.Gravity.Scale, &r.Temp.Text, &r.Temp.Unit,
			&r.Instrument, &r.Gassy, &r.Keep, &r.Note,
		}
	},
	args: func(r *journal.Reading) []any {
		gassy := 0
		if r.Gassy {
			gassy = 1
		}
		return []any{
			r.Batch, r.Vessel, stamp(r.TakenAt), millisecond(r.TakenAt), r.Quality, r.Gravity.Text, r.Gravity.Scale, r.Temp.Text, r.Temp.Unit,
			r.Instrument, gassy, r.Keep, r.Note,
		}
	},
}

// leanReadings have what figures are made of; the batch is that of the record.
var leanReadings = table[journal.Reading]{
	name:    readings.name,
	columns: []string{"taken_at", "gravity_text", "gravity_scale", "temp_text", "temp_unit", "instrument", "gassy", "keep_reason"},
	dest: func(r *journal.Reading) []any {
		return []any{
			stampOf{&r.TakenAt},
			&r.Gravity.Text, &r.Gravity.Scale, &r.Temp.Text, &r.Temp.Unit, &r.Instrument, &r.Gassy, &r.Keep,
		}
	},
}

var events = table[journal.Event]{
	name: "batch_event",
	columns: []string{
		"batch", "at", "at_ms", "what", "mass_kg", "volume_l", "gravity_text", "gravity_scale", "from_batch", "vessel", "note",
	},
	dest: func(e *journal.Event) []any {
		return []any{
			&e.Batch, stampOf{&e.At}, millis(&e.At), &e.What, &e.MassKg, &e.VolumeL, &e.Gravity.Text, &e.Gravity.Scale, &e.From, &e.Vessel, &e.Note,
		}
	},
	args: func(e *journal.Event) []any {
		return []any{
			e.Batch, stamp(e.At), millisecond(e.At), e.What, e.MassKg, e.VolumeL, e.Gravity.Text, e.Gravity.Scale, e.From, e.Vessel, e.Note,
		}
	},
}

// given is events seen from the batch that was blended into others.
var given = func() table[journal.Event] {
	t := events
	t.owner = "from_batch"
	return t
}()
