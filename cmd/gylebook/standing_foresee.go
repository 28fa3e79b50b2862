package main

import (
	"errors"
	"fmt"

	"gylebook/attenuation/curve"
	"gylebook/attenuation/outlook"
	"gylebook/gravity/method"
)

// foresee puts the word of the forecast in the place of that of the readings, and the
// gravity that is expected now beside it. What wants attention for its readings keeps
// their word; where there is no forecast a note says why.
func (s *standing) foresee(e outlook.Evidence, err error) {
	switch {
	case err != nil:
		var refused *outlook.Refusal
		why := err.Error()
		if errors.As(err, &refused) {
			why = refused.Why
		}
		s.note("no-forecast", "no forecast: %s", why)
		return
	case !e.Forecast.Curve.Curve:
		s.note("no-forecast", "no forecast: %s, wanted 3", counted(e.Forecast.Curve.N, "reading"))
		return
	}
	if i, ok := nextOf(s.view, e.Forecast); ok {
		s.next = &i.Median
	}
	state := e.Weighed.State
	s.state = string(state)
	if state == curve.Stalled && (s.rank == inCourse || s.rank == stands) {
		s.rank = stands
		s.say(stateSymbols[state], s.state)
		s.notes = append(s.notes, method.Note{Code: "stalled", Text: stalledText(e)})
		return
	}
	if s.rank == inCourse {
		s.say(stateSymbols[state], s.state)
	}
}

// stalledText says what the batch stands above.
func stalledText(e outlook.Evidence) string {
	if w := e.Weighed; w.AboveLimitKnown && w.AboveLimit > 0 {
		return fmt.Sprintf("unchanged, %s points above the forced ferment", fixed(w.AboveLimit, 1))
	}
	return "unchanged above the final gravity that the history and its course foretold"
}
