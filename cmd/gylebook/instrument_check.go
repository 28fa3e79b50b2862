package main

import (
	"math"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/tempcorr"
)

func (b *bench) instrumentCheck() *cli.Command {
	return b.sub("instrument", &cli.Command{
		Name: "check", Usage: "check an instrument and enter its correction", ArgsUsage: "ID --water FOUND --temp T",
		Description: `In clean water (--water FOUND), in a sucrose solution made by mass (--sucrose 10.00 --found F: 10 g of sugar in
			100 g of solution) or in the drink itself (--drink EXPECTED --found F, where EXPECTED is already corrected for
			temperature). The correction holds from then until the next check or certificate.`,
		Flags: []cli.Flag{
			&cli.StringFlag{Name: "water", Usage: "`FOUND` what it showed in water"},
			&cli.StringFlag{Name: "sucrose", Usage: "`PCT` % mass of the sucrose solution"},
			&cli.StringFlag{Name: "drink", Usage: "`EXPECTED` gravity of the drink, by another way"},
			&cli.StringFlag{Name: "found", Usage: "`FOUND` what it showed, with --sucrose or --drink"},
			&cli.StringFlag{Name: "temp", Usage: "`T` temperature of the liquid"},
			&cli.StringFlag{Name: "at", Usage: "`TIME` now unless given"},
		},
	}, `gylebook instrument check H1 --water 0.998 --temp 20C
		gylebook instrument check H1 --sucrose 10.00 --found 1.038 --temp 20C
		gylebook instrument check H1 --drink 1.0121 --found 1.010 --temp 20C`, b.checkInstrument)
}

func (b *bench) checkInstrument(c *cli.Context) error {
	if c.Args().Len() != 1 {
		return wanted(c, "one id")
	}
	at, err := b.past(c, "at")
	if err != nil {
		return err
	}
	return b.withJournal(c.Context, func(s journal.Store) error {
		rec, err := instrumentBy(c.Context, s, c.Args().First())
		if err != nil {
			return err
		}
		if err := inUseAt(rec, at); err != nil {
			return err
		}
		h, _, err := journal.NewBook([]*journal.InstrumentRecord{rec}).Hydrometer(rec.Instrument.ID, at)
		if err != nil {
			return err
		}
		one, err := b.compare(c, h)
		if err != nil {
			return err
		}
		one.check.Instrument, one.check.At = rec.Instrument.ID, at
		e, err := b.commitOne(c.Context, s, one.check)
		if err != nil {
			return err
		}
		return b.print(one.sheet(e, h))
	})
}

// comparison is what an instrument should have shown and what it showed.
type comparison struct {
	check      journal.Check
	found      asread.Reading
	temp       asread.Temperature
	expected   float64
	correction float64 // expected − found
	places     int
}

// compare reads the flags of a check against h.
func (b *bench) compare(c *cli.Context, h tempcorr.Hydrometer) (comparison, error) {
	var one comparison
	var given []string
	for _, f := range []string{journal.InWater, journal.InSucrose, journal.InDrink} {
		if c.String(f) != "" {
			given = append(given, f)
		}
	}
	if len(given) != 1 {
		return one, usageError("gylebook instrument check --help", "wanted one of --water, --sucrose and --drink, read %d", len(given))
	}
	found := c.String("found")
	if one.check.Liquid = given[0]; one.check.Liquid == journal.InWater {
		found = c.String("water")
	}
	if found == "" || c.String("temp") == "" {
		return one, usageError("add --found 1.038 --temp 20C", "what the instrument showed and the temperature are needed")
	}
	b.set.scale = h.Scale
	var err error
	if one.found, err = b.reading(found); err != nil {
		return one, err
	}
	if one.found.Scale != h.Scale {
		return one, dataError("type the reading of this instrument", "read %s, wanted a value in %s", one.found.ReadAs(), h.Scale.Info().Name)
	}
	if one.temp, err = b.temperature(c.String("temp")); err != nil {
		return one, err
	}
	one.places = placesOf(one.found) + 1
	if one.expected, err = b.expect(c, h, &one); err != nil {
		return one, err
	}
	one.expected = asread.Round(one.expected, one.places, asread.HalfEven)
	one.correction = asread.RoundDiff(one.expected, one.found.Value, 1, one.places, asread.HalfEven)
	if limit := tooFar(h); math.Abs(one.correction) > limit {
		return one, dataError("was it this instrument, this liquid and this temperature?",
			"found %s where %s was expected: too far apart for an instrument in order", one.found.ReadAs(), fixed(one.expected, one.places))
	}
	one.check.Found = typedAs(one.found)
	one.check.Temp = journal.TypedTemp{Text: one.temp.Input, Unit: one.temp.Unit}
	one.check.Correction = asread.Signed(one.correction, one.places)
	return one, nil
}

// expect is what the instrument should show: the mark at which its body, as it has
// grown at the temperature, displaces the liquid. The value of a drink is typed.
func (b *bench) expect(c *cli.Context, h tempcorr.Hydrometer, one *comparison) (float64, error) {
	if one.check.Liquid == journal.InDrink {
		r, err := b.reading(c.String("drink"))
		if err == nil && r.Scale != h.Scale {
			err = dataError("type it in the scale of the instrument", "--drink: read %s, wanted a value in %s", r.ReadAs(), h.Scale.Info().Name)
		}
		one.check.Expected = typedAs(r)
		return r.Value, err
	}
	density := gravity.Kell(one.temp.C)
	if one.check.Liquid == journal.InSucrose {
		one.check.Strength = c.String("sucrose")
		v, err := asread.ParseNumber(one.check.Strength)
		if err != nil {
			return 0, dataError("type the % mass alone: 10.00", "--sucrose: %v", err)
		}
		if !(v.Float() >= 0 && v.Float() <= 40) {
			return 0, dataError("grams of sugar in 100 g of solution", "--sucrose: read %s, wanted 0 to 40 %% mass", v)
		}
		density = gravity.SucroseDensity(gravity.Plato(v.Float()), one.temp.C)
	}
	grown := 1 + h.Body.Expansion*float64(one.temp.C-h.Basis.Sample)
	mark, err := h.Float().Mark(density * gravity.Density(grown))
	one.check.Expected = journal.Typed{Text: fixed(mark, one.places), Scale: h.Scale.String()}
	return mark, err
}

// tooFar is the correction, in the instrument's scale, above which a check is
// taken for a slip: 20 points, more than any instrument in order is off (judged).
func tooFar(h tempcorr.Hydrometer) float64 {
	f := h.Float()
	lo, errLo := f.Mark(gravity.Kell(h.Basis.Water))
	hi, errHi := f.Mark(gravity.Kell(h.Basis.Water) * 1.02)
	if errLo != nil || errHi != nil {
		return math.Inf(1)
	}
	return math.Abs(hi - lo)
}

// placesOf is the number of decimals of a reading on its own scale, where 998 is
// 0.998.
func placesOf(r asread.Reading) int {
	return max(0, int(math.Round(-math.Log10(r.Step))))
}

// typedAs is a reading as the journal keeps it.
func typedAs(r asread.Reading) journal.Typed {
	return journal.Typed{Text: r.Input, Scale: r.Scale.String()}
}
