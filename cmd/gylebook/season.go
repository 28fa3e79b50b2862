package main

import (
	"cmp"
	"context"
	"fmt"
	"slices"
	"strconv"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/control"
	"gylebook/attenuation/journal"
	"gylebook/attenuation/season"
	"gylebook/tables"
)

func (b *bench) seasonCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "season", Usage: "what each product and yeast came to",
		ArgsUsage: "[YEAR]",
		Description: `The year is that of pitching. Figures of a product and yeast are medians of its closed batches, with the
			interquartile range; days run from pitching to the last fall. From 15 closed batches of a product on, limits
			are drawn from them (individuals chart) and batches that break one of Nelson's tests are named; then what the
			generations of a yeast did. --json and --csv have one row a batch, --json charts and generations too.`,
		Flags: []cli.Flag{
			&cli.StringFlag{Name: "product", Usage: "`NAME` of the product"},
			&cli.StringFlag{Name: "yeast", Usage: "`NAME` of the yeast"},
			&cli.StringFlag{Name: "tests", Usage: "`NUMBERS` of Nelson's tests, 1 to 8; " + control.Default.String() + " unless given"},
		},
	}, `gylebook season
		gylebook season 2026 --product "Lane Bitter"
		gylebook season 2026 --tests 1,2,3,4,5,6,7,8
		gylebook season 2026 --csv`, b.season)
}

func (b *bench) season(c *cli.Context) error {
	f, tests, err := seasonAsked(c)
	if err != nil {
		return err
	}
	defer b.hasty()()
	return b.withJournal(c.Context, func(s journal.Store) error {
		rows, err := b.seasonRows(c.Context, s, f)
		if err != nil {
			return err
		}
		return b.print(b.seasonSheet(f, rows, tests))
	})
}

// seasonAsked reads the year and the flags that narrow a season.
func seasonAsked(c *cli.Context) (journal.Filter, control.Set, error) {
	f, tests := journal.Filter{Product: c.String("product"), Yeast: c.String("yeast")}, control.Default
	if c.Args().Len() > 1 {
		return f, tests, wanted(c, "a year at most")
	}
	if text := c.Args().First(); text != "" {
		year, err := strconv.Atoi(text)
		if err != nil || year < 1900 || year > 9999 {
			return f, tests, dataError("type a year such as 2026", "read %.20q, wanted a year from 1900 to 9999", text)
		}
		f.Year = year
	}
	if c.IsSet("tests") {
		var err error
		if tests, err = control.ParseSet(c.String("tests")); err != nil {
			return f, tests, usageError("gylebook season --tests "+control.Default.String(), "--tests: %v", err)
		}
	}
	return f, tests, nil
}

// seasonRows reads the batches of a season, with a count on a terminal.
func (b *bench) seasonRows(ctx context.Context, s journal.Store, f journal.Filter) ([]season.Row, error) {
	book, err := bookOf(ctx, s)
	if err != nil {
		return nil, err
	}
	book.Plain = true // no uncertainty is shown
	var rows []season.Row
	count := b.counter("batches")
	defer count.end()
	for row, err := range season.Rows(ctx, s, f, book) {
		if err != nil {
			return nil, err
		}
		rows = append(rows, row)
		count.to(len(rows))
	}
	return rows, nil
}

func (b *bench) seasonSheet(f journal.Filter, rows []season.Row, tests control.Set) sheet {
	s := sheet{name: "season", columns: names(seasonRecord(season.Row{}))}
	open := 0
	for _, r := range rows {
		if !b.isText() {
			s.records = append(s.records, seasonRecord(r))
		}
		if r.Open {
			open++
		}
	}
	if b.set.format == tables.JSON {
		s.summary = seasonSummary(rows, tests)
	}
	if !b.isText() {
		return s
	}
	title := "all seasons"
	if f.Year != 0 {
		title = fmt.Sprintf("season %d", f.Year)
	}
	title += fmt.Sprintf(": %s, %d open", count(len(rows), "batch", "batches"), open)
	if len(rows) == 0 {
		s.ladder = &tables.Ladder{Answer: []string{title}}
		return s
	}
	stacked := b.set.plain || b.set.width < 60
	lines := stacked && b.set.format != tables.Markdown
	s.tables = slices.Concat(
		[]tables.Table{seasonTable(season.Groups(rows), title, b.set.width, stacked)},
		chartTables(season.Charts(rows, tests), lines),
		generationTables(season.Lineages(rows), b.set.width, lines),
	)
	return s
}

// seasonTable has a line a product and yeast. Where lines are stacked the names are
// whole, and no cell is cut.
func seasonTable(groups []season.Group, title string, width int, stacked bool) tables.Table {
	right := func(head string) tables.Column { return tables.Column{Head: head, Align: tables.Right} }
	heads := []string{"n", "app. %", "IQR", "real %", "IQR", "% vol", "IQR", "days"}
	if stacked {
		heads = []string{
			"batches closed+open", "apparent attenuation %", "apparent IQR", "real attenuation %", "real IQR",
			"alcohol % vol", "alcohol IQR", "days to the last fall",
		}
	}
	t := tables.Table{
		Title:   title,
		Columns: []tables.Column{{Head: "product"}, {Head: "yeast"}},
		Foot: []string{
			"medians of the closed batches; IQR: width of the middle half; n closed+open",
			"attenuation on extract; days from pitching to the last fall",
		},
	}
	for _, head := range heads {
		t.Columns = append(t.Columns, right(head))
	}
	for _, g := range groups {
		n := strconv.Itoa(g.Batches - g.Open)
		if g.Open > 0 {
			n += "+" + strconv.Itoa(g.Open)
		}
		row := []string{g.Product, cmp.Or(g.Yeast, none), n}
		for _, one := range []season.Spread{g.Apparent, g.Real, g.ABV, g.Days} {
			median, width := none, none
			if one.N > 0 {
				median, width = fixed(one.Median, 1), fixed(one.IQR(), 1)
			}
			row = append(row, median, width)
		}
		// The width of the days is left to machines: the line is full.
		t.Rows = append(t.Rows, row[:len(t.Columns)])
	}
	if !stacked && !squeeze(&t, width, 0, 1) {
		return seasonTable(groups, title, width, true) // it would be stacked all the same
	}
	return t
}
