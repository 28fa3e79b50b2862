package demo

import (
	"time"

	"gylebook/attenuation/journal"
	"gylebook/gravity"
)

// readings writes the rounds of a batch.
func (w *writer) readings() error {
	number := 0
	for _, day := range w.days {
		// Each vessel has its place in the round.
		minute := 10 + 4*w.place() + w.rng.IntN(3)
		hours := []int{8}
		if day <= w.twice {
			hours = append(hours, 16)
		}
		for _, hour := range hours {
			if err := w.reading(number, w.clock(day, hour, minute)); err != nil {
				return err
			}
			number++
		}
	}
	return nil
}

func (w *writer) place() int {
	const order = "T1T2T3T4T5T6T7T8"
	for k := 0; k < len(order); k += 2 {
		if order[k:k+2] == w.vessel {
			return k / 2
		}
	}
	return 9
}

// reading writes the reading with this number, with what went wrong around it.
func (w *writer) reading(number int, at time.Time) error {
	operator := onDuty(at)
	oe, sg, err := w.brew.at(at)
	if err != nil {
		return err
	}
	warm := w.warm + 1.5*w.rng.NormFloat64()
	if w.crashed(at) {
		warm = 8 + 2*w.rng.Float64()
	}
	r := journal.Reading{
		Batch: w.id, Vessel: w.vesselAt(at), TakenAt: at, Quality: journal.Exact, Instrument: w.instrument(at),
		Temp: journal.TypedTemp{Text: temperature(max(warm, 4), operator), Unit: "C"},
	}
	if number == 7 && w.gen%3 == 0 {
		r.Quality = journal.Estimated
	}
	if number < 4 && w.rng.IntN(5) == 0 {
		r.Gassy = true
	}
	true20 := sg
	for _, k := range kept {
		if k.batch == w.id && k.number == number {
			r.Keep, sg = k.reason, sg+gravity.SG(k.high)
		}
	}
	h := truth(r.Instrument, at)
	value, err := w.read(r.Instrument, at, sg, oe, r.Temp)
	if err != nil {
		return err
	}
	r.Gravity = journal.Typed{Text: typed(h, value, operator, w.rng), Scale: h.Scale.String()}

	entered := at.Add(time.Minute)
	for _, b := range refracted {
		if b.batch == w.id && b.number == number {
			other := r
			other.TakenAt, other.Instrument = at.Add(-2*time.Minute), optical
			other.Gravity = journal.Typed{Text: b.typed, Scale: "brix"}
			other.Note = "for comparison"
			w.add(at, other)
		}
	}
	for _, s := range slips {
		if s.batch == w.id && s.number == number {
			wrong := r
			wrong.Gravity.Text = s.typed
			if s.temp != "" {
				wrong.Temp.Text = s.temp
			}
			w.add(entered, wrong)
			w.items = append(w.items, item{at: entered.Add(time.Minute), body: journal.Void{Entry: 1, Reason: s.reason}, fixes: true})
			entered = entered.Add(2 * time.Minute)
		}
	}
	w.items = append(w.items, item{at: entered, body: r, sg: true20})
	return nil
}

// crashed reports whether the tank is cold at a time.
func (w *writer) crashed(at time.Time) bool {
	for _, d := range deeds {
		if d.batch == w.id && d.event.What == journal.Crash && at.Sub(w.clock(d.day, d.hour, 0)) > 12*time.Hour {
			return true
		}
	}
	return false
}

// vesselAt follows the moves.
func (w *writer) vesselAt(at time.Time) string {
	vessel := w.vessel
	for _, d := range deeds {
		if d.batch == w.id && d.event.What == journal.Move && at.After(w.clock(d.day, d.hour, 0)) {
			vessel = d.event.Vessel
		}
	}
	return vessel
}
