package main

import (
	"fmt"
	"strings"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/curve"
	"gylebook/attenuation/journal"
	"gylebook/attenuation/outlook"
	"gylebook/gravity/method"
	"gylebook/tables"
)

func (b *bench) terminalCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "terminal", Usage: "is it finished? the evidence, and what it cannot exclude", ArgsUsage: "BATCH|VESSEL",
		Description: `A word, not an approval. terminal: unchanged within 1 point for 48 h, and the curve leaves less than 10 % for more
			than 2 points. probably terminal: the curve alone. stalled: unchanged above where it should end. sluggish: slower than
			nearly all finished batches. moving: none of these. Dry hops, fruit, sugar, topping up, a blend or water begin a new
			watch period; readings after a cold crash prove nothing. With --check the exit code is 3 unless the word is terminal.`,
		Flags: []cli.Flag{
			&cli.StringFlag{Name: "at", Usage: "`TIME` as the journal stood then: 2026-10-24 12:00, yesterday 18:30"},
			&cli.BoolFlag{Name: "check", Usage: "exit code 3 unless terminal"},
			&cli.BoolFlag{Name: "slow-yeast", Usage: "the yeast goes on slowly below the usual limit: ask for a forced ferment"},
			drinkFlag(),
		},
	}, `gylebook terminal T4
		gylebook terminal B26-014 --check --quiet
		gylebook terminal T7 --drink cider --json`, b.terminal)
}

func (b *bench) terminal(c *cli.Context) error {
	return b.foresee(c, func(f *foresight, v journal.View, h outlook.History) error {
		e, err := outlook.EvidenceOf(v, h, f.at, c.Bool("slow-yeast"))
		if err != nil {
			return err
		}
		e = e.WithSince()
		if err := b.print(b.terminalSheet(v, e, isCider(v, f.drink))); err != nil {
			return err
		}
		if c.Bool("check") && e.Weighed.State != curve.Terminal {
			return &exitError{exitNotMet, fmt.Sprintf("%s is %s, wanted terminal", v.Record.Batch.ID, e.Weighed.State), ""}
		}
		return nil
	})
}

// isCider chooses the unit of cider makers, which is beside the others.
func isCider(v journal.View, d outlook.Drink) bool {
	if d.Named {
		return d.Kind == curve.Cider
	}
	return strings.Contains(strings.ToLower(v.Record.Batch.Product), "cider")
}

// stateSymbols stand before the words.
var stateSymbols = map[curve.State]string{
	curve.Moving: "↓", curve.Sluggish: "↘", curve.Stalled: "!", curve.ProbablyTerminal: "≈", curve.Terminal: "=",
}

func (b *bench) terminalSheet(v journal.View, e outlook.Evidence, cider bool) sheet {
	o, w := e.Forecast, e.Weighed
	answer := []string{stateSymbols[w.State] + " " + string(w.State)}
	if !e.Since.IsZero() {
		answer[0] += " since " + whenText(e.Since, o.Course.Now)
	}
	last := none + " no reading that counts"
	if one := o.Course.Last; one != nil {
		last = fixed(float64(one.SG), 4)
	}
	l := &tables.Ladder{Answer: append(answer, v.Record.Batch.ID, last)}
	for _, f := range e.Facts {
		l.Rungs = append(l.Rungs, tables.Rung{Name: factNames[f.Code], Value: factMark(f), Remark: f.Text})
	}
	l.Rungs = append(l.Rungs, batchRungs(v, o)...)
	if fg, ok := o.FG(); ok {
		l.Rungs = append(l.Rungs, tables.Rung{Name: "final", Value: fixed(fg.Median, 4), Remark: fmt.Sprintf("forecast (%s to %s)", fixed(fg.Lo, 4), fixed(fg.Hi, 4))})
	}
	if d := e.LimitDifference; d != nil {
		l.Rungs = append(l.Rungs, tables.Rung{Name: "to the limit", Value: asSigned(*d), Remark: "points of % apparent attenuation below the forced ferment at " + fixed(1+o.Course.Watch.Limit/1000, 4)})
	}
	l.Lines = proofLines(e, cider)
	record := terminalRecord(v, e)
	if b.set.format == tables.JSON {
		record = append(record, tables.Field{Name: "facts", Value: factRecords(e.Facts)})
	}
	return sheet{
		name: "terminal", records: []tables.Record{record}, ladder: l,
		explain: explainForecast(o), notes: []method.Note{cautionContainers},
	}
}

var factNames = map[string]string{
	"unchanged": "unchanged", "curve": "curve", "watch": "watch period", "warm": "read warm", "limit": "forced ferment",
}

// factMark is a symbol with its word.
func factMark(f outlook.Fact) string {
	switch {
	case !f.Known:
		return "· not known"
	case f.Met:
		return "✓ met"
	}
	return "✗ not met"
}

// proofLines are the limits of proof: what the readings leave open.
func proofLines(e outlook.Evidence, cider bool) []string {
	w := e.Weighed
	var lines []string
	if w.SlopeKnown {
		s := w.Slope
		lines = append(lines, fmt.Sprintf("cannot exclude %s points/day: %s over %s days",
			rate(s.NotExcluded), counted(s.N, "reading"), fixed(s.Days, 1)))
		if cider {
			fall, half := s.FSU()
			lines = append(lines, fmt.Sprintf("%s FSU ± %s, points in 100 days; below 3 is held very safe, 3 to 5 safe, 5 to 10 riskier (Jolicoeur 2012)",
				fixed(fall, 0), fixed(half, 0)))
		}
	} else {
		lines = append(lines, "what the readings exclude is not known: wanted two, some hours apart, in the watch period")
	}
	if e.LeftKnown {
		lines = append(lines, fmt.Sprintf("up to %s points may be left undetected (95 %%): %s g/L or %s volumes of CO2 in a closed vessel, beside what is dissolved and what priming makes",
			fixed(e.Left, 1), fixed(e.CO2GPL, 1), fixed(e.CO2Volumes, 1)))
	} else {
		lines = append(lines, "how many points may be left is not known below 3 readings")
	}
	return lines
}

// rate has the digits that a slow fall needs.
func rate(perDay float64) string {
	if perDay < 0.1 {
		return fixed(perDay, 2)
	}
	return fixed(perDay, 1)
}

func factRecords(facts []outlook.Fact) []tables.Record {
	out := make([]tables.Record, len(facts))
	for k, f := range facts {
		out[k] = tables.Record{{Name: "code", Value: f.Code}, {Name: "met", Value: metOf(f)}, {Name: "text", Value: f.Text}}
	}
	return out
}

// metOf is null where a fact is not known.
func metOf(f outlook.Fact) any {
	if !f.Known {
		return nil
	}
	return f.Met
}
