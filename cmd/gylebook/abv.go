package main

import (
	"errors"
	"fmt"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation"
	"gylebook/gravity"
	"gylebook/gravity/method"
	"gylebook/tables"
)

func (b *bench) abvCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "abv", Usage: "alcohol from original and present gravity, by every method",
		ArgsUsage: "OG PG",
		Description: `Gravities are corrected readings. The spread is over the methods whose range holds both; potential
			alcohol stands apart. "-" reads stdin, OG and PG a line.`,
		Flags: append([]cli.Flag{
			&cli.StringFlag{Name: "method", Usage: "`ID` method of the answer: " + ids(attenuation.ABVMethods)},
			&cli.StringFlag{Name: "rule", Usage: "`RULE` for the declared figure: " + ruleIDs()},
			&cli.StringFlag{Name: "reading-u", Usage: "`HALF-WIDTH` of both readings, in SG, rectangular; half the last place typed unless told"},
		}, pairFlags()...),
	}, `gylebook abv 1.048 1.010
		gylebook abv 12P 2.6P --method densimetric
		gylebook abv 1.055 1.016 --rule eu-label --json`, b.abv)
}

func ruleIDs() string {
	text := ""
	for i, r := range attenuation.Rules {
		if i > 0 {
			text += ", "
		}
		text += r.ID
	}
	return text
}

// strength is one pair with its answer and the declared figure.
type strength struct {
	pair
	all      []attenuation.Estimate
	answer   attenuation.Estimate
	u        attenuation.Propagated
	spread   gravity.VolPct
	rule     attenuation.Rule
	by       attenuation.Estimate // what the rule is applied to
	declared *gravity.VolPct
}

func (b *bench) abv(c *cli.Context) error {
	m, err := attenuation.ABVMethods.Find(c.String("method"))
	if err != nil {
		return err
	}
	rule, err := attenuation.FindRule(c.String("rule"))
	if err != nil {
		return err
	}
	var done []strength
	refused := b.pairs(c, func(p pair) error {
		if err := p.setReadingU(c); err != nil {
			return err
		}
		s, err := estimate(p, m, rule, c.String("method") == "")
		if err == nil {
			done = append(done, s)
		}
		return err
	})
	return b.finish(refused, len(done), func() error { return b.print(abvSheet(done)) })
}

// estimate answers with method m. The rule is applied to the method that it
// names itself, unless one was asked for.
func estimate(p pair, m method.Entry[attenuation.ABVFunc], rule attenuation.Rule, ruleChooses bool) (strength, error) {
	s := strength{pair: p, rule: rule, all: attenuation.Estimates(p.g)}
	s.answer = attenuation.EstimateBy(m, p.g)
	if s.answer.Err != nil && !errors.Is(s.answer.Err, attenuation.ErrOrder) {
		return s, s.answer.Err
	}
	s.spread = attenuation.Spread(s.all)
	if s.answer.Err == nil {
		var err error
		if s.u, err = attenuation.PropagateABV(m.Fn, p.fog.SG, p.fpg.SG, p.fit, p.uOG, p.uPG); err != nil {
			return s, err
		}
	}
	s.by = s.answer
	if rule.Method != "" && ruleChooses {
		e, err := attenuation.ABVMethods.Find(rule.Method)
		if err != nil {
			return s, err
		}
		s.by = attenuation.EstimateBy(e, p.g)
	}
	if s.by.Err == nil && s.by.Info.Kind == attenuation.KindABV {
		d := rule.Declare(s.by.Alcohol.ABV)
		s.declared = &d
	}
	return s, nil
}

var abvColumns = []string{"method", "abv_pct_20c", "abw_pct", "real_extract_pct_mass", "in_range", "source"}

func abvSheet(done []strength) sheet {
	s := sheet{name: "abv", columns: abvColumns}
	columns := abvColumns
	if len(done) > 1 {
		// Several pairs: each record says which one it belongs to.
		columns = append(append([]string{}, abvColumns...), "original_input", "present_input")
		s.columns = columns
	}
	for _, one := range done {
		for _, e := range one.all {
			values := []any{e.Info.ID, nil, nil, nil, e.InRange, e.Info.Source.String(), one.og.Input, one.pg.Input}
			if e.Err == nil {
				values[1], values[2], values[3] = float64(e.Alcohol.ABV), number(e.Alcohol.ABW), number(e.Alcohol.RE)
			}
			s.records = append(s.records, record(columns, values[:len(columns)]))
		}
		s.notes = append(s.notes, one.notesOf()...)
		s.explain = append(s.explain, one.explain()...)
	}
	switch len(done) {
	case 0:
		return s
	case 1:
		one := done[0]
		s.summary = one.summary()
		s.ladder, s.tables = one.text()
	default:
		s.tables = []tables.Table{abvTable(done)}
	}
	s.notes = append(s.notes, cautionEstimate, cautionRule(done[0].rule.Name, done[0].rule.Dated))
	return s
}

func (s strength) summary() tables.Record {
	return record(
		[]string{"method", "abv_pct_20c", "abw_pct", "expanded_uncertainty_k2", "spread_pct", "declared_rule", "declared_pct"},
		[]any{
			s.answer.Info.ID, s.known(float64(s.answer.Alcohol.ABV)), number(s.answer.Alcohol.ABW), s.known(s.u.Expanded),
			s.known(float64(s.spread)), s.rule.ID, number(s.declared),
		},
	)
}

// known is x, or nil when the answer has no value.
func (s strength) known(x float64) any {
	if s.answer.Err != nil {
		return nil
	}
	return x
}

// notesOf are the notes of the answer, of the declared figure and of the readings.
func (s strength) notesOf() []method.Note {
	notes := append(append([]method.Note{}, s.notes...), s.answer.Notes...)
	if s.by.Info.ID != s.answer.Info.ID {
		notes = append(notes, s.by.Notes...)
	}
	if s.declared == nil {
		reason := s.by.Info.ID + " gives potential alcohol, which is not declared"
		if s.by.Err != nil {
			reason = s.by.Err.Error()
		}
		notes = append(notes, method.Note{Code: method.NoValue, Text: "no declared figure by " + s.rule.ID + ": " + reason})
	}
	return notes
}

func (s strength) declaredText() string {
	if s.declared == nil {
		return "declared —"
	}
	return "declared " + fixed(float64(*s.declared), s.rule.Places) + " (" + s.rule.ID + ")"
}

// alcohol is the answer in % vol, a dash where there is none.
func (s strength) alcohol() string {
	if s.answer.Err != nil {
		return "—"
	}
	return fixed(float64(s.answer.Alcohol.ABV), 2)
}

func (s strength) text() (*tables.Ladder, []tables.Table) {
	answer := []string{s.alcohol() + " % vol at 20 °C", "±" + fixed(s.u.Expanded, 2) + " (k=2)", s.declaredText()}
	if s.answer.Err != nil {
		answer = []string{"no alcohol: " + s.answer.Err.Error()}
	}
	rungs := []tables.Rung{
		{Name: "original", Value: fixed(float64(s.g.OG), 4), Remark: fmt.Sprintf("SG 20/20, read as %s; %s °P", s.og.ReadAs(), fixed(float64(s.g.OE), 2))},
		{Name: "present", Value: fixed(float64(s.g.FG), 4), Remark: fmt.Sprintf("SG 20/20, read as %s; %s °P apparent", s.pg.ReadAs(), fixed(float64(s.g.AE), 2))},
		{Name: "alcohol", Value: s.alcohol(), Remark: "% vol by " + s.answer.Info.ID + "; instrument error not included"},
		{Name: "spread", Value: fixed(float64(s.spread), 2), Remark: "% vol between the methods in range"},
	}
	if s.declared != nil {
		rungs = append(rungs, tables.Rung{
			Name: "declared", Value: fixed(float64(*s.declared), s.rule.Places),
			Remark: fmt.Sprintf("%% vol, %s from %s by %s", s.rule.ID, fixed(float64(s.by.Alcohol.ABV), 2), s.by.Info.ID),
		})
	}
	t := tables.Table{Columns: []tables.Column{
		{Head: "method", Align: tables.Left},
		{Head: "% vol", Align: tables.Right},
		{Head: "% mass", Align: tables.Right},
		{Head: "real extract", Align: tables.Right},
		{Head: "in range", Align: tables.Left},
	}}
	for _, e := range s.all {
		row := []string{e.Info.ID, "—", "—", "—", "yes"}
		if e.Err == nil {
			row[1] = fixed(float64(e.Alcohol.ABV), 2)
		}
		if e.Alcohol.ABW != nil {
			row[2] = fixed(float64(*e.Alcohol.ABW), 2)
		}
		if e.Alcohol.RE != nil {
			row[3] = fixed(float64(*e.Alcohol.RE), 2)
		}
		if !e.InRange {
			row[4] = "no"
		}
		if e.Info.Kind == attenuation.KindPotential {
			row[4] += ", potential"
		}
		t.Rows = append(t.Rows, row)
	}
	return &tables.Ladder{Answer: answer, Rungs: rungs}, []tables.Table{t}
}

func abvTable(done []strength) tables.Table {
	t := tables.Table{Columns: []tables.Column{
		{Head: "original", Align: tables.Left},
		{Head: "present", Align: tables.Left},
		{Head: "% vol", Align: tables.Right},
		{Head: "± (k=2)", Align: tables.Right},
		{Head: "spread", Align: tables.Right},
		{Head: "declared", Align: tables.Right},
	}}
	for _, s := range done {
		declared := "—"
		if s.declared != nil {
			declared = fixed(float64(*s.declared), s.rule.Places)
		}
		t.Rows = append(t.Rows, []string{
			s.og.ReadAs(), s.pg.ReadAs(), s.alcohol(), fixed(s.u.Expanded, 2),
			fixed(float64(s.spread), 2), declared,
		})
	}
	t.Foot = []string{fmt.Sprintf("by %s, declared by %s; instrument error not included", done[0].answer.Info.ID, done[0].rule.ID)}
	return t
}

func (s strength) explain() []string {
	out := attenuation.ExplainAlcohol(s.g, s.answer)
	return append(
		out,
		fmt.Sprintf("uncertainty: readings, independent (r = 0) u = %.4f; common (r = +1) u = %.4f; method u = %.2f; u = %.4f, U = 2u = %.4f %% vol (JCGM 100)",
			s.u.Independent, s.u.Common, s.u.Method, s.u.Standard, s.u.Expanded),
		fmt.Sprintf("declared: %s (%s), %s; applied to %s", s.rule.Text, s.rule.Source, s.rule.Dated, s.by.Info.ID),
	)
}
