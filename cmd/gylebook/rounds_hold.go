package main

import (
	"strings"

	"gylebook/attenuation/journal"
	"gylebook/tables"
)

// answer asks about a held reading, in one line.
func (r *round) answer(hold *journal.Hold) (string, error) {
	for _, line := range tables.Wrap("hold: "+hold.Text, max(r.set.width-2, 40)) {
		r.say(line)
	}
	question := "k REASON keeps it as suspect, "
	if hold.Closer != "" {
		question += "t logs it to " + nameOf(hold) + ", "
	}
	return r.ask(question + "Enter forgets it > ")
}

func nameOf(hold *journal.Hold) string {
	if hold.Vessel != "" {
		return hold.Vessel
	}
	return hold.Closer
}

// reason is why a suspect reading is kept; it is asked for when it was not typed.
func (r *round) reason(typed string) (string, error) {
	reason := strings.TrimSpace(typed)
	if reason == "" {
		var err error
		if reason, err = r.ask("reason > "); err != nil {
			return "", err
		}
	}
	if reason == "" {
		r.say("forgotten")
	}
	return reason, nil
}
