package exchange

import (
	"testing"
	"time"

	"gylebook/attenuation/journal"
)

// Readings of one minute are derived together, wherever the cut would fall.
func TestMinuteEnd(t *testing.T) {
	var all []numbered
	for _, seconds := range []int{0, 30, 60, 61, 119, 120} { // minutes 0 0 1 1 1 2
		all = append(all, numbered{Body: journal.Reading{TakenAt: time.Unix(1_780_300_800+int64(seconds), 0)}})
	}
	for n, want := range map[int]int{1: 2, 2: 2, 3: 5, 4: 5, 5: 5, 6: 6, 9: 6} {
		if got := minuteEnd(all, n); got != want {
			t.Errorf("minuteEnd(%d) = %d, wanted %d", n, got, want)
		}
	}
}
