package main

import (
	"bufio"
	"errors"
	"fmt"
	"slices"
	"strings"
	"time"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/gravity/asread"
	"gylebook/gravity/method"
	"gylebook/tables"
)

// logAsking logs one reading. When it is held and a person sits there, the person
// says what is meant, outside of any write; the reading is then judged anew.
func (b *bench) logAsking(c *cli.Context, s journal.Store, in toLog) (logged, error) {
	for {
		done, err := b.logOne(c.Context, s, in)
		var hold *journal.Hold
		if err == nil || !errors.As(err, &hold) || hold.Final || !b.interactive() {
			return done, err
		}
		again, asked := b.askHold(hold, &in)
		if asked != nil {
			return done, asked
		}
		if !again {
			return done, err
		}
	}
}

// choice is one way out of a hold.
type choice struct {
	text string
	take func(*toLog) (bool, error)
}

// askHold offers the ways out of a hold and changes in accordingly; false leaves
// the reading refused.
func (b *bench) askHold(hold *journal.Hold, in *toLog) (bool, error) {
	var choices []choice
	if hold.Closer != "" {
		name := strings.TrimSpace(hold.Vessel + " " + hold.Closer)
		choices = append(choices, choice{"it was " + name, func(in *toLog) (bool, error) {
			in.name = hold.Closer
			return true, nil
		}})
	}
	if hold.Code == journal.HoldRise || hold.Code == journal.HoldAboveOG {
		choices = append(choices, choice{"something was added before it: log that too", b.askAddition})
	}
	choices = append(
		choices,
		choice{"it was another tank", func(in *toLog) (bool, error) {
			in.name = b.askLine("vessel or batch")
			return in.name != "", nil
		}},
		choice{"keep it as suspect, with a reason", func(in *toLog) (bool, error) {
			in.keep = b.askLine("reason")
			return in.keep != "", nil
		}},
	)
	tell(b.err, "held: "+tables.Clean(hold.Text))
	for k, one := range choices {
		fmt.Fprintf(b.err, "  %d  %s\n", k+1, one.text)
	}
	answer := b.askLine(fmt.Sprintf("which (1-%d, Enter to write nothing)", len(choices)))
	for k, one := range choices {
		if answer == fmt.Sprint(k+1) {
			return one.take(in)
		}
	}
	return false, nil
}

// askLine asks on stderr for one line; "" when there is none.
func (b *bench) askLine(question string) string {
	fmt.Fprintf(b.err, "%s? ", question)
	line, _ := bufio.NewReader(b.in).ReadString('\n')
	return strings.TrimSpace(line)
}

// addedBefore is how long before its reading an addition is taken to have been that
// was typed when the reading was held.
const addedBefore = time.Minute

// askAddition asks what was added just before the reading.
func (b *bench) askAddition(in *toLog) (bool, error) {
	fields := asread.Fields(b.askLine("what was added (sugar 2kg, dilution 5L, top-up 10L 1.040)"))
	if len(fields) == 0 {
		return false, nil
	}
	kind := strings.ToLower(fields[0])
	if !slices.Contains(journal.EventKinds, kind) || len(fields) > 4 {
		return false, dataError("type a kind, an amount and, where it is no water or sugar, its gravity",
			"read %.40q, wanted one of %s", strings.Join(fields, " "), strings.Join(journal.EventKinds, ", "))
	}
	e := journal.Event{What: kind, At: in.at.Add(-addedBefore)}
	if _, err := b.amounts(&e, fields[1:], "", "", ""); err != nil {
		return false, err
	}
	in.before = &e
	return true, nil
}

// extra are the notes that the record of the reading does not hold itself.
func (l logged) extra() []method.Note {
	var out []method.Note
	for _, n := range l.notes {
		if l.value == nil || !slices.Contains(l.value.Notes, n) {
			out = append(out, n)
		}
	}
	return out
}
