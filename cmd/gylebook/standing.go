package main

import (
	"cmp"
	"fmt"
	"math"
	"slices"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/gravity/method"
)

// Attention is why an open batch wants to be looked at; lower comes first.
type attention int

const (
	unread   attention = iota // no reading for long, for its stage
	rising                    // its gravity rises
	stands                    // not falling though far above the expected
	inCourse                  // none of these
)

// Limits of the words for a batch: common practice, no source.
const (
	sameWithin = 0.5 // points; readings that lie closer are called unchanged
	farAbove   = 5.0 // points above the expected gravity
	lowAA      = 50  // % apparent attenuation, where no gravity is expected
	lagHours   = 24  // after pitching a gravity need not fall yet
	restHours  = 20  // unchanged for so long is not falling

	atWork     = 24.0  // hours from reading to reading while it falls or nothing is known
	atRest     = 72.0  // once it falls by less than quietFall
	inStore    = 168.0 // the same after storeDays
	quietFall  = 1.0   // points in 24 h
	storeDays  = 30.0
	lateFactor = 1.5 // late is what exceeds the time from reading to reading by this
)

// standing is what the readings of an open batch say by themselves. It approves
// of nothing.
type standing struct {
	view   journal.View
	vessel string
	last   *journal.Value // newest that counts, nil when there is none
	days   *float64       // since pitching
	hours  *float64       // since the last reading, suspect ones too
	fall   *float64       // points in 24 h
	rank   attention
	late   float64 // hours without a reading as a part of those usual at its stage
	symbol string
	word   string
	state  string   // word of the forecast, "" without one
	next   *float64 // SG that the forecast expects now
	notes  []method.Note
}

// standingOf judges a batch at a time. Of the readings the newest three minutes do.
func standingOf(v journal.View, now time.Time) standing {
	s := standing{view: v, vessel: v.Vessel(), last: v.Last(), rank: inCourse}
	if d, ok := v.Days(now); ok && d >= 0 {
		s.days = &d
	}
	if f, ok := v.Fall24h(); ok {
		s.fall = &f
	}
	newest := newestTaken(v)
	if newest != nil {
		h := now.Sub(newest.Source.TakenAt).Hours()
		s.hours = &h
	}
	s.describe(newest)
	s.attend(now)
	return s
}

// newestTaken is the newest reading that is not void, whether it counts or not.
func newestTaken(v journal.View) *journal.Value {
	for k := len(v.Values) - 1; k >= 0; k-- {
		if !v.Values[k].Void {
			return &v.Values[k]
		}
	}
	return nil
}

// describe finds word and symbol from the readings.
func (s *standing) describe(newest *journal.Value) {
	list := s.view.Counting()
	if newest != nil && newest.Suspect {
		s.note("suspect", "the newest reading, %s, is kept as suspect: %s", newest.Source.Gravity.Text, newest.Source.Keep)
		if s.last != nil && newest.Err == nil && 1000*float64(newest.SG-s.last.SG) > sameWithin {
			s.say("↑", "rising")
			s.rank = rising
			return
		}
	}
	if len(list) < 2 {
		s.say("·", "new")
		return
	}
	a, b := list[len(list)-2], list[len(list)-1]
	drop := 1000 * float64(a.SG-b.SG)
	switch added := s.addedBetween(a.Source.TakenAt, b.Source.TakenAt); {
	case added != "":
		s.say("+", "after "+added)
	case drop > sameWithin:
		s.say("↓", "falling")
	case drop < -sameWithin:
		s.say("↑", "rising")
		s.rank = rising
	default:
		s.unchanged(list)
	}
}

// unchanged says for how long the readings have lain close to the newest one.
func (s *standing) unchanged(list []*journal.Value) {
	newest := list[len(list)-1]
	since := newest
	for k := len(list) - 2; k >= 0; k-- {
		one := list[k]
		if math.Abs(1000*float64(one.SG-newest.SG)) > sameWithin || s.addedBetween(one.Source.TakenAt, newest.Source.TakenAt) != "" {
			break
		}
		since = one
	}
	hours := newest.Source.TakenAt.Sub(since.Source.TakenAt).Hours()
	s.say("=", "unchanged "+span24(hours))
	if hours < restHours {
		return
	}
	if excess, expected, ok := s.aboveExpected(); ok && excess > farAbove {
		s.rank = stands
		s.note("high", "not falling at %s, %s points above the expected %s", fixed(float64(newest.SG), 4), fixed(excess, 1), fixed(expected, 4))
	} else if a := newest.Attenuation; !ok && a != nil && a.Apparent < lowAA {
		s.rank = stands
		s.note("high", "not falling at %s, %s %% apparent attenuation", fixed(float64(newest.SG), 4), fixed(a.Apparent, 0))
	}
	if s.rank == stands {
		s.symbol = "!"
	}
}

// aboveExpected is how far the last reading lies above the end of the forced
// ferment; ok is false without one.
func (s *standing) aboveExpected() (points, expected float64, ok bool) {
	if s.view.Limit == nil || s.last == nil {
		return 0, 0, false
	}
	sg, err := gravity.Fits.Default().Fn.SG(*s.view.Limit)
	if err != nil {
		return 0, 0, false
	}
	return 1000 * float64(s.last.SG-sg), float64(sg), true
}

// addedBetween names what was last put in from a on and before b; "" is nothing.
func (s *standing) addedBetween(a, b time.Time) string {
	added := []string{journal.Sugar, journal.TopUp, journal.Dilution, journal.Blend, journal.Fruit, journal.Priming}
	what := ""
	for _, e := range s.view.Record.Events {
		if !e.Void && slices.Contains(added, e.Body.What) && !e.Body.At.Before(a) && e.Body.At.Before(b) {
			what = e.Body.What
		}
	}
	return what
}

// attend finds the rank: a batch that has not been read for long comes before
// whatever its old readings say.
func (s *standing) attend(now time.Time) {
	usual := atWork
	if s.fall != nil && *s.fall < quietFall {
		usual = atRest
		if s.days != nil && *s.days > storeDays {
			usual = inStore
		}
	}
	waited := 0.0
	switch {
	case s.hours != nil:
		waited = *s.hours
	case !s.view.Pitched.IsZero():
		waited = now.Sub(s.view.Pitched).Hours()
	default:
		waited = now.Sub(s.view.Record.Batch.Opened).Hours()
	}
	s.late = waited / usual
	if s.late > lateFactor {
		s.rank = unread
		s.say("!", "no reading "+span24(waited))
	} else if s.rank == stands && s.days != nil && *s.days*24 < lagHours {
		s.rank = inCourse
	}
}

func (s *standing) say(symbol, word string) { s.symbol, s.word = symbol, word }

func (s *standing) note(code, format string, args ...any) {
	s.notes = append(s.notes, method.Note{Code: code, Text: fmt.Sprintf(format, args...)})
}

// byAttention orders batches: those that want attention first.
func byAttention(a, b standing) int {
	since := func(s standing) float64 {
		if s.hours == nil {
			return math.Inf(1)
		}
		return *s.hours
	}
	order := cmp.Compare(a.rank, b.rank)
	if order == 0 && a.rank == unread {
		order = cmp.Compare(b.late, a.late)
	}
	return cmp.Or(order, cmp.Compare(since(b), since(a)), naturalCompare(a.vessel, b.vessel), naturalCompare(a.view.Record.Batch.ID, b.view.Record.Batch.ID))
}

// span24 is a span of time in whole hours, from 72 h on in whole days.
func span24(hours float64) string {
	if hours < 72 {
		return fixed(math.Floor(hours+1e-9), 0) + " h"
	}
	return fixed(math.Floor(hours/24+1e-9), 0) + " d"
}
