package main

import (
	"bufio"
	"bytes"
	"errors"
	"fmt"
	"io"
	"strings"

	"github.com/urfave/cli/v2"

	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/gravity/method"
)

// maxLine is the longest line that stdin may hold.
const maxLine = 1 << 16

// each hands every set of values to do. Values given as arguments are all or
// nothing: with grouped they are one set, else one set each. A lone "-" reads
// stdin, one set a line: a refused line is named and the others go on.
func (b *bench) each(c *cli.Context, grouped bool, do func(fields []string) error) error {
	args := asread.Join(c.Args().Slice())
	if b.lines = len(args) == 1 && args[0] == "-"; b.lines {
		return b.eachLine(do)
	}
	if grouped {
		return do(args)
	}
	for _, arg := range args {
		if err := do([]string{arg}); err != nil {
			return err
		}
	}
	return nil
}

// eachLine reads stdin. It returns errShown when a line was refused.
func (b *bench) eachLine(do func(fields []string) error) error {
	in := bufio.NewReaderSize(b.in, maxLine)
	refused, seen := false, false
	for n := 1; ; n++ {
		line, err := readLine(in)
		if errors.Is(err, io.EOF) && len(line) == 0 {
			break
		}
		if err != nil && !errors.Is(err, io.EOF) && !errors.Is(err, bufio.ErrBufferFull) {
			return fmt.Errorf("reading standard input: %w", err)
		}
		if errors.Is(err, bufio.ErrBufferFull) {
			err = dataError("", "longer than %d bytes", maxLine)
			say(b.err, fmt.Sprintf("line %d", n), err)
			refused, seen = true, true
			continue
		}
		text := strings.TrimRight(string(line), "\r\n")
		if n == 1 {
			text = strings.TrimPrefix(text, "\ufeff")
		}
		if text = strings.TrimSpace(text); text == "" || text[0] == '#' {
			continue
		}
		seen = true
		if err := do(asread.Fields(text)); err != nil {
			say(b.err, fmt.Sprintf("line %d", n), err)
			refused = true
		}
	}
	if !seen {
		return dataError("type one value a line, or give it as an argument", "standard input is empty")
	}
	if refused {
		return errShown
	}
	return nil
}

// readLine returns one line; ErrBufferFull says that it was longer than the
// buffer, and the rest of it has been passed over.
func readLine(in *bufio.Reader) ([]byte, error) {
	line, err := in.ReadSlice('\n')
	if !errors.Is(err, bufio.ErrBufferFull) {
		return line, err
	}
	for errors.Is(err, bufio.ErrBufferFull) {
		_, err = in.ReadSlice('\n')
	}
	return nil, bufio.ErrBufferFull
}

// reading parses one gravity; on a terminal a doubtful one is asked about.
func (b *bench) reading(text string) (asread.Reading, error) {
	r, err := ask(b, text, func(s string) (asread.Reading, error) { return asread.ParseReading(s, b.set.scale) })
	// A whole number in the range of worts in °P is taken for points; say so.
	if x := r.Typed.Float(); err == nil && r.Scale == gravity.ScaleSG && x >= 2 && x <= 30 {
		b.notes = append(b.notes, method.Note{Code: method.Interpreted, Text: fmt.Sprintf(
			"%s is read as points, %s; for degrees Plato type %sP", r.Typed, r.ReadAs(), r.Typed)})
	}
	return r, err
}

// temperature parses one temperature; on a terminal a doubtful one is asked about.
func (b *bench) temperature(text string) (asread.Temperature, error) {
	return ask(b, text, func(s string) (asread.Temperature, error) { return asread.ParseTemperature(s, b.set.units) })
}

// ask parses text and, when it is doubtful and a person sits there, offers what
// it may mean. Anything but one of the offered numbers leaves the doubt standing.
func ask[T any](b *bench, text string, parse func(string) (T, error)) (T, error) {
	v, err := parse(text)
	var doubt *asread.Doubt
	if err == nil || !errors.As(err, &doubt) || len(doubt.Proposals) == 0 || !b.interactive() {
		return v, err
	}
	fmt.Fprintf(b.err, "%s\n", doubt)
	for i, p := range doubt.Proposals {
		fmt.Fprintf(b.err, "  %d  %s\n", i+1, p.Means)
	}
	fmt.Fprintf(b.err, "which (1-%d, Enter for none)? ", len(doubt.Proposals))
	answer, readErr := bufio.NewReader(b.in).ReadBytes('\n')
	if readErr != nil && len(answer) == 0 {
		return v, err
	}
	answer = bytes.TrimSpace(answer)
	for i, p := range doubt.Proposals {
		if string(answer) == fmt.Sprint(i+1) || strings.EqualFold(string(answer), p.Type) {
			return parse(p.Type)
		}
	}
	return v, err
}
