package main

import (
	"context"
	"errors"
	"net/http"
	"slices"
	"strconv"

	"gylebook/attenuation/journal"
	"gylebook/tables"
	"gylebook/tables/web"
)

// Batch implements web.Desk with batch show and the course of the batch.
func (d *desk) Batch(ctx context.Context, name, operator string) (web.Batch, error) {
	out, _, _, err := d.batch(ctx, name)
	if err != nil {
		return web.Batch{}, refused(err)
	}
	form, err := d.form(ctx, operator)
	if err != nil {
		return web.Batch{}, refused(err)
	}
	out.Form = form
	out.LastEntry, err = d.lastEntry(ctx, out.Batch, operator)
	return out, refused(err)
}

// noPage is what a name that no batch has is for a page.
func noPage(err error) error {
	var exit *exitError
	if errors.As(err, &exit) && exit.code == exitData {
		return &web.Refused{Status: http.StatusNotFound, Text: tables.Clean(exit.text), Hint: tables.Clean(exit.hint)}
	}
	return err
}

// renamed gives a table without a title one, and heads to columns without: a page
// reads them out.
func renamed(list []tables.Table, title string) []tables.Table {
	for k := range list {
		if list[k].Title == "" {
			list[k].Title = title
		}
		if n := len(list[k].Columns); n > 0 && list[k].Columns[n-1].Head == "" {
			list[k].Columns[n-1].Head = "remark"
		}
	}
	return list
}

// lastEntry is the number of the operator's last entry when it is a reading of this
// batch: what undo takes back.
func (d *desk) lastEntry(ctx context.Context, batch, operator string) (string, error) {
	if operator == "" {
		return "", nil
	}
	e, err := d.store.LastBy(ctx, operator)
	if errors.Is(err, journal.ErrNotFound) {
		return "", nil
	}
	if err != nil {
		return "", err
	}
	if r, ok := e.Body.(journal.Reading); ok && r.Batch == batch {
		return strconv.FormatInt(e.Number, 10), nil
	}
	return "", nil
}

// form offers the instruments in use, the operator's last one chosen.
func (d *desk) form(ctx context.Context, operator string) (web.Form, error) {
	list, err := d.instruments(ctx)
	if err != nil {
		return web.Form{}, err
	}
	last, err := d.store.LastInstrumentBy(ctx, operator)
	if err != nil {
		return web.Form{}, err
	}
	var f web.Form
	for _, rec := range list {
		if rec.Retired != nil {
			continue
		}
		f.Instruments = append(f.Instruments, web.Choice{Value: rec.Instrument.ID, Text: rec.Instrument.ID + ", " + rec.Instrument.Scale})
		if rec.Instrument.ID == last {
			f.Instrument = last
		}
	}
	switch {
	case f.Instrument != "":
	case len(f.Instruments) == 1:
		f.Instrument = f.Instruments[0].Value
	default:
		// A browser would choose the first one for whoever does not look.
		f.Instruments = slices.Insert(f.Instruments, 0, web.Choice{Text: "choose one"})
	}
	f.Instruments = append(f.Instruments, web.Choice{Value: "none", Text: "none of the journal's"})
	return f, nil
}

// Curve implements web.Desk.
func (d *desk) Curve(ctx context.Context, name, form string, phone bool) ([]byte, error) {
	_, sketch, slot, err := d.batch(ctx, name)
	if err != nil {
		return nil, refused(err)
	}
	k := kind{form, phone}
	picture, err := slot.drawing(k).draw(k, sketch)
	return picture, refused(err)
}
