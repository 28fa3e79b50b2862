package exchange

import (
	"cmp"
	"context"
	"io"
	"slices"
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
		if err := writeBatch(ctx, out, rec, book); err != nil {
			return err
		}
	}
	return out.flush()
}

// writeBatch derives a few readings at a time, so that a batch of any length takes
// little memory.
func writeBatch(ctx context.Context, out *cells, rec *journal.Record, book *journal.Book) error {
	b := batchCells(rec, out.d.Decimal)
	all := inTime(rec.Readings)
	some := *rec
	some.Batch.Pitched = begun(rec, all)
	for len(all) > 0 && out.err == nil {
		if err := ctx.Err(); err != nil {
			return err
		}
		n := minuteEnd(all, atOnce)
		some.Readings, all = all[:n], all[n:]
		view := journal.Derive(&some, book)
		for i := range view.Values {
			writeValue(out, &view.Values[i], view, book)
			for _, cell := range b {
				out.text(cell)
			}
			out.end()
		}
	}
	return out.err
}

// begun is when the batch was pitched: as entered, else its first reading that is
// not void.
func begun(rec *journal.Record, all []numbered) *time.Time {
	if rec.Batch.Pitched != nil {
		return rec.Batch.Pitched
	}
	for i := range all {
		if !all[i].Void {
			return &all[i].Body.TakenAt
		}
	}
	return nil
}

// inTime returns readings in the order of their time, then of their number.
func inTime(list []numbered) []numbered {
	byTime := func(a, b numbered) int {
		return cmp.Or(a.Body.TakenAt.Compare(b.Body.TakenAt), cmp.Compare(a.Number, b.Number))
	}
	if !slices.IsSortedFunc(list, byTime) {
		list = slices.Clone(list)
		slices.SortFunc(list, byTime)
	}
	return list
}

// minuteEnd returns n, or so many more that readings of one minute stay together,
// for their mean is used.
func minuteEnd(all []numbered, n int) int {
	if n >= len(all) {
		return len(all)
	}
	for n < len(all) && floorMinute(all[n].Body.TakenAt) == floorMinute(all[n-1].Body.TakenAt) {
		n++
	}
	return n
}

// batchCells are the last four columns, the same for every reading of a batch.
func batchCells(rec *journal.Record, mark rune) [4]string {
	pitched := ""
	if rec.Batch.Pitched != nil {
		pitched = stamp(*rec.Batch.Pitched)
	}
	return [4]string{rec.Batch.Product, pitched, ogText(rec.OGs, mark), withMark(rec.Volume(), mark)}
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

// finer is how many decimals more a temperature typed in °F has in °C.
const finer = 2

func yesNo(yes bool) string {
	if yes {
		return "yes"
	}
	return "no"
}

func stamp(t time.Time) string { return t.Format(time.RFC3339Nano) }

// celsiusText returns the digits of a temperature typed in °C, and otherwise the
// temperature in °C with two decimals more than were typed, by which the one typed
// can be told: a step of 1 °F is 0.56 °C.
func celsiusText(t journal.TypedTemp) string {
	v, err := t.Temperature()
	if err != nil {
		return t.Text
	}
	if v.Unit == string(asread.C) {
		return v.Typed.String()
	}
	return asread.Fixed(float64(v.C), v.Typed.Places()+finer, asread.HalfEven)
}
