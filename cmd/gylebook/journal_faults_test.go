package main

import (
	"bytes"
	"context"
	"fmt"
	"math/rand/v2"
	"os"
	"os/exec"
	"slices"
	"strconv"
	"strings"
	"sync"
	"testing"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/journal/sqlstore"
)

// Processes that log into one journal at once, some killed, keep every reading
// that they printed. All processes are the program itself.

// logProcess is a process that logs to the journal at place. Its operator names it.
func logProcess(place, operator string, args ...string) *exec.Cmd {
	cmd := exec.Command("gylebook", append([]string{"log", "--csv", "--quiet", "--journal", place, "--operator", operator}, args...)...)
	cmd.Env = slices.DeleteFunc(os.Environ(), func(e string) bool { return strings.HasPrefix(e, "GYLEBOOK_") || strings.HasPrefix(e, "TZ=") })
	cmd.Env = append(cmd.Env, "TZ=UTC")
	for name, value := range fixedEnv {
		cmd.Env = append(cmd.Env, name+"="+value)
	}
	return cmd
}

// oneReading logs to T1, as the only one in its minute.
func oneReading(place string, p int) *exec.Cmd {
	taken := time.Date(2026, 11, 2, 0, p, 0, 0, time.UTC).Format(time.RFC3339)
	return logProcess(place, fmt.Sprint("p", p), "T1", "1.012", "18", "--taken", taken)
}

// printedEntries reads the numbers of the entries in what a log process printed.
func printedEntries(t *testing.T, out string) []int64 {
	t.Helper()
	var numbers []int64
	lines := strings.Split(strings.TrimSuffix(out, "\n"), "\n")
	for _, line := range lines[1:] { // the first has the names
		first, _, _ := strings.Cut(line, ",")
		n, err := strconv.ParseInt(first, 10, 64)
		if err != nil {
			t.Errorf("a process printed %q", line)
			continue
		}
		numbers = append(numbers, n)
	}
	return numbers
}

// verifyProcess demands that `journal verify` is content.
func verifyProcess(t *testing.T, place string) {
	t.Helper()
	if out, err := exec.Command("gylebook", "journal", "verify", "--journal", place).CombinedOutput(); err != nil {
		t.Errorf("journal verify: %v, %s", err, out)
	}
}

// loggedBy returns the operator of every reading and how many each has.
func loggedBy(t *testing.T, place string) (byEntry map[int64]string, count map[string]int) {
	t.Helper()
	s, err := sqlstore.Open(t.Context(), place)
	if err != nil {
		t.Fatal(err)
	}
	defer s.Close()
	byEntry, count = make(map[int64]string), make(map[string]int)
	for e, err := range s.Entries(context.Background()) {
		if err != nil {
			t.Fatal(err)
		}
		if _, ok := e.Body.(journal.Reading); ok {
			byEntry[e.Number] = e.By
			count[e.By]++
		}
	}
	return byEntry, count
}

// atOnce runs do for 0 … n−1, so many at a time.
func atOnce(n, slots int, do func(p int)) {
	var wg sync.WaitGroup
	free := make(chan struct{}, slots)
	for p := range n {
		free <- struct{}{}
		wg.Go(func() {
			defer func() { <-free }()
			do(p)
		})
	}
	wg.Wait()
}

func TestKilledLogProcesses(t *testing.T) {
	processes := 500
	if testing.Short() {
		processes = 60
	}
	place := openJournal(t, "B26-1:T1")
	began := time.Now()
	const warm = 4
	for p := range warm {
		if out, err := oneReading(place, processes+p).CombinedOutput(); err != nil {
			t.Fatalf("%v, %s", err, out)
		}
	}
	// With a few at a time each takes about this long, so that a kill falls before,
	// into and after the write.
	const slots = 4
	usual := time.Since(began) / warm * 2
	printed := make([]string, processes)
	killed := make([]bool, processes)
	atOnce(processes, slots, func(p int) {
		cmd := oneReading(place, p)
		var out bytes.Buffer
		cmd.Stdout = &out
		if err := cmd.Start(); err != nil {
			t.Error(err)
			return
		}
		if p%4 != 0 {
			timer := time.AfterFunc(rand.N(usual), func() { _ = cmd.Process.Kill() })
			defer timer.Stop()
		}
		err := cmd.Wait()
		printed[p], killed[p] = out.String(), cmd.ProcessState.ExitCode() == -1
		if err != nil && !killed[p] {
			t.Errorf("process %d ended with %v", p, err)
		}
	})
	verifyProcess(t, place)
	byEntry, count := loggedBy(t, place)
	dead, whole := 0, 0
	for p := range processes {
		name := fmt.Sprint("p", p)
		if killed[p] {
			dead++
		} else if count[name] != 1 {
			t.Errorf("%s ended by itself and has %d readings, wanted 1", name, count[name])
		}
		if count[name] > 1 {
			t.Errorf("%s has %d readings, wanted 1 at most", name, count[name])
		}
		for _, n := range printedEntries(t, printed[p]) {
			whole++
			if byEntry[n] != name {
				t.Errorf("%s printed entry %d, which is a reading of %q", name, n, byEntry[n])
			}
		}
	}
	t.Logf("%d processes, %d killed, %d printed, %d readings", processes, dead, whole, len(byEntry)-warm)
	if dead < processes/10 || whole < processes/10 {
		t.Errorf("%d of %d processes were killed and %d printed: this tested nothing", dead, processes, whole)
	}
}

// Eight processes log one reading after the other, each to a vessel of its own.
func TestEightLogProcesses(t *testing.T) {
	each := 100
	if testing.Short() {
		each = 25
	}
	const processes = 8
	var batches []string
	for p := range processes {
		batches = append(batches, fmt.Sprintf("B26-%d:T%d", p+1, p+1))
	}
	place := openJournal(t, batches...)
	atOnce(processes, processes, func(p int) {
		name := fmt.Sprint("p", p)
		var lines strings.Builder
		for k := range each {
			fmt.Fprintf(&lines, "T%d 1.0%04d 18\n", p+1, 4800-k) // all of one minute, within a point
		}
		cmd := logProcess(place, name, "-")
		cmd.Stdin = strings.NewReader(lines.String())
		out, err := cmd.Output()
		if n := len(printedEntries(t, string(out))); err != nil || n != each {
			t.Errorf("%s printed %d readings, %v; wanted %d", name, n, err, each)
		}
	})
	verifyProcess(t, place)
	if _, count := loggedBy(t, place); len(count) != processes {
		t.Errorf("readings of %d operators, wanted %d", len(count), processes)
	} else {
		for name, n := range count {
			if n != each {
				t.Errorf("%s has %d readings, wanted %d", name, n, each)
			}
		}
	}
}

func TestSixtyLogProcessesAtOnce(t *testing.T) {
	const processes = 60
	place := openJournal(t, "B26-1:T1")
	printed := make([][]int64, processes)
	atOnce(processes, processes, func(p int) {
		out, err := oneReading(place, p).Output()
		if printed[p] = printedEntries(t, string(out)); err != nil || len(printed[p]) != 1 {
			t.Errorf("process %d printed %d readings, %v; wanted 1", p, len(printed[p]), err)
		}
	})
	verifyProcess(t, place)
	byEntry, count := loggedBy(t, place)
	if len(byEntry) != processes {
		t.Errorf("%d readings, wanted %d", len(byEntry), processes)
	}
	for p, numbers := range printed {
		name := fmt.Sprint("p", p)
		if count[name] != 1 || len(numbers) == 1 && byEntry[numbers[0]] != name {
			t.Errorf("%s has %d readings and printed entry %v, which is of %q", name, count[name], numbers, byEntry[numbers[0]])
		}
	}
}
