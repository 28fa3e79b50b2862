package main

import (
	"cmp"
	"fmt"
	"slices"

	"gylebook/attenuation/journal"
	"gylebook/tables"
)

// end says how many vessels were read.
func (r *round) end() error {
	read, skipped, ahead := 0, 0, 0
	for _, s := range r.stops {
		switch {
		case s.read > 0:
			read++
		case s.passed:
			skipped++
		default:
			ahead++
		}
	}
	line := fmt.Sprintf("%d read, %d skipped", read, skipped)
	switch {
	case len(r.stops) == 0:
		line = "no open batch"
	case ahead > 0:
		line += fmt.Sprintf(", %d not reached", ahead)
	}
	if r.forMachines() {
		return r.print(sheet{name: "rounds", columns: names(valueRecord(journal.View{Record: new(journal.Record)}, new(journal.Value), nil)), records: r.records})
	}
	_, err := fmt.Fprintln(r.out, line)
	return err
}

func (r *round) forMachines() bool {
	return r.set.format == tables.JSON || r.set.format == tables.CSV
}

// stopOf is where the batch of a reading is visited, nil when it is not.
func (r *round) stopOf(done logged) *stop {
	at := slices.IndexFunc(r.stops, func(s *stop) bool { return s.batch == done.view.Record.Batch.ID })
	if at < 0 {
		return nil
	}
	return r.stops[at]
}

// keep takes what is on disk into the round, and echoes it in one line.
func (r *round) keep(done logged, remembered string) error {
	if s := r.stopOf(done); s != nil {
		s.read++
	}
	name := cmp.Or(done.view.Vessel(), done.view.Record.Batch.ID)
	if r.forMachines() {
		if done.value != nil {
			r.records = append(r.records, valueRecord(done.view, done.value, done.notes))
		}
		return nil
	}
	_, err := fmt.Fprintln(r.out, echo(name, done, remembered, r.set.width))
	return err
}

// echo is one line on what is on disk, with the number of its entry; what does not
// fit width is left out from before that.
func echo(name string, done logged, remembered string, width int) string {
	v := done.value
	switch {
	case done.repeat || v == nil:
		return name + "  already there"
	case v.Err != nil:
		return echoed(fmt.Sprintf("%s  read %s, not corrected", name, v.Source.Gravity.Text), done.entry)
	}
	line := name + "  " + fixed(float64(v.Result.SG), 4) + "  read " + v.Typed.ReadAs() + " at " + v.Temp.ReadAs() + remembered
	var more []string
	if v.Suspect {
		more = append(more, "kept as suspect")
	} else if fall, ok := done.view.Fall24h(); ok {
		word := "fall "
		if fall < 0 {
			word, fall = "rise ", -fall
		}
		more = append(more, word+fixed(fall, 1)+" in 24 h")
	}
	if v.Attenuation != nil {
		more = append(more, "app. "+fixed(v.Attenuation.Apparent, 1)+" %")
	}
	for _, part := range more {
		longer := line + "  " + part
		if tables.Width(echoed(longer, done.entry)) > width {
			break
		}
		line = longer
	}
	return echoed(line, done.entry)
}

// echoed ends a line of a round with the number of its entry, which void takes.
func echoed(line string, e journal.Entry) string { return fmt.Sprintf("%s  #%d", line, e.Number) }
