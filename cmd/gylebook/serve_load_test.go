package main

import (
	"encoding/json"
	"fmt"
	"os"
	"strconv"
	"syscall"
	"testing"
	"time"
)

// crowdNow is serveEpoch as a number.
const crowdNow = 1795780800

// Two hundred people at once: every request is answered, and what a page called
// stored is in the journal, once, under the name of who stored it.
//
// GYLEBOOK_LOAD="PEOPLE SECONDS PAUSE" sets how many come, for how long, and the
// mean time in seconds that each waits between two requests; .ci/load uses it.
func TestServeCrowd(t *testing.T) {
	people, lasts, pause := 200, 3.0, 0.5
	if os.Getenv("GYLEBOOK_CI") == "1" {
		lasts, pause = 30, 1
	}
	if set := os.Getenv("GYLEBOOK_LOAD"); set != "" {
		if _, err := fmt.Sscan(set, &people, &lasts, &pause); err != nil {
			t.Fatalf("GYLEBOOK_LOAD: read %q, wanted three numbers: %v", set, err)
		}
	}
	s := newServed(t).start()
	seconds := func(n float64) time.Duration { return time.Duration(n * float64(time.Second)) }
	c := &crowd{url: s.url, people: people, lasts: seconds(lasts), pause: seconds(pause), minutes: 240}
	for _, batch := range []string{"OD-04", "NP-05", "HC-05", "LB-16", "HC-06", "MM-04"} {
		c.typed = append(c.typed, s.lastReading(t, batch))
	}
	c.run()
	if code := s.end(syscall.SIGTERM); code != exitOK {
		t.Errorf("exit code %d: %s", code, s.stderr())
	}
	spent := s.cmd.ProcessState.UserTime() + s.cmd.ProcessState.SystemTime()
	t.Logf("%s; %.1f ms of a processor each", c.figures(), spent.Seconds()*1000/float64(len(c.took)))
	for k, what := range c.wrong {
		if k == 10 {
			t.Errorf("… and %d more", len(c.wrong)-k)
			break
		}
		t.Error(what)
	}
	if len(c.stored) == 0 {
		t.Error("nobody stored anything: this tested nothing")
	}
	found := map[int64]string{}
	for _, e := range s.exported() {
		if c.stored[e.Number] != "" || len(e.By) == 4 && e.By[0] == 'p' {
			found[e.Number] = e.By
		}
	}
	for number, by := range c.stored {
		if found[number] != by {
			t.Errorf("#%d was stored by %s, the journal has it from %q", number, by, found[number])
		}
	}
	if len(found) != len(c.stored) {
		t.Errorf("the pages said %d were stored, the journal has %d", len(c.stored), len(found))
	}
	verifyProcess(t, s.place)
}

// lastReading is the newest reading of a batch as it was typed: its temperature in
// whole degrees, to which tenths are put.
func (s *served) lastReading(t *testing.T, batch string) crowdReading {
	t.Helper()
	var d struct {
		Records []struct {
			Readings []struct {
				Input      string
				Temp       float64 `json:"sample_temp_c"`
				Instrument *string `json:"instrument_id"`
			}
		}
	}
	if err := json.Unmarshal([]byte(s.run("batch", "show", batch, "--json")), &d); err != nil {
		t.Fatal(err)
	}
	list := d.Records[0].Readings
	last := list[len(list)-1]
	with := "none"
	if last.Instrument != nil {
		with = *last.Instrument
	}
	return crowdReading{batch, last.Input, strconv.Itoa(int(last.Temp)), with}
}
