package main

import (
	"cmp"
	"fmt"
	"slices"
	"strings"
	"time"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/curve"
	"gylebook/attenuation/journal"
	"gylebook/attenuation/outlook"
	"gylebook/gravity/method"
	"gylebook/tables"
)

func (b *bench) forecastCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "forecast", Usage: "where a batch ends, and when", ArgsUsage: "BATCH|VESSEL",
		Description: `A curve of growth and uptake through the readings, with what the last 20 finished batches of the same product and
			yeast did behind it. Figures are medians with the range from the 5th to the 95th percentile; terminal is when 2 points
			are left. Below three readings the finished batches alone speak. While none has finished the usual figures of beer are
			taken, or those of --drink.`,
		Flags: []cli.Flag{
			&cli.StringFlag{Name: "at", Usage: "`TIME` as the journal stood then: 2026-10-24 12:00, yesterday 18:30"},
			drinkFlag(),
		},
	}, `gylebook forecast T4
		gylebook forecast B26-014 --at "yesterday 18:00"
		gylebook forecast T7 --drink cider --json`, b.forecast)
}

func (b *bench) forecast(c *cli.Context) error {
	return b.foresee(c, func(f *foresight, v journal.View, h outlook.History) error {
		o, err := outlook.Of(v, h, f.at)
		if err != nil {
			return err
		}
		return b.print(b.forecastSheet(v, o))
	})
}

// foresee finds the batch and the history that a command on its future is about.
func (b *bench) foresee(c *cli.Context, do func(*foresight, journal.View, outlook.History) error) error {
	if c.Args().Len() == 0 {
		return missing(c.Command, "a batch or a vessel")
	}
	if c.Args().Len() > 1 {
		return tooMany(c, 1)
	}
	drink, err := drinkOf(c)
	if err != nil {
		return err
	}
	at, err := b.at(c, "at")
	if err != nil {
		return err
	}
	return b.withJournal(c.Context, func(s journal.Store) error {
		rec, err := batchAt(c.Context, s, c.Args().First(), at, c.IsSet("at"))
		if err != nil {
			return err
		}
		f, err := newForesight(c.Context, s, at, drink)
		if err != nil {
			return err
		}
		h, err := f.history(rec)
		if err != nil {
			return err
		}
		thin, left := outlook.Thin(rec)
		if left > 0 {
			b.notes = append(b.notes, method.Note{Code: method.Interpreted, Text: fmt.Sprintf("%d of %d readings used: the newest, and the others evenly", len(thin.Readings), len(thin.Readings)+left)})
		}
		return do(f, journal.Derive(thin, f.book), h)
	})
}

func (b *bench) forecastSheet(v journal.View, o outlook.Forecast) sheet {
	s := sheet{name: "forecast", records: []tables.Record{forecastRecord(v, o)}}
	s.ladder = &tables.Ladder{Answer: forecastAnswer(o), Rungs: forecastRungs(v, o)}
	s.explain = explainForecast(o)
	s.notes = []method.Note{caution(fmt.Sprintf("statistical forecast from %s; the band covers past behaviour, not faults", counted(o.Curve.N, "reading")))}
	return s
}

// counted gives "1 reading" and "3 readings".
func counted(n int, what string) string {
	if n == 1 {
		return "1 " + what
	}
	return fmt.Sprintf("%d %ss", n, what)
}

// forecastAnswer is the end: gravity, strength, time.
func forecastAnswer(o outlook.Forecast) []string {
	answer := []string{none + " final gravity"}
	if fg, ok := o.FG(); ok {
		answer[0] = fmt.Sprintf("%s final gravity (%s to %s)", fixed(fg.Median, 4), fixed(fg.Lo, 3), fixed(fg.Hi, 3))
	}
	if abv, ok := o.ABV(); ok {
		answer = append(answer, fixed(abv.Median, 1)+" % vol")
	}
	return append(answer, terminalWhen(o))
}

// terminalWhen says when the end comes. Times near it are told by their weekday.
func terminalWhen(o outlook.Forecast) string {
	t, ok := o.Terminal()
	if !ok && !o.Curve.Curve {
		return "no time of the end below 3 readings"
	}
	if !ok {
		return "no time of the end: pitching not known"
	}
	now := o.Course.Now
	// The time is never before the last reading, which showed it then.
	if last := o.Course.Last; last != nil && t.Median.Sub(last.Source.TakenAt) < 2*time.Minute {
		return "within 2 points of it by " + whenText(last.Source.TakenAt, now)
	}
	near := func(at time.Time) string {
		if d := at.Sub(t.Median).Abs(); d < 6*24*time.Hour {
			return at.Format("Mon 15:04")
		}
		return whenText(at, now)
	}
	return fmt.Sprintf("terminal %s (%s to %s)", whenText(t.Median, now), near(t.Lo), near(t.Hi))
}

// whenText is a time for a person, with the year when it is another.
func whenText(at, now time.Time) string {
	if at.Year() != now.Year() {
		return at.Format("Mon 2 Jan 2006 15:04")
	}
	return at.Format("Mon 2 Jan 15:04")
}

func forecastRungs(v journal.View, o outlook.Forecast) []tables.Rung {
	rungs := batchRungs(v, o)
	next := tables.Rung{Name: "expected", Value: none, Remark: "at " + minuteText(o.Course.Now) + ": " + nextWhy(v, o)}
	if i, ok := nextOf(v, o); ok {
		next.Value = fixed(i.Median, 4)
		next.Remark = fmt.Sprintf("by a reading at %s (%s to %s)", minuteText(o.Course.Now), fixed(i.Lo, 4), fixed(i.Hi, 4))
	}
	return append(rungs, next)
}

// batchRungs say what a figure rests on: the batch, its readings and the history.
func batchRungs(v journal.View, o outlook.Forecast) []tables.Rung {
	rec := v.Record.Batch
	parts := slices.DeleteFunc([]string{v.Vessel(), rec.Product, rec.Yeast}, func(s string) bool { return s == "" })
	rungs := []tables.Rung{
		{Name: "batch", Value: rec.ID, Remark: strings.Join(parts, ", ")},
		{Name: "original", Value: fixed(1+o.Course.Batch.OG/1000, 4), Remark: "SG 20/20, effective"},
		{Name: "readings", Value: fmt.Sprint(o.Curve.N), Remark: "none that counts"},
		{Name: "history", Value: fmt.Sprint(o.Curve.History), Remark: historyText(o.History)},
	}
	if last := o.Course.Last; last != nil {
		rungs[2].Remark = fmt.Sprintf("the last %s of %s", fixed(float64(last.SG), 4), minuteText(last.Source.TakenAt))
	}
	return rungs
}

// historyText names the batches behind a forecast, the newest first.
func historyText(h outlook.History) string {
	if len(h.Batches) == 0 {
		return "no finished batch: the usual figures of " + h.Kind.String()
	}
	const most = 6
	text := "finished: " + strings.Join(h.Batches[:min(most, len(h.Batches))], ", ")
	if more := len(h.Batches) - most; more > 0 {
		text += fmt.Sprintf(" and %d more", more)
	}
	return text
}

// nextOf is the gravity expected now; a closed batch is not read any more.
func nextOf(v journal.View, o outlook.Forecast) (curve.Interval, bool) {
	if v.Record.Closed != nil {
		return curve.Interval{}, false
	}
	return o.Next(o.Course.Now)
}

func nextWhy(v journal.View, o outlook.Forecast) string {
	switch c := o.Course; {
	case v.Record.Closed != nil:
		return "the batch is closed"
	case !o.Curve.Curve:
		return "no curve below 3 readings"
	case !c.Crashed.IsZero():
		return "the batch was cooled, the curve no longer holds"
	case !c.Primed.IsZero():
		return "the batch was primed, the curve no longer holds"
	}
	return "not known"
}

// explainForecast is what the forecast was reckoned with.
func explainForecast(o outlook.Forecast) []string {
	prior := o.History.Prior()
	centre := prior.Centre()
	lines := []string{
		fmt.Sprintf("curve: y(t) = OG - AA·OG·F(t), 1 - F(t) = ((1+E)/(1+E·e^(kt)))^s; OG %s points", fixed(o.Course.Batch.OG, 2)),
		fmt.Sprintf("history: apparent attenuation %s %% and ln t50 %s at its middle, error of the curve %s points, cold start of %s",
			fixed(100*centre.AA, 1), fixed(centre.LnT50, 2), fixed(prior.Tau, 2), o.History.Kind),
	}
	if len(o.History.Batches) > 0 {
		lines = append(lines, "finished batches: "+strings.Join(o.History.Batches, ", "))
	}
	for _, l := range o.History.Left {
		lines = append(lines, "left out of the history: "+l.Batch+", "+cmp.Or(l.Why, "no reason"))
	}
	for _, r := range o.Course.Batch.Readings {
		lines = append(lines, fmt.Sprintf("reading at %s h: %s points, u %s", fixed(r.Hours, 1), fixed(r.Points, 2), fixed(r.U, 2)))
	}
	if o.Curve.Curve {
		lines = append(lines, fmt.Sprintf("600 draws with a fixed seed, worth %s", fixed(o.Curve.ESS, 0)))
	}
	return lines
}
