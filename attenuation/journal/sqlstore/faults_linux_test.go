package sqlstore

import (
	"context"
	"errors"
	"io"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"syscall"
	"testing"

	"gylebook/attenuation/journal"
)

// cannot skips a test on a machine that cannot run it; where the whole suite must
// run it fails instead.
func cannot(t *testing.T, reason string) {
	t.Helper()
	if os.Getenv("GYLEBOOK_CI") == "1" {
		t.Fatal(reason)
	}
	t.Skip(reason)
}

// stranger runs a task as a user who owns nothing here, when root runs the tests;
// permissions do not hold root back.
func stranger(t *testing.T, args ...string) string {
	t.Helper()
	cmd := process(args...)
	if os.Getuid() == 0 {
		binary := filepath.Join(shelf, "stranger")
		if _, err := os.Stat(binary); err != nil {
			copyFile(t, os.Args[0], binary, 0o755)
			if err := os.Chmod(shelf, 0o755); err != nil { // the stranger must reach it
				t.Fatal(err)
			}
		}
		cmd.Path, cmd.Args[0], cmd.Dir = binary, binary, "/"
		cmd.SysProcAttr = &syscall.SysProcAttr{Credential: &syscall.Credential{Uid: 65534, Gid: 65534}}
	}
	out, err := cmd.Output()
	if errors.Is(err, os.ErrPermission) {
		cannot(t, "another user cannot run the test binary: "+err.Error())
	}
	if err != nil {
		t.Fatal(err)
	}
	return string(out)
}

func copyFile(t *testing.T, from, to string, mode os.FileMode) {
	t.Helper()
	in, err := os.Open(from)
	if err != nil {
		t.Fatal(err)
	}
	defer in.Close()
	out, err := os.OpenFile(to, os.O_CREATE|os.O_WRONLY|os.O_TRUNC, mode)
	if err != nil {
		t.Fatal(err)
	}
	_, err = io.Copy(out, in)
	if err := errors.Join(err, out.Close(), os.Chmod(to, mode)); err != nil {
		t.Fatal(err)
	}
}

// smallCellar fills a journal with three batches of 40 readings: 127 entries.
func smallCellar(t *testing.T, place string) *Store {
	t.Helper()
	s := openAt(t, place)
	cellar(t, s, 3, 3)
	return s
}

const smallCount = "127"

func TestReadOnly(t *testing.T) {
	for _, c := range []struct {
		name         string
		file, folder os.FileMode
		open         bool // somebody has it open
		want         []string
	}{
		{"file", 0o444, 0o777, false, []string{"verify: " + smallCount + " done", "append: read-only", "backup: done"}},
		{"folder", 0o666, 0o555, false, []string{"verify: " + smallCount + " done", "append: read-only", "backup: read-only"}},
		{"both", 0o444, 0o555, false, []string{"verify: " + smallCount + " done", "append: read-only", "backup: read-only"}},
		{"both, in use", 0o444, 0o555, true, []string{"verify: " + smallCount + " done", "append: read-only", "backup: read-only"}},
		{"neither", 0o666, 0o777, false, []string{"verify: " + smallCount + " done", "append: done", "backup: done"}},
		{"not to be read", 0o200, 0o777, false, []string{"open: permission"}},
	} {
		t.Run(c.name, func(t *testing.T) {
			folder, err := os.MkdirTemp(shelf, "read-only-")
			if err != nil {
				t.Fatal(err)
			}
			place := filepath.Join(folder, "journal")
			s := smallCellar(t, place)
			mode := func(m os.FileMode, path string) {
				if err := os.Chmod(path, m); err != nil {
					t.Fatal(err)
				}
			}
			if c.open {
				for _, suffix := range []string{"-wal", "-shm"} {
					mode(c.file, place+suffix)
				}
			} else if err := s.Close(); err != nil {
				t.Fatal(err)
			}
			mode(c.file, place)
			mode(c.folder, folder)
			defer mode(0o755, folder)
			got := stranger(t, "look", place)
			for _, line := range c.want {
				if !strings.Contains(got, line+"\n") {
					t.Errorf("another user read %q, wanted %q", got, line)
				}
			}
			if c.folder == 0o555 {
				if got := stranger(t, "create", filepath.Join(folder, "other")); got != "create: read-only\n" {
					t.Errorf("another user read %q, wanted that a new journal cannot be written", got)
				}
			}
			mode(0o644, place)
			again := openAt(t, place)
			if _, err := journal.VerifyAll(context.Background(), again); err != nil {
				t.Errorf("afterwards: %v", err)
			}
		})
	}
}

// tmpfs mounts a small file system.
func tmpfs(t *testing.T, size string) string {
	t.Helper()
	place := t.TempDir()
	if out, err := exec.Command("mount", "-t", "tmpfs", "-o", "size="+size, "tmpfs", place).CombinedOutput(); err != nil {
		cannot(t, "cannot mount a small file system: "+strings.TrimSpace(string(out)))
	}
	t.Cleanup(func() {
		if out, err := exec.Command("umount", place).CombinedOutput(); err != nil {
			t.Errorf("umount: %s", out)
		}
	})
	return place
}

func TestDiskFull(t *testing.T) {
	ctx := context.Background()
	folder := tmpfs(t, "1500k")
	ballast := filepath.Join(folder, "ballast")
	if err := os.WriteFile(ballast, make([]byte, 400<<10), 0o600); err != nil {
		t.Fatal(err)
	}
	place := filepath.Join(folder, "journal")
	s := smallCellar(t, place)
	defer s.Close()
	note := strings.Repeat("x", 900)
	write := func() error {
		_, err := s.Append(ctx, "ada", benchDay, func(journal.Reader) ([]journal.Body, error) {
			r := benchReading(benchBatch(1), 3)
			r.Note = note
			return []journal.Body{r}, nil
		})
		return err
	}
	var full error
	for n := 0; full == nil && n < 10_000; n++ {
		before, _, err := s.Head(ctx)
		if err != nil {
			t.Fatal(err)
		}
		if full = write(); full != nil {
			if after, _, err := s.Head(ctx); err != nil || after != before {
				t.Errorf("entry %d before the disk was full, %d after, error %v", before, after, err)
			}
		}
	}
	if !errors.Is(full, journal.ErrDiskFull) {
		t.Fatalf("on a full disk: %v, wanted %v", full, journal.ErrDiskFull)
	}
	held, err := journal.VerifyAll(ctx, s)
	if err != nil {
		t.Fatalf("on a full disk: %v", err)
	}
	if err := s.Backup(ctx, filepath.Join(folder, "copy")); !errors.Is(err, journal.ErrDiskFull) {
		t.Errorf("backup onto a full disk: %v, wanted %v", err, journal.ErrDiskFull)
	}
	if _, err := Create(ctx, filepath.Join(folder, "other")); !errors.Is(err, journal.ErrDiskFull) {
		t.Errorf("a new journal on a full disk: %v, wanted %v", err, journal.ErrDiskFull)
	}
	if left, err := filepath.Glob(filepath.Join(folder, ".*")); err != nil || len(left) != 0 {
		t.Errorf("left behind: %v", left)
	}
	if err := os.Remove(ballast); err != nil {
		t.Fatal(err)
	}
	if err := write(); err != nil {
		t.Fatalf("with space again: %v", err)
	}
	if n, err := journal.VerifyAll(ctx, s); err != nil || n != held+1 {
		t.Errorf("with space again %d entries verify, error %v, wanted %d", n, err, held+1)
	}
	if err := s.Close(); err != nil {
		t.Error(err)
	}
	again := openAt(t, place)
	defer again.Close()
	if n, err := journal.VerifyAll(ctx, again); err != nil || n != held+1 {
		t.Errorf("opened again %d entries verify, error %v, wanted %d", n, err, held+1)
	}
}
