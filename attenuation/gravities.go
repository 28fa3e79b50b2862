package attenuation

import (
	"errors"
	"fmt"

	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/gravity/method"
)

// Gravities is what every method starts from: the gravity before and the gravity
// after, each as SG 20/20 °C and as extract [% mass].
type Gravities struct {
	OG, FG gravity.SG
	OE, AE gravity.Plato
}

// NewGravities returns the gravities of two readings in SG 20/20 °C, with the
// extracts of the fit given. It returns a *method.RangeError for an SG that no
// liquid of the trade has; which of the two is the higher is left to Check.
func NewGravities(og, fg gravity.SG, fit method.Entry[gravity.Fit]) (Gravities, error) {
	if err := checkSG("original gravity", og); err != nil {
		return Gravities{}, err
	}
	if err := checkSG("present gravity", fg); err != nil {
		return Gravities{}, err
	}
	return Gravities{OG: og, FG: fg, OE: fit.Fn.Extract(og), AE: fit.Fn.Extract(fg)}, nil
}

// Of returns the gravities of two converted readings, whatever scale they were
// read on.
func Of(og, pg gravity.Figures) Gravities {
	return Gravities{OG: og.SG, FG: pg.SG, OE: og.Extract, AE: pg.Extract}
}

// MinExtract is the original extract [% mass] below which attenuation is not
// given: the division would only amplify the reading's error.
const MinExtract gravity.Plato = 0.1

// What can be wrong with a pair of gravities.
var (
	ErrOrder     = errors.New("present gravity is not below the original gravity")
	ErrNoExtract = errors.New("no original extract")
	ErrTooLow    = errors.New("more fermented than there was extract")
)

// MinRealExtract is the real extract [% mass] below which two gravities cannot
// belong together: no liquid holds less than none, and what readings and the
// attenuation quotient leave in doubt is less than half a degree (judged).
const MinRealExtract gravity.Plato = -0.5

// pairHint is what to look at when two gravities do not go together.
const pairHint = "swapped values, or an addition of sugar or wort that is missing from the original gravity?"

// OrderError says that the present gravity is not below the original one. It
// wraps ErrOrder.
type OrderError struct{ OG, FG gravity.SG }

func (e *OrderError) Error() string {
	return fmt.Sprintf("present gravity is %.4f, wanted below the original gravity %.4f", float64(e.FG), float64(e.OG))
}

// Unwrap returns ErrOrder.
func (e *OrderError) Unwrap() error { return ErrOrder }

// Hint says what to look at.
func (e *OrderError) Hint() string { return pairHint }

// NoExtractError says that attenuation is undefined because there was nothing to
// ferment. It wraps ErrNoExtract.
type NoExtractError struct {
	OG gravity.SG
	OE gravity.Plato
}

func (e *NoExtractError) Error() string {
	return fmt.Sprintf("original gravity %.4f is %s %% extract, wanted at least %.1f %%: attenuation is undefined",
		float64(e.OG), asread.Fixed(float64(e.OE), 2, asread.HalfEven), float64(MinExtract))
}

// Unwrap returns ErrNoExtract.
func (e *NoExtractError) Unwrap() error { return ErrNoExtract }

// Hint says what to look at.
func (e *NoExtractError) Hint() string { return pairHint }

// OverfermentedError says that the gravities would leave less than no extract. It
// wraps ErrTooLow.
type OverfermentedError struct {
	OG, FG gravity.SG
	RE     gravity.Plato
}

func (e *OverfermentedError) Error() string {
	return fmt.Sprintf("present gravity %.4f from original %.4f would leave a real extract of %s %%, wanted at least %s %%",
		float64(e.FG), float64(e.OG), asread.Fixed(float64(e.RE), 2, asread.HalfEven), asread.Fixed(float64(MinRealExtract), 1, asread.HalfEven))
}

// Unwrap returns ErrTooLow.
func (e *OverfermentedError) Unwrap() error { return ErrTooLow }

// Hint says what to look at.
func (e *OverfermentedError) Hint() string {
	return "wrong tank, a hot sample, an original gravity read too low, or an addition that is missing from it?"
}

// Check returns nil for gravities that a fermentation can have. Otherwise it
// returns a *method.RangeError (an SG that no liquid of the trade has), a
// *NoExtractError (original extract below MinExtract), an *OrderError (present
// gravity not below the original) or an *OverfermentedError (more gone than there
// was), the first that applies.
func (g Gravities) Check() error {
	if err := g.possible(); err != nil {
		return err
	}
	if err := g.checkExtract(); err != nil {
		return err
	}
	if !(g.FG < g.OG && g.AE < g.OE) {
		return &OrderError{g.OG, g.FG}
	}
	if re := gravity.RealExtract(g.OE, g.AE); re < MinRealExtract {
		return &OverfermentedError{g.OG, g.FG, re}
	}
	return nil
}

func (g Gravities) checkExtract() error {
	if !(g.OE >= MinExtract) {
		return &NoExtractError{g.OG, g.OE}
	}
	return nil
}

// maxExtract bounds the extract of gravities put together by hand, where it may
// not belong to the SG; no solution of sugar holds more.
const maxExtract = 100

// possible keeps what is not a number, and what no liquid has, out of every
// relation.
func (g Gravities) possible() error {
	if err := checkSG("original gravity", g.OG); err != nil {
		return err
	}
	if err := checkSG("present gravity", g.FG); err != nil {
		return err
	}
	if err := checkExtract("original extract", g.OE); err != nil {
		return err
	}
	return checkExtract("apparent extract", g.AE)
}

// fermentable is what the methods that use both gravities ask for: equal
// gravities have no alcohol, a present gravity above the original has no answer.
func (g Gravities) fermentable() error {
	if err := g.possible(); err != nil {
		return err
	}
	if g.FG > g.OG || g.AE > g.OE {
		return &OrderError{g.OG, g.FG}
	}
	return nil
}

func checkSG(what string, s gravity.SG) error {
	if gravity.CheckSG(s) == nil {
		return nil
	}
	return &method.RangeError{
		What: what, Got: float64(s), Lo: float64(gravity.MinSG), Hi: float64(gravity.MaxSG), Unit: "SG",
		Hint: "type specific gravity as 1.048, or add the scale: 12P, 48pt",
	}
}

func checkExtract(what string, p gravity.Plato) error {
	if p >= -maxExtract && p <= maxExtract {
		return nil
	}
	return &method.RangeError{What: what, Got: float64(p), Lo: -maxExtract, Hi: maxExtract, Unit: "% mass"}
}
