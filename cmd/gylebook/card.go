package main

import (
	"fmt"
	"time"

	"github.com/urfave/cli/v2"

	"gylebook/gravity"
	"gylebook/gravity/method"
	"gylebook/tables/report"
)

func (b *bench) cardCommand() *cli.Command {
	return b.group("card", "one page in large print, to hang by the tank",
		`gylebook card temperature --instrument H1 --out H1.html
		gylebook card scales --out scales.html
		gylebook card rounds --out rounds.html`,
		b.cardTemperature(), b.cardScales(), b.cardRounds(),
	)
}

const cardFigures = "for figures: gylebook table --json"

func (b *bench) cardScales() *cli.Command {
	return b.sub("card", &cli.Command{
		Name: "scales", Usage: "SG beside extract, in a strip", ArgsUsage: " ",
		Description: "Rows run over SG 20/20 by the fit named; --from, --to and --step choose others.",
		Flags: append(pageFlags(
			&cli.StringFlag{Name: "from", Usage: "`SG` of the first row, 0.990 unless given"},
			&cli.StringFlag{Name: "to", Usage: "`SG` of the last row, 1.160 unless given"},
			&cli.StringFlag{Name: "step", Usage: "`STEP` from row to row, 0.002 unless given"},
			&cli.StringFlag{Name: "modulus", Value: "145", Usage: "`M` modulus of the Baumé scale: 145 or 144.3"},
		), fitFlags()...),
	}, `gylebook card scales --out scales.html
		gylebook card scales --from 1.000 --to 1.060 --step 0.001 --out scales.html`,
		func(c *cli.Context) error {
			if c.Args().Len() != 0 {
				return wanted(c, "none")
			}
			if err := b.pageForm(c, cardFigures); err != nil {
				return err
			}
			card, err := b.scalesCard(c)
			if err != nil {
				return err
			}
			return b.pageInto(c, card.Write)
		})
}

func (b *bench) scalesCard(c *cli.Context) (report.Card, error) {
	conv, basis, err := converterOf(c)
	if err != nil {
		return report.Card{}, err
	}
	b.set.scale = gravity.ScaleSG
	rows, err := spanOf(c, span{0.990, 1.160, 0.002}, func(text string) (float64, error) {
		r, err := b.reading(text)
		if err == nil && r.Scale != gravity.ScaleSG {
			err = dataError("type an SG such as 1.040; gylebook table scales --scale "+r.Scale.String()+" runs over others", "read %s, wanted a limit in SG", r.ReadAs())
		}
		return r.Value, err
	})
	if err != nil {
		return report.Card{}, err
	}
	var notes []method.Note
	strip := &report.Strip{Left: "SG " + basis.String(), Right: "°P"}
	err = rows.each(func(v float64) error {
		f, err := conv.Convert(gravity.ScaleSG, v, basis)
		if err == nil {
			notes = append(notes, f.Notes...)
			strip.Rows = append(strip.Rows, [2]string{fixed(v, 3), fixed(float64(f.Extract), 1)})
		}
		return err
	})
	card := report.Card{
		Title: "Specific gravity and extract", Strip: strip, Made: b.made(),
		Basis: []string{
			fmt.Sprintf("SG %s, °P in g per 100 g", basis),
			fmt.Sprintf("fit %s (%s)", conv.Fit.ID, conv.Fit.Source.Author),
			"for unfermented liquids; with alcohol the extract is apparent",
		},
	}
	for _, n := range firstOfEach(notes) {
		card.Basis = append(card.Basis, n.Text)
	}
	return card, err
}

// made is when a page was written.
func (b *bench) made() string { return b.set.now.UTC().Format(time.RFC3339) }

func (b *bench) cardRounds() *cli.Command {
	return b.sub("card", &cli.Command{
		Name: "rounds", Usage: "a blank sheet for a round, in the columns of import", ArgsUsage: " ",
		Description: "What is written into it can be typed into a CSV of the same columns and imported.",
		Flags: pageFlags(
			&cli.IntFlag{Name: "lines", Value: 14, Usage: "`N` lines to write on"},
		),
	}, `gylebook card rounds --out rounds.html
		gylebook card rounds --lines 12 --out rounds.html`,
		func(c *cli.Context) error {
			if c.Args().Len() != 0 {
				return wanted(c, "none")
			}
			if err := b.pageForm(c, cardFigures); err != nil {
				return err
			}
			n := c.Int("lines")
			if n < 1 {
				return usageError("", "--lines: read %d, wanted 1 or more", n)
			}
			card := report.Card{
				Title: "Round of readings", Landscape: true, Made: b.made(),
				Sheet:    &report.Sheet{Columns: roundsColumns, Rows: n},
				Basis:    []string{"date, who and thermometer: ____________________________", "read at the bottom of the meniscus; degas; write down what you see, never a corrected value"},
				Cautions: []string{cautionRounds.Text},
			}
			return b.pageInto(c, card.Write)
		})
}

// roundsColumns are those that import takes as typed.
var roundsColumns = []string{"vessel", "batch_id", "taken_at", "entered_text", "sample_temp_c", "instrument_id", "note"}

func (b *bench) cardTemperature() *cli.Command {
	return b.sub("card", &cli.Command{
		Name: "temperature", Usage: "what to add to a reading of one instrument", ArgsUsage: " ",
		Description: `The whole correction in the instrument's own scale: temperature, and its certificate or last check where the
			journal has one. --og is for a fermenting liquid.`,
		Flags: append(pageFlags(
			&cli.StringFlag{Name: "instrument", Usage: "`ID` of the instrument in the journal"},
			&cli.StringFlag{Name: "from", Usage: "`T` of the first row, 6C unless given"},
			&cli.StringFlag{Name: "to", Usage: "`T` of the last row, 34C unless given"},
			&cli.StringFlag{Name: "step", Usage: "`STEP` from row to row, in degrees"},
			&cli.StringFlag{Name: "og", Usage: "`OG` original gravity of a fermenting liquid"},
			&cli.StringFlag{Name: "body", Usage: "`MATERIAL` of the instrument: glass, borosilicate, polycarbonate"},
			&cli.StringFlag{Name: "method", Usage: "`ID` of the correction"},
		), fitFlags()...),
	}, `gylebook card temperature --instrument H1 --out H1.html
		gylebook card temperature --basis 60/60F --units F --out wall.html`,
		func(c *cli.Context) error {
			if c.Args().Len() != 0 {
				return wanted(c, "none")
			}
			if err := b.pageForm(c, "for figures: gylebook table temperature --json"); err != nil {
				return err
			}
			card, err := b.temperatureCard(c)
			if err != nil {
				return err
			}
			return b.pageInto(c, card.Write)
		})
}
