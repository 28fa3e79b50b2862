package main

import (
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
		}, append(pairFlags(), rowsFlags("og", "pg")...)...),
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
	if c.IsSet("rows") {
		return b.abvRows(c, m, rule)
	}
	if err := rowsAlone(c); err != nil {
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
	return b.finish(refused, len(done), func() error {
		s, err := b.abvSheet(done)
		if err != nil {
			return err
		}
		return b.print(s)
	})
}

// estimate answers with method m. The rule is applied to the method that it
// names itself, unless one was asked for. A method without a value (a difference
// beyond its table, a present gravity above the original) leaves a dash.
func estimate(p pair, m method.Entry[attenuation.ABVFunc], rule attenuation.Rule, ruleChooses bool) (strength, error) {
	s := strength{pair: p, rule: rule, all: attenuation.Estimates(p.g)}
	s.answer = attenuation.EstimateBy(m, p.g)
	s.spread = attenuation.Spread(s.all)
	var err error
	if s.u, err = s.uncertainty(s.answer); err != nil {
		return s, err
	}
	s.by = s.answer
	if rule.Method != "" && ruleChooses {
		e, err := attenuation.ABVMethods.Find(rule.Method)
		if err != nil {
			return s, err
		}
		s.by = attenuation.EstimateBy(e, p.g)
	}
	s.declared = s.declare(s.by)
	return s, nil
}

// uncertainty is that of one estimate; zero where there is no value.
func (s strength) uncertainty(e attenuation.Estimate) (attenuation.Propagated, error) {
	m, err := attenuation.ABVMethods.Find(e.Info.ID)
	if err != nil || e.Err != nil {
		return attenuation.Propagated{}, err
	}
	return attenuation.PropagateABV(m.Fn, s.fog.SG, s.fpg.SG, s.fit, s.uOG, s.uPG)
}

// declare applies the rule; nil for what has no value or is potential alcohol.
func (s strength) declare(e attenuation.Estimate) *gravity.VolPct {
	if e.Err != nil || e.Info.Kind != attenuation.KindABV {
		return nil
	}
	d := s.rule.Declare(e.Alcohol.ABV)
	return &d
}

var abvColumns = []string{
	"method", "abv_pct_20c", "abw_pct", "real_extract_pct_mass", "in_range", "source",
}

func (b *bench) abvSheet(done []strength) (sheet, error) {
	columns := b.lineFields(abvColumns, "expanded_uncertainty_k2", "declared_pct", "original_input", "present_input")
	s := sheet{name: "abv", columns: columns}
	for _, one := range done {
		for _, e := range one.all {
			values := []any{e.Info.ID, nil, nil, nil, e.InRange, e.Info.Source.String(), nil, number(one.declare(e)), one.og.Input, one.pg.Input}
			if e.Err == nil {
				u, err := one.uncertainty(e)
				if err != nil {
					return s, err
				}
				values[1], values[2], values[3], values[6] = float64(e.Alcohol.ABV), number(e.Alcohol.ABW), number(e.Alcohol.RE), u.Expanded
			}
			s.records = append(s.records, record(columns, values))
		}
		for _, e := range one.all {
			if e.Err != nil {
				s.reasons = append(s.reasons, method.Note{Code: method.NoValue, Text: "no value by " + e.Info.ID + ": " + e.Err.Error()})
			}
		}
		s.notes = append(s.notes, one.notesOf()...)
		s.explain = append(s.explain, one.explain()...)
	}
	switch len(done) {
	case 0:
		return s, nil
	case 1:
		s.summary = done[0].summary()
		s.ladder, s.tables = done[0].text()
	default:
		// A summary is of one pair; of several, each record holds its own.
		s.tables = []tables.Table{abvTable(done)}
	}
	s.notes = append(s.notes, cautionEstimate, cautionRule(done[0].rule.Name, done[0].rule.Dated))
	return s, nil
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

// attenuationChecked are the original gravities of the measured brews (USDA
// Bulletin 493, 1917) that the methods' own doubt comes from.
var attenuationChecked = struct{ from, to gravity.SG }{1.045, 1.079}

// notesOf are the notes of the answer, of the declared figure and of the readings.
func (s strength) notesOf() []method.Note {
	notes := append(append([]method.Note{}, s.notes...), s.answer.Notes...)
	if s.by.Info.ID != s.answer.Info.ID {
		notes = append(notes, s.by.Notes...)
	}
	if s.g.OG > attenuationChecked.to || s.g.OG < attenuationChecked.from {
		notes = append(notes, method.Note{Code: method.NotCovered, Text: "the methods were checked on measured brews of OG 1.045 to 1.078; beyond, the spread says more than the ±"})
	}
	if s.answer.Info.Kind == attenuation.KindPotential && s.answer.Err == nil {
		if _, lo, hi, err := attenuation.PotentialAlcohol(s.g.OG); err == nil {
			notes = append(notes, method.Note{Code: method.NotCovered, Text: fmt.Sprintf(
				"potential alcohol of the must: %s to %s %% vol at 18 to 17 g sugar per L; rules by Brix differ by 1 %% vol either way", fixed(float64(lo), 2), fixed(float64(hi), 2))})
		}
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
	}
	if s.answer.Err == nil {
		rungs = append(rungs, tables.Rung{Name: "spread", Value: fixed(float64(s.spread), 2), Remark: "% vol between the methods in range"})
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
		fmt.Sprintf("declared: %s (%s); applied to %s", s.rule.Text, s.rule.Source, s.by.Info.ID),
	)
}
