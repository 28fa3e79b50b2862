package main

import (
	"context"
	"errors"
	"strings"
	"time"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/gravity/asread"
)

func (b *bench) batchCommand() *cli.Command {
	return b.group("batch", "what ferments: facts, readings, attenuation",
		`gylebook batch open B26-014 --vessel T4 --product "Lane Bitter" --og 1.048
		gylebook batch og B26-014 1.0485 20
		gylebook batch limit B26-014 1.009
		gylebook batch volume B26-014 100L
		gylebook batch list
		gylebook batch show B26-014
		gylebook batch close B26-014`,
		b.batchOpen(), b.batchList(), b.batchShow(), b.batchOG(), b.batchLimit(), b.batchVolume(), b.batchClose(),
	)
}

func (b *bench) batchOpen() *cli.Command {
	return b.sub("batch", &cli.Command{
		Name: "open", Usage: "open a batch; its id is never used again", ArgsUsage: "ID --product NAME",
		Description: `A vessel is a name for the batch that is in it, to be used again by later ones. An original gravity
			without --og-temp is one already corrected.`,
		Flags: []cli.Flag{
			&cli.StringFlag{Name: "vessel", Usage: "`V` tank, barrel or bucket that it is in"},
			&cli.StringFlag{Name: "product", Usage: "`NAME` what it is to become"},
			&cli.StringFlag{Name: "og", Usage: "`OG` original gravity"},
			&cli.StringFlag{Name: "og-temp", Usage: "`T` at which --og was read"},
			&cli.StringFlag{Name: "instrument", Usage: "`ID` with which --og was read"},
			&cli.StringFlag{Name: "pitched", Usage: "`TIME` of pitching: \"2026-10-01 18:00\"; else the first reading's"},
			&cli.StringFlag{Name: "volume", Usage: "`V` volume at 20 °C: 100L, 5hl"},
			&cli.StringFlag{Name: "yeast", Usage: "`NAME` of the yeast"},
			&cli.IntFlag{Name: "generation", Usage: "`N` of the yeast"},
			&cli.StringFlag{Name: "parent", Usage: "`BATCH` that the yeast was cropped from"},
			&cli.StringFlag{Name: "at", Usage: "`TIME` of opening; now, or pitching, unless given"},
			&cli.StringFlag{Name: "note", Usage: "`TEXT` anything else"},
		},
	}, `gylebook batch open B26-014 --vessel T4 --product "Lane Bitter" --og 1.048 --volume 100L
		gylebook batch open C26-03 --product "Russet still" --og 1.055 --og-temp 16C --pitched "2026-10-01 18:00"`,
		func(c *cli.Context) error {
			if c.Args().Len() != 1 {
				return wanted(c, "one id")
			}
			body, err := b.batchOf(c)
			if err != nil {
				return err
			}
			return b.writing(c.Context, func(s journal.Store) error { return b.openBatch(c, s, body) })
		})
}

// batchOf reads the flags of a batch.
func (b *bench) batchOf(c *cli.Context) (journal.Batch, error) {
	body := journal.Batch{
		ID: c.Args().First(), Product: c.String("product"), Vessel: c.String("vessel"), Yeast: c.String("yeast"),
		Generation: c.Int("generation"), Parent: c.String("parent"), Note: c.String("note"),
	}
	if body.Product == "" {
		return body, usageError(`add --product "Lane Bitter"`, "--product is missing; usage: gylebook batch open ID --product NAME")
	}
	var err error
	if body.Opened, err = b.past(c, "at"); err != nil {
		return body, err
	}
	if c.String("pitched") != "" {
		at, err := b.past(c, "pitched")
		if err != nil {
			return body, err
		}
		body.Pitched = &at
		if c.String("at") == "" {
			body.Opened = at
		}
	}
	if text := c.String("volume"); text != "" {
		v, err := asread.ParseVolume(text)
		if err != nil {
			return body, dataError(hintOf(err), "--volume: %v", err)
		}
		body.Volume = v.Text
	}
	return body, nil
}

// openBatch writes the batch, with its original gravity where there is one.
func (b *bench) openBatch(c *cli.Context, s journal.Store, body journal.Batch) error {
	bodies := []journal.Body{body}
	if text := c.String("og"); text != "" {
		og, err := b.ogOf(c, s, text, c.String("og-temp"), body.Opened)
		if err != nil {
			return err
		}
		og.Batch, og.At = body.ID, body.Opened
		bodies = append(bodies, og)
	}
	entries, err := b.commit(c.Context, s, func(r journal.Reader) ([]journal.Body, error) {
		open, err := r.OpenLast(c.Context, 0)
		if err != nil {
			return nil, err
		}
		if err := namesFree(open, body.ID, body.Vessel); err != nil {
			return nil, err
		}
		if body.Parent != "" {
			if bodies[0], err = parented(c.Context, r, open, body); err != nil {
				return nil, err
			}
		}
		return bodies, nil
	})
	if errors.Is(err, journal.ErrExists) {
		return dataError("choose another id: the old one keeps its history", "%v", err)
	}
	if err != nil {
		return err
	}
	return b.showBatch(c.Context, s, "batch-open", entries[0], body.ID, "opened "+body.ID)
}

// parented finds the parent of a batch among those of the journal.
func parented(ctx context.Context, r journal.Reader, open []*journal.Record, body journal.Batch) (journal.Batch, error) {
	parent, err := batchBy(ctx, r, body.Parent)
	if err != nil {
		hint := "one older than the journal goes in --note"
		if near := nearestNames(ctx, r, open, body.Parent); len(near) > 0 {
			hint = "nearest: " + strings.Join(near, ", ") + "; " + hint
		}
		return body, dataError(hint, "--parent: no batch %.40q", body.Parent)
	}
	body.Parent = parent.Batch.ID
	return body, nil
}

// ogOf reads one original gravity at a time; without a temperature it is already corrected
// and no instrument's.
func (b *bench) ogOf(c *cli.Context, r journal.Reader, text, temp string, at time.Time) (journal.OG, error) {
	var og journal.OG
	var rec *journal.InstrumentRecord
	var err error
	if temp != "" || c.String("instrument") != "" {
		if rec, err = b.instrumentFor(c.Context, r, c.String("instrument"), ""); err != nil {
			return og, err
		}
		if err = inUseAt(rec, at); err != nil {
			return og, err
		}
	}
	og.Instrument = idOf(rec)
	if og.Gravity, err = b.readWith(rec, text); err != nil || temp == "" {
		return og, err
	}
	og.Temp, err = b.readTemp(temp)
	return og, err
}
