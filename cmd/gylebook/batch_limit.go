package main

import (
	"context"
	"fmt"
	"time"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/gravity/method"
)

// forcedLimit reads the limit of attenuation of a batch. Nothing ends above where it began.
func (b *bench) forcedLimit(ctx context.Context, s journal.Store, rec *journal.Record, at time.Time, text string) (journal.Body, string, error) {
	r, err := b.reading(text)
	if err != nil {
		return nil, "", err
	}
	f, err := gravity.NewConverter().Convert(r.Scale, r.Value, gravity.Pair2020)
	if err != nil {
		return nil, "", err
	}
	book, err := bookOf(ctx, s)
	if err != nil {
		return nil, "", err
	}
	v := journal.DeriveLast(rec, book, 2)
	if oe, sg, why := v.OEAt(forever); why == "" && f.Extract >= oe {
		return nil, "", dataError("type the gravity at which the forced ferment stood still",
			"limit %s is not below the original gravity %s (%s)", r.ReadAs(), fixed(float64(sg), 4), plato(oe))
	}
	if last := v.Last(); last != nil && f.Extract > last.Extract {
		b.notes = append(b.notes, method.Note{Code: method.Assumed, Text: fmt.Sprintf(
			"the limit lies above the last reading %s: the batch is past it, or one of the two is wrong", fixed(float64(last.SG), 4))})
	}
	what := fmt.Sprintf("limit of attenuation SG %s (%s)", fixed(float64(f.SG), 4), plato(f.Extract))
	if v.Limit != nil {
		what += ", replaces " + limitBefore(rec, *v.Limit)
	}
	return journal.Limit{Batch: rec.Batch.ID, At: at, Gravity: typedAs(r)}, what, nil
}

// limitBefore is the limit in force in words, in SG where the fit has it.
func limitBefore(rec *journal.Record, limit gravity.Plato) string {
	text := plato(limit)
	if sg, err := gravity.Fits.Default().Fn.SG(limit); err == nil {
		text = fixed(float64(sg), 4) + " (" + text + ")"
	}
	number := int64(0)
	for _, l := range rec.Limits { // in the order of time
		if !l.Void {
			number = l.Number
		}
	}
	return fmt.Sprintf("%s of #%d", text, number)
}

func (b *bench) batchVolume() *cli.Command {
	return b.sub("batch", &cli.Command{
		Name: "volume", Usage: "enter the volume at pitching, at 20 °C", ArgsUsage: "BATCH VOLUME",
		Description: "The one entered last counts. It closes the gap of a batch that was opened without and to which something was added.",
		Flags:       []cli.Flag{&cli.StringFlag{Name: "at", Aliases: orTaken, Usage: "`TIME` now unless given"}},
	}, `gylebook batch volume B26-014 100L
		gylebook batch volume T4 5.5hl`,
		func(c *cli.Context) error {
			args := joinUnits(c.Args().Slice())
			if len(args) != 2 {
				return wanted(c, "a batch and a volume")
			}
			volume, err := asread.ParseVolume(args[1])
			if err != nil {
				return dataError(hintOf(err), "%v", err)
			}
			return b.amend(c, args[0], func(_ journal.Store, rec *journal.Record, at time.Time) (journal.Body, string, error) {
				what := "volume " + volume.Text + " L"
				if before := rec.Volume(); before != "" {
					what += ", replaces " + before + " L"
				}
				return journal.Volume{Batch: rec.Batch.ID, At: at, Volume: volume.Text}, what, nil
			})
		})
}

// joinUnits puts a unit of mass or volume that stands apart back to its number.
func joinUnits(args []string) []string {
	var out []string
	for _, a := range args {
		if last := len(out) - 1; last >= 0 && amount(out[last]+a) && !amount(out[last]) && !amount(a) {
			out[last] += a
			continue
		}
		out = append(out, a)
	}
	return out
}

// amount reports whether a word is a mass or a volume with its unit.
func amount(word string) bool {
	_, errMass := asread.ParseMass(word)
	_, errVolume := asread.ParseVolume(word)
	return errMass == nil || errVolume == nil
}
