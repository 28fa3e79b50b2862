package volume

import (
	"context"
	"fmt"
	"io"
	"math/rand/v2"
	"strings"
	"testing"

	"gylebook/gravity"
	"gylebook/gravity/asread"
)

// rows are n plain rows with every mark from 1.0000 to 1.1000 and every tenth from
// 10 to 30 °C as likely.
func rows(n int) string {
	r := rand.New(rand.NewPCG(1, 2))
	var b strings.Builder
	b.WriteString("time,batch,reading,temp\n")
	for i := range n {
		fmt.Fprintf(&b, "2016-01-01T00:00Z,B%07d,%.4f,%.1f\n", i/1000, 1+float64(r.IntN(1001))/1e4, 10+float64(r.IntN(201))/10)
	}
	return b.String()
}

func BenchmarkCorrect(b *testing.B) {
	p := correctPlan(single{gravity.ScaleSG, asread.C, gravity.Pair2020})
	p.Results = []string{"corrected", "sg_20_20", "extract", ErrorColumn}
	p.Workers = 1
	figures := []Figure{Corrected, SG2020, Extract, Other}
	p.New = func() Worker {
		return NewCorrector(figures, gravity.Pair2020, glass, asread.C, nil, single{})
	}
	text := rows(400000)
	b.SetBytes(int64(len(text)))
	b.ReportAllocs()
	for b.Loop() {
		if _, err := Run(context.Background(), strings.NewReader(text), io.Discard, p); err != nil {
			b.Fatal(err)
		}
	}
}
