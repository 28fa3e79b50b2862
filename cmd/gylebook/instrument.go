package main

import (
	"errors"
	"fmt"
	"strings"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/gravity/method"
	"gylebook/tables"
)

func (b *bench) instrumentCommand() *cli.Command {
	return b.group("instrument", "hydrometers with their checks and certificates",
		`gylebook instrument add H1 --division 0.001 --range 0.990-1.060
		gylebook instrument check H1 --water 0.998 --temp 20C
		gylebook instrument certificate H1 --point 1.000,+0.0004,0.0002 --reference "no 118"
		gylebook instrument list
		gylebook instrument show H1
		gylebook instrument retire H1 --reason broken`,
		b.instrumentAdd(), b.instrumentList(), b.instrumentShow(), b.instrumentCheck(), b.instrumentCertificate(), b.instrumentRetire(),
	)
}

func (b *bench) instrumentAdd() *cli.Command {
	return b.sub("instrument", &cli.Command{
		Name: "add", Usage: "register an instrument; its id is never used again", ArgsUsage: "ID --division D",
		Description: "Without flags it is a glass hydrometer in specific gravity 20/20, read at the bottom of the meniscus.",
		Flags: []cli.Flag{
			&cli.StringFlag{Name: "type", Value: journal.Hydrometer, Usage: "`TYPE` hydrometer, refractometer, thermometer"},
			&cli.StringFlag{Name: "basis", Value: "20/20", Usage: "`PAIR` reference: 20/20, 60/60F, 15/15, 17.5/17.5, 15/4, 20/4"},
			&cli.StringFlag{Name: "division", Usage: "`D` one division, in its scale: 0.001"},
			&cli.StringFlag{Name: "range", Usage: "`LO-HI` of its scale: 0.990-1.060"},
			&cli.StringFlag{Name: "body", Value: "glass", Usage: "`MATERIAL` glass, borosilicate, polycarbonate"},
			&cli.StringFlag{Name: "meniscus", Value: "bottom", Usage: "`PLACE` where it is meant to be read: bottom or top"},
			&cli.StringFlag{Name: "max-error", Usage: "`E` largest error its maker allows, in its scale"},
			&cli.StringFlag{Name: "stem", Usage: "`MM` diameter of the stem, mm"},
			&cli.StringFlag{Name: "mass", Usage: "`G` mass, g"},
			&cli.StringFlag{Name: "tension", Usage: "`MNM` surface tension it was adjusted for, mN/m"},
			&cli.StringFlag{Name: "since", Usage: "`TIME` in use since; now unless given"},
			&cli.StringFlag{Name: "note", Usage: "`TEXT` anything else"},
		},
	}, `gylebook instrument add H1 --division 0.001 --range 0.990-1.060
		gylebook instrument add S2 --scale plato --division 0.1 --range 0-12 --basis 20/4`,
		func(c *cli.Context) error {
			if c.Args().Len() != 1 {
				return wanted(c, "one id")
			}
			if strings.EqualFold(c.Args().First(), noInstrument) {
				return dataError("choose another id", "%q stands for no instrument, as in --instrument none", noInstrument)
			}
			body, err := b.instrumentOf(c)
			if err != nil {
				return err
			}
			return b.writing(c.Context, func(s journal.Store) error {
				e, err := b.commitOne(c.Context, s, body)
				if errors.Is(err, journal.ErrExists) {
					return dataError("choose another id: the old one keeps its history", "%v", err)
				}
				if err != nil {
					return err
				}
				return b.acknowledge("instrument-add", e, body.ID, "registered "+body.ID+": "+describe(body))
			})
		})
}

// instrumentOf reads the flags of an instrument.
func (b *bench) instrumentOf(c *cli.Context) (journal.Instrument, error) {
	at, err := b.past(c, "since")
	i := journal.Instrument{
		ID: c.Args().First(), Type: c.String("type"), Scale: b.set.scale.String(), Basis: c.String("basis"),
		Division: c.String("division"), Body: c.String("body"), ReadAt: c.String("meniscus"),
		MaxError: c.String("max-error"), StemMM: c.String("stem"), MassG: c.String("mass"), Tension: c.String("tension"),
		Note: c.String("note"), Since: at,
	}
	switch {
	case err != nil:
		return i, err
	case i.Type == journal.Thermometer:
		return journal.Instrument{ID: i.ID, Type: i.Type, Note: i.Note, Since: i.Since}, i.Check()
	case i.Division == "":
		return i, usageError("add --division 0.001", "--division is missing: the smallest step of its scale")
	}
	i.RangeLo, i.RangeHi, err = rangeOf(c.String("range"), b.set.scale)
	return i, err
}

// rangeOf splits LO-HI; both ends must be readings of the scale, in order.
func rangeOf(text string, scale gravity.Scale) (lo, hi string, err error) {
	if text == "" {
		return "", "", nil
	}
	refuse := func(why string) (string, string, error) {
		return "", "", dataError("type --range 0.990-1.060", "--range: read %.40q, %s", text, why)
	}
	// A minus in front is a sign, the next one stands between the ends.
	k := strings.IndexByte(strings.TrimLeft(text, "-"), '-')
	if k < 0 {
		return refuse("wanted LO-HI")
	}
	k += len(text) - len(strings.TrimLeft(text, "-"))
	lo, hi = strings.TrimSpace(text[:k]), strings.TrimSpace(text[k+1:])
	a, errLo := asread.ParseReading(lo, scale)
	z, errHi := asread.ParseReading(hi, scale)
	if err := errors.Join(errLo, errHi); err != nil {
		return "", "", dataError(hintOf(err), "--range: %v", firstError(errLo, errHi))
	}
	if a.Scale != scale || z.Scale != scale {
		return refuse("wanted both ends in " + scale.Info().Name)
	}
	if !(a.Value < z.Value) {
		return refuse("wanted the lower end first")
	}
	return lo, hi, nil
}

func firstError(errs ...error) error {
	for _, err := range errs {
		if err != nil {
			return err
		}
	}
	return nil
}

// describe says in a few words what an instrument is.
func describe(i journal.Instrument) string {
	if i.Type == journal.Thermometer {
		return i.Type
	}
	text := fmt.Sprintf("%s, %s, %s, %s, divisions of %s", i.Type, scaleName(i.Scale), i.Basis, i.Body, i.Division)
	if i.RangeLo != "" {
		text += ", " + i.RangeLo + " to " + i.RangeHi
	}
	return text
}

// scaleName is what a person calls the scale with this id.
func scaleName(id string) string {
	s, err := gravity.FindScale(id)
	if err != nil {
		return id
	}
	return s.Info().Name
}

// scaleSymbol is the short name of a scale, "SG" or "°P".
func scaleSymbol(id string) string {
	s, err := gravity.FindScale(id)
	if err != nil {
		return id
	}
	return s.Info().Symbol
}

// acknowledge prints what was written, after it was written.
func (b *bench) acknowledge(name string, e journal.Entry, id, text string, notes ...method.Note) error {
	return b.print(sheet{
		name:    name,
		records: []tables.Record{entryRecord(e, id, notes)},
		ladder:  &tables.Ladder{Answer: []string{numberedLine(text, e)}},
	})
}

// entryRecord is an entry for machines: its number, what it is about and its
// digest.
func entryRecord(e journal.Entry, id string, notes []method.Note) tables.Record {
	return tables.Record{
		{Name: "entry", Value: int(e.Number)},
		{Name: "kind", Value: string(e.Body.Kind())},
		{Name: "id", Value: id},
		{Name: "recorded_at", Value: e.RecordedAt.UTC().Format(recordedAt)},
		{Name: "operator", Value: e.By},
		{Name: "digest", Value: e.Digest},
		{Name: "notes", Value: neutral(notes)},
	}
}

// recordedAt is RFC 3339 to the millisecond that an entry is numbered with.
const recordedAt = "2006-01-02T15:04:05.000Z07:00"
