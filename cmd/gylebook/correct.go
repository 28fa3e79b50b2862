package main

import (
	"fmt"
	"math"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation"
	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/gravity/method"
	"gylebook/tables"
	"gylebook/tempcorr"
)

func (b *bench) correctCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "correct", Usage: "a hydrometer reading at its reference temperature",
		ArgsUsage: "READING… --temp T",
		Description: `The instrument is glass, 20/20, read at the bottom of the meniscus unless told. With --og the
			liquid is a fermenting one; without it a sucrose solution. "-" reads stdin, one reading a line; a line may
			carry its own temperature. An OG is on the same basis as the reading.`,
		Flags: append([]cli.Flag{
			&cli.StringFlag{Name: "temp", Usage: "`T` temperature of the sample: 28C, 68F"},
			&cli.StringFlag{Name: "instrument", Usage: "`ID` of an instrument of the journal, as it is now"},
			&cli.StringFlag{Name: "basis", Value: "20/20", Usage: "`PAIR` reference of the instrument: 20/20, 60/60F, 15/15, 17.5/17.5, 15/4, 20/4"},
			&cli.StringFlag{Name: "body", Usage: "`MATERIAL` of the instrument: glass, borosilicate, polycarbonate"},
			&cli.StringFlag{Name: "meniscus", Value: "bottom", Usage: "`PLACE` where it was read: bottom or top (the scale is meant for the bottom)"},
			&cli.StringFlag{Name: "og", Usage: "`OG` original gravity of a liquid that ferments or has fermented"},
			&cli.StringFlag{Name: "method", Usage: "`ID` correction: " + ids(tempcorr.Methods) + " (sucrose; fermenting with --og)"},
		}, rowsFlags("reading", "temp")...),
	}, `gylebook correct 1.050 --temp 28C
		gylebook correct 1.012 --temp 30C --og 1.048
		gylebook correct 12.1P --temp 68F --json
		gylebook correct 1.050 --temp 22C --instrument H1
		printf '1.050 28C\n1.048 25C\n' | gylebook correct -
		gylebook correct --rows readings.csv --out corrected.csv`, b.correct)
}

// reader is an instrument and what every observation with it shares.
type reader struct {
	basis    gravity.Pair
	body     tempcorr.Body
	meniscus tempcorr.Meniscus
	oe       gravity.Plato
	og       string // the original gravity as it was read
	method   string
	named    *named // nil when no instrument is named
	plain    bool   // the uncertainty is not asked for
}

// corrected is one reading, typed and corrected.
type corrected struct {
	typed asread.Reading
	temp  asread.Temperature
	by    tempcorr.Hydrometer
	seen  tempcorr.Observation
	res   tempcorr.Result
}

func (b *bench) correct(c *cli.Context) error {
	if c.IsSet("rows") {
		return b.correctRows(c)
	}
	if err := rowsAlone(c); err != nil {
		return err
	}
	if c.Args().Len() == 0 {
		return missing(c.Command, "a reading")
	}
	r, err := b.readerOf(c)
	if err != nil {
		return err
	}
	var done []corrected
	temp := c.String("temp")
	// "1.050 28C" on the line is one reading with its temperature.
	refused := b.each(c, temp == "" && len(asread.Join(c.Args().Slice())) == 2, func(fields []string) error {
		temp := temp
		if len(fields) == 2 {
			temp = fields[1]
			fields = fields[:1]
		}
		if len(fields) != 1 {
			return dataError("one reading a line, its temperature behind it", "read %s, wanted a reading and its temperature", count(len(fields), "value", "values"))
		}
		if temp == "" {
			return usageError("read the sample's thermometer and add it, like --temp 28C", "the sample temperature is missing; usage: gylebook correct READING… --temp T")
		}
		one, err := b.correctOne(r, fields[0], temp)
		if err == nil {
			done = append(done, one)
		}
		return err
	})
	return b.finish(refused, len(done), func() error { return b.print(b.correctSheet(r, done)) })
}

// finish prints what was done and passes a refusal of stdin lines on; any other
// refusal prints nothing.
func (b *bench) finish(refused error, done int, print func() error) error {
	if refused != nil && refused != errShown {
		return refused
	}
	if done > 0 || b.set.format == tables.JSON || b.set.format == tables.CSV {
		if err := print(); err != nil {
			return err
		}
	}
	return refused
}

func (b *bench) readerOf(c *cli.Context) (reader, error) {
	r := reader{meniscus: tempcorr.Meniscus(c.String("meniscus")), method: c.String("method")}
	if r.meniscus == "" {
		r.meniscus = tempcorr.Bottom
	}
	if r.meniscus != tempcorr.Bottom && r.meniscus != tempcorr.Top {
		return r, usageError("", "--meniscus: read %.20q, wanted bottom or top", string(r.meniscus))
	}
	var err error
	if r.basis, err = basisOf(c); err != nil {
		return r, err
	}
	if r.body, err = tempcorr.FindBody(c.String("body")); err != nil {
		return r, err
	}
	if _, err = tempcorr.Methods.Find(r.method); err != nil {
		return r, err
	}
	if err := b.nameInstrument(c, &r); err != nil {
		return r, err
	}
	if text := c.String("og"); text != "" {
		og, err := b.reading(text)
		if err != nil {
			return r, err
		}
		f, err := gravity.NewConverter().Convert(og.Scale, og.Value, r.basis)
		if err != nil {
			return r, err
		}
		if f.Extract <= 0 {
			return r, dataError("leave --og out for a liquid without extract", "read OG %s, wanted an original gravity above water", og.ReadAs())
		}
		r.oe, r.og = f.Extract, og.ReadAs()
	}
	if r.method == "fermenting" && r.oe == 0 {
		return r, usageError("add --og 1.048", "--method fermenting needs the original gravity")
	}
	return r, nil
}

func (b *bench) correctOne(r reader, reading, temp string) (corrected, error) {
	var one corrected
	var err error
	if one.typed, err = b.reading(reading); err != nil {
		return one, err
	}
	if one.temp, err = b.temperature(temp); err != nil {
		return one, err
	}
	if one.by, err = r.hydrometer(one.typed.ReadAs(), one.typed.Scale); err != nil {
		return one, err
	}
	one.seen = tempcorr.Observation{
		Reading: one.typed.Value, Step: one.typed.Step, T: one.temp.C,
		ReadAt: r.meniscus, OE: r.oe, Method: r.method, Plain: r.plain,
	}
	one.res, err = tempcorr.Correct(one.by, one.seen)
	return one, err
}

var correctColumns = []string{
	"input", "reading", "read_as", "scale", "sample_temp_c", "reference_temp_c", "method", "instrument_id",
	"meniscus_correction", "instrument_correction", "temperature_correction", "corrected", "sg_20_20",
	"extract_pct_mass", "expanded_uncertainty_k2", "notes",
}

func (one corrected) record() tables.Record {
	res := one.res
	values := []any{
		one.typed.Input, res.Reading, one.typed.ReadAs(), one.typed.Scale.String(), float64(one.temp.C),
		float64(one.by.Basis.Sample), res.Method.ID, one.by.ID,
		res.Meniscus, res.Instrument(), res.Temperature, res.Corrected, float64(res.SG),
		float64(res.Extract), res.Budget.Expanded, neutral(res.Notes),
	}
	return record(correctColumns, values)
}

// record pairs names with values; what is not known is null, an empty text too.
func record(names []string, values []any) tables.Record {
	r := make(tables.Record, len(names))
	for i, n := range names { // values beyond the names are left out
		if values[i] == "" {
			values[i] = nil
		}
		r[i] = tables.Field{Name: n, Value: values[i]}
	}
	return r
}

func (b *bench) correctSheet(r reader, done []corrected) sheet {
	s := sheet{name: "correct", columns: correctColumns}
	if r.named != nil {
		s.notes = append(s.notes, r.named.notes...)
	}
	hot := false
	for _, one := range done {
		s.records = append(s.records, one.record())
		if b.set.explain {
			s.explain = append(s.explain, tempcorr.Explain(one.by, one.seen, one.res)...)
		}
		hot = hot || one.temp.C > 40
	}
	if hot {
		s.notes = append(s.notes, cautionHot)
	}
	switch {
	case len(done) == 1:
		s.ladder = done[0].ladder(r)
	case len(done) > 1:
		s.tables = []tables.Table{correctTable(r, done)}
	}
	return s
}

// places is the number of decimals that a value and its corrections are shown
// with: the scale's own, one more where more was typed.
func (one corrected) places() int {
	p := one.typed.Scale.Info().Decimals
	if one.typed.Step > 0 {
		p = max(p, min(int(math.Round(-math.Log10(one.typed.Step))), p+1))
	}
	return p
}

func (one corrected) ladder(r reader) *tables.Ladder {
	res, p := one.res, one.places()
	unit := one.typed.Scale.Info().Symbol
	if one.typed.Scale == gravity.ScaleSG {
		unit += " " + r.basis.String()
	}
	answer := []string{
		fixed(res.Corrected, p) + " " + unit,
		"±" + fixed(res.Budget.Expanded, p) + " (k=2, " + covers(res.Budget.Record) + ")",
	}
	if one.typed.Scale == gravity.ScaleSG && r.basis != gravity.Pair2020 {
		answer = append(answer, fixed(float64(res.SG), p)+" SG 20/20")
	}
	if one.typed.Scale.IsMass() {
		answer = append(answer, fixed(float64(res.SG), 4)+" SG 20/20")
	} else {
		answer = append(answer, fixed(float64(res.Extract), 2)+" °P")
	}
	rungs := []tables.Rung{{
		Name: "read", Value: one.typed.Typed.String(),
		Remark: fmt.Sprintf("%s at %s, %s %s, %s of meniscus", one.typed.ReadAs(), one.temp.ReadAs(), r.body.ID, r.basis, r.meniscus),
	}}
	if r.og != "" {
		rungs = append(rungs, tables.Rung{Name: "original", Value: fixed(float64(r.oe), 2), Remark: "°P, read as " + r.og})
	}
	if res.Meniscus != 0 {
		rungs = append(rungs, tables.Rung{Name: "meniscus", Value: asread.Signed(res.Meniscus, p), Remark: "read at the " + string(r.meniscus)})
	}
	rungs = append(
		rungs,
		tables.Rung{Name: "certificate", Value: asread.Signed(res.Instrument(), p), Remark: r.certificateRemark()},
		tables.Rung{Name: "temperature", Value: asread.Signed(res.Temperature, p), Remark: liquidRemark(r, res)},
		tables.Rung{Name: "corrected", Value: fixed(res.Corrected, p), Remark: apparent(res)},
	)
	return &tables.Ladder{Answer: answer, Rungs: rungs}
}

// liquidRemark names the model of the liquid and of the body.
func liquidRemark(r reader, res tempcorr.Result) string {
	body := fmt.Sprintf("%s %.0fe-6/K", r.body.ID, r.body.Expansion*1e6)
	switch res.Method.ID {
	case "fermenting":
		if res.Mixture.Alcohol == 0 {
			return "not below the original: no alcohol, sucrose model, " + body
		}
		return "fermenting model (Balling, OIML R 22, ICUMSA SPS-4), " + body
	case "lyons1992":
		return "temperature-only cubic (Lyons 1992), no glass"
	}
	return "sucrose model (ICUMSA SPS-4), " + body
}

func apparent(res tempcorr.Result) string {
	if res.Mixture.Alcohol > 0 {
		return fmt.Sprintf("apparent; about %s %% vol alcohol in it", fixed(float64(attenuation.VolumeOf(res.Mixture.Alcohol, res.SG)), 1))
	}
	return ""
}

func correctTable(r reader, done []corrected) tables.Table {
	t := tables.Table{
		Columns: []tables.Column{
			{Head: "read", Align: tables.Left},
			{Head: "at", Align: tables.Right},
			{Head: "temperature", Align: tables.Right},
			{Head: "corrected", Align: tables.Right},
			{Head: "± (k=2)", Align: tables.Right},
			{Head: "SG 20/20", Align: tables.Right},
			{Head: "°P", Align: tables.Right},
		},
		Foot: []string{fmt.Sprintf("%s %s, %s of meniscus; %s", r.body.ID, r.basis, r.meniscus, covers(done[0].res.Budget.Record))},
	}
	for _, one := range done {
		p := one.places()
		t.Rows = append(t.Rows, []string{
			one.typed.ReadAs(), one.temp.ReadAs(), asread.Signed(one.res.Temperature, p), fixed(one.res.Corrected, p),
			fixed(one.res.Budget.Expanded, p), fixed(float64(one.res.SG), 4), fixed(float64(one.res.Extract), 2),
		})
	}
	return t
}

// ids lists the ids of a registry for help.
func ids[F any](s method.Set[F]) string {
	text := ""
	for i, id := range s.IDs() {
		if i > 0 {
			text += ", "
		}
		text += id
	}
	return text
}
