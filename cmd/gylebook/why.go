package main

import (
	"context"
	"fmt"
	"slices"
	"strconv"
	"time"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/cause"
	"gylebook/attenuation/journal"
	"gylebook/gravity/method"
	"gylebook/tables"
)

// peersKept is how many finished batches of the product and yeast a batch is held
// against, the newest ones.
const peersKept = 20

func (b *bench) whyCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "why", Usage: "why an attenuation is low or high: causes, computed and ranked",
		ArgsUsage: "BATCH|VESSEL",
		Description: `Holds the batch against the newest 20 finished batches of its product and yeast, at the end or, where it ended
			as they did, along the way. Each cause says how many points of apparent attenuation it would explain, and which
			check is the next cheapest. Causes that the data cannot tell apart share a rank; a cause that explains less than
			its uncertainty has none. The figures approve of nothing and blame nobody.`,
	}, `gylebook why B26-014
		gylebook why T4 --json`, b.why)
}

func (b *bench) why(c *cli.Context) error {
	if c.Args().Len() == 0 {
		return missing(c.Command, "the batch")
	}
	if c.Args().Len() > 1 {
		return tooMany(c, 1)
	}
	return b.withJournal(c.Context, func(s journal.Store) error {
		rec, err := batchBy(c.Context, s, c.Args().First())
		if err != nil {
			return err
		}
		one, err := caseOf(c.Context, s, rec)
		if err != nil {
			return err
		}
		return b.print(b.whySheet(one.Batch, cause.Judge(one)))
	})
}

// caseOf gathers what a batch is judged from.
func caseOf(ctx context.Context, r journal.Reader, rec *journal.Record) (cause.Case, error) {
	book, err := bookOf(ctx, r)
	if err != nil {
		return cause.Case{}, err
	}
	book.Plain = true // the causes need no budgets
	one := cause.Case{Batch: journal.Derive(rec, book), Book: book}
	last := one.Batch.Last()
	var peers []*journal.Record
	for other, err := range r.Batches(ctx, journal.Filter{}) {
		if err != nil {
			return one, err
		}
		if other.Batch.ID == rec.Batch.ID {
			continue
		}
		if m, ok := cause.MemberOf(journal.DeriveLast(other, book, 1)); ok {
			one.Others = append(one.Others, m)
			if m.Product == rec.Batch.Product && m.Yeast == rec.Batch.Yeast {
				peers = append(peers, other)
			}
		}
		if last != nil && readAbout(other, last.Source.TakenAt) {
			one.Tanks = append(one.Tanks, journal.Derive(other, book))
		}
	}
	slices.SortStableFunc(peers, func(a, b *journal.Record) int { return b.Closed.Body.At.Compare(a.Closed.Body.At) })
	for _, p := range peers[:min(len(peers), peersKept)] {
		one.Peers = append(one.Peers, journal.Derive(p, book))
	}
	return one, nil
}

// readAbout reports whether a batch was read within two hours of a time, as in one
// round.
func readAbout(rec *journal.Record, at time.Time) bool {
	return slices.ContainsFunc(rec.Readings, func(r journal.Numbered[journal.Reading]) bool {
		return !r.Void && r.Body.TakenAt.Sub(at).Abs() <= 2*time.Hour
	})
}

func (b *bench) whySheet(v journal.View, r cause.Report) sheet {
	s := sheet{name: "why", columns: names(whyRecord(cause.Hypothesis{})), summary: whySummary(v, r)}
	for _, h := range r.Hypotheses {
		s.records = append(s.records, whyRecord(h))
	}
	s.ladder = &tables.Ladder{Answer: whyAnswer(v, r), Lines: []string{r.Verdict}}
	if r.Comparison == nil {
		return s // the verdict says what lacks, and so would every cause
	}
	causes := &tables.Ladder{Answer: []string{"points of apparent attenuation that each cause would explain"}}
	for _, h := range r.Hypotheses {
		causes.Rungs = append(causes.Rungs, tables.Rung{Name: rankText(h) + " " + h.Name, Value: explainsText(h), Remark: evidenceText(h)})
	}
	s.more = append(s.more, causes)
	if list := r.Checks(); len(list) > 0 {
		next := &tables.Ladder{Answer: []string{"next checks, the cheapest first"}}
		for _, h := range list {
			next.Rungs = append(next.Rungs, tables.Rung{Name: h.Cost.String(), Value: h.Name, Remark: h.Check})
		}
		s.more = append(s.more, next)
	}
	return s
}

// whyAnswer is how the batch lies to its peers, in a line.
func whyAnswer(v journal.View, r cause.Report) []string {
	id := v.Record.Batch.ID
	c := r.Comparison
	if c == nil {
		return []string{id}
	}
	at := ""
	if c.Course {
		at = " after " + fixed(c.Hours, 0) + " h"
	}
	if c.Entered {
		at = ", with the original gravity as entered"
	}
	return []string{
		id, fixed(c.Apparent, 1) + " % apparent" + at,
		fmt.Sprintf("%s points ±%s against %d peers (%s %%)", asSigned(c.Difference), fixed(c.U, 1), c.Peers, fixed(c.Median, 1)),
	}
}

func rankText(h cause.Hypothesis) string {
	if h.Rank == 0 {
		return "·"
	}
	return strconv.Itoa(h.Rank)
}

func explainsText(h cause.Hypothesis) string {
	if h.Explains == nil {
		return none
	}
	text := asSigned(*h.Explains)
	if h.U != nil {
		text += " ±" + fixed(*h.U, 1)
	}
	return text
}

// evidenceText is the evidence, and what lacks to judge it.
func evidenceText(h cause.Hypothesis) string {
	switch {
	case h.Why == "":
		return h.Evidence
	case h.Evidence == "":
		return "cannot be judged: " + h.Why
	}
	return "cannot be judged: " + h.Why + "; " + h.Evidence
}

// whyRecord is one cause for machines.
func whyRecord(h cause.Hypothesis) tables.Record {
	var cost any
	if h.Check != "" {
		cost = h.Cost.String()
	}
	return tables.Record{
		{Name: "rank", Value: nilIfZero(h.Rank)},
		{Name: "hypothesis", Value: h.Name},
		{Name: "explains_pct_points", Value: number(h.Explains)},
		{Name: "expanded_uncertainty_k2", Value: number(h.U)},
		{Name: "share", Value: number(h.Share)},
		{Name: "evidence", Value: nilIfEmpty(evidenceText(h))},
		{Name: "check", Value: nilIfEmpty(h.Check)},
		{Name: "check_cost", Value: cost},
		{Name: "notes", Value: neutral(slices.Concat([]method.Note{}, h.Notes))},
	}
}

// whySummary is the comparison for machines.
func whySummary(v journal.View, r cause.Report) tables.Record {
	rec := tables.Record{
		{Name: "batch_id", Value: v.Record.Batch.ID},
		{Name: "product", Value: v.Record.Batch.Product},
		{Name: "yeast", Value: nilIfEmpty(v.Record.Batch.Yeast)},
		{Name: "open", Value: v.Open()},
	}
	fields := []string{
		"compared", "taken_at", "hours_since_pitching", "apparent_attenuation_pct", "peers", "peers_median_pct",
		"difference_pct_points", "expanded_uncertainty_k2", "limit_pct_points", "stands_out",
	}
	values := make([]any, len(fields))
	if c := r.Comparison; c != nil {
		compared := "end"
		if c.Course {
			compared = "course"
		}
		if c.Entered {
			compared = "og as entered"
		}
		values = []any{
			compared, stampText(c.Value.Source.TakenAt), known(c.Hours), c.Apparent, c.Peers, c.Median,
			c.Difference, c.U, c.Limit, c.StandsOut(),
		}
	}
	rec = append(rec, record(fields, values)...)
	return append(rec, tables.Field{Name: "verdict", Value: r.Verdict})
}
