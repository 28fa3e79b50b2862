package volume

import (
	"context"
	"errors"
	"fmt"
	"io"
	"runtime"
	"sync"
)

// maxWorkers bounds the memory: beyond, the reader and the writer are the limit.
const maxWorkers = 8

// Run reads separated values from in and writes the same rows with their results to
// out. The form of the file is found from its beginning; every column needs a name.
//
// A row that is refused is written with empty results and its reason, and counted;
// with Plan.Stop it ends the run and is the error, a *RowError. Other errors are a
// *FileError for a file that cannot be worked, those of in and out, and that of ctx.
// What was written before an error stays written. A Read that is waiting when Run
// returns is left behind.
func Run(ctx context.Context, in io.Reader, out io.Writer, p Plan) (Summary, error) {
	h, err := readHead(in, p.Inputs)
	if err != nil {
		return Summary{}, err
	}
	inputs, err := h.find(&p)
	if err != nil {
		return Summary{}, err
	}
	f := h.form(&p)
	sum := Summary{Dialect: h.dialect}
	if err := write(out, h.header(&p, f)); err != nil {
		return sum, err
	}
	workers := p.Workers
	if workers <= 0 {
		workers = min(runtime.GOMAXPROCS(0), maxWorkers)
	}
	size := p.chunk
	if size <= 0 {
		size = chunkSize
	}
	l := newLine(workers)
	var working sync.WaitGroup
	defer working.Wait()
	defer close(l.quit)
	for range workers {
		working.Go(func() { l.work(newWorker(&p, f, inputs)) })
	}
	go l.read(&cutter{in: in, comma: f.comma, size: size, rest: h.rest})
	return sum, l.write(ctx, out, &p, &sum, h)
}

// line passes chunks from the reader through the workers to the writer, which
// takes them in the order in which they were read, and back.
type line struct {
	free, jobs, order chan *chunk
	ended             chan error // how the input ended, before order is closed
	quit              chan struct{}
}

func newLine(workers int) *line {
	n := workers + 2
	l := &line{make(chan *chunk, n), make(chan *chunk, n), make(chan *chunk, n), make(chan error, 1), make(chan struct{})}
	for range n {
		l.free <- &chunk{done: make(chan struct{}, 1)}
	}
	return l
}

// read cuts the input into chunks until it ends or the run does.
func (l *line) read(r *cutter) {
	defer close(l.order)
	defer close(l.jobs)
	for {
		var c *chunk
		select {
		case c = <-l.free:
		case <-l.quit:
			return
		}
		err := r.fill(c)
		if err == nil || errors.Is(err, io.EOF) {
			// There is room for every chunk that there is.
			l.order <- c
			l.jobs <- c
		}
		if err != nil {
			l.ended <- err
			return
		}
	}
}

func (l *line) work(w *worker) {
	for {
		select {
		case <-l.quit:
			return
		case c, ok := <-l.jobs:
			if !ok {
				return
			}
			w.work(c)
			c.done <- struct{}{}
		}
	}
}

// write writes the chunks in order and sums them up.
func (l *line) write(ctx context.Context, out io.Writer, p *Plan, sum *Summary, h *head) error {
	lines, bytes := h.lines, int64(h.size)
	for {
		var c *chunk
		select {
		case c = <-l.order:
		case <-ctx.Done():
			return ctx.Err()
		}
		if c == nil {
			break
		}
		select {
		case <-c.done:
		case <-ctx.Done():
			return ctx.Err()
		}
		if err := write(out, c.out); err != nil {
			return err
		}
		sum.Rows += c.rows
		sum.Refused += c.refused
		if c.first != nil && sum.First == nil {
			sum.First = &RowError{Line: lines + 1 + c.first.Line, Err: c.first.Err}
			if p.Stop {
				return sum.First
			}
		}
		lines += c.lines
		bytes += int64(c.bytes)
		if p.Progress != nil {
			p.Progress(sum.Rows, bytes)
		}
		l.free <- c
	}
	if err := <-l.ended; !errors.Is(err, io.EOF) {
		return fmt.Errorf("reading line %d and on: %w", lines+1, err)
	}
	return nil
}

// write hands b over whole and takes a short write for an error.
func write(out io.Writer, b []byte) error {
	if len(b) == 0 {
		return nil
	}
	n, err := out.Write(b)
	if err == nil && n < len(b) {
		err = io.ErrShortWrite
	}
	return err
}

// fieldCount is what dialect says of a row with more or fewer fields than the header.
func fieldCount(n, want int) string {
	return fmt.Sprintf("%d fields, wanted %d as in the header", n, want)
}
