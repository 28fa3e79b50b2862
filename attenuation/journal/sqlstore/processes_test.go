package sqlstore

import (
	"bufio"
	"fmt"
	"io"
	"math/rand/v2"
	"path/filepath"
	"strings"
	"sync"
	"testing"
	"time"
)

// together runs processes that append at once and returns what they printed.
func together(t *testing.T, place string, processes, each int, once string) string {
	t.Helper()
	outputs := make([]string, processes)
	var wg sync.WaitGroup
	for p := range processes {
		wg.Go(func() {
			out, err := process("append", place, fmt.Sprintf("p%d", p), fmt.Sprint(each), once).Output()
			if err != nil {
				t.Errorf("process %d: %v", p, err)
			}
			outputs[p] = string(out)
		})
	}
	wg.Wait()
	return strings.Join(outputs, "")
}

func TestSixtyProcessesOnANewPlace(t *testing.T) {
	place := filepath.Join(t.TempDir(), "new", "folder", "journal")
	notes := acknowledged(t, together(t, place, 60, 1, "once"))
	if len(notes) != 60 {
		t.Errorf("%d entries were acknowledged, wanted 60", len(notes))
	}
	if n := checkAcknowledged(t, place, notes); n != 61 {
		t.Errorf("%d entries, wanted the batch and 60 readings", n)
	}
	if left, err := filepath.Glob(filepath.Join(filepath.Dir(place), "*")); err != nil || len(left) != 1 {
		t.Errorf("the folder holds %v, wanted the journal alone", left)
	}
	if left, err := filepath.Glob(filepath.Join(filepath.Dir(place), ".*")); err != nil || len(left) != 0 {
		t.Errorf("the folder holds %v, wanted no drafts", left)
	}
}

func TestEightProcesses(t *testing.T) {
	each := 200
	if testing.Short() {
		each = 40
	}
	for _, once := range []string{"once", "each time"} {
		t.Run(once, func(t *testing.T) {
			place := filepath.Join(t.TempDir(), "journal")
			notes := acknowledged(t, together(t, place, 8, each, once))
			if len(notes) != 8*each {
				t.Errorf("%d entries were acknowledged, wanted %d", len(notes), 8*each)
			}
			if n := checkAcknowledged(t, place, notes); n != int64(8*each+1) {
				t.Errorf("%d entries, wanted %d", n, 8*each+1)
			}
		})
	}
}

// killedProcess runs a process that appends without end and kills it: a moment
// after it began, whatever it has come to, or a moment after its first entry.
func killedProcess(t *testing.T, place string, p int) (output string, killed bool) {
	once := "once"
	if p%4 < 2 {
		once = "each time"
	}
	cmd := process("append", place, fmt.Sprintf("p%d", p), "1000000", once)
	pipe, err := cmd.StdoutPipe()
	if err == nil {
		err = cmd.Start()
	}
	if err != nil {
		t.Error(err)
		return "", false
	}
	out := bufio.NewReader(pipe)
	if p%2 == 0 {
		output, _ = out.ReadString('\n')
	}
	timer := time.AfterFunc(time.Duration(rand.Int64N(int64(150*time.Millisecond))), func() { _ = cmd.Process.Kill() })
	defer timer.Stop()
	rest, _ := io.ReadAll(out)
	err = cmd.Wait()
	return output + string(rest), err != nil && cmd.ProcessState.ExitCode() == -1
}

// A process that is killed leaves whole entries or none, and every number that it
// printed is in the journal.
func TestKilledProcesses(t *testing.T) {
	processes := 500
	if testing.Short() {
		processes = 100
	}
	place := filepath.Join(t.TempDir(), "journal")
	outputs := make([]string, processes)
	killed := make([]bool, processes)
	var wg sync.WaitGroup
	slots := make(chan struct{}, 6)
	for p := range processes {
		slots <- struct{}{}
		wg.Go(func() {
			defer func() { <-slots }()
			outputs[p], killed[p] = killedProcess(t, place, p)
		})
	}
	wg.Wait()
	dead, cut := 0, 0
	for p := range outputs {
		if killed[p] {
			dead++
		}
		// The last line may be cut in the middle of its number.
		if k := strings.LastIndexByte(outputs[p], '\n'); k+1 != len(outputs[p]) {
			outputs[p] = outputs[p][:k+1]
			cut++
		}
	}
	notes := acknowledged(t, strings.Join(outputs, ""))
	n := checkAcknowledged(t, place, notes)
	t.Logf("%d of %d processes killed, %d lines cut, %d entries acknowledged, %d in the journal", dead, processes, cut, len(notes), n)
	if dead != processes || len(notes) < processes/10 {
		t.Errorf("%d of %d processes were killed and %d entries acknowledged: too few to show anything", dead, processes, len(notes))
	}
	if n < int64(len(notes)) {
		t.Errorf("%d entries, fewer than the %d acknowledged", n, len(notes))
	}
}
