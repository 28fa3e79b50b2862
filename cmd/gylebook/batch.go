package main

import (
	"errors"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/gravity/asread"
)

func (b *bench) batchCommand() *cli.Command {
	return b.group("batch", "what ferments: facts, readings, attenuation",
		`gylebook batch open B26-014 --vessel T4 --product "Lane Bitter" --og 1.048
		gylebook batch og B26-014 1.0485 20
		gylebook batch limit B26-014 1.009
		gylebook batch list
		gylebook batch show B26-014
		gylebook batch close B26-014`,
		b.batchOpen(), b.batchList(), b.batchShow(), b.batchOG(), b.batchLimit(), b.batchClose(),
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
		og, err := b.ogOf(c, s, text, c.String("og-temp"))
		if err != nil {
			return err
		}
		og.Batch, og.At = body.ID, body.Opened
		bodies = append(bodies, og)
	}
	entries, err := b.commit(c.Context, s, func(r journal.Reader) ([]journal.Body, error) {
		open, err := r.Open(c.Context)
		if err != nil {
			return nil, err
		}
		if rec := occupant(open, body.Vessel); rec != nil {
			return nil, dataError("gylebook batch close "+rec.Batch.ID+", or gylebook event "+rec.Batch.ID+" move --to VESSEL",
				"vessel %s holds %s", body.Vessel, rec.Batch.ID)
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

// ogOf reads one original gravity; without a temperature it is already corrected
// and no instrument's.
func (b *bench) ogOf(c *cli.Context, r journal.Reader, text, temp string) (journal.OG, error) {
	var og journal.OG
	var rec *journal.InstrumentRecord
	var err error
	if temp != "" || c.String("instrument") != "" {
		if rec, err = b.instrumentFor(c.Context, r, c.String("instrument")); err != nil {
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
