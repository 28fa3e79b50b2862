package exchange

import (
	"context"
	"io"
	"strconv"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/gravity/asread"
)

// WriteReadings writes the table of readings, one row a reading, void ones too,
// batch by batch in the order of Reader.Batches, in the profile p. The figures are by
// the book; nil is that of the journal's instruments and the default method. Readings
// of the same minute share the figures of their mean. The error is that of r or of w.
func WriteReadings(ctx context.Context, w io.Writer, r journal.Reader, p Profile, book *journal.Book) error {
	if book == nil {
		instruments, err := r.Instruments(ctx)
		if err != nil {
			return err
		}
		book = journal.NewBook(instruments)
	}
	out := newCells(w, p.Dialect())
	for _, name := range Columns() {
		out.raw(name)
	}
	out.end()
	for rec, err := range r.Batches(ctx, journal.Filter{}) {
		if err != nil {
			return err
		}
		writeBatch(out, rec, book)
		if out.err != nil {
			return out.err
		}
	}
	return out.flush()
}

func writeBatch(out *cells, rec *journal.Record, book *journal.Book) {
	view := journal.Derive(rec, book)
	b := batchCells(rec, out.d.Decimal)
	for i := range view.Values {
		v := &view.Values[i]
		writeValue(out, v, view, book)
		for _, cell := range b {
			out.text(cell)
		}
		out.end()
	}
}

// batchCells are the last four columns, the same for every reading of a batch.
func batchCells(rec *journal.Record, mark rune) [4]string {
	pitched := ""
	if rec.Batch.Pitched != nil {
		pitched = stamp(*rec.Batch.Pitched)
	}
	return [4]string{rec.Batch.Product, pitched, ogText(rec.OGs, mark), withMark(rec.Batch.Volume, mark)}
}

func writeValue(out *cells, v *journal.Value, view journal.View, book *journal.Book) {
	src := v.Source
	out.raw(strconv.FormatInt(v.Number, 10))
	out.text(src.Batch)
	out.text(src.Vessel)
	out.raw(stamp(src.TakenAt))
	out.raw(src.Quality)
	elapsed := ""
	if h, ok := view.Elapsed(src.TakenAt); ok {
		elapsed = asread.Fixed(h, 2, asread.HalfEven)
	}
	out.number(elapsed)
	out.number(src.Gravity.Text)
	out.raw(src.Gravity.Scale)
	out.number(celsiusText(src.Temp))
	out.raw(yesNo(!src.Gassy))
	out.text(src.Instrument)
	f := figuresOf(v, book)
	for i := range figureColumns {
		out.number(f.text(i))
	}
	method := ""
	if f.known[figABV] {
		method = book.ABV.ID
	}
	out.raw(method)
	generation := ""
	if g := view.Record.Batch.Generation; g > 0 {
		generation = strconv.Itoa(g)
	}
	out.raw(generation)
	status, reason := state(v)
	out.raw(status)
	out.text(reason)
	out.text(takenBy(src.Note, v.By))
	out.raw(Schema)
}

// state returns status and reason of a reading.
func state(v *journal.Value) (status, reason string) {
	switch {
	case v.Void:
		return statusVoid, v.VoidReason
	case v.Source.Keep != "":
		return statusSuspect, v.Source.Keep
	case v.Err != nil:
		return statusUncorrected, v.Err.Error()
	}
	if v.Why == "" {
		return statusOK, v.AlcoholWhy
	}
	return statusOK, v.Why
}

func yesNo(yes bool) string {
	if yes {
		return "yes"
	}
	return "no"
}

func stamp(t time.Time) string { return t.Format(time.RFC3339Nano) }

// celsiusText returns the digits of a temperature typed in °C, and otherwise the
// temperature in °C to every digit.
func celsiusText(t journal.TypedTemp) string {
	v, err := t.Temperature()
	if err != nil {
		return t.Text
	}
	if v.Unit == string(asread.C) {
		return v.Typed.String()
	}
	return strconv.FormatFloat(float64(v.C), 'f', -1, 64)
}
