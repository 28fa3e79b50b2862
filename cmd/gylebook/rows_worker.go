package main

import (
	"slices"
	"strings"
	"sync/atomic"

	"gylebook/attenuation/volume"
	"gylebook/tables"
)

// rowWorker computes rows as the command computes single values.
type rowWorker struct {
	b      *bench // its own: it keeps notes, and nobody can be asked
	job    rowsJob
	pick   []int // field of each result, -1 for none
	cells  []string
	points *atomic.Bool // whether a whole number was taken for points
}

func newRowWorker(b *bench, job rowsJob, results []string, points *atomic.Bool) *rowWorker {
	own := *b
	own.in, own.notes = nil, nil
	w := &rowWorker{b: &own, job: job, cells: make([]string, len(job.inputs)), points: points}
	for _, name := range results {
		w.pick = append(w.pick, slices.Index(job.fields, name))
	}
	return w
}

// Row computes one row.
func (w *rowWorker) Row(cells [][]byte, out *volume.Results) error {
	for i, c := range cells {
		w.cells[i] = string(c)
	}
	w.b.notes = w.b.notes[:0]
	rec, err := w.job.one(w.b, w.cells)
	if err != nil {
		return err
	}
	if len(w.b.notes) > 0 {
		w.points.Store(true)
	}
	for i, field := range w.pick {
		if field >= 0 {
			put(out, i, rec[field].Value)
		}
	}
	return nil
}

// put sets a result as CSV writes a field.
func put(out *volume.Results, i int, v any) {
	switch v := v.(type) {
	case float64:
		out.Number(i, v)
	case int:
		out.Number(i, float64(v))
	case bool:
		out.Bool(i, v)
	case string:
		out.Text(i, v)
	case []tables.Note:
		texts := make([]string, len(v))
		for k, n := range v {
			texts[k] = n.Text
		}
		out.Text(i, strings.Join(texts, "; "))
	}
}
