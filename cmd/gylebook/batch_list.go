package main

import (
	"fmt"
	"strconv"
	"time"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/tables"
)

func (b *bench) batchList() *cli.Command {
	return b.sub("batch", &cli.Command{
		Name: "list", Usage: "the batches, by product",
		Flags: []cli.Flag{
			&cli.BoolFlag{Name: "open", Usage: "those that are open"},
			&cli.BoolFlag{Name: "closed", Usage: "those that are closed"},
			&cli.BoolFlag{Name: "all", Usage: "void ones too"},
			&cli.StringFlag{Name: "product", Usage: "`NAME` of the product"},
			&cli.StringFlag{Name: "yeast", Usage: "`NAME` of the yeast"},
			&cli.IntFlag{Name: "year", Usage: "`YEAR` of pitching"},
		},
	}, `gylebook batch list --open
		gylebook batch list --product "Lane Bitter" --csv`,
		func(c *cli.Context) error {
			if c.Args().Len() > 0 {
				return wanted(c, "none")
			}
			f := journal.Filter{
				Product: c.String("product"), Yeast: c.String("yeast"), Year: c.Int("year"),
				Open: c.Bool("open"), Closed: c.Bool("closed"), Void: c.Bool("all"),
			}
			if f.Open && f.Closed {
				return usageError("", "--open and --closed exclude each other")
			}
			return b.withJournal(c.Context, func(s journal.Store) error { return b.listBatches(c, s, f) })
		})
}

func (b *bench) listBatches(c *cli.Context, s journal.Store, f journal.Filter) error {
	book, err := bookOf(c.Context, s)
	if err != nil {
		return err
	}
	t := tables.Table{Columns: []tables.Column{
		{Head: "batch"},
		{Head: "vessel"},
		{Head: "product"},
		{Head: "pitched"},
		{Head: "OG", Align: tables.Right},
		{Head: "last", Align: tables.Right},
		{Head: "app. %", Align: tables.Right},
		{Head: "state"},
	}}
	sh := sheet{name: "batch-list", columns: names(batchFigures(journal.View{Record: new(journal.Record)}))}
	for rec, err := range s.Batches(c.Context, f) {
		if err != nil {
			return err
		}
		v := journal.DeriveLast(rec, book, 2)
		sh.records = append(sh.records, batchFigures(v))
		t.Rows = append(t.Rows, batchRow(v))
	}
	if err := c.Context.Err(); err != nil {
		return err
	}
	switch {
	case len(t.Rows) == 0:
		b.note("note: no such batch")
	case b.narrow():
		sh.ladder = &tables.Ladder{Lines: narrowBatches(t.Rows, b.set.width)}
	default:
		sh.tables = []tables.Table{t}
	}
	return b.print(sh)
}

func batchRow(v journal.View) []string {
	rec := v.Record
	og, last, apparent, state := none, none, none, "open"
	if v.OG != nil {
		og = fixed(float64(v.OG.SG), 4)
	}
	if one := v.Last(); one != nil {
		last = fixed(float64(one.SG), 4)
		if one.Attenuation != nil {
			apparent = fixed(one.Attenuation.Apparent, 1)
		}
	}
	switch {
	case rec.Void:
		state = "void"
	case rec.Closed != nil:
		state = "closed"
	}
	return []string{rec.Batch.ID, v.Vessel(), rec.Batch.Product, day(v.Pitched), og, last, apparent, state}
}

// none stands where a figure is not known.
const none = "—"

// day is a date for people.
func day(t time.Time) string {
	if t.IsZero() {
		return none
	}
	return t.Format(time.DateOnly)
}

// minuteText is a time for people, on the clock where it was taken.
func minuteText(t time.Time) string {
	if t.IsZero() {
		return none
	}
	return t.Format("2006-01-02 15:04")
}

// names lists the fields of a record.
func names(r tables.Record) []string {
	out := make([]string, len(r))
	for k, f := range r {
		out[k] = f.Name
	}
	return out
}

// afterSheet says how a batch stands after an entry about it.
func afterSheet(name string, e journal.Entry, v journal.View, text string) sheet {
	rec := tables.Record{{Name: "entry", Value: int(e.Number)}, {Name: "kind", Value: string(e.Body.Kind())}}
	rec = append(rec, batchFigures(v)...)
	rec = append(rec, tables.Field{Name: "notes", Value: neutral(v.Notes)})
	answer := []string{text}
	if line := originalLine(v); line != "" {
		answer = append(answer, line)
	}
	answer[len(answer)-1] = numberedLine(answer[len(answer)-1], e)
	return sheet{name: name, records: []tables.Record{rec}, ladder: &tables.Ladder{Answer: answer}}
}

// numberedLine ends a line about an entry with its number, which void takes.
func numberedLine(line string, e journal.Entry) string {
	return fmt.Sprintf("%s   #%d", line, e.Number)
}

// originalLine is the original gravity in words, with what was added.
func originalLine(v journal.View) string {
	if v.OG == nil {
		return "original gravity not known"
	}
	text := fmt.Sprintf("OG %s (%s)", fixed(float64(v.OG.SG), 4), plato(v.OG.Extract))
	if v.OG.N > 1 {
		text += fmt.Sprintf(", mean of %d within %s points", v.OG.N, fixed(1000*v.OG.Spread, 1))
	}
	if len(v.Basis) > 0 {
		text += "   " + effectiveLine(v)
	}
	return text
}

// effectiveLine is the effective original gravity in words.
func effectiveLine(v journal.View) string {
	oe, sg, why := v.OEAt(forever)
	if why != "" {
		return "effective OG " + none + " (" + why + ")"
	}
	return fmt.Sprintf("effective OG %s (%s)", fixed(float64(sg), 4), plato(oe))
}

// entryNumber reads the number of an entry.
func entryNumber(text string) (int64, error) {
	n, err := strconv.ParseInt(text, 10, 64)
	if err != nil || n < 1 {
		return 0, dataError("gylebook batch show BATCH lists the numbers", "read %.40q, wanted the number of an entry", text)
	}
	return n, nil
}
