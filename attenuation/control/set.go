package control

import (
	"fmt"
	"strconv"
	"strings"
)

// Set is which of the tests are looked for. The zero value is none.
type Set uint8

// Default is the set that finds shifts and upsets without too many false alarms:
// 1, 2, 5 and 6.
var Default = Of(1, 2, 5, 6)

// Of returns the set of these tests, by number from 1; others are left out.
func Of(numbers ...int) Set {
	var s Set
	for _, n := range numbers {
		if n >= 1 && n <= len(Tests) {
			s |= 1 << (n - 1)
		}
	}
	return s
}

// ParseSet reads numbers with commas between them, "1,2,5,6".
func ParseSet(text string) (Set, error) {
	var s Set
	for word := range strings.SplitSeq(text, ",") {
		word = strings.TrimSpace(word)
		n, err := strconv.Atoi(word)
		if err != nil || n < 1 || n > len(Tests) {
			return 0, fmt.Errorf("read test %.20q, wanted numbers from 1 to %d with commas between them", word, len(Tests))
		}
		s |= Of(n)
	}
	return s, nil
}

// Has reports whether test n is in the set.
func (s Set) Has(n int) bool { return s&Of(n) != 0 }

// Numbers returns the tests in order.
func (s Set) Numbers() []int {
	numbers := make([]int, 0, len(Tests))
	for k := range Tests {
		if s.Has(k + 1) {
			numbers = append(numbers, k+1)
		}
	}
	return numbers
}

// String gives "1,2,5,6", as ParseSet reads it.
func (s Set) String() string {
	words := make([]string, 0, len(Tests))
	for _, n := range s.Numbers() {
		words = append(words, strconv.Itoa(n))
	}
	return strings.Join(words, ",")
}
