package main

import (
	"bytes"
	"io"
	"slices"
	"strings"
	"time"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation"
	"gylebook/attenuation/journal"
	"gylebook/attenuation/outlook"
	"gylebook/gravity"
	"gylebook/gravity/method"
	"gylebook/tables"
	"gylebook/tables/chart"
	"gylebook/tables/page"
	"gylebook/tables/report"
)

// pageWidth is the width for text that a page breaks itself.
const pageWidth = 400

func (b *bench) reportBatch() *cli.Command {
	return b.sub("report", &cli.Command{
		Name: "batch", Usage: "one batch: where it stands, its course, its end, every entry", ArgsUsage: "BATCH|VESSEL",
		Description: `One HTML file with its picture inside: no network, no script, made to be printed. A FILE that ends in .svg or
			.png is the picture alone.`,
		Flags: pageFlags(),
	}, `gylebook report batch B26-014 --out B26-014.html
		gylebook report batch T4 --out T4.png`,
		func(c *cli.Context) error {
			if c.Args().Len() != 1 {
				return wanted(c, "one batch")
			}
			if err := b.pageForm(c, "for figures: gylebook batch show BATCH --json"); err != nil {
				return err
			}
			return b.withJournal(c.Context, func(s journal.Store) error {
				rec, err := shownBy(c.Context, s, c.Args().First())
				if err != nil {
					return err
				}
				f, err := newForesight(c.Context, s, b.set.now.In(time.Local), outlook.Drink{})
				if err != nil {
					return err
				}
				p, err := pictureOf(c.Context, s, f, rec)
				if err != nil {
					return err
				}
				if form := pictureForm(c.String("out")); form != "" {
					return b.pageInto(c, func(w io.Writer) error { return p.course.Write(w, chart.Form(form), chart.Page) })
				}
				r, err := b.batchReport(f, rec, p)
				if err != nil {
					return err
				}
				return b.pageInto(c, r.Write)
			})
		})
}

// batchReport is the page of a batch: the blocks of batch show, forecast and terminal.
func (b *bench) batchReport(f *foresight, rec *journal.Record, p picture) (report.Report, error) {
	b.set.width = pageWidth
	v := journal.Derive(rec, f.book)
	r := report.Report{
		Title: p.course.Title, Subtitle: "batch report", Made: b.set.now.UTC().Format(time.RFC3339),
		Cautions: []string{cautionContainers.Text, cautionEstimate.Text, cautionRecords.Text},
	}
	r.Sections = append(r.Sections, report.Section{Heading: "Where it stands", Ladders: []tables.Ladder{*b.showLadder(v)}})
	var svg bytes.Buffer
	if err := p.course.Write(&svg, chart.SVG, chart.Page); err != nil {
		return r, err
	}
	r.Sections = append(r.Sections, report.Section{Heading: "Course", Figures: []page.Figure{{
		ID: "course", Alt: "Gravity of " + rec.Batch.ID + " by day; the same in words below", Caption: "Gravity by day", SVG: svg.Bytes(), Text: p.lines,
	}}})
	if end, ok, err := b.endSection(f, rec); err != nil {
		return r, err
	} else if ok {
		r.Sections = append(r.Sections, end)
	}
	if t := b.lineTable(v); len(t.Rows) > 0 {
		t.Title, t.Columns[len(t.Columns)-1].Head = "entries", "remark"
		r.Sections = append(r.Sections, report.Section{Heading: "Every entry", Tables: []tables.Table{t}})
	}
	r.Methods = batchMethods(v)
	return r, nil
}

// endSection is what forecast and terminal say of an open batch.
func (b *bench) endSection(f *foresight, rec *journal.Record) (report.Section, bool, error) {
	sec := report.Section{Heading: "Where it is going"}
	if rec.Closed != nil || rec.Void {
		return sec, false, nil
	}
	h, err := f.history(rec)
	if err != nil {
		return sec, false, err
	}
	v := f.view(rec)
	o, err := outlook.Of(v, h, f.at)
	if err != nil {
		sec.Lines = []string{"No forecast: " + err.Error() + "."}
		return sec, true, nil
	}
	e, err := outlook.EvidenceOf(v, h, f.at, false)
	if err != nil {
		return sec, false, err
	}
	said := b.forecastSheet(v, o)
	evidence := b.terminalSheet(v, e.WithSince(), isCider(v, f.drink))
	sec.Ladders = []tables.Ladder{*said.ladder, *evidence.ladder}
	sec.Notes = neutral(slices.Concat(o.Notes(), said.notes))
	return sec, true, nil
}

// batchMethods names the method and the source of every figure on the page.
func batchMethods(v journal.View) []report.Method {
	var list []report.Method
	seen := map[string]bool{}
	for k := range v.Values {
		one := &v.Values[k]
		if m := one.Result.Method; one.Err == nil && m.ID != "" && !seen[m.ID] {
			seen[m.ID] = true
			list = append(list, methodOf("temperature correction", m))
		}
	}
	return append(list, journalMethods()...)
}

func methodOf(figure string, m method.Info) report.Method {
	return report.Method{Figure: figure, Method: m.ID, Source: strings.TrimSpace(m.Source.String())}
}

// journalMethods are those that every figure of the journal follows.
func journalMethods() []report.Method {
	return []report.Method{
		methodOf("extract from SG", gravity.Fits.Default().Info),
		methodOf("apparent attenuation", attenuation.ApparentInfo),
		methodOf("real attenuation", attenuation.RealInfo),
		methodOf("alcohol by volume", attenuation.ABVMethods.Default().Info),
		{Figure: "uncertainty", Method: "k = 2", Source: "JCGM 100:2008 (GUM): reading, thermometer, instrument and relation in quadrature"},
	}
}
