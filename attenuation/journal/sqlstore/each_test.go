package sqlstore

import (
	"bufio"
	"context"
	"errors"
	"fmt"
	"iter"
	"path/filepath"
	"testing"

	"gylebook/attenuation/journal"
)

// eachTask appends readings one by one without end, and says when it is in the
// middle of them.
func eachTask(place string) error {
	s, err := Open(context.Background(), place)
	if err != nil {
		return err
	}
	_, _, err = s.AppendEach(context.Background(), "ada", benchDay, func(journal.Reader) (iter.Seq2[journal.Body, error], error) {
		return func(yield func(journal.Body, error) bool) {
			for n := 1; ; n++ {
				r := benchReading(benchBatch(1), 1)
				r.Note = fmt.Sprintf("in the middle, %d", n)
				if !yield(r, nil) {
					return
				}
				if n == 20_000 { // some are beyond the cache, in the log of the file
					fmt.Println("in the middle")
				}
			}
		}, nil
	})
	return err
}

// A process that is killed in the middle of many entries leaves none of them.
func TestKilledInTheMiddle(t *testing.T) {
	place := filepath.Join(t.TempDir(), "journal")
	before := openAt(t, place)
	cellar(t, before, 3, 3)
	held, _, err := before.Head(context.Background())
	if err := errors.Join(err, before.Close()); err != nil {
		t.Fatal(err)
	}
	cmd := process("each", place)
	pipe, err := cmd.StdoutPipe()
	if err == nil {
		err = cmd.Start()
	}
	if err != nil {
		t.Fatal(err)
	}
	line, err := bufio.NewReader(pipe).ReadString('\n')
	if err != nil || line != "in the middle\n" {
		t.Errorf("read %q, %v, wanted that it is in the middle", line, err)
	}
	if err := cmd.Process.Kill(); err != nil {
		t.Fatal(err)
	}
	if err := cmd.Wait(); err == nil || cmd.ProcessState.ExitCode() != -1 {
		t.Errorf("it ended with %v, wanted it killed", err)
	}
	s := openAt(t, place)
	defer s.Close()
	if n, err := journal.VerifyAll(context.Background(), s); err != nil || n != held {
		t.Errorf("%d entries verified, error %v, wanted the %d from before", n, err, held)
	}
	rec, err := s.Batch(context.Background(), benchBatch(1).ID)
	if err != nil || len(rec.Readings) != 40 {
		t.Errorf("%v with %v, wanted the 40 readings from before", rec, err)
	}
}
