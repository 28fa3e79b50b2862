package volume

import (
	"bytes"
	"errors"

	"gylebook/tables/dialect"
)

// chunk is a piece of the input, cut at record boundaries, and what became of it.
type chunk struct {
	in      []byte
	tooLong bool // stands for one record that was passed over; in is empty
	bytes   int  // of the input, for the progress
	lines   int  // line ends in it

	out     []byte
	rows    int
	refused int
	first   *RowError // its line counted from the start of the chunk, from 0
	done    chan struct{}
}

// worker works chunks.
type worker struct {
	plan    *Plan
	form    *form
	inputs  []int // columns of the inputs
	errorAt int   // result that takes the reason, -1 for none
	row     Worker
	memo    memo
	rec     record
	cells   [][]byte
	out     Results
}

func newWorker(p *Plan, f *form, inputs []int) *worker {
	w := &worker{
		plan: p, form: f, inputs: inputs, errorAt: -1, row: p.New(),
		rec: record{comma: f.comma}, cells: make([][]byte, len(inputs)), out: Results{make([]result, len(p.Results))},
	}
	for i, name := range p.Results {
		if name == ErrorColumn {
			w.errorAt = i
		}
	}
	return w
}

func (w *worker) work(c *chunk) {
	c.out, c.rows, c.refused, c.first = c.out[:0], 0, 0, nil
	if c.tooLong {
		w.rec.fields, w.rec.why = w.rec.fields[:0], tooLong()
		w.refuse(c, 0, errors.New(w.rec.why))
		return
	}
	if need := 3 * len(c.in); cap(c.out) < need {
		c.out = make([]byte, 0, need)
	}
	w.memo.chunk(len(c.in))
	all := simple(c.in)
	for at := 0; at < len(c.in); {
		rest := c.in[at:]
		end := bytes.IndexByte(rest, '\n') + 1
		if end == 0 {
			end = len(rest)
		}
		raw := trimEnd(rest[:end])
		if all || simple(raw) && bytes.IndexByte(raw, '\r') < 0 {
			w.rec.cut(raw)
			if end > dialect.MaxRecord {
				w.rec.fields, w.rec.why = w.rec.fields[:0], tooLong()
			}
		} else {
			end = w.rec.parse(rest)
			raw = trimEnd(rest[:end])
		}
		if !w.rec.blank() {
			w.one(c, at, raw)
			if c.refused > 0 && w.plan.Stop {
				break
			}
		}
		at += end
	}
	c.lines = lineEnds(c.in)
}

// trimEnd takes one line end off.
func trimEnd(b []byte) []byte {
	if n := len(b); n > 0 && b[n-1] == '\n' {
		b = b[:n-1]
	}
	if n := len(b); n > 0 && b[n-1] == '\r' {
		b = b[:n-1]
	}
	return b
}

// one works the record in w.rec, which stands as raw at the place at of the chunk.
func (w *worker) one(c *chunk, at int, raw []byte) {
	if w.rec.why == "" && len(w.rec.fields) != w.form.columns {
		w.rec.why = fieldCount(len(w.rec.fields), w.form.columns)
	}
	if w.rec.why != "" {
		w.refuse(c, at, errors.New(w.rec.why))
		return
	}
	from := len(c.out)
	if w.form.lines {
		c.out = w.form.object(c.out, &w.rec)
	} else {
		c.out = append(c.out, raw...)
	}
	for i, column := range w.inputs {
		w.cells[i] = w.rec.fields[column]
	}
	var known *slot
	var key memoKey
	if w.memo.awake() {
		var there bool
		if known, key, there = w.memo.slot(w.cells); there {
			c.rows++
			c.out = w.form.end(append(c.out, known.text[:known.n]...))
			return
		}
	}
	w.out.clear()
	if err := w.row.Row(w.cells, &w.out); err != nil {
		c.out = c.out[:from]
		w.refuseValue(c, at, raw, err)
		return
	}
	c.rows++
	from = len(c.out)
	c.out = w.form.results(c.out, w.out.cells)
	if n := len(c.out) - from; known != nil && n <= memoText {
		known.key, known.n = key, uint8(n)
		copy(known.text[:], c.out[from:])
	}
	c.out = w.form.end(c.out)
}

// refuse counts a row whose form is broken and writes it in a form that is not.
func (w *worker) refuse(c *chunk, at int, err error) {
	if !w.count(c, at, err) {
		return
	}
	if w.form.lines {
		c.out = w.form.object(c.out, &w.rec)
	} else {
		c.out = w.form.rewrite(c.out, &w.rec)
	}
	w.reason(c, err)
}

// refuseValue counts a row whose values are refused and writes it as it stands.
func (w *worker) refuseValue(c *chunk, at int, raw []byte, err error) {
	if !w.count(c, at, err) {
		return
	}
	if w.form.lines {
		c.out = w.form.object(c.out, &w.rec)
	} else {
		c.out = append(c.out, raw...)
	}
	w.reason(c, err)
}

// count reports whether the row is to be written.
func (w *worker) count(c *chunk, at int, err error) bool {
	c.rows++
	c.refused++
	if c.first == nil {
		c.first = &RowError{Line: lineEnds(c.in[:at]), Err: err}
	}
	return !w.plan.Stop
}

// reason writes empty results with the reason.
func (w *worker) reason(c *chunk, err error) {
	w.out.clear()
	if w.errorAt >= 0 {
		w.out.Text(w.errorAt, err.Error())
	}
	c.out = w.form.end(w.form.results(c.out, w.out.cells))
}
