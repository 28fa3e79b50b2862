package main

import (
	"context"
	"fmt"
	"strings"
	"time"

	"gylebook/attenuation/journal"
)

// looselyBy finds a batch whose id or vessel is the name but for capitals, open ones
// first; two of them are none.
func looselyBy(ctx context.Context, r journal.Reader, open []*journal.Record, name string) (*journal.Record, error) {
	var alike []*journal.Record
	for _, rec := range open {
		if strings.EqualFold(rec.Batch.ID, name) || strings.EqualFold(vesselOf(rec), name) {
			alike = append(alike, rec)
		}
	}
	if len(alike) == 0 {
		ids, err := r.BatchIDs(ctx)
		if err != nil {
			return nil, err
		}
		for _, id := range ids {
			if !strings.EqualFold(id, name) {
				continue
			}
			if rec, err := r.Batch(ctx, id); err == nil { // else it is void
				alike = append(alike, rec)
			}
		}
	}
	if len(alike) == 1 {
		return alike[0], nil
	}
	return nil, unknownName(ctx, r, open, name)
}

// unknownName says what became of a name that is neither an open vessel nor a batch,
// else which names are most alike.
func unknownName(ctx context.Context, r journal.Reader, open []*journal.Record, name string) error {
	for _, rec := range open {
		if text := leftFor(rec, name); text != "" {
			return dataError("type "+vesselOf(rec)+" or "+rec.Batch.ID, "no open vessel %.40s: %s", name, text)
		}
	}
	if rec := voidBatch(ctx, r, name); rec != nil {
		return dataError("its id is used up; gylebook batch open opens another", "batch %s is void: %s", rec.Batch.ID, rec.VoidReason)
	}
	hint := "gylebook batch open opens one"
	if near := nearestNames(ctx, r, open, name); len(near) > 0 {
		hint = "nearest: " + strings.Join(near, ", ")
	}
	return dataError(hint, "no open vessel and no batch %.40q", name)
}

// leftFor says when and for which vessel a batch left the vessel of this name; "" when
// it was not there.
func leftFor(rec *journal.Record, name string) string {
	in, text := rec.Batch.Vessel, ""
	for _, e := range rec.Events { // in the order of time
		if e.Void || e.Body.Vessel == "" || e.Body.What != journal.Move && e.Body.What != journal.Racking {
			continue
		}
		if in != "" && strings.EqualFold(in, name) {
			text = fmt.Sprintf("%s moved from %s to %s on %s", rec.Batch.ID, in, e.Body.Vessel, e.Body.At.Format("2 Jan"))
		}
		in = e.Body.Vessel
	}
	return text
}

// voidBatch finds a batch that is void, capitals not counting; nil when there is none.
func voidBatch(ctx context.Context, r journal.Reader, name string) *journal.Record {
	ids, err := r.BatchIDs(ctx)
	if err != nil {
		return nil
	}
	for _, id := range ids {
		if !strings.EqualFold(id, name) {
			continue
		}
		for rec, err := range r.Batches(ctx, journal.Filter{Batch: id, Void: true}) {
			if err == nil && rec.Void {
				return rec
			}
		}
	}
	return nil
}

// nearestNames are the three vessels and batches, none of them void, that are most
// like a name.
func nearestNames(ctx context.Context, r journal.Reader, open []*journal.Record, name string) []string {
	names, err := r.BatchIDs(ctx)
	if err != nil {
		return nil
	}
	vessels := map[string]bool{}
	for _, rec := range open {
		if vessel := vesselOf(rec); vessel != "" && !vessels[vessel] {
			vessels[vessel] = true
			names = append(names, vessel)
		}
	}
	var near []string
	for _, one := range journal.Nearest(name, names, len(names)) {
		if len(near) == 3 {
			break
		}
		if !vessels[one] {
			if _, err := r.Batch(ctx, one); err != nil {
				continue // void
			}
		}
		near = append(near, one)
	}
	return near
}

// namesFree refuses an id or a vessel that would stand for two open batches.
func namesFree(open []*journal.Record, id, vessel string) error {
	for _, rec := range open {
		if rec.Batch.ID == id {
			continue
		}
		in := vesselOf(rec)
		switch {
		case vessel != "" && strings.EqualFold(in, vessel):
			return dataError("gylebook batch close "+rec.Batch.ID+", or gylebook event "+rec.Batch.ID+" move --to VESSEL",
				"%s holds %s since %s; close or move it first", in, rec.Batch.ID, day(inSince(rec)))
		case vessel != "" && strings.EqualFold(rec.Batch.ID, vessel):
			return dataError("give the vessel another name", "vessel %s: an open batch is named %s", vessel, rec.Batch.ID)
		case in != "" && strings.EqualFold(in, id):
			return dataError("choose another id", "batch %s: the vessel of %s is named %s", id, rec.Batch.ID, in)
		case strings.EqualFold(rec.Batch.ID, id):
			return dataError("choose another id", "batch %s: an open batch is named %s", id, rec.Batch.ID)
		}
	}
	return nil
}

// inSince is when a batch came into the vessel that it is in.
func inSince(rec *journal.Record) time.Time {
	since := rec.Batch.Opened
	if p := rec.Batch.Pitched; p != nil {
		since = *p
	}
	for _, e := range rec.Events {
		if !e.Void && e.Body.Vessel != "" && (e.Body.What == journal.Move || e.Body.What == journal.Racking) {
			since = e.Body.At
		}
	}
	return since
}
