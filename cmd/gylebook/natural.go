package main

import (
	"cmp"
	"strings"
)

// naturalCompare orders names as people count: T2 before T10, letter case
// ignored. Names that differ in leading zeros or in case alone keep a fixed order.
func naturalCompare(a, b string) int {
	x, y := strings.ToLower(a), strings.ToLower(b)
	for x != "" && y != "" {
		n, m := digitsOf(x), digitsOf(y)
		if n == 0 || m == 0 {
			if x[0] != y[0] {
				return cmp.Compare(x[0], y[0])
			}
			x, y = x[1:], y[1:]
			continue
		}
		// The longer number is the larger one; as text, so that no number is too large.
		p, q := strings.TrimLeft(x[:n], "0"), strings.TrimLeft(y[:m], "0")
		if c := cmp.Or(cmp.Compare(len(p), len(q)), cmp.Compare(p, q)); c != 0 {
			return c
		}
		x, y = x[n:], y[m:]
	}
	return cmp.Or(cmp.Compare(len(x), len(y)), cmp.Compare(a, b))
}

// digitsOf counts the digits that s begins with.
func digitsOf(s string) int {
	return len(s) - len(strings.TrimLeft(s, "0123456789"))
}
