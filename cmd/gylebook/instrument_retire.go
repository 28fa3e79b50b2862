package main

import (
	"math"
	"strings"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/gravity/method"
)

func (b *bench) instrumentRetire() *cli.Command {
	return b.sub("instrument", &cli.Command{
		Name: "retire", Usage: "take an instrument out of use", ArgsUsage: "ID --reason TEXT",
		Flags: []cli.Flag{
			&cli.StringFlag{Name: "reason", Usage: "`TEXT` broken, lost, sold"},
			&cli.StringFlag{Name: "at", Usage: "`TIME` now unless given"},
		},
	}, `gylebook instrument retire H1 --reason broken`,
		func(c *cli.Context) error {
			if c.Args().Len() != 1 {
				return wanted(c, "one id")
			}
			if c.String("reason") == "" {
				return usageError("add --reason broken", "--reason is missing; usage: gylebook instrument retire ID --reason TEXT")
			}
			at, err := b.past(c, "at")
			if err != nil {
				return err
			}
			body := journal.Retire{Instrument: c.Args().First(), At: at, Reason: c.String("reason")}
			var notes []method.Note
			if shattered(body.Reason) {
				notes = append(notes, cautionBroken)
			}
			return b.withJournal(c.Context, func(s journal.Store) error {
				rec, err := instrumentBy(c.Context, s, body.Instrument)
				if err != nil {
					return err
				}
				if err := inUseAt(rec, forever); err != nil {
					return err
				}
				body.Instrument = rec.Instrument.ID
				e, err := b.commitOne(c.Context, s, body)
				if err != nil {
					return err
				}
				return b.acknowledge("instrument-retire", e, body.Instrument, body.Instrument+" is out of use: "+body.Reason, notes...)
			})
		})
}

// shattered reports whether a reason may mean that an instrument went to pieces.
func shattered(reason string) bool {
	for _, word := range []string{"broke", "break", "crack", "glass", "shatter", "smash", "chip"} {
		if strings.Contains(strings.ToLower(reason), word) {
			return true
		}
	}
	return false
}

func (b *bench) instrumentCertificate() *cli.Command {
	points := new(list)
	return b.sub("instrument", &cli.Command{
		Name: "certificate", Usage: "enter a calibration certificate", ArgsUsage: "ID --point READING,CORRECTION,U …",
		Description: `Each point is a reading on the scale, what to add to it, and the expanded uncertainty (k=2), all in the
			instrument's scale at its reference temperature; readings ascend. A semicolon divides where a comma is the decimal
			mark. It holds until the next certificate or check.`,
		Flags: []cli.Flag{
			&cli.GenericFlag{Name: "point", Value: points, Usage: "`R,C,U` reading, correction, U; once for each point"},
			&cli.StringFlag{Name: "reference", Usage: "`TEXT` number and issuer"},
			&cli.StringFlag{Name: "at", Usage: "`TIME` of the calibration; now unless given"},
		},
	}, `gylebook instrument certificate H1 --point 1.000,+0.0004,0.0002 --point 1.050,+0.0002,0.0002 --reference "no 118"`,
		func(c *cli.Context) error {
			if c.Args().Len() != 1 {
				return wanted(c, "one id")
			}
			if len(*points) == 0 {
				return usageError("add --point 1.000,+0.0004,0.0002", "--point is missing")
			}
			at, err := b.past(c, "at")
			if err != nil {
				return err
			}
			body := journal.Certificate{Instrument: c.Args().First(), At: at, Reference: c.String("reference")}
			for _, text := range *points {
				p, err := pointOf(text)
				if err != nil {
					return err
				}
				body.Points = append(body.Points, p)
			}
			return b.withJournal(c.Context, func(s journal.Store) error {
				rec, err := instrumentBy(c.Context, s, body.Instrument)
				if err != nil {
					return err
				}
				if err := firstError(inUseAt(rec, at), possibleCorrections(rec, body)); err != nil {
					return err
				}
				body.Instrument = rec.Instrument.ID
				e, err := b.commitOne(c.Context, s, body)
				if err != nil {
					return err
				}
				return b.acknowledge("instrument-certificate", e, body.Instrument, "certificate of "+body.Instrument+" with "+counted(len(body.Points), "point"))
			})
		})
}

// possibleCorrections refuses a correction that no hydrometer in order has: it is a
// reading in the place of one, or a slip of the decimal mark.
func possibleCorrections(rec *journal.InstrumentRecord, c journal.Certificate) error {
	h, _, err := journal.NewBook([]*journal.InstrumentRecord{rec}).Hydrometer(rec.Instrument.ID, c.At)
	if err != nil {
		return nil //nolint:nilerr // an instrument of another type, whose corrections are not bounded here
	}
	for _, p := range c.Points {
		if v, err := asread.ParseNumber(p.Correction); err == nil && math.Abs(v.Float()) > tooFar(h) {
			return dataError("type what to add to the reading: --point 1.000,+0.0004,0.0002",
				"correction %s at %s: too large for an instrument in order", p.Correction, p.Reading)
		}
	}
	return nil
}

// list is a flag that may stand several times; a comma in it divides nothing.
type list []string

// Set implements cli.Generic.
func (l *list) Set(text string) error {
	*l = append(*l, text)
	return nil
}

// String implements cli.Generic.
func (l *list) String() string { return strings.Join(*l, " ") }

// pointOf reads "1.000,+0.0004,0.0002"; U may be left out.
func pointOf(text string) (journal.CertificatePoint, error) {
	mark := ","
	if strings.Contains(text, ";") {
		mark = ";"
	}
	parts := strings.Split(text, mark)
	if len(parts) < 2 || len(parts) > 3 {
		return journal.CertificatePoint{}, dataError("type --point 1.000,+0.0004,0.0002", "--point: read %.40q, wanted reading, correction and U", text)
	}
	for i, p := range parts {
		parts[i] = strings.TrimSpace(p)
		if _, err := asread.ParseNumber(parts[i]); err != nil {
			return journal.CertificatePoint{}, dataError("type --point 1.000,+0.0004,0.0002", "--point: %v", err)
		}
	}
	p := journal.CertificatePoint{Reading: parts[0], Correction: parts[1]}
	if len(parts) == 3 {
		p.U = parts[2]
	}
	return p, nil
}

// scaleOf is the scale of an instrument, SG for one that has none.
func scaleOf(i journal.Instrument) gravity.Scale {
	s, err := gravity.FindScale(i.Scale)
	if err != nil {
		return gravity.ScaleSG
	}
	return s
}
