package sqlstore

import (
	"errors"
	"fmt"
	"strconv"
	"strings"
	"time"
)

// To fetch a column costs more than to read it from the page. Where rows are many
// their columns come as one text, divided by the unit separator of ASCII.
const divider = "\x1f"

// packed is the expression that joins columns, none of which may be NULL.
func packed(columns []string) string {
	return strings.Join(columns, " || '"+divider+"' || ")
}

// errPacked says that a text held a divider of its own.
var errPacked = errors.New("a column holds the divider")

// unpack scans such a text.
func unpack(text string, dest []any) error {
	if strings.Count(text, divider) != len(dest)-1 {
		return errPacked
	}
	for _, d := range dest {
		var column string
		column, text, _ = strings.Cut(text, divider)
		if err := unpackColumn(column, d); err != nil {
			return err
		}
	}
	return nil
}

func unpackColumn(column string, dest any) (err error) {
	switch d := dest.(type) {
	case *string:
		*d = column
	case *bool:
		*d, err = strconv.ParseBool(column)
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
