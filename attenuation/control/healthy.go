package control

import (
	"math"
	"math/rand/v2"
	"sync"
)

// Rate is how often a season shows at least one violation on one chart although
// nothing happened: its points are independent and normal, its limits drawn from
// themselves.
type Rate struct {
	Share   float64 // 0 to 1
	Error   float64 // one standard deviation of the simulation
	Seasons int     // simulated; 0 when there is nothing to simulate
	N       int     // points of each
}

const (
	// simulated is about how many points one rate is made of. It keeps the work the
	// same for every length, and the error of the share below 0.004 at 30 points.
	simulated   = 300_000
	mostSeasons = 10_000
	// longest is the longest season simulated. The rate grows with the length, so
	// that of a longer one is at least as large.
	longest = 1000

	seedA, seedB = 0x9e3779b97f4a7c15, 1984
)

// Healthy knows rates of false alarms and remembers them. The zero value is ready;
// it may be used by several goroutines.
type Healthy struct {
	mu    sync.Mutex
	rates map[rateKey]Rate
}

type rateKey struct {
	n     int
	tests Set
}

// Rate returns the rate of false alarms of n points under the tests, always the
// same for the same arguments. Fewer than two points, or no test, give none.
// Derived by simulation.
func (h *Healthy) Rate(n int, tests Set) Rate {
	n = min(n, longest)
	if n < 2 || tests == 0 {
		return Rate{N: max(n, 0)}
	}
	h.mu.Lock()
	defer h.mu.Unlock()
	key := rateKey{n, tests}
	if r, ok := h.rates[key]; ok {
		return r
	}
	if h.rates == nil {
		h.rates = make(map[rateKey]Rate)
	}
	r := simulate(n, tests, min(simulated/n, mostSeasons), rand.New(rand.NewPCG(seedA, seedB)))
	h.rates[key] = r
	return r
}

func simulate(n int, tests Set, seasons int, random *rand.Rand) Rate {
	var looked []Test
	for _, k := range tests.Numbers() {
		looked = append(looked, Tests[k-1].Fn)
	}
	points, z := make([]float64, n), make([]float64, 0, n)
	alarms := 0
	for range seasons {
		for k := range points {
			points[k] = random.NormFloat64()
		}
		z = LimitsOf(lines(points)).standard(points, z)
		if alarmed(z, looked) {
			alarms++
		}
	}
	share := float64(alarms) / float64(seasons)
	return Rate{Share: share, Error: math.Sqrt(share * (1 - share) / float64(seasons)), Seasons: seasons, N: n}
}

func alarmed(z []float64, looked []Test) bool {
	for k := range z {
		for _, test := range looked {
			if test(z, k) {
				return true
			}
		}
	}
	return false
}
