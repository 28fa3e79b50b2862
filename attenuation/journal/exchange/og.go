package exchange

import (
	"fmt"
	"strings"

	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/gravity/asread"
)

// The words of og_text: "1.0480", "12.1P at 18.5C with H1"; several readings are
// separated by semicolons. A reading without a temperature is already corrected.
const (
	ogAt   = " at "
	ogWith = " with "
	ogSep  = "; "
)

// ogText writes the original gravity as it was typed, with the decimal mark given,
// void readings left out.
func ogText(ogs []journal.Numbered[journal.OG], mark rune) string {
	var parts []string
	for _, n := range ogs {
		if n.Void {
			continue
		}
		g := n.Body
		text := withMark(plainText(g.Gravity.Text, g.Gravity.Scale), mark)
		if g.Temp.Text != "" {
			text += ogAt + withMark(celsiusText(g.Temp), mark) + "C"
		}
		if g.Instrument != "" {
			text += ogWith + g.Instrument
		}
		parts = append(parts, text)
	}
	return strings.Join(parts, ogSep)
}

// parseOG reads og_text; batch and time are left to the caller. In a file of
// another hand 1048 is taken for a damaged 1.048, in ours it was typed.
func parseOG(text string, own bool) ([]journal.OG, error) {
	var out []journal.OG
	for _, part := range strings.Split(text, strings.TrimSpace(ogSep)) {
		part = strings.TrimSpace(part)
		if part == "" {
			continue
		}
		part, instrument, _ := strings.Cut(part, ogWith)
		value, temp, _ := strings.Cut(part, ogAt)
		value = withMark(strings.TrimSpace(value), '.')
		if !own {
			value, _ = thousandths(value)
		}
		meant, err := asread.ParseReading(value, gravity.ScaleSG)
		if err != nil {
			return nil, fmt.Errorf("%s: %w", colOG, err)
		}
		g := journal.OG{
			Gravity:    journal.Typed{Text: value, Scale: meant.Scale.String()},
			Instrument: strings.TrimSpace(instrument),
		}
		if temp = withMark(strings.TrimSpace(temp), '.'); temp != "" {
			if _, err := asread.ParseTemperature(temp, asread.C); err != nil {
				return nil, fmt.Errorf("%s: %w", colOG, err)
			}
			g.Temp = journal.TypedTemp{Text: temp, Unit: string(asread.C)}
		}
		out = append(out, g)
	}
	return out, nil
}

// An entry's operator is who recorded it. Who took a reading that another recorded,
// by import, stands at the end of its note.
const tookIt = "taken by "

// takenBy returns who took a reading.
func takenBy(note, recordedBy string) string {
	if i := strings.LastIndex(note, tookIt); i == 0 || i > 0 && note[i-1] == '\n' {
		return note[i+len(tookIt):]
	}
	return recordedBy
}

// withTaker adds to a note who took the reading.
func withTaker(note, operator, by string) string {
	operator = strings.TrimSpace(operator)
	if operator == "" || operator == by {
		return note
	}
	if note != "" {
		note += "\n"
	}
	return note + tookIt + operator
}
