package main

import (
	"slices"
	"strings"

	"gylebook/attenuation/journal"
	"gylebook/gravity/asread"
)

// unknownAmount says that nobody weighed or measured what was added.
const unknownAmount = "unknown"

// amountsTyped are amounts in the words of who typed them; "" where the entry, which
// is in kg and L, has them so.
type amountsTyped struct{ mass, volume string }

// amounts reads what was added: from flags, and from words behind the kind, of which
// one with a unit of mass or volume is an amount, any other the gravity.
func (b *bench) amounts(body *journal.Event, words []string, mass, volume, gravity string) (typed amountsTyped, err error) {
	for _, word := range joinUnits(words) {
		_, errMass := asread.ParseMass(word)
		_, errVolume := asread.ParseVolume(word)
		place := &gravity
		switch {
		case errMass == nil:
			place = &mass
		case errVolume == nil:
			place = &volume
		}
		if *place != "" {
			return typed, usageError("type an amount with its unit and one gravity: top-up 20L 1.045", "read %.40q and %.40q, wanted one of them", *place, word)
		}
		*place = word
	}
	knowingly := mass == unknownAmount || volume == unknownAmount
	if mass != "" && mass != unknownAmount {
		m, err := asread.ParseMass(mass)
		if err != nil {
			return typed, dataError(hintOf(err), "--mass: %v", err)
		}
		body.MassKg, typed.mass = m.Text, otherThan(m.Input, shortAmount(m.Text)+" kg")
	}
	if volume != "" && volume != unknownAmount {
		v, err := asread.ParseVolume(volume)
		if err != nil {
			return typed, dataError(hintOf(err), "--volume: %v", err)
		}
		body.VolumeL, typed.volume = v.Text, otherThan(v.Input, shortAmount(v.Text)+" L")
	}
	if gravity != "" {
		if body.Gravity, err = b.readWith(nil, gravity); err != nil {
			return typed, err
		}
	}
	if knowingly {
		return typed, nil
	}
	return typed, amountMissing(*body)
}

// otherThan is a text as it was typed, "" when it says what is shown: blanks, letter
// case and the decimal mark aside.
func otherThan(typed, shown string) string {
	plain := func(s string) string {
		return strings.ReplaceAll(strings.ToLower(strings.Join(strings.Fields(s), "")), ",", ".")
	}
	if plain(typed) == plain(shown) {
		return ""
	}
	return typed
}

// amountMissing refuses an addition without what the mass balance needs of it.
func amountMissing(e journal.Event) error {
	byMass := []string{journal.Sugar, journal.Fruit}
	byVolume := []string{journal.TopUp, journal.Dilution, journal.Blend}
	syrup := e.What == journal.Sugar && e.Gravity.Text != "" && e.VolumeL != ""
	switch {
	case slices.Contains(byMass, e.What) && e.MassKg == "" && !syrup:
		return usageError("--mass 2kg, or --mass unknown if nobody weighed it", "%s: its mass is missing", e.What)
	case slices.Contains(byVolume, e.What) && e.MassKg == "" && e.VolumeL == "":
		return usageError("--volume 20L, or --volume unknown if nobody measured it", "%s: its volume is missing", e.What)
	}
	return nil
}

// shortAmount is an amount as typed, with at most three decimals, or as many as show
// three digits of a small one.
func shortAmount(text string) string {
	_, decimals, _ := strings.Cut(text, ".")
	v, err := asread.ParseNumber(text)
	if err != nil {
		return text
	}
	places := 3
	for x := v.Float(); x > 0 && x < 0.1; x *= 10 {
		places++
	}
	if len(decimals) <= places {
		return text
	}
	return fixed(v.Float(), places)
}

// eventText is an event in a few words.
func eventText(e journal.Event) string { return eventTextTyped(e, amountsTyped{}) }

// eventTextTyped is eventText with the amounts as they were typed behind them.
func eventTextTyped(e journal.Event, typed amountsTyped) string {
	text := e.What
	amount := func(kept, unit, typed string) {
		if kept != "" {
			text += " " + shortAmount(kept) + " " + unit
		}
		if typed != "" {
			text += " (" + typed + ")"
		}
	}
	amount(e.MassKg, "kg", typed.mass)
	amount(e.VolumeL, "L", typed.volume)
	if e.Gravity.Text != "" {
		text += " of " + e.Gravity.Text
	}
	if e.From != "" {
		text += " from " + e.From
	}
	if e.Vessel != "" {
		text += " to " + e.Vessel
	}
	if e.Note != "" {
		text += ": " + e.Note
	}
	return text
}

// givenText is a blend as the batch sees it that was blended into another.
func givenText(e journal.Event) string {
	switch {
	case e.VolumeL != "":
		return shortAmount(e.VolumeL) + " L to " + e.Batch
	case e.MassKg != "":
		return shortAmount(e.MassKg) + " kg to " + e.Batch
	}
	return "some to " + e.Batch
}
