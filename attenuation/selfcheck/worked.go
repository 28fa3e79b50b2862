package selfcheck

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"gylebook/attenuation"
	"gylebook/gravity"
	"gylebook/gravity/method"
	"gylebook/testdata/published"
)

var nan = math.NaN()

// example is one worked example: its inputs by name and its printed results.
type example struct {
	row  published.Row
	in   map[string]float64
	want []string
	t    *tally
}

// workedExamples compares the published examples, each by the relations that its
// topic is about. A topic that is known to no check is an error.
func workedExamples(r Relations, t *tally) {
	for _, row := range t.file.Rows {
		x := example{row: row, in: inputs(row.Text("inputs")), want: strings.Split(row.Text("published"), "|"), t: t}
		switch topic := row.Text("topic"); {
		case topic == "OE from m,n,q":
			x.quotient()
		case topic == "apparent attenuation and degree":
			x.apparent()
		case strings.HasPrefix(topic, "p=12: degree|ABW|RE"):
			x.degree(r)
		case topic == "duty strength truncation":
			x.declared()
		case strings.HasPrefix(topic, "Notice 226 30.3"):
			x.duty(r)
		case strings.HasPrefix(topic, "RE|density|ABW|ABV|kcal"):
			x.analysis(r)
		case topic == "g/100 mL from deg P":
			x.extract()
		case strings.HasPrefix(topic, "dataset mean: RE"):
			x.dataset(r)
		case topic == "potential alcohol base 16.83 g/L":
			e := find(t, r.ABV, "must-1683")
			x.compare(e.Info, 0, x.leading()/attenuation.SugarPerVol, nil, unitVol)
		default:
			t.fail(fmt.Errorf("%s: topic %.60q is known to no check", row.Where(), topic))
		}
		if t.err != nil {
			return
		}
	}
}

// inputs reads "m=4.250 n=5.550" into a map; other words are left out.
func inputs(text string) map[string]float64 {
	in := make(map[string]float64)
	for _, word := range strings.Fields(text) {
		name, value, ok := strings.Cut(strings.Trim(word, "()"), "=")
		if x, err := strconv.ParseFloat(value, 64); ok && err == nil {
			in[name] = x
		}
	}
	return in
}

// leading reads the number that the inputs begin with.
func (x example) leading() float64 {
	word, _, _ := strings.Cut(x.row.Text("inputs"), " ")
	return x.t.parse(x.row, "inputs", word)
}

// compare compares the k-th printed result with got.
func (x example) compare(info method.Info, k int, got float64, err error, unit string) {
	if k >= len(x.want) {
		x.t.fail(fmt.Errorf("%s: published is %.60q, wanted %d results", x.row.Where(), x.row.Text("published"), k+1))
		return
	}
	want := x.t.parse(x.row, "published", x.want[k])
	x.t.value(info, x.row, "published", want, got, x.t.tolerance(x.row, info.ID, "published"), err, unit)
}

// quotient: the example turns m, n and q into p; the program has q from p.
func (x example) quotient() {
	p := x.t.parse(x.row, "published", x.want[0])
	// q is printed to three decimals.
	x.t.value(gravity.QuotientInfo, x.row, "q", x.in["q"], gravity.AttenuationQuotient(gravity.Plato(p)), 0.0005, nil, "")
}

func (x example) apparent() {
	g, err := extracts(gravity.Plato(x.in["p"]), gravity.Plato(x.in["m"]))
	if err != nil {
		x.t.fail(err)
		return
	}
	a, err := attenuation.Attenuate(g)
	x.compare(attenuation.ApparentInfo, 0, float64(a.OE-a.AE), err, "")
	x.compare(attenuation.ApparentInfo, 1, a.Apparent/100, err, "")
}

func (x example) degree(r Relations) {
	e := find(x.t, r.ABV, "balling")
	g, err := extracts(gravity.Plato(x.in["p"]), gravity.Plato(x.in["m"]))
	if err != nil {
		x.t.fail(err)
		return
	}
	whole, wholeErr := attenuation.Attenuate(g)
	a, err := e.Fn(g)
	abw, re := parts(a)
	x.compare(attenuation.ApparentInfo, 0, whole.Apparent/100, wholeErr, "")
	x.compare(e.Info, 1, abw, err, unitMass)
	x.compare(e.Info, 2, re, err, unitMass)
}

func (x example) declared() {
	rule, err := attenuation.FindRule("uk-duty")
	x.compare(attenuation.DeclaredInfo, 0, float64(rule.Declare(gravity.VolPct(x.leading()))), err, unitVol)
}

func (x example) duty(r Relations) {
	e := find(x.t, r.ABV, "uk-duty")
	g, err := difference(x.in["OG-PG"])
	if err != nil {
		x.t.fail(err)
		return
	}
	a, err := e.Fn(g)
	x.compare(e.Info, 0, float64(a.ABV), err, unitVol)
}

func (x example) analysis(r Relations) {
	e := find(x.t, r.ABV, "balling")
	g, err := extracts(gravity.Plato(x.in["OE"]), gravity.Plato(x.in["AE"]))
	if err != nil {
		x.t.fail(err)
		return
	}
	a, err := e.Fn(g)
	abw, re := parts(a)
	x.compare(e.Info, 0, re, err, unitMass)
	x.compare(e.Info, 2, abw, err, unitMass)
	x.compare(e.Info, 3, float64(a.ABV), err, unitVol)
	whole, err := attenuation.Attenuate(g)
	// Half a litre is five times 100 mL.
	x.compare(attenuation.EnergyInfo, 4, 5*whole.EnergyKcal100mL, err, "kcal per 0.5 L")
}

func (x example) extract() {
	p := gravity.Plato(x.leading())
	x.compare(gravity.ExtractInfo, 0, float64(gravity.ExtractGPL(p, gravity.SucroseDensity(p, 20)))/10, nil, "g/100 mL")
}

func (x example) dataset(r Relations) {
	e := find(x.t, r.ABV, "cutaia2009")
	g, err := extracts(gravity.Plato(x.in["OE"]), gravity.Plato(x.in["AE"]))
	if err != nil {
		x.t.fail(err)
		return
	}
	a, err := e.Fn(g)
	_, re := parts(a)
	x.compare(e.Info, 0, re, err, unitMass)
}
