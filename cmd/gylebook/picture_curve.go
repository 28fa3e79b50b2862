package main

import (
	"math"
	"strings"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/outlook"
	"gylebook/tables/chart"
)

// foretell adds the curve and what lies ahead; it returns where the picture ends.
func (p *picture) foretell(v journal.View, o outlook.Forecast, last float64) float64 {
	end := last
	ahead := v.Record.Closed == nil && o.Course.Crashed.IsZero() && o.Course.Primed.IsZero()
	if ahead {
		end = math.Min(math.Max(last*1.08, o.Curve.Hours.Hi/hoursOfADay*lookAhead), last+mostAhead)
	}
	begin := o.Course.Batch.Readings[0].Hours / hoursOfADay
	if n := len(v.Basis); n > 0 { // the curve is that after the last addition
		begin = math.Max(begin, o.Course.Hours(v.Basis[n-1].At)/hoursOfADay)
	}
	split := o.Course.Last
	from := o.Course.Hours(split.Source.TakenAt) / hoursOfADay
	p.curves = func(c *chart.Course) { c.Fitted = traced("fitted curve", o, begin, from) }
	if !ahead {
		p.lines = append(p.lines, "The line is the curve fitted to the readings.")
		return end
	}
	fitted := p.curves
	p.curves = func(c *chart.Course) {
		fitted(c)
		c.Median, c.Forecast = foretold(o, from, end)
	}
	p.lines = append(p.lines, "The line is the curve fitted to the readings, the band where a reading will lie in 90 of 100 cases. Forecast: "+strings.Join(forecastAnswer(o), ", ")+".")
	return end
}

func traced(name string, o outlook.Forecast, from, to float64) *chart.Line {
	l := chart.Line{Name: name}
	for _, x := range steps(from, to) {
		if i, ok := o.Shown(x * hoursOfADay); ok {
			l.X, l.Y = append(l.X, x), append(l.Y, i.Median)
		}
	}
	return &l
}

// foretold is what lies ahead: the median and the band around it.
func foretold(o outlook.Forecast, from, to float64) (*chart.Line, *chart.Band) {
	median, band := chart.Line{Name: "forecast"}, chart.Band{Name: "forecast, 5 to 95 %"}
	for _, x := range steps(from, to) {
		if i, ok := o.Shown(x * hoursOfADay); ok {
			median.X, median.Y = append(median.X, x), append(median.Y, i.Median)
			band.X, band.Low, band.High = append(band.X, x), append(band.Low, i.Lo), append(band.High, i.Hi)
		}
	}
	return &median, &band
}

// steps run evenly from one value to another, both included.
func steps(from, to float64) []float64 {
	list := make([]float64, 0, curveSteps+1)
	for k := 0; k <= curveSteps; k++ {
		list = append(list, from+(to-from)*float64(k)/curveSteps)
	}
	return list
}
