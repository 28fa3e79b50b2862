package main

import (
	"context"
	"errors"
	"net/http"
	"strconv"
	"strings"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/tables/web"
)

// logLine is the command that logs a reading as it was typed into a page.
func logLine(r web.Reading, dry bool) (command, values []string) {
	command = []string{"log"}
	flag := func(name, value string) {
		if value = strings.TrimSpace(value); value != "" {
			command = append(command, "--"+name+"="+value)
		}
	}
	flag("taken", r.Taken)
	flag("instrument", r.Instrument)
	flag("keep", r.Keep)
	flag("note", r.Note)
	if dry {
		command = append(command, "--dry-run")
	}
	return command, []string{r.Batch, strings.TrimSpace(r.Gravity), strings.TrimSpace(r.Temp)}
}

// Judge implements web.Desk: what log would say, with nothing written.
func (d *desk) Judge(ctx context.Context, r web.Reading) (web.Judged, error) {
	command, values := logLine(r, true)
	got, err := d.ask(ctx, r.Operator, command, values...)
	var hold *journal.Hold
	if errors.As(err, &hold) && !hold.Final {
		hint, _, _ := strings.Cut(hold.Hint(), ": --keep") // the page asks for the reason itself
		j := web.Judged{Held: hold.Error(), Hint: hint, Taken: d.taken(r)}
		if hold.Closer != "" {
			j.Other = &web.Choice{Value: hold.Closer, Text: strings.TrimSpace(hold.Vessel + " " + hold.Closer)}
		}
		return j, nil
	}
	if err != nil {
		return web.Judged{}, refused(err)
	}
	return web.Judged{Answer: answerOf(got), Taken: d.taken(r)}, nil
}

// taken is the time that a reading is judged for: what is stored a minute later was
// not taken then.
func (d *desk) taken(r web.Reading) string {
	if strings.TrimSpace(r.Taken) != "" {
		return r.Taken
	}
	return d.now().Format(time.RFC3339)
}

// Log implements web.Desk. What it returns is on disk.
func (d *desk) Log(ctx context.Context, r web.Reading) (web.Answer, string, error) {
	command, values := logLine(r, false)
	got, err := d.ask(ctx, r.Operator, command, values...)
	if err != nil {
		return web.Answer{}, "", refused(err)
	}
	entry := ""
	for _, s := range got {
		if s.logged != nil {
			entry = strconv.FormatInt(s.logged.entry.Number, 10)
		}
	}
	return answerOf(got), entry, nil
}

// Undo implements web.Desk with void: of this entry alone, and only while it is the
// operator's last.
func (d *desk) Undo(ctx context.Context, entry, operator, reason string) (web.Answer, error) {
	last, err := d.store.LastBy(ctx, operator)
	if errors.Is(err, journal.ErrNotFound) {
		return web.Answer{}, &web.Refused{Status: http.StatusConflict, Text: "nothing of " + operator + " to take back"}
	}
	if err != nil {
		return web.Answer{}, refused(err)
	}
	if n, err := entryNumber(entry); err != nil || n != last.Number {
		return web.Answer{}, &web.Refused{Status: http.StatusConflict, Text: "entry #" + entry + " is not your last one any more", Hint: "gylebook void N --reason TEXT takes back any entry"}
	}
	if strings.TrimSpace(reason) == "" {
		reason = "undo"
	}
	return d.answer(ctx, operator, []string{"void", "--reason=" + reason}, entry)
}

// Bench implements web.Desk: correct, convert and abv without a batch.
func (d *desk) Bench(ctx context.Context, what string, values map[string]string) (web.Answer, error) {
	get := func(name string) string { return strings.TrimSpace(values[name]) }
	switch what {
	case "correct":
		command := []string{"correct", "--temp=" + get("temp")}
		if id := get("instrument"); id != "" && id != "none" {
			command = append(command, "--instrument="+id)
		}
		if og := get("og"); og != "" {
			command = append(command, "--og="+og)
		}
		return d.answer(ctx, "", command, get("reading"))
	case "convert":
		return d.answer(ctx, "", []string{"convert"}, get("value"))
	case "abv":
		return d.answer(ctx, "", []string{"abv"}, get("og"), get("fg"))
	}
	return web.Answer{}, &web.Refused{Status: http.StatusNotFound, Text: "no such page of the bench"}
}

// BenchForm implements web.Desk.
func (d *desk) BenchForm(ctx context.Context) (web.Form, error) {
	f, err := d.form(ctx, "")
	return f, refused(err)
}
