package cause

import (
	"time"

	"gylebook/gravity"
	"gylebook/gravity/method"
	"gylebook/tempcorr"
)

// shifts returns by how many points of gravity an instrument reads low, as told by
// the other finished batches that were read with it under one calibration: the
// median of what each lies off the median of its own product and yeast. u is
// expanded. ok is false with too few of them.
func (q *question) shifts(id string, since, next time.Time) (points, u float64, n, products int, ok bool) {
	own := q.Batch.Record.Batch
	var list []float64
	for i, m := range q.Others {
		if m.Batch == own.ID || m.Instrument != id || !within(m.At, since, next) {
			continue
		}
		var group []float64
		for k, other := range q.Others {
			if k != i && other.Batch != own.ID && other.Product == m.Product && other.Yeast == m.Yeast {
				group = append(group, other.Apparent)
			}
		}
		if len(group) < fewest {
			continue
		}
		is, okIs := apparent(m.OG, m.FG)
		was, okWas := apparent(m.OG, m.FG+point)
		if !okIs || !okWas || !(is-was > 0) {
			continue
		}
		median, _ := middle(group)
		list = append(list, (m.Apparent-median)/(is-was))
		if m.Product != own.Product {
			products++
		}
	}
	n = len(list)
	if n == 0 {
		return 0, 0, 0, 0, false
	}
	points, sd := middle(list)
	return points, medianDoubt(max(sd, pointFloor), n), n, products, n >= fewest
}

// largestU is the largest expanded uncertainty of a calibration; 0 without one.
func largestU(points []tempcorr.Certificate) float64 {
	largest := 0.0
	for _, p := range points {
		largest = max(largest, p.U)
	}
	return largest
}

func note(code, text string) method.Note { return method.Note{Code: code, Text: text} }

// points is a difference of gravities in points.
func points(a, b gravity.SG) float64 { return float64(a-b) / point }
