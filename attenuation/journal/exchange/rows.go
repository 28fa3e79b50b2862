package exchange

import (
	"bufio"
	"errors"
	"fmt"
	"io"
	"iter"
	"strings"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/gravity/asread"
	"gylebook/tables/dialect"
)

// ReadOptions say how the cells of a table of readings are meant.
type ReadOptions struct {
	Location *time.Location                 // of times without an offset; nil is UTC
	Scale    func(instrument string) string // id of an instrument's scale; "" or nil: sg
	Now      time.Time                      // a later reading is refused; zero refuses none
}

// Row is one row of a table of readings. What stands in typed columns is checked as
// far as that can be done without a journal; the rest is text.
type Row struct {
	Line     int
	Reading  journal.Reading
	Operator string
	Void     bool
	Reason   string // of the void
	Facts    Facts
	Repairs  []Repair

	own    bool // written by this program
	failed bool // status says that it could not be corrected
	claims figures
	places [figCount]int8
}

// Facts are the cells of a row that are about its batch, as text.
type Facts struct{ Product, Pitched, OG, Volume, Generation string }

// Repair is damage by a spreadsheet that was put right.
type Repair struct {
	Line             int
	Column, Read, As string
}

// Rows reads a table of readings.
type Rows struct {
	Dialect dialect.Dialect
	Notes   []string // such as columns that are not read
	in      *dialect.Reader
	header  header
	opt     ReadOptions
	zones   map[int]*time.Location // one for each offset: time.Parse makes one a row
}

// ReadReadings finds the form of a table of readings and reads its header. Columns
// stand in any order; wanted are batch_id or vessel, taken_at, entered_text and
// sample_temp_c. Errors: those of dialect.Detect, a *dialect.Error, ErrHeader, and
// those of r.
func ReadReadings(r io.Reader, opt ReadOptions) (*Rows, error) {
	in := bufio.NewReaderSize(r, dialect.SampleSize)
	sample, err := in.Peek(dialect.SampleSize)
	if err != nil && !errors.Is(err, io.EOF) {
		return nil, err
	}
	// Damage that is in the header, such as a NUL byte, is better named than a
	// separator not found.
	first := dialect.NewReader(strings.NewReader(string(sample)), dialect.Dialect{Comma: ','})
	var bad *dialect.Error
	if _, err := first.Read(); errors.As(err, &bad) {
		return nil, bad
	}
	d, err := dialect.DetectColumns(sample, numeric)
	if err != nil {
		return nil, err
	}
	rows := &Rows{Dialect: d, in: dialect.NewReader(in, d), opt: opt, zones: make(map[int]*time.Location)}
	head, err := rows.in.Read()
	if err != nil {
		return nil, err
	}
	rows.header, rows.Notes, err = readHeader(head.Fields)
	return rows, err
}

// All runs over the rows. A row that is refused comes as a *dialect.Error, and the
// rows after it follow; any other error is that of the file, and the last. A Row
// holds until the next one.
func (rs *Rows) All() iter.Seq2[*Row, error] {
	return func(yield func(*Row, error) bool) {
		var row Row
		for {
			rec, err := rs.in.Read()
			if errors.Is(err, io.EOF) {
				return
			}
			if err == nil {
				row = Row{Line: rec.Line}
				if why := rs.parse(&row, rec.Fields); why != nil {
					err = &dialect.Error{Line: rec.Line, Why: why.Error()}
				}
			}
			if err == nil {
				if !yield(&row, nil) {
					return
				}
				continue
			}
			var bad *dialect.Error
			if !yield(nil, err) || !errors.As(err, &bad) {
				return
			}
		}
	}
}

// parse fills row from the fields.
func (rs *Rows) parse(row *Row, fields []string) error {
	text := func(name string) string {
		if i, ok := rs.header.place[name]; ok {
			return dialect.Strip(fields[i])
		}
		return ""
	}
	cell := func(name string) string { return strings.TrimSpace(text(name)) }
	schema := cell(colSchema)
	if v := schema; v != "" && v != Schema {
		return fmt.Errorf("%s %.20q, wanted %s: written by a newer version?", colSchema, v, Schema)
	}
	row.own = schema != ""
	r := &row.Reading
	r.Batch, r.Vessel, r.Instrument = cell(colBatch), cell(colVessel), cell(colInstrument)
	if r.Batch == "" && r.Vessel == "" {
		return fmt.Errorf("neither %s nor %s, wanted one", colBatch, colVessel)
	}
	var err error
	if r.TakenAt, err = parseStamp(cell(colTaken), rs.opt.Location); err != nil {
		return fmt.Errorf("%s: %w", colTaken, err)
	}
	r.TakenAt = rs.zoned(r.TakenAt)
	if !rs.opt.Now.IsZero() && r.TakenAt.After(rs.opt.Now) {
		return fmt.Errorf("%s: read %s, which is still to come", colTaken, stamp(r.TakenAt))
	}
	if r.Quality = cell(colQuality); r.Quality == "" {
		r.Quality = journal.Exact
	}
	degassed, err := parseYesNo(cell(colDegassed))
	if err != nil {
		return fmt.Errorf("%s: %w", colDegassed, err)
	}
	r.Gassy, r.Note, row.Operator = !degassed, text(colNote), cell(colOperator)
	if err := rs.gravity(row, cell(colText), cell(colScale), damaged(schema, cell(figureColumns[figSG].name))); err != nil {
		return fmt.Errorf("%s: %w", colText, err)
	}
	if err := rs.temperature(row, cell(colTemp)); err != nil {
		return fmt.Errorf("%s: %w", colTemp, err)
	}
	row.Facts = Facts{cell(colProduct), cell(colPitched), cell(colOG), withMark(cell(colVolume), '.'), cell(colGeneration)}
	if err := rs.status(row, strings.ToLower(cell(colStatus)), text(colReason)); err != nil {
		return err
	}
	return rs.figures(row, fields)
}

// status takes void and suspect readings as such.
func (rs *Rows) status(row *Row, status, reason string) error {
	switch status {
	case "", statusOK:
		return nil
	case statusUncorrected:
		row.failed = true
		return nil
	case statusVoid, statusSuspect:
	default:
		return fmt.Errorf("%s: read %.40q, wanted %s, %s, %s or %s", colStatus, status, statusOK, statusVoid, statusSuspect, statusUncorrected)
	}
	if strings.TrimSpace(reason) == "" {
		return fmt.Errorf("%s is %s without a %s, wanted one", colStatus, status, colReason)
	}
	if status == statusVoid {
		row.Void, row.Reason = true, reason
	} else {
		row.Reading.Keep = reason
	}
	return nil
}

// parseStamp reads a date with a time; a time alone would mean today.
func parseStamp(text string, loc *time.Location) (time.Time, error) {
	if t, err := time.Parse(time.RFC3339Nano, text); err == nil {
		return t, nil
	}
	if len(text) < 10 || !isDigit(text[0]) || !strings.ContainsAny(text[:5], "-.") {
		return time.Time{}, fmt.Errorf("read %.40q, wanted a date and a time such as 2026-10-24T12:00:00+02:00", text)
	}
	return journal.ParseTime(text, loc, time.Time{})
}

// zoned is t with the zone that all times of its offset share.
func (rs *Rows) zoned(t time.Time) time.Time {
	_, offset := t.Zone()
	if offset == 0 {
		return t.UTC()
	}
	zone := rs.zones[offset]
	if zone == nil {
		zone = time.FixedZone("", offset)
		rs.zones[offset] = zone
	}
	return t.In(zone)
}

func parseYesNo(text string) (bool, error) {
	switch strings.ToLower(text) {
	case "", "yes", "true", "1":
		return true, nil
	case "no", "false", "0":
		return false, nil
	}
	return false, fmt.Errorf("read %.40q, wanted yes or no", text)
}

// sameMark refuses a number with the other decimal mark. A file whose beginning
// held no decimals takes the first mark that comes.
func (rs *Rows) sameMark(cell string) error {
	mark, _ := dialect.Mark(cell)
	if mark == 0 || mark == rs.Dialect.Decimal {
		return nil
	}
	if rs.Dialect.Decimal == 0 {
		rs.Dialect.Decimal = mark
		return nil
	}
	return fmt.Errorf("read %.40q, wanted the decimal mark %q as in the rows before", cell, rs.Dialect.Decimal)
}

// temperature takes a bare number as °C whatever it is, for the column says so.
func (rs *Rows) temperature(row *Row, cell string) error {
	if err := rs.sameMark(cell); err != nil {
		return err
	}
	t := journal.TypedTemp{Text: withMark(cell, '.'), Unit: string(asread.C)}
	_, err := t.Temperature()
	var doubt *asread.Doubt
	if errors.As(err, &doubt) {
		t.Text += t.Unit
		_, err = t.Temperature()
	}
	row.Reading.Temp = t
	return err
}
