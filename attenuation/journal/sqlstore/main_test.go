package sqlstore

import (
	"bufio"
	"context"
	"errors"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"strconv"
	"strings"
	"testing"
	"time"

	"gylebook/attenuation/journal"
)

// shelf is a folder that lasts as long as the run.
var shelf string

// The test binary starts itself again as a process of its own; the variable holds
// what it is to do and with what.
const task = "GYLEBOOK_SQLSTORE_TEST_TASK"

func TestMain(m *testing.M) {
	if t := os.Getenv(task); t != "" {
		if err := runTask(strings.Split(t, "|")); err != nil {
			fmt.Fprintln(os.Stderr, err)
			os.Exit(1)
		}
		os.Exit(0)
	}
	os.Exit(func() int {
		var err error
		if shelf, err = os.MkdirTemp("", "gylebook-sqlstore-"); err != nil {
			fmt.Fprintln(os.Stderr, err)
			return 1
		}
		defer os.RemoveAll(shelf)
		return m.Run()
	}())
}

// process is this binary with a task.
func process(args ...string) *exec.Cmd {
	cmd := exec.Command(os.Args[0], "-test.run=^$")
	cmd.Env = append(os.Environ(), task+"="+strings.Join(args, "|"))
	cmd.Stderr = os.Stderr
	return cmd
}

func runTask(args []string) error {
	place := args[1]
	switch args[0] {
	case "append": // place, name, how many, opened once or each time
		n, err := strconv.Atoi(args[3])
		if err != nil {
			return err
		}
		return appendTask(place, args[2], n, args[4] == "once")
	case "each": // place
		return eachTask(place)
	case "look": // place
		return lookTask(place)
	case "create": // place
		s, err := Create(context.Background(), place)
		if err == nil {
			err = s.Close()
		}
		fmt.Println("create:", kindOf(err))
		return nil
	}
	return fmt.Errorf("unknown task %q", args)
}

// appendTask appends readings to a journal that may not be there yet, and prints
// the number and the note of each when Append has returned.
func appendTask(place, name string, n int, once bool) error {
	ctx := context.Background()
	var s *Store
	for k := range n {
		if s == nil {
			var err error
			if s, _, err = OpenOrCreate(ctx, place); err != nil {
				return err
			}
		}
		note := fmt.Sprintf("%s-%d", name, k)
		made, err := s.Append(ctx, name, time.Now(), func(r journal.Reader) ([]journal.Body, error) {
			b := benchBatch(1)
			reading := benchReading(b, 1)
			reading.Instrument, reading.Note = "", note
			_, err := r.Batch(ctx, b.ID)
			if errors.Is(err, journal.ErrNotFound) {
				return []journal.Body{b, reading}, nil
			}
			return []journal.Body{reading}, err
		})
		if err != nil {
			return err
		}
		fmt.Printf("%d %s\n", made[len(made)-1].Number, note)
		if !once {
			if err := s.Close(); err != nil {
				return err
			}
			s = nil
		}
	}
	if s != nil {
		return s.Close()
	}
	return nil
}

// lookTask says what a user may do with a journal.
func lookTask(place string) error {
	ctx := context.Background()
	s, err := Open(ctx, place)
	if err != nil {
		fmt.Println("open:", kindOf(err))
		return nil
	}
	defer s.Close()
	n, err := journal.VerifyAll(ctx, s)
	fmt.Printf("verify: %d %s\n", n, kindOf(err))
	_, err = s.Append(ctx, "nobody", time.Now(), func(journal.Reader) ([]journal.Body, error) {
		return []journal.Body{benchReading(benchBatch(1), 2)}, nil
	})
	fmt.Println("append:", kindOf(err))
	fmt.Println("backup:", kindOf(s.Backup(ctx, filepath.Join(filepath.Dir(place), "copy"))))
	return nil
}

func kindOf(err error) string {
	if err == nil {
		return "done"
	}
	for _, k := range []struct {
		name string
		err  error
	}{{"read-only", journal.ErrReadOnly}, {"full", journal.ErrDiskFull}, {"permission", os.ErrPermission}} {
		if errors.Is(err, k.err) {
			return k.name
		}
	}
	return err.Error()
}

// acknowledged reads what append tasks printed.
func acknowledged(t *testing.T, output string) map[int64]string {
	t.Helper()
	notes := make(map[int64]string)
	for sc := bufio.NewScanner(strings.NewReader(output)); sc.Scan(); {
		number, note, ok := strings.Cut(sc.Text(), " ")
		n, err := strconv.ParseInt(number, 10, 64)
		if !ok || err != nil {
			t.Fatalf("a process printed %q", sc.Text())
		}
		if other, twice := notes[n]; twice {
			t.Errorf("entry %d was acknowledged to %s and %s", n, other, note)
		}
		notes[n] = note
	}
	return notes
}

// checkAcknowledged fails the test unless the journal verifies, holds every entry
// that was acknowledged, as it was, and no note twice. It returns how many entries
// it holds.
func checkAcknowledged(t *testing.T, place string, notes map[int64]string) int64 {
	t.Helper()
	s, err := Open(context.Background(), place)
	if err != nil {
		t.Fatal(err)
	}
	defer s.Close()
	n, err := journal.VerifyAll(context.Background(), s)
	if err != nil {
		t.Errorf("after %d entries: %v", n, err)
	}
	if wrong, err := s.Audit(context.Background()); err != nil || wrong != 0 {
		t.Errorf("audit: %d wrong, error %v", wrong, err)
	}
	seen := make(map[string]int64)
	for e, err := range s.Entries(context.Background()) {
		if err != nil {
			t.Fatal(err)
		}
		r, ok := e.Body.(journal.Reading)
		if !ok {
			continue
		}
		if first, twice := seen[r.Note]; twice {
			t.Errorf("entries %d and %d are both %s", first, e.Number, r.Note)
		}
		seen[r.Note] = e.Number
	}
	for number, note := range notes {
		if seen[note] != number {
			t.Errorf("%s was acknowledged as entry %d, the journal has it as %d", note, number, seen[note])
		}
	}
	return n
}
