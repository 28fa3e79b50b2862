package journal

import (
	"fmt"
	"time"
)

// Typed is a gravity as it was typed, with the scale it was read on.
type Typed struct {
	Text  string `json:"text"`
	Scale string `json:"scale"` // id of the scale
}

// TypedTemp is a temperature as it was typed; Unit is what a bare number meant.
type TypedTemp struct {
	Text string `json:"text"`
	Unit string `json:"unit"` // "C" or "F"
}

// Kinds of instrument.
const (
	Hydrometer    = "hydrometer"
	Refractometer = "refractometer"
	Thermometer   = "thermometer"
)

// Instrument registers an instrument. Its id is never used again.
type Instrument struct {
	ID       string    `json:"id"`
	Type     string    `json:"type"`
	Scale    string    `json:"scale"`     // id of the scale; "" for a thermometer
	Basis    string    `json:"basis"`     // "20/20", "60/60F"
	Division string    `json:"division"`  // as typed, in Scale
	RangeLo  string    `json:"range_lo"`  // as typed, in Scale; "" when not known
	RangeHi  string    `json:"range_hi"`  // as typed, in Scale; "" when not known
	Body     string    `json:"body"`      // id of the material
	ReadAt   string    `json:"read_at"`   // "bottom" or "top" of the meniscus
	MaxError string    `json:"max_error"` // as typed, in Scale; "" when not known
	StemMM   string    `json:"stem_mm"`   // "" when not known
	MassG    string    `json:"mass_g"`    // "" when not known
	Tension  string    `json:"tension"`   // surface tension it was adjusted for, mN/m; "" when not known
	Note     string    `json:"note"`
	Since    time.Time `json:"since"`
}

// CertificatePoint is one point of a certificate, as typed, in the instrument's
// scale at its reference temperature; U is expanded (k=2).
type CertificatePoint struct {
	Reading    string `json:"reading"`
	Correction string `json:"correction"`
	U          string `json:"u"`
}

// Certificate is a calibration certificate. It holds from At until the next
// certificate or check.
type Certificate struct {
	Instrument string             `json:"instrument"`
	At         time.Time          `json:"at"`
	Reference  string             `json:"reference"` // number and issuer, as typed
	Points     []CertificatePoint `json:"points"`    // ascending readings
}

// Liquids that an instrument is checked in.
const (
	InWater   = "water"
	InSucrose = "sucrose"
	InDrink   = "drink"
)

// Check is a check by the user: what the instrument should have shown and what it
// showed. It holds from At until the next check or certificate.
type Check struct {
	Instrument string    `json:"instrument"`
	At         time.Time `json:"at"`
	Liquid     string    `json:"liquid"`   // InWater, InSucrose or InDrink
	Strength   string    `json:"strength"` // % mass of the sucrose solution, as typed; else ""
	Found      Typed     `json:"found"`
	Expected   Typed     `json:"expected"` // typed for InDrink; computed text otherwise
	Temp       TypedTemp `json:"temp"`
	Correction string    `json:"correction"` // expected − found, in the instrument's scale
}

// Retire takes an instrument out of use.
type Retire struct {
	Instrument string    `json:"instrument"`
	At         time.Time `json:"at"`
	Reason     string    `json:"reason"`
}

// Batch opens a batch. Its id is unique for ever; a vessel is an alias that later
// batches use again.
type Batch struct {
	ID         string     `json:"id"`
	Product    string     `json:"product"`
	Vessel     string     `json:"vessel"`
	Volume     string     `json:"volume_l"` // litres at 20 °C, as typed; "" when not known
	Yeast      string     `json:"yeast"`
	Generation int        `json:"generation"` // 0 when not known
	Parent     string     `json:"parent"`     // batch that the yeast came from
	Pitched    *time.Time `json:"pitched"`
	Opened     time.Time  `json:"opened"`
	Note       string     `json:"note"`
}

// OG is one reading of the original gravity. Without a temperature the value is
// already corrected.
type OG struct {
	Batch      string    `json:"batch"`
	At         time.Time `json:"at"`
	Gravity    Typed     `json:"gravity"`
	Temp       TypedTemp `json:"temp"` // Text "" when already corrected
	Instrument string    `json:"instrument"`
}

// Limit is the apparent extract at which a forced ferment of the same wort ended,
// already corrected.
type Limit struct {
	Batch   string    `json:"batch"`
	At      time.Time `json:"at"`
	Gravity Typed     `json:"gravity"`
}

// Volume is the volume of a batch at its original gravity, entered or put right
// after it was opened.
type Volume struct {
	Batch  string    `json:"batch"`
	At     time.Time `json:"at"`
	Volume string    `json:"volume_l"` // litres at 20 °C, as typed
}

// Close ends a batch.
type Close struct {
	Batch string    `json:"batch"`
	At    time.Time `json:"at"`
	Note  string    `json:"note"`
}

// Qualities of a time.
const (
	Exact     = "exact"
	Estimated = "estimated"
)

// Reading is a gravity of a batch.
type Reading struct {
	Batch      string    `json:"batch"`
	Vessel     string    `json:"vessel"` // that it was drawn from
	TakenAt    time.Time `json:"taken_at"`
	Quality    string    `json:"time_quality"`
	Gravity    Typed     `json:"gravity"`
	Temp       TypedTemp `json:"temp"`
	Instrument string    `json:"instrument"` // "" when none is named
	Gassy      bool      `json:"gassy"`      // not degassed
	Keep       string    `json:"keep"`       // reason for which a suspect reading was kept; else ""
	Note       string    `json:"note"`
}

// Kinds of event.
const (
	Sugar    = "sugar"
	TopUp    = "top-up"
	Dilution = "dilution"
	Blend    = "blend"
	Racking  = "racking"
	DryHop   = "dry-hop"
	Fruit    = "fruit"
	Crash    = "crash"
	Priming  = "priming"
	Move     = "move"
)

// EventKinds lists the kinds of event in the order of help.
var EventKinds = []string{Sugar, TopUp, Dilution, Blend, Racking, DryHop, Fruit, Crash, Priming, Move}

// Event is what was done to a batch.
type Event struct {
	Batch   string    `json:"batch"`
	At      time.Time `json:"at"`
	What    string    `json:"what"`
	MassKg  string    `json:"mass_kg"`  // of what was added, as typed in kg; "" when not known
	VolumeL string    `json:"volume_l"` // of what was added or lost, litres; "" when not known
	Gravity Typed     `json:"gravity"`  // of what was added; Text "" when not given
	From    string    `json:"from"`     // batch that was blended in
	Vessel  string    `json:"vessel"`   // where it went (racking, move)
	Note    string    `json:"note"`
}

// Void takes an earlier entry out of the reckoning. The entry stays.
type Void struct {
	Entry  int64  `json:"entry"`
	Reason string `json:"reason"`
}

// Kind implements Body.
func (Instrument) Kind() Kind { return KindInstrument }

// Kind implements Body.
func (Certificate) Kind() Kind { return KindCertificate }

// Kind implements Body.
func (Check) Kind() Kind { return KindCheck }

// Kind implements Body.
func (Retire) Kind() Kind { return KindRetire }

// Kind implements Body.
func (Batch) Kind() Kind { return KindBatch }

// Kind implements Body.
func (OG) Kind() Kind { return KindOG }

// Kind implements Body.
func (Limit) Kind() Kind { return KindLimit }

// Kind implements Body.
func (Volume) Kind() Kind { return KindVolume }

// Kind implements Body.
func (Close) Kind() Kind { return KindClose }

// Kind implements Body.
func (Reading) Kind() Kind { return KindReading }

// Kind implements Body.
func (Event) Kind() Kind { return KindEvent }

// Kind implements Body.
func (Void) Kind() Kind { return KindVoid }

// newBody returns a pointer to an empty body of a kind.
func newBody(k Kind) (any, error) {
	switch k {
	case KindInstrument:
		return new(Instrument), nil
	case KindCertificate:
		return new(Certificate), nil
	case KindCheck:
		return new(Check), nil
	case KindRetire:
		return new(Retire), nil
	case KindBatch:
		return new(Batch), nil
	case KindOG:
		return new(OG), nil
	case KindLimit:
		return new(Limit), nil
	case KindVolume:
		return new(Volume), nil
	case KindClose:
		return new(Close), nil
	case KindReading:
		return new(Reading), nil
	case KindEvent:
		return new(Event), nil
	case KindVoid:
		return new(Void), nil
	}
	return nil, fmt.Errorf("unknown kind of entry %.40q", string(k))
}

// value takes the pointer off a body made by newBody.
func value(p any) Body {
	switch b := p.(type) {
	case *Instrument:
		return *b
	case *Certificate:
		return *b
	case *Check:
		return *b
	case *Retire:
		return *b
	case *Batch:
		return *b
	case *OG:
		return *b
	case *Limit:
		return *b
	case *Volume:
		return *b
	case *Close:
		return *b
	case *Reading:
		return *b
	case *Event:
		return *b
	case *Void:
		return *b
	}
	return nil
}
