package volume

import (
	"math"
	"math/rand/v2"
	"strconv"
	"testing"

	"pgregory.net/rapid"
)

func compareShort(t fatal, x float64) (ok bool) {
	t.Helper()
	got, ok := appendShort([]byte("1,"), x)
	want := "1,"
	if ok {
		want = string(strconv.AppendFloat([]byte(want), x, 'f', -1, 64))
	}
	if string(got) != want {
		t.Fatalf("%x is %s, wanted %s", x, got, want)
	}
	return ok
}

// What is written is what strconv writes: of any bits, of short decimals and their
// neighbours, and of whole sums of few powers of two, where ties are.
func TestAppendShortIsStrconv(t *testing.T) {
	r := rand.New(rand.NewPCG(7, 8))
	lo, hi := math.Float64bits(1.0/4), math.Float64bits(2048)
	taken := 0
	try := func(x float64) {
		if compareShort(t, x) {
			taken++
		}
	}
	const n = 300_000
	for range n {
		try(math.Float64frombits(lo + r.Uint64N(hi-lo)))
		places := r.IntN(17)
		x, err := strconv.ParseFloat(strconv.FormatFloat(math.Exp(9*r.Float64()-1.5), 'f', places, 64), 64)
		if err != nil {
			t.Fatal(err)
		}
		try(x)
		try(math.Nextafter(x, 0))
		try(math.Nextafter(x, math.Inf(1)))
		try(float64(r.Uint64N(1<<uint(1+r.IntN(30)))) / float64(uint64(1)<<uint(r.IntN(60))))
	}
	if taken < 2*n {
		t.Errorf("%d of %d were taken, so that little was compared", taken, 5*n)
	}
}

func TestAppendShortLeavesOthers(t *testing.T) {
	for _, x := range []float64{
		0, math.Copysign(0, -1), -1.5, -1.05, 1, 2, 0.5, 1024, 1e4, 1e-3, 1e300, 5e-324, math.Inf(1), math.Inf(-1), math.NaN(),
		1 + 1.0/(1<<17), // 17 places end in 5
	} {
		if compareShort(t, x) && x != 1+1.0/(1<<17) {
			t.Errorf("%v is taken, wanted it left to strconv", x)
		}
	}
	for x, want := range map[float64]string{
		1.05: "1.05", 12.4: "12.4", 3: "3", 100.25: "100.25", 999.9999999999999: "999.9999999999999", 0.9999999999999999: "0.9999999999999999",
		0.5000000001: "0.5000000001", 10.5: "10.5", 9.999999999999998: "9.999999999999998", 1023.9999999999999: "1023.9999999999999", 1.0522063340790377: "1.0522063340790377",
	} {
		if got, ok := appendShort(nil, x); !ok || string(got) != want {
			t.Errorf("%s, %v, wanted %s", got, ok, want)
		}
	}
}

func TestEightDigits(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.Uint64Range(0, 99_999_999).Draw(t, "n")
		v := eightDigits(n)
		var got uint64
		for range 8 {
			got = got*10 + v&0xff - '0'
			v >>= 8
		}
		if got != n {
			t.Fatalf("%d, wanted %d", got, n)
		}
	})
}

func FuzzAppendShort(f *testing.F) {
	for _, x := range []float64{1.05, 11.9120807562241, 0.1, 1 + 1.0/(1<<17), 999.95, math.Pi} {
		f.Add(math.Float64bits(x))
	}
	f.Fuzz(func(t *testing.T, b uint64) { compareShort(t, math.Float64frombits(b)) })
}

func BenchmarkAppendShort(b *testing.B) {
	var buf []byte
	x := 1.0522063340790377
	for b.Loop() {
		buf, _ = appendShort(buf[:0], x)
		x = math.Nextafter(x, 2)
	}
}

func BenchmarkStrconv(b *testing.B) {
	var buf []byte
	x := 1.0522063340790377
	for b.Loop() {
		buf = strconv.AppendFloat(buf[:0], x, 'f', -1, 64)
		x = math.Nextafter(x, 2)
	}
}
