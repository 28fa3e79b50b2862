package asread

import (
	"math"
	"math/big"
	"regexp"
	"strconv"
	"testing"

	"pgregory.net/rapid"
)

func TestRound(t *testing.T) {
	tests := []struct {
		x      float64
		places int
		rule   Rule
		want   float64
		fixed  string
	}{
		// A tie in decimal is a tie, although no float64 is 1.0485.
		{1.0485, 3, HalfUp, 1.049, "1.049"},
		{1.0485, 3, HalfEven, 1.048, "1.048"},
		{1.0485, 3, Truncate, 1.048, "1.048"},
		// ISO 80000-1 rule A and ASTM E29: a tie goes to the even digit.
		{2.5, 0, HalfEven, 2, "2"},
		{3.5, 0, HalfEven, 4, "4"},
		{-2.5, 0, HalfEven, -2, "-2"},
		{-2.5, 0, HalfUp, -3, "-3"},
		// UK strength for duty is truncated: Alcoholic Products Technical Guide,
		// section 11 (quoted).
		{7.59, 1, Truncate, 7.5, "7.5"},
		{4.19, 1, Truncate, 4.1, "4.1"},
		{-7.59, 1, Truncate, -7.5, "-7.5"},
		// Zeros are printed, a minus zero is not.
		{1.05, 4, HalfEven, 1.05, "1.0500"},
		{-0.004, 2, HalfEven, 0, "0.00"},
		{-0.004, 2, Truncate, 0, "0.00"},
		{math.Copysign(0, -1), 2, HalfEven, 0, "0.00"},
		{0.9996, 3, HalfUp, 1, "1.000"},
		{1250, -2, HalfEven, 1200, "1200"},
		{1250, -2, HalfUp, 1300, "1300"},
		{1299, -2, Truncate, 1200, "1200"},
		{49, -2, HalfUp, 0, "0"},
		{1e21, 1, HalfEven, 1e21, "1000000000000000000000.0"},
	}
	for _, tt := range tests {
		if got := Round(tt.x, tt.places, tt.rule); got != tt.want || (got == 0 && math.Signbit(got)) {
			t.Errorf("Round(%v, %d, %d) = %v, want %v", tt.x, tt.places, tt.rule, got, tt.want)
		}
		if got := Fixed(tt.x, tt.places, tt.rule); got != tt.fixed {
			t.Errorf("Fixed(%v, %d, %d) = %q, want %q", tt.x, tt.places, tt.rule, got, tt.fixed)
		}
	}
}

func TestSigned(t *testing.T) {
	for _, tt := range []struct {
		x      float64
		places int
		want   string
	}{
		{0.0022, 4, "+0.0022"},
		{-0.0019, 4, "-0.0019"},
		{0.00225, 4, "+0.0022"}, // a tie goes to the even digit
		{-0.00004, 4, "0"},
		{0.00005, 4, "0"},
		{0, 4, "0"},
		{12, 0, "+12"},
		{math.NaN(), 4, "—"},
		{math.Inf(-1), 4, "—"},
	} {
		if got := Signed(tt.x, tt.places); got != tt.want {
			t.Errorf("Signed(%v, %d) = %q, want %q", tt.x, tt.places, got, tt.want)
		}
	}
}

func TestRoundDiffAndProduct(t *testing.T) {
	for _, tt := range []struct {
		a, b, by float64
		places   int
		rule     Rule
		want     float64
	}{
		{1.048, 1.010, 1000, 1, HalfUp, 38.0},
		{1.0485, 1.0100, 1000, 0, HalfUp, 39},   // 38.5 up
		{1.0485, 1.0100, 1000, 0, HalfEven, 38}, // 38.5 to even
		{1.0485, 1.0100, 1000, 0, Truncate, 38},
		{1.010, 1.048, 1000, 1, HalfUp, -38.0},
		{1.048, 1.048, 1000, 1, HalfUp, 0},
	} {
		if got := RoundDiff(tt.a, tt.b, tt.by, tt.places, tt.rule); got != tt.want {
			t.Errorf("RoundDiff(%v, %v, %v, %d, %d) = %v, want %v", tt.a, tt.b, tt.by, tt.places, tt.rule, got, tt.want)
		}
	}
	// By hand: 0.1·3 = 0.3, 1.1·1.1 = 1.21, 38.5·0.129 = 4.9665; binary
	// multiplication misses the first two.
	for _, tt := range [][3]float64{{0.1, 3, 0.3}, {1.1, 1.1, 1.21}, {38.5, 0.129, 4.9665}, {-0.1, 3, -0.3}, {0, 5, 0}} {
		if got := Product(tt[0], tt[1]); got != tt[2] {
			t.Errorf("Product(%v, %v) = %v, want %v", tt[0], tt[1], got, tt[2])
		}
	}
}

func TestRoundingWhatIsNotFinite(t *testing.T) {
	same := func(a, b float64) bool { return a == b || math.IsNaN(a) && math.IsNaN(b) }
	for _, x := range []float64{math.NaN(), math.Inf(1), math.Inf(-1)} {
		for name, got := range map[string]float64{
			"Round": Round(x, 2, HalfUp), "first of RoundDiff": RoundDiff(x, 1, 1, 2, HalfUp),
			"second of RoundDiff": RoundDiff(1, x, 1, 2, HalfUp), "scale of RoundDiff": RoundDiff(1, 1, x, 2, HalfUp),
			"first of Product": Product(x, 0), "second of Product": Product(0, x),
		} {
			if !same(got, x) {
				t.Errorf("%s: %v became %v", name, x, got)
			}
		}
		if got := Fixed(x, 2, HalfUp); got != "—" {
			t.Errorf("Fixed(%v) = %q", x, got)
		}
	}
}

// The ends of float64 and absurd places neither stall nor fail.
func TestRoundExtremes(t *testing.T) {
	for _, x := range []float64{math.MaxFloat64, -math.MaxFloat64, math.SmallestNonzeroFloat64} {
		for _, rule := range []Rule{HalfEven, HalfUp, Truncate} {
			if got := Round(x, math.MaxInt, rule); got != x {
				t.Errorf("Round(%v, max) = %v", x, got)
			}
			if got := Round(x, math.MinInt, rule); got != 0 {
				t.Errorf("Round(%v, min) = %v, want 0", x, got)
			}
			if got, err := strconv.ParseFloat(Fixed(x, math.MaxInt, rule), 64); err != nil || got != x {
				t.Errorf("Fixed(%v, max) reads %v, %v", x, got, err)
			}
		}
	}
	if got := RoundDiff(math.MaxFloat64, math.SmallestNonzeroFloat64, 1, 400, HalfEven); got != math.MaxFloat64 {
		t.Errorf("difference of the extremes is %v", got)
	}
}

// reference rounds the shortest decimal of x in exact rational arithmetic.
func reference(x float64, places int, rule Rule) float64 {
	r, _ := new(big.Rat).SetString(strconv.FormatFloat(x, 'f', -1, 64))
	unit := new(big.Rat).SetInt(new(big.Int).Exp(big.NewInt(10), big.NewInt(int64(places)), nil))
	r.Mul(r, unit)
	q, m := new(big.Int).QuoRem(r.Num(), r.Denom(), new(big.Int)) // toward zero
	twice := m.Abs(m).Lsh(m, 1)
	tie := twice.Cmp(r.Denom())
	if tie > 0 && rule != Truncate || tie == 0 && (rule == HalfUp || rule == HalfEven && q.Bit(0) == 1) {
		q.Add(q, big.NewInt(int64(r.Sign())))
	}
	f, _ := new(big.Rat).Quo(new(big.Rat).SetInt(q), unit).Float64()
	return f
}

var (
	rules      = rapid.SampledFrom([]Rule{HalfEven, HalfUp, Truncate})
	minusZero  = regexp.MustCompile(`^-0*(\.0*)?$`)
	decimalish = rapid.Custom(func(t *rapid.T) float64 {
		if rapid.Bool().Draw(t, "any float") {
			return rapid.Float64Range(-1e6, 1e6).Draw(t, "x")
		}
		// Short decimals hit ties.
		n := rapid.Int64Range(-2_000_000, 2_000_000).Draw(t, "n")
		return float64(n) / math.Pow10(rapid.IntRange(0, 6).Draw(t, "digits"))
	})
)

func TestRoundProperties(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		x, places, rule := decimalish.Draw(t, "x"), rapid.IntRange(0, 8).Draw(t, "places"), rules.Draw(t, "rule")
		got := Round(x, places, rule)
		if want := reference(x, places, rule); got != want {
			t.Fatalf("Round(%v, %d, %d) = %v, want %v", x, places, rule, got, want)
		}
		if again := Round(got, places, rule); again != got {
			t.Fatalf("rounding %v again gives %v", got, again)
		}
		text := Fixed(x, places, rule)
		if minusZero.MatchString(text) {
			t.Fatalf("Fixed(%v, %d, %d) = %q", x, places, rule, text)
		}
		if back, err := strconv.ParseFloat(text, 64); err != nil || back != got {
			t.Fatalf("Fixed(%v, %d, %d) = %q, Round gives %v", x, places, rule, text, got)
		}
		// Symmetric about zero.
		if -Round(-x, places, rule) != got {
			t.Fatalf("Round(%v) is %v, Round(%v) is %v", x, got, -x, Round(-x, places, rule))
		}
		if RoundDiff(x, 0, 1, places, rule) != got {
			t.Fatalf("RoundDiff(%v, 0, 1) differs from %v", x, got)
		}
	})
}
