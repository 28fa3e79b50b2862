package demo

import (
	"time"

	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/tempcorr"
)

// Name is the name of the invented cellar.
const Name = "Alder Lane Cellar"

// The cellar's instruments.
const (
	brewery  = "H1" // certified
	cellar   = "H2" // reads low from slipped on
	old      = "H3" // broken on the day broke
	plato    = "S1"
	optical  = "R1"
	mercury  = "TH1"
	lowBy    = 0.003
	division = 0.001
)

// local returns a time of 2026 in the cellar, where the clock stands at +01:00 in
// winter and at +02:00 from 29 March 02:00 to 25 October 03:00.
func local(month time.Month, day, hour, minute int) time.Time {
	return inCellar(time.Date(2026, month, day, hour, minute, 0, 0, winter))
}

var (
	winter = time.FixedZone("", 3600)
	summer = time.FixedZone("", 7200)

	summerFrom = time.Date(2026, time.March, 29, 1, 0, 0, 0, time.UTC)
	summerTo   = time.Date(2026, time.October, 25, 1, 0, 0, 0, time.UTC)

	slipped = local(time.June, 1, 7, 0)      // the paper scale in H2 slips
	checked = local(time.October, 6, 10, 40) // and is found out
	broke   = local(time.March, 12, 16, 20)
	end     = local(time.November, 27, 9, 30) // nothing is known after this
)

// inCellar gives t the same clock time with the offset that holds then.
func inCellar(t time.Time) time.Time {
	zone := winter
	if !t.Before(summerFrom) && t.Before(summerTo) {
		zone = summer
	}
	return time.Date(t.Year(), t.Month(), t.Day(), t.Hour(), t.Minute(), 0, 0, zone)
}

// onDuty is who works on a day.
func onDuty(t time.Time) string {
	switch t.Weekday() {
	case time.Thursday, time.Friday:
		return "tomas"
	case time.Saturday, time.Sunday:
		return "ines"
	}
	return "nell"
}

// certificate of H1, as typed.
var certificate = []journal.CertificatePoint{
	{Reading: "1.000", Correction: "+0.0002", U: "0.0004"},
	{Reading: "1.040", Correction: "0.0000", U: "0.0004"},
	{Reading: "1.080", Correction: "-0.0003", U: "0.0004"},
}

// instruments returns the register and the checks of the year.
func instruments() []item {
	since := local(time.January, 12, 9, 0)
	float := func(id, scale, division, lo, hi, note string) journal.Instrument {
		return journal.Instrument{
			ID: id, Type: journal.Hydrometer, Scale: scale, Basis: "20/20", Division: division, RangeLo: lo, RangeHi: hi,
			Body: "glass", ReadAt: string(tempcorr.Bottom), Note: note, Since: since,
		}
	}
	sg := gravity.ScaleSG.String()
	water := func(at time.Time, found, correction string) journal.Check {
		return journal.Check{
			Instrument: cellar, At: at, Liquid: journal.InWater, Found: journal.Typed{Text: found, Scale: sg},
			Expected: journal.Typed{Text: "1.000", Scale: sg}, Temp: journal.TypedTemp{Text: "20.0", Unit: "C"}, Correction: correction,
		}
	}
	refractometer := float(optical, gravity.ScaleBrix.String(), "0.2", "0", "32", "compensates for temperature; before fermentation only")
	refractometer.Type = journal.Refractometer
	bodies := []journal.Body{
		float(brewery, sg, "0.001", "0.980", "1.120", "brewhouse, in its case"),
		float(cellar, sg, "0.001", "0.980", "1.100", "cellar"),
		float(old, sg, "0.001", "0.980", "1.100", "spare"),
		float(plato, gravity.ScalePlato.String(), "0.1", "-2", "30", "saccharometer, for what starts strong"),
		refractometer,
		journal.Instrument{ID: mercury, Type: journal.Thermometer, Division: "0.5", Note: "cellar wall", Since: since},
		journal.Certificate{Instrument: brewery, At: since, Reference: "26-0114, invented", Points: certificate},
		water(local(time.January, 12, 9, 20), "1.000", "0.000"),
		journal.Check{
			Instrument: plato, At: local(time.January, 12, 9, 30), Liquid: journal.InSucrose, Strength: "10.00",
			Found: journal.Typed{Text: "10.0", Scale: "plato"}, Expected: journal.Typed{Text: "10.0", Scale: "plato"},
			Temp: journal.TypedTemp{Text: "20.0", Unit: "C"}, Correction: "0.0",
		},
	}
	var items []item
	for i, b := range bodies {
		items = append(items, item{at: since.Add(time.Duration(4*i) * time.Minute), body: b})
	}
	return append(items,
		item{at: broke.Add(6 * time.Minute), body: journal.Retire{
			Instrument: old, At: broke, Reason: "broken in the sink; splinters picked up, sample thrown away",
		}},
		item{at: checked.Add(5 * time.Minute), body: water(checked, "0.997", "+0.003")})
}

// truth is an instrument as it really is at a time, whatever its record says.
func truth(id string, at time.Time) tempcorr.Hydrometer {
	scale := gravity.ScaleSG
	if id == plato {
		scale = gravity.ScalePlato
	}
	h := tempcorr.New(scale, gravity.Pair2020, tempcorr.Bodies[0])
	h.ID = id
	switch {
	case id == brewery:
		h.Certificate = []tempcorr.Certificate{{Reading: 1, Correction: 0.0002}, {Reading: 1.04}, {Reading: 1.08, Correction: -0.0003}}
	case id == cellar && !at.Before(slipped):
		h.Certificate = []tempcorr.Certificate{{Reading: 1, Correction: lowBy}}
	}
	return h
}
