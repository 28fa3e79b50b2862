package exchange

import (
	"encoding/binary"
	"math"

	"gylebook/gravity/asread"
)

// claim is what a file has in its derived columns for one reading.
type claim struct {
	value  [figCount]float64
	places [figCount]int8 // or absent, noNumber
}

const (
	absent   = -1
	noNumber = -2
)

func claimOf(row *Row) (claim, bool) {
	c, some := claim{value: row.claims.value, places: row.places}, false
	for i, known := range row.claims.known {
		if !known {
			c.places[i] = absent
		}
		some = some || known
	}
	return c, some
}

// pack appends the claim in its smallest form: a file may have a million of them.
// For each figure that is there: a byte of its place in figureColumns, one of its
// decimals, and the digits; at the end a byte that is no place.
func (c *claim) pack(b []byte) []byte {
	for i, places := range c.places {
		if places == absent {
			continue
		}
		digits := math.Round(c.value[i] * math.Pow10(int(places)))
		if places == noNumber || !(math.Abs(digits) < 1<<53) {
			none := int8(noNumber)
			b = append(b, byte(i), byte(none)) // so large it is no figure of a reading
			continue
		}
		b = append(b, byte(i), byte(places))
		b = binary.AppendVarint(b, int64(digits))
	}
	return append(b, figCount)
}

// unpackClaim is the claim that b begins with.
func unpackClaim(b []byte) claim {
	var c claim
	for i := range c.places {
		c.places[i] = absent
	}
	for len(b) > 1 && b[0] < figCount {
		i, places := b[0], int8(b[1])
		b = b[2:]
		c.places[i] = places
		if places == noNumber {
			continue
		}
		digits, n := binary.Varint(b)
		c.value[i] = float64(digits) / math.Pow10(int(places))
		b = b[max(n, 1):]
	}
	return c
}

// differs reports whether ours is more than one unit of the file's last digit, or of
// our own where that is the coarser, away from the file's figure. unsure [°C] is what
// the file leaves open of the temperature; what that makes of a figure is no
// difference.
func (c *claim) differs(i int, ours, unsure float64) bool {
	if c.places[i] == noNumber {
		return true
	}
	places := min(int(c.places[i]), figureColumns[i].places)
	unit := math.Pow10(-places)
	return !(math.Abs(c.value[i]-ours) <= unit*(1+1e-9)+unsure*figureColumns[i].perDegree)
}

// text returns the file's figure.
func (c *claim) text(i int) string {
	if c.places[i] == noNumber {
		return "not a number"
	}
	return asread.Fixed(c.value[i], int(c.places[i]), asread.HalfEven)
}
