package exchange

import (
	"bufio"
	"io"
	"strings"

	"gylebook/tables/dialect"
)

// cells writes records in a dialect. It keeps the first error.
type cells struct {
	out     *bufio.Writer
	d       dialect.Dialect
	special string // characters that put a cell in quotes
	begun   bool
	err     error
}

func newCells(w io.Writer, d dialect.Dialect) *cells {
	c := &cells{out: bufio.NewWriterSize(w, 64<<10), d: d, special: "\"\r\n" + string(d.Comma)}
	if d.BOM {
		c.write("\ufeff")
	}
	return c
}

func (c *cells) write(s string) {
	if c.err == nil {
		_, c.err = c.out.WriteString(s)
	}
}

func (c *cells) raw(s string) {
	if c.begun {
		c.write(string(c.d.Comma))
	}
	c.begun = true
	// A leading or trailing space is kept by quotes in every program.
	if strings.ContainsAny(s, c.special) || s != strings.TrimSpace(s) {
		s = `"` + strings.ReplaceAll(s, `"`, `""`) + `"`
	}
	c.write(s)
}

// text writes a cell that a person typed.
func (c *cells) text(s string) { c.raw(dialect.Guard(s)) }

// number writes a cell that begins with a number, with the dialect's decimal mark.
func (c *cells) number(s string) { c.raw(dialect.Guard(withMark(s, c.d.Decimal))) }

func (c *cells) end() {
	c.write("\r\n")
	c.begun = false
}

func (c *cells) flush() error {
	if c.err != nil {
		return c.err
	}
	return c.out.Flush()
}
