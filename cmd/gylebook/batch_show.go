package main

import (
	"context"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/season"
	"gylebook/tables"
)

func (b *bench) batchShow() *cli.Command {
	return b.sub("batch", &cli.Command{
		Name: "show", Usage: "one batch: facts, readings with corrections, attenuation", ArgsUsage: "BATCH",
		Description: `Readings are corrected with the instrument as it was when they were taken. What is void stays in sight.
			--json prints one record with the batch's figures, its readings and its events; --csv one reading a row.`,
	}, `gylebook batch show B26-014
		gylebook batch show T4 --json`,
		func(c *cli.Context) error {
			if c.Args().Len() != 1 {
				return wanted(c, "one batch")
			}
			return b.withJournal(c.Context, func(s journal.Store) error {
				rec, err := shownBy(c.Context, s, c.Args().First())
				if err != nil {
					return err
				}
				book, err := bookOf(c.Context, s)
				if err != nil {
					return err
				}
				return b.print(b.showSheet(journal.Derive(rec, book)))
			})
		})
}

// shownBy is batchBy that finds void batches too.
func shownBy(ctx context.Context, r journal.Reader, name string) (*journal.Record, error) {
	rec, err := batchBy(ctx, r, name)
	if err != nil {
		if gone := voidBatch(ctx, r, name); gone != nil {
			return gone, nil
		}
	}
	return rec, err
}

func (b *bench) showSheet(v journal.View) sheet {
	s := sheet{name: "batch-show", ladder: b.showLadder(v)}
	readings := make([]tables.Record, len(v.Values))
	for k := range v.Values {
		readings[k] = valueRecord(v, &v.Values[k], nil)
	}
	if b.set.format == tables.CSV {
		s.columns, s.records, s.notes = names(valueRecord(v, new(journal.Value), nil)), readings, v.Notes
		return s
	}
	var rest any
	if at, _, ok := season.LastFall(v.Counting()); ok {
		if d, ok := v.Days(at); ok {
			rest = d
		}
	}
	rec := append(batchFigures(v), tables.Record{
		{Name: "days_to_last_fall", Value: rest},
		{Name: "notes", Value: neutral(v.Notes)},
		{Name: "original_gravities", Value: ogRecords(v)},
		{Name: "readings", Value: readings},
		{Name: "events", Value: eventRecords(v)},
	}...)
	s.records = []tables.Record{rec}
	switch t := b.lineTable(v); {
	case len(t.Rows) == 0:
	case b.narrow():
		s.more = []*tables.Ladder{{Lines: narrowEntries(v)}}
	default:
		s.tables = []tables.Table{t}
	}
	if v.Limit != nil {
		s.notes = append(s.notes, cautionContainers)
	}
	if b.set.explain {
		s.explain = explainBatch(v)
	}
	return s
}

// ogRecords are the readings of the original gravity.
func ogRecords(v journal.View) []tables.Record {
	var out []tables.Record
	for _, og := range v.Record.OGs {
		out = append(out, tables.Record{
			{Name: "entry", Value: int(og.Number)},
			{Name: "at", Value: stampText(og.Body.At)},
			{Name: "input", Value: og.Body.Gravity.Text},
			{Name: "scale", Value: og.Body.Gravity.Scale},
			{Name: "temp_input", Value: nilIfEmpty(og.Body.Temp.Text)},
			{Name: "instrument_id", Value: nilIfEmpty(og.Body.Instrument)},
			{Name: "void", Value: og.Void},
			{Name: "void_reason", Value: nilIfEmpty(og.VoidReason)},
			{Name: "operator", Value: og.By},
		})
	}
	return out
}

// eventRecords are the events, each with the original gravity in force after it.
func eventRecords(v journal.View) []tables.Record {
	var out []tables.Record
	for _, e := range v.Record.Events {
		var oe, sg any
		for _, step := range v.Basis {
			if step.Number == e.Number {
				oe, sg = known(step.OE), known(step.SG)
			}
		}
		out = append(out, tables.Record{
			{Name: "entry", Value: int(e.Number)},
			{Name: "at", Value: stampText(e.Body.At)},
			{Name: "what", Value: e.Body.What},
			{Name: "mass_kg", Value: numberOf(e.Body.MassKg)},
			{Name: "volume_l", Value: numberOf(e.Body.VolumeL)},
			{Name: "gravity_input", Value: nilIfEmpty(e.Body.Gravity.Text)},
			{Name: "gravity_scale", Value: nilIfEmpty(e.Body.Gravity.Scale)},
			{Name: "from_batch_id", Value: nilIfEmpty(e.Body.From)},
			{Name: "to_vessel", Value: nilIfEmpty(e.Body.Vessel)},
			{Name: "effective_og_sg_20_20", Value: sg},
			{Name: "original_extract_pct_mass", Value: oe},
			{Name: "void", Value: e.Void},
			{Name: "void_reason", Value: nilIfEmpty(e.VoidReason)},
			{Name: "note", Value: nilIfEmpty(e.Body.Note)},
			{Name: "operator", Value: e.By},
		})
	}
	return out
}
