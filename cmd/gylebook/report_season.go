package main

import (
	"bytes"
	"cmp"
	"fmt"
	"io"
	"slices"
	"strconv"
	"time"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/control"
	"gylebook/attenuation/journal"
	"gylebook/attenuation/season"
	"gylebook/tables"
	"gylebook/tables/chart"
	"gylebook/tables/page"
	"gylebook/tables/report"
)

func (b *bench) reportSeason() *cli.Command {
	return b.sub("report", &cli.Command{
		Name: "season", Usage: "a season: products, control charts, generations, every batch", ArgsUsage: "[YEAR]",
		Description: "The year is that of pitching. One HTML file with its pictures inside: no network, no script, made to be printed.",
		Flags: pageFlags(
			&cli.StringFlag{Name: "product", Usage: "`NAME` of the product"},
			&cli.StringFlag{Name: "yeast", Usage: "`NAME` of the yeast"},
			&cli.StringFlag{Name: "tests", Usage: "`NUMBERS` of Nelson's tests, 1 to 8; " + control.Default.String() + " unless given"},
		),
	}, `gylebook report season 2026 --out season.html
		gylebook report season --product "Lane Bitter" --out bitter.html`,
		func(c *cli.Context) error {
			if err := b.pageForm(c, "for figures: gylebook season YEAR --json"); err != nil {
				return err
			}
			f, tests, err := seasonAsked(c)
			if err != nil {
				return err
			}
			return b.withJournal(c.Context, func(s journal.Store) error {
				rows, err := b.seasonRows(c.Context, s, f)
				if err != nil {
					return err
				}
				r, err := b.seasonReport(f, rows, tests)
				if err != nil {
					return err
				}
				return b.pageInto(c, func(w io.Writer) error { return r.Write(w) })
			})
		})
}

func (b *bench) seasonReport(f journal.Filter, rows []season.Row, tests control.Set) (report.Report, error) {
	b.set.width = pageWidth
	r := report.Report{
		Title: seasonTitle(f), Subtitle: seasonCount(rows), Made: b.set.now.UTC().Format(time.RFC3339),
		Cautions: []string{cautionEstimate.Text, cautionRecords.Text},
	}
	if len(rows) == 0 {
		r.Lead = []string{"No batch was pitched in it."}
		return r, nil
	}
	products := seasonTable(season.Groups(rows), "products", pageWidth, false)
	r.Sections = append(r.Sections, report.Section{Heading: "Products", Tables: []tables.Table{products}})
	charted, err := chartSections(season.Charts(rows, tests), rows)
	if err != nil {
		return r, err
	}
	r.Sections = append(r.Sections, charted...)
	if list := generationTables(season.Lineages(rows), pageWidth, false); len(list) > 0 {
		r.Sections = append(r.Sections, report.Section{Heading: "Generations of the yeast", Tables: list})
	}
	r.Sections = append(r.Sections, report.Section{Heading: "Every batch", Tables: []tables.Table{everyBatch(rows)}})
	r.Methods = append(journalMethods(), methodOf("limits of a chart", control.ChartInfo), methodOf("tests of a chart", control.Tests[0].Info))
	return r, nil
}

func seasonTitle(f journal.Filter) string {
	title := "All seasons"
	if f.Year != 0 {
		title = "Season " + strconv.Itoa(f.Year)
	}
	for _, name := range []string{f.Product, f.Yeast} {
		if name != "" {
			title += ", " + name
		}
	}
	return title
}

func seasonCount(rows []season.Row) string {
	open := 0
	for _, r := range rows {
		if r.Open {
			open++
		}
	}
	return fmt.Sprintf("%s, %d open", count(len(rows), "batch", "batches"), open)
}

// chartSections have a section a product with its pictures and limits. A product
// without two points has no picture, and one with too few for limits has one.
func chartSections(charts []season.FigureChart, rows []season.Row) ([]report.Section, error) {
	generations := map[string]int{}
	for _, r := range rows {
		generations[r.Batch] = r.Generation
	}
	var out []report.Section
	for k := range charts {
		c := &charts[k]
		if len(c.Values) < 2 || c.TooFew() && c.Figure != season.Apparent {
			continue
		}
		if len(out) == 0 || out[len(out)-1].Heading != c.Product {
			out = append(out, report.Section{Heading: c.Product})
		}
		sec := &out[len(out)-1]
		p, lines := controlPicture(c, generations)
		var svg bytes.Buffer
		if err := p.Write(&svg, chart.SVG, chart.Page); err != nil {
			return nil, err
		}
		sec.Figures = append(sec.Figures, page.Figure{
			ID: "chart-" + strconv.Itoa(k+1), Alt: p.YLabel + " of " + c.Product + " by batch; the same in words below",
			Caption: chartedAs[c.Figure].name, SVG: svg.Bytes(), Text: lines,
		})
	}
	return out, nil
}

// everyBatch is a row a batch, in the order of pitching.
func everyBatch(rows []season.Row) tables.Table {
	t := tables.Table{Title: "batches"}
	for k, head := range []string{"batch", "product", "yeast", "gen.", "pitched", "OG", "last SG", "app. %", "real %", "% vol", "days", "state"} {
		align := tables.Right
		if k < 3 || k == 11 {
			align = tables.Left
		}
		t.Columns = append(t.Columns, tables.Column{Head: head, Align: align})
	}
	rows = slices.Clone(rows)
	slices.SortStableFunc(rows, func(a, b season.Row) int {
		return cmp.Or(a.Pitched.Compare(b.Pitched), cmp.Compare(a.Batch, b.Batch))
	})
	for _, r := range rows {
		t.Rows = append(t.Rows, seasonRow(r))
	}
	t.Foot = []string{"attenuation on extract, % vol at 20 °C; days from pitching to the last fall; — is not known, gylebook batch show says why"}
	return t
}

func seasonRow(r season.Row) []string {
	row := []string{r.Batch, r.Product, cmp.Or(r.Yeast, none), none, day(r.Pitched), none, none, none, none, none, none, "closed"}
	if r.Generation > 0 {
		row[3] = strconv.Itoa(r.Generation)
	}
	if r.OG > 0 {
		row[5] = fixed(float64(r.OG), 4)
	}
	if r.SG > 0 {
		row[6] = fixed(float64(r.SG), 4)
	}
	if a := r.Attenuation; a != nil {
		row[7], row[8] = fixed(a.Apparent, 1), fixed(a.Real, 1)
	}
	if r.ABV != nil {
		row[9] = fixed(float64(*r.ABV), 2)
	}
	if r.Days != nil {
		row[10] = fixed(*r.Days, 1)
	}
	if r.Open {
		row[11] = "open"
	}
	return row
}
