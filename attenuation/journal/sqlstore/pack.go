package sqlstore

import (
	"errors"
	"fmt"
	"strconv"
	"strings"
	"time"
)

// To step to a row and to fetch a column costs more than to read them from the page.
// What is read in numbers comes as one text: columns divided by the unit separator
// of ASCII, rows by its record separator.
const (
	divider = "\x1f"
	ending  = "\x1e"
)

// packed is the expression that joins columns, none of which may be NULL.
func packed(columns []string) string {
	return "concat_ws('" + divider + "', " + strings.Join(columns, ", ") + ")"
}

// packedRows is the expression that joins the rows of a group, in no order, and says
// how many there are; NULL without any.
func packedRows(columns []string) string {
	return "count(*) || '" + ending + "' || group_concat(" + packed(columns) + ", '" + ending + "')"
}

// errPacked says that a text held a divider of its own.
var errPacked = errors.New("a column holds the divider")

// unpackRows calls fn after every row of such a text has been scanned into dest. more
// is told how many rows there are before the first of them.
func unpackRows(text string, dest []any, more func(n int), fn func()) error {
	count, text, _ := strings.Cut(text, ending)
	n, err := strconv.Atoi(count)
	if err != nil {
		return err
	}
	more(n)
	for k := range n {
		row, rest, follows := strings.Cut(text, ending)
		if follows != (k < n-1) {
			return errPacked
		}
		if err := unpack(row, dest); err != nil {
			return err
		}
		fn()
		text = rest
	}
	return nil
}

// unpack scans a text of columns.
func unpack(text string, dest []any) error {
	for k, d := range dest {
		column, rest, follows := strings.Cut(text, divider)
		if follows != (k < len(dest)-1) {
			return errPacked
		}
		if err := unpackColumn(column, d); err != nil {
			return err
		}
		text = rest
	}
	return nil
}

func unpackColumn(column string, dest any) (err error) {
	switch d := dest.(type) {
	case *string:
		*d = column
	case *int64:
		*d, err = strconv.ParseInt(column, 10, 64)
	case *bool:
		*d, err = strconv.ParseBool(column)
	case voidOf:
		*d.reason, *d.void = strings.CutPrefix(column, isVoid)
	case recordedOf:
		*d.t, err = time.Parse(time.RFC3339Nano, column)
	case stampOf:
		*d.t, err = time.Parse(time.RFC3339Nano, column)
	case millisOf:
		var ms int64
		if ms, err = strconv.ParseInt(column, 10, 64); err == nil {
			err = d.Scan(ms)
		}
	default:
		err = fmt.Errorf("a column for %T", dest)
	}
	return err
}

// voidOf takes whether an entry is void, and why: with isVoid before it the reason
// is told apart from none.
type voidOf struct {
	void   *bool
	reason *string
}

const isVoid = "v"

// voidness is the column for voidOf, of the row x of void_entry that need not be.
const voidness = "coalesce('" + isVoid + "' || x.reason, '')"
