package journal

import "fmt"

// Series judges the readings of one batch in the order of their time by the rules
// that hold whatever the order they were entered in: not before pitching, within
// the range of the instrument, a liquid that reads so, and no rise with nothing
// added. For many readings at once it takes the place of Judge, which looks at all
// readings of the batch for each.
type Series struct {
	s         Situation
	last, now accepted // of the minute before, and of this one
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
// the journal and stands over that. Void values are passed over, and suspect ones
// may rise.
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
		q.last = q.now
	}
	before := q.last
	if before.v == nil || !fresh && !before.fresh {
		q.now = accepted{v, fresh}
		return nil, 0
	}
	one := v
	if !fresh {
		one = before.v
	}
	// Most readings fall, and what a rise is doubted by takes its time.
	if 1000*(own(v, one)-own(before.v, one)) > smallestRise/2 {
		hold = q.rise(view, before.v, v, one)
	}
	if hold == nil || !fresh {
		q.now = accepted{v, fresh}
	}
	if hold == nil {
		return nil, 0
	}
	return hold, one.Number
}

// rise is Situation.rise, with the uncertainties that a plain book leaves out.
func (q *Series) rise(view View, a, b, one *Value) *Hold {
	if !q.s.Book.Plain {
		return q.s.rise(view, a, b, one)
	}
	book := *q.s.Book
	book.Plain = false
	whole := func(v *Value) *Value {
		w := *v
		if err := w.fill(&book); err != nil {
			return v // it was corrected before
		}
		w.SG, w.Extract = v.SG, v.Extract // the mean of its minute
		return &w
	}
	wa, wb := whole(a), whole(b)
	if one == a {
		return q.s.rise(view, wa, wb, wa)
	}
	return q.s.rise(view, wa, wb, wb)
}

// impossible refuses what no reason makes right.
func (q *Series) impossible(v *Value) *Hold {
	r, b := v.Source, q.s.Target.Batch
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
