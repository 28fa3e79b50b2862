package main

import (
	"slices"
	"strings"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/gravity/method"
)

func (b *bench) eventCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "event", Usage: "what was done to a batch: additions, racking, moves", ArgsUsage: "BATCH KIND [AMOUNT] [GRAVITY]",
		Description: "Kinds: " + strings.Join(journal.EventKinds, ", ") + `. Sugar (by mass), top-up, dilution, blend and fruit
			change the original gravity that attenuation is reckoned from, by mass balance: give the amount, and the
			gravity of what is neither water nor sugar; --mass unknown where nobody weighed it. --volume of racking is what was lost.`,
		Flags: []cli.Flag{
			&cli.StringFlag{Name: "mass", Usage: "`M` of what was added: 2kg, 500g"},
			&cli.StringFlag{Name: "volume", Usage: "`V` of what was added or lost: 5L, 1hl"},
			&cli.StringFlag{Name: "gravity", Usage: "`G` original gravity of what was added, corrected"},
			&cli.StringFlag{Name: "from", Usage: "`BATCH` that was blended in"},
			&cli.StringFlag{Name: "to", Usage: "`VESSEL` that it went to"},
			&cli.StringFlag{Name: "at", Aliases: orTaken, Usage: "`TIME` now unless given"},
			&cli.StringFlag{Name: "note", Usage: "`TEXT` anything else"},
		},
	}, `gylebook event B26-014 sugar 2kg
		gylebook event T4 top-up 20L 1.040
		gylebook event T4 dry-hop --mass 500g --note "second charge"
		gylebook event T4 move --to T7`, b.event)
}

func (b *bench) event(c *cli.Context) error {
	if c.Args().Len() < 2 {
		return wanted(c, "a batch and what was done")
	}
	body, typed, err := b.eventOf(c)
	if err != nil {
		return err
	}
	return b.withJournal(c.Context, func(s journal.Store) error {
		entries, err := b.commit(c.Context, s, func(r journal.Reader) ([]journal.Body, error) {
			open, err := r.OpenLast(c.Context, 0)
			if err != nil {
				return nil, err
			}
			rec, err := openBy(c.Context, r, open, c.Args().First())
			if err != nil {
				return nil, err
			}
			body.Batch = rec.Batch.ID
			if body.From != "" {
				from, err := batchBy(c.Context, r, body.From)
				if err != nil {
					return nil, err
				}
				body.From = from.Batch.ID
			}
			if body.Vessel != "" {
				if err := namesFree(open, body.Batch, body.Vessel); err != nil {
					return nil, err
				}
			}
			return []journal.Body{body}, possibleEvent(c.Context, r, rec, body)
		})
		if err != nil {
			return err
		}
		return b.showEvent(c, s, entries[0], body, typed)
	})
}

// eventOf reads the flags of an event, and how its amounts were typed; the batch is
// found later.
func (b *bench) eventOf(c *cli.Context) (journal.Event, amountsTyped, error) {
	body := journal.Event{What: strings.ToLower(c.Args().Get(1)), From: c.String("from"), Vessel: c.String("to"), Note: c.String("note")}
	if !slices.Contains(journal.EventKinds, body.What) {
		return body, amountsTyped{}, usageError("did you mean "+journal.Nearest(body.What, journal.EventKinds, 1)[0]+"?",
			"unknown event %.40q, known: %s", c.Args().Get(1), strings.Join(journal.EventKinds, ", "))
	}
	var err error
	if body.At, err = b.past(c, "at"); err != nil {
		return body, amountsTyped{}, err
	}
	switch {
	case body.What == journal.Move && body.Vessel == "":
		return body, amountsTyped{}, usageError("add --to T7", "--to is missing: the vessel that it went to")
	case body.What == journal.Blend && body.From == "":
		return body, amountsTyped{}, usageError("add --from B26-010", "--from is missing: the batch that was blended in")
	}
	typed, err := b.amounts(&body, c.Args().Slice()[2:], c.String("mass"), c.String("volume"), c.String("gravity"))
	return body, typed, err
}

// showEvent says what was done and what it makes of the original gravity.
func (b *bench) showEvent(c *cli.Context, s journal.Store, e journal.Entry, body journal.Event, typed amountsTyped) error {
	rec, err := s.Batch(c.Context, body.Batch)
	if err != nil {
		return err
	}
	book, err := bookOf(c.Context, s)
	if err != nil {
		return err
	}
	v := journal.DeriveLast(rec, book, 2)
	sh := afterSheet("event", e, v, "")
	sh.ladder.Answer = []string{body.Batch + " " + eventTextTyped(body, typed)}
	// After the event, whatever was read before it.
	oe, sg, why := v.OEAt(forever)
	sh.records[0] = set(set(sh.records[0], "effective_og_sg_20_20", known(sg)), "effective_og_extract_pct_mass", known(oe))
	if why != "" {
		sh.records[0] = set(sh.records[0], "why", why)
	}
	for _, step := range v.Basis {
		if step.Number == e.Number {
			sh.ladder.Answer = append(sh.ladder.Answer, effectiveLine(v))
		}
	}
	last := len(sh.ladder.Answer) - 1
	sh.ladder.Answer[last] = numberedLine(sh.ladder.Answer[last], e)
	sh.notes = eventCautions(body.What)
	return b.print(sh)
}

// eventCautions are what a kind of event may bring about.
func eventCautions(what string) []method.Note {
	switch what {
	case journal.Sugar, journal.Fruit, journal.DryHop:
		return []method.Note{cautionRestart}
	case journal.Priming:
		return []method.Note{cautionContainers}
	}
	return nil
}
