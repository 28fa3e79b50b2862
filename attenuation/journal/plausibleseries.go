package journal

import "fmt"

// Series judges the readings of one batch in the order of their time by the rules of
// Judge that hold whatever the order they were entered in: gravity and temperature in
// their places, not before pitching, within the range of the instrument, a liquid that
// reads so; and, against doubt that a reason overcomes, no rise and nothing over the
// original gravity with nothing added, no fall faster than anything ferments, and no
// other reading of the minute that is far off. Which other batch a reading would fit
// is not asked: that is a matter of the hour it is entered in. For many readings at
// once it takes the place of Judge, which looks at all readings of the batch for each.
type Series struct {
	s         Situation
	last, now accepted   // of the minute before, and of this one
	same      []accepted // all of this minute
}

type accepted struct {
	v     *Value
	fresh bool
}

// NewSeries begins with the batch's first reading. A nil book knows no instruments.
func NewSeries(target *Record, book *Book) *Series {
	if book == nil {
		book = NewBook(nil)
	}
	return &Series{s: Situation{Target: target, Book: book}}
}

// Next judges v, the next value of the batch in time; view is what it was derived
// in, with whole minutes. Fresh values are not in the journal yet. The hold is that
// of the fresh value with the number returned: v, or the one before it when v is in
// the journal and the fault shows against that. Void values are passed over, and suspect ones
// may be anything that is possible.
func (q *Series) Next(view View, v *Value, fresh bool) (hold *Hold, number int64) {
	if v.Void {
		return nil, 0
	}
	if fresh {
		if hold := q.impossible(v); hold != nil {
			return hold, v.Number
		}
	}
	if !v.Counts() {
		return nil, 0
	}
	if q.now.v != nil && !minute(q.now.v.Source.TakenAt).Equal(minute(v.Source.TakenAt)) {
		q.last, q.same = q.now, q.same[:0]
	}
	before := q.last
	one := v
	if fresh {
		hold = q.doubtful(view, before.v, v)
	} else if before.fresh {
		one = before.v
		hold = q.step(view, before.v, v, one)
	}
	if hold == nil {
		if far, fault := q.apart(v, fresh); far != nil {
			hold, one = far, fault
		}
	}
	if hold == nil || one != v {
		q.now = accepted{v, fresh}
		q.same = append(q.same, q.now)
	}
	if hold == nil {
		return nil, 0
	}
	return hold, one.Number
}

// doubtful judges a fresh value as compare does.
func (q *Series) doubtful(view View, before, v *Value) *Hold {
	if before != nil {
		if hold := q.step(view, before, v, v); hold != nil {
			return hold
		}
	}
	// Most are below it, and what they are doubted by takes its time.
	if v.OE > 0 && 1000*(own(v, v)-float64(v.OG)) > smallestRise/2 {
		if hold := q.s.aboveOG(view, q.whole(v)); hold != nil {
			return hold
		}
	}
	if before == nil {
		return q.s.plunge(view, nil, v)
	}
	return nil
}

// step holds a rise from a to b, or a fall that is too fast.
func (q *Series) step(view View, a, b, one *Value) *Hold {
	// Most readings fall, and what a rise is doubted by takes its time.
	if 1000*(own(b, one)-own(a, one)) > smallestRise/2 {
		wa, wb := q.whole(a), q.whole(b)
		if one == a {
			return q.s.rise(view, wa, wb, wa)
		}
		return q.s.rise(view, wa, wb, wb)
	}
	return q.s.plunge(view, a, b)
}

// apart holds the fresh one of two values of this minute that lie far apart.
func (q *Series) apart(v *Value, fresh bool) (hold *Hold, fault *Value) {
	for _, other := range q.same {
		switch {
		case fresh:
			hold, fault = far(v, other.v, ""), v
		case other.fresh:
			hold, fault = far(other.v, v, ""), other.v
		}
		if hold != nil {
			return hold, fault
		}
	}
	return nil, nil
}

// whole is a value with the uncertainties that a plain book leaves out.
func (q *Series) whole(v *Value) *Value {
	if !q.s.Book.Plain {
		return v
	}
	book := *q.s.Book
	book.Plain = false
	w := *v
	if err := w.fill(&book); err != nil {
		return v // it was corrected before
	}
	w.SG, w.Extract = v.SG, v.Extract // the mean of its minute
	return &w
}

// impossible refuses what no reason makes right.
func (q *Series) impossible(v *Value) *Hold {
	r, b := v.Source, q.s.Target.Batch
	if swapped(r) {
		return swap(r)
	}
	if b.Pitched != nil && r.TakenAt.Before(*b.Pitched) {
		return &Hold{
			Code: HoldBeforePitch, Final: true, Tip: "before pitching only the original gravity is read: batch og " + b.ID,
			Text: fmt.Sprintf("taken at %s, wanted a time after pitching at %s", clock(r.TakenAt), clock(*b.Pitched)),
		}
	}
	_, hold, comparable := q.s.instrument(r, nil)
	if hold == nil && comparable && v.Err != nil {
		hold = &Hold{Code: HoldUncorrected, Text: v.Err.Error(), Tip: hintOf(v.Err), Final: true}
	}
	return hold
}
