package main

import (
	"math"

	"github.com/urfave/cli/v2"

	"gylebook/gravity/asread"
	"gylebook/gravity/method"
)

// firstRow heads the steps of a chart: those of its first value stand for all.
const firstRow = "the first value of the chart, step by step"

// maxRows bounds a chart: it is meant for a wall.
const maxRows = 2000

func (b *bench) tableCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "table", Usage: "a chart for the wall: scales, temperature or alcohol",
		ArgsUsage: "scales|temperature|alcohol",
		Description: `scales runs over gravities, temperature over sample temperatures (columns are readings), alcohol over
			original gravities (columns are present gravities).`,
		Flags: append([]cli.Flag{
			&cli.StringFlag{Name: "from", Usage: "`START` first row"},
			&cli.StringFlag{Name: "to", Usage: "`END` last row"},
			&cli.StringFlag{Name: "step", Usage: "`STEP` from row to row, a plain number on the scale of the rows"},
			&cli.StringFlag{Name: "body", Usage: "`MATERIAL` of the instrument (temperature): glass, borosilicate, polycarbonate"},
			&cli.StringFlag{Name: "og", Usage: "`OG` original gravity of a fermenting liquid (temperature)"},
			&cli.StringFlag{Name: "method", Usage: "`ID` correction or ABV method"},
			&cli.StringFlag{Name: "modulus", Value: "145", Usage: "`M` modulus of the Baumé scale: 145 or 144.3"},
		}, fitFlags()...),
	}, `gylebook table scales --from 1.030 --to 1.060 --step 0.005
		gylebook table temperature --basis 60/60F --units F
		gylebook table alcohol --method cutaia2009 --format markdown`, b.table)
}

func (b *bench) table(c *cli.Context) error {
	charts := map[string]func(*cli.Context) (sheet, error){
		"scales": b.scalesChart, "temperature": b.temperatureChart, "alcohol": b.alcoholChart,
	}
	if c.Args().Len() == 0 {
		return missing(c.Command, "the chart")
	}
	if c.Args().Len() > 1 {
		return tooMany(c, 1)
	}
	chart, ok := charts[c.Args().First()]
	if !ok {
		return usageError("", "unknown chart %.40q, known: scales, temperature, alcohol", c.Args().First())
	}
	s, err := chart(c)
	if err != nil {
		return err
	}
	return b.print(s)
}

// span is the rows of a chart.
type span struct{ from, to, step float64 }

func (s span) each(do func(v float64) error) error {
	n := int(math.Floor((s.to-s.from)/s.step + 1e-9))
	for i := 0; i <= n; i++ {
		// Rounded, so that 1.030 + 2 × 0.005 is 1.040 and not a hair beside it.
		if err := do(asread.Round(s.from+float64(i)*s.step, 9, asread.HalfEven)); err != nil {
			return err
		}
	}
	return nil
}

// spanOf reads --from, --to and --step; parse reads a limit.
func spanOf(c *cli.Context, def span, parse func(string) (float64, error)) (span, error) {
	s := def
	for _, f := range []struct {
		name string
		to   *float64
	}{{"from", &s.from}, {"to", &s.to}} {
		if text := c.String(f.name); text != "" {
			v, err := parse(text)
			if err != nil {
				return s, err
			}
			*f.to = v
		}
	}
	if text := c.String("step"); text != "" {
		v, err := flagNumber("step", text)
		if err != nil {
			return s, err
		}
		s.step = v.Float()
	}
	switch {
	case s.step <= 0:
		return s, dataError("", "--step: read %g, wanted more than 0", s.step)
	case s.to < s.from:
		return s, dataError("swap --from and --to", "rows run from %g to %g, wanted the lower one first", s.from, s.to)
	case (s.to-s.from)/s.step > maxRows:
		return s, dataError("take a larger --step", "rows from %g to %g by %g are more than %d", s.from, s.to, s.step, maxRows)
	}
	return s, nil
}

// gravitySpan reads the rows in the scale in use; the bounds in SG are def's.
func (b *bench) gravitySpan(c *cli.Context, def span) (span, error) {
	return spanOf(c, def, func(text string) (float64, error) {
		r, err := b.reading(text)
		if err == nil && r.Scale != b.set.scale {
			err = dataError("use --scale "+r.Scale.String(), "read %s, wanted a limit in %s", r.ReadAs(), b.set.scale.Info().Name)
		}
		return r.Value, err
	})
}

// firstOfEach keeps one note a code: a chart would repeat it on every row.
func firstOfEach(notes []method.Note) []method.Note {
	seen := map[string]bool{}
	var kept []method.Note
	for _, n := range notes {
		if !seen[n.Code] {
			seen[n.Code] = true
			kept = append(kept, n)
		}
	}
	return kept
}
