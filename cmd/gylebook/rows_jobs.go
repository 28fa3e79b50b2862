package main

import (
	"fmt"
	"slices"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation"
	"gylebook/attenuation/volume"
	"gylebook/gravity"
	"gylebook/gravity/method"
	"gylebook/tables"
	"gylebook/tempcorr"
)

func (b *bench) correctRows(c *cli.Context) error {
	r, err := b.readerOf(c)
	if err != nil {
		return err
	}
	job := rowsJob{
		inputs: []string{"reading", "temp"}, fields: correctColumns,
		standard: []string{"corrected", "sg_20_20", "extract_pct_mass"},
	}
	temp := c.String("temp") // of every row, when it is given
	var fixed *gravity.Celsius
	if temp != "" {
		t, err := b.temperature(temp)
		if err != nil {
			return err
		}
		fixed = &t.C
		job.inputs = job.inputs[:1]
	}
	asked, err := job.results(c.String("columns"))
	if err != nil {
		return err
	}
	r.plain = !slices.Contains(asked, "expanded_uncertainty_k2")
	job.one = func(b *bench, cells []string) (tables.Record, error) {
		temp := temp
		if len(cells) > 1 {
			temp = cells[1]
		}
		one, err := b.correctOne(r, cells[0], temp)
		return one.record(), err
	}
	if figures, ok := figuresOf(asked); ok && b.bareSucrose(r) {
		job.fast = func(_ []string, slow volume.Worker) volume.Worker {
			return volume.NewCorrector(figures, r.basis, r.body, b.set.units, fixed, slow)
		}
	}
	if r.named != nil {
		for _, n := range r.named.notes {
			b.note("note: %s", n.Text)
		}
	}
	return b.rows(c, job)
}

// bareSucrose reports whether an SG reading gets nothing but the sucrose correction.
func (b *bench) bareSucrose(r reader) bool {
	return b.set.scale == gravity.ScaleSG && r.named == nil && r.oe == 0 && r.meniscus == tempcorr.Bottom &&
		(r.method == "" || r.method == tempcorr.Methods.Default().ID)
}

// figuresOf says which figure each result is; not ok when one is none of them.
func figuresOf(results []string) (figures []volume.Figure, ok bool) {
	known := map[string]volume.Figure{
		"reading": volume.Reading, "sample_temp_c": volume.SampleC, "temperature_correction": volume.ShiftSG,
		"corrected": volume.Corrected, "sg_20_20": volume.SG2020, "extract_pct_mass": volume.Extract, volume.ErrorColumn: volume.Other,
	}
	for _, name := range results {
		f, ok := known[name]
		if !ok {
			return nil, false
		}
		figures = append(figures, f)
	}
	return figures, true
}

func (b *bench) convertRows(c *cli.Context) error {
	conv, pair, err := converterOf(c)
	if err != nil {
		return err
	}
	show, err := scaleList(c.String("to"))
	if err != nil {
		return err
	}
	job := rowsJob{inputs: []string{"reading"}, fields: convertFields(columns), standard: []string{"sg_20_20", "extract_pct_mass"}}
	if c.String("to") != "" {
		job.standard = nil
		for _, col := range show {
			job.standard = append(job.standard, col.field)
		}
	}
	job.one = func(b *bench, cells []string) (tables.Record, error) {
		typed, err := b.reading(cells[0])
		if err != nil {
			return nil, err
		}
		one, err := convertOne(conv, pair, typed)
		if err != nil {
			return nil, err
		}
		return convertRecord(conv, columns, job.fields, one), nil
	}
	return b.rows(c, job)
}

// pairJob is a job on original and present gravities; of makes the record.
func (b *bench) pairJob(c *cli.Context, fields, standard []string, of func(*bench, pair) (tables.Record, error)) error {
	conv, basis, err := converterOf(c)
	if err != nil {
		return err
	}
	reason := c.String("reason")
	return b.rows(c, rowsJob{
		inputs: []string{"og", "pg"}, fields: fields, standard: standard,
		one: func(b *bench, cells []string) (tables.Record, error) {
			p, err := b.pairOf(conv, basis, cells, reason)
			if err != nil {
				return nil, err
			}
			return of(b, p)
		},
	})
}

// strengthFields are those of the answer and of the summary of one pair.
var strengthFields = []string{
	"method", "abv_pct_20c", "abw_pct", "real_extract_pct_mass", "in_range", "source",
	"expanded_uncertainty_k2", "spread_pct", "declared_rule", "declared_pct", "notes",
}

func (b *bench) abvRows(c *cli.Context, m method.Entry[attenuation.ABVFunc], rule attenuation.Rule) error {
	standard := []string{"abv_pct_20c", "expanded_uncertainty_k2", "declared_pct"}
	ruleChooses := c.String("method") == ""
	if err := b.pairJob(c, strengthFields, standard, func(_ *bench, p pair) (tables.Record, error) {
		if err := p.setReadingU(c); err != nil {
			return nil, err
		}
		s, err := estimate(p, m, rule, ruleChooses)
		if err != nil {
			return nil, err
		}
		if s.answer.Err != nil {
			return nil, fmt.Errorf("no value by %s: %w", m.ID, s.answer.Err)
		}
		e := s.answer
		return record(strengthFields, []any{
			e.Info.ID, float64(e.Alcohol.ABV), number(e.Alcohol.ABW), number(e.Alcohol.RE), e.InRange, e.Info.Source.String(),
			s.u.Expanded, float64(s.spread), rule.ID, number(s.declared), neutral(s.notesOf()),
		}), nil
	}); err != nil {
		return err
	}
	b.noteAs("caution", cautionEstimate)
	b.noteAs("caution", cautionRule(rule.Name, rule.Dated))
	return nil
}

func (b *bench) attenuationRows(c *cli.Context) error {
	standard := []string{"real_extract_pct_mass", "apparent_attenuation_pct", "real_attenuation_pct", "abv_pct_20c"}
	limit := c.String("limit")
	return b.pairJob(c, attenuationColumns, standard, func(b *bench, p pair) (tables.Record, error) {
		one := attenuated{pair: p}
		var err error
		if one.a, err = attenuation.Attenuate(p.g); err != nil {
			return nil, err
		}
		if limit != "" {
			if one.limit, err = b.limitOf(c, limit, one.a.OE); err != nil {
				return nil, err
			}
		}
		return one.record(attenuationColumns), nil
	})
}
