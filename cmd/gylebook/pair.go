package main

import (
	"errors"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation"
	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/gravity/method"
)

// pair is an original and a present gravity as typed, converted and checked.
type pair struct {
	og, pg   asread.Reading
	fog, fpg gravity.Figures
	g        attenuation.Gravities
	uOG, uPG attenuation.ReadingU
	fit      method.Entry[gravity.Fit]
	notes    []method.Note
}

// pairFlags are shared by the commands that take an original and a present gravity.
func pairFlags() []cli.Flag {
	return append(
		fitFlags(),
		&cli.StringFlag{Name: "reason", Usage: "`TEXT` why a present gravity at or above the original is meant"},
	)
}

// pairs hands every original and present gravity to do.
func (b *bench) pairs(c *cli.Context, do func(pair) error) error {
	if c.Args().Len() == 0 {
		return missing(c.Command, "the original and the present gravity")
	}
	conv, basis, err := converterOf(c)
	if err != nil {
		return err
	}
	return b.each(c, true, func(fields []string) error {
		if len(fields) != 2 {
			return usageError("", "wanted two values, read %d; usage: gylebook %s %s", len(fields), c.Command.Name, c.Command.ArgsUsage)
		}
		p, err := b.pairOf(conv, basis, fields, c.String("reason"))
		if err != nil {
			return err
		}
		return do(p)
	})
}

func (b *bench) pairOf(conv gravity.Converter, basis gravity.Pair, fields []string, reason string) (pair, error) {
	p := pair{fit: conv.Fit}
	var err error
	if p.og, err = b.reading(fields[0]); err != nil {
		return p, err
	}
	if p.pg, err = b.reading(fields[1]); err != nil {
		return p, err
	}
	if p.fog, err = conv.Convert(p.og.Scale, p.og.Value, basis); err != nil {
		return p, err
	}
	if p.fpg, err = conv.ConvertFermented(p.pg.Scale, p.pg.Value, basis, p.fog.Extract); err != nil {
		return p, err
	}
	p.g = attenuation.Of(p.fog, p.fpg)
	switch err = p.g.Check(); {
	case err == nil:
	case (errors.Is(err, attenuation.ErrOrder) || errors.Is(err, attenuation.ErrTooLow)) && reason != "":
		p.notes = append(p.notes, method.Note{Code: method.WithReason, Text: err.Error() + "; accepted with the reason: " + reason})
	case errors.Is(err, attenuation.ErrOrder), errors.Is(err, attenuation.ErrTooLow):
		return p, dataError(hintOf(err)+" to keep it add --reason TEXT", "%v", err)
	default:
		return p, err
	}
	p.uOG = readingU(p.og, func(v float64) (gravity.Figures, error) { return conv.Convert(p.og.Scale, v, basis) })
	p.uPG = readingU(p.pg, func(v float64) (gravity.Figures, error) {
		return conv.ConvertFermented(p.pg.Scale, v, basis, p.fog.Extract)
	})
	p.notes = append(p.notes, p.fog.Notes...)
	p.notes = append(p.notes, p.fpg.Notes...)
	return p, nil
}

// readingU is half the last typed place as a rectangular distribution, in SG.
func readingU(r asread.Reading, convert func(v float64) (gravity.Figures, error)) attenuation.ReadingU {
	hi, errHi := convert(r.Value + r.Step/2)
	lo, errLo := convert(r.Value - r.Step/2)
	if errHi != nil || errLo != nil {
		return attenuation.ReadingU{}
	}
	return attenuation.Resolution(float64(hi.SG-lo.SG) / 2)
}

// flagNumber reads the number of a flag; the error names the flag.
func flagNumber(name, text string) (asread.Value, error) {
	v, err := asread.ParseNumber(text)
	if err != nil {
		return v, dataError(hintOf(err), "--%s: %v", name, err)
	}
	return v, nil
}

// setReadingU replaces both by a half-width typed, in SG.
func (p *pair) setReadingU(c *cli.Context) error {
	text := c.String("reading-u")
	if text == "" {
		return nil
	}
	v, err := flagNumber("reading-u", text)
	if err != nil {
		return err
	}
	if v.Float() < 0 || v.Float() > 0.05 {
		return dataError("type 0.0005 for half a point", "--reading-u: read %s, wanted an SG half-width of 0 to 0.05", v)
	}
	u := attenuation.Resolution(v.Float())
	p.uOG, p.uPG = u, u
	return nil
}
