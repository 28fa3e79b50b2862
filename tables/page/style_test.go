package page

import (
	"math"
	"regexp"
	"strconv"
	"strings"
	"testing"
)

// luminance is the relative luminance of a colour #rrggbb (WCAG 2.2, section 6).
func luminance(t *testing.T, colour string) float64 {
	t.Helper()
	n, err := strconv.ParseUint(strings.TrimPrefix(colour, "#"), 16, 32)
	if err != nil || len(colour) != 7 {
		t.Fatalf("colour %q, want #rrggbb", colour)
	}
	part := func(shift uint) float64 {
		c := float64(n>>shift&0xff) / 255
		if c <= 0.04045 {
			return c / 12.92
		}
		return math.Pow((c+0.055)/1.055, 2.4)
	}
	return 0.2126*part(16) + 0.7152*part(8) + 0.0722*part(0)
}

func contrast(t *testing.T, a, b string) float64 {
	t.Helper()
	x, y := luminance(t, a), luminance(t, b)
	return (max(x, y) + 0.05) / (min(x, y) + 0.05)
}

func TestContrastFormula(t *testing.T) {
	if got := contrast(t, "#000000", "#ffffff"); math.Abs(got-21) > 1e-9 {
		t.Errorf("black on white %v, want 21", got)
	}
	// The grey that is known for failing by a hair: 4.48 to two places.
	if got := contrast(t, "#777777", "#ffffff"); math.Abs(got-4.48) > 0.005 {
		t.Errorf("#777777 on white %v, want 4.48", got)
	}
}

var (
	root     = regexp.MustCompile(`(?s):root \{(.*?)\}`)
	property = regexp.MustCompile(`--([a-z-]+): (#[0-9a-f]{6});`)
	ink      = regexp.MustCompile(`[ {;]color: var\(--([a-z-]+)\)`)
)

// themes are the custom properties in light, in dark and on paper, each upon
// those of light.
func themes(t *testing.T) map[string]map[string]string {
	t.Helper()
	blocks := root.FindAllStringSubmatch(Style, -1)
	if len(blocks) != 3 {
		t.Fatalf("%d blocks of :root, want light, dark and print", len(blocks))
	}
	out := map[string]map[string]string{}
	for i, name := range []string{"light", "dark", "print"} {
		out[name] = map[string]string{}
		for _, block := range [][]string{blocks[0], blocks[i]} {
			for _, p := range property.FindAllStringSubmatch(block[1], -1) {
				out[name][p[1]] = p[2]
			}
		}
	}
	return out
}

func TestContrast(t *testing.T) {
	text := [][2]string{
		{"ink", "paper"},
		{"soft", "paper"},
		{"accent", "paper"},
		{"ink", "card"},
		{"soft", "card"},
		{"accent", "card"},
		{"caution-ink", "caution-paper"},
		{"caution-ink", "paper"},
		{"ink", "caution-paper"},
		{"on-accent", "accent"},
	}
	marks := [][2]string{{"edge", "paper"}, {"edge", "card"}, {"caution-edge", "caution-paper"}, {"accent", "paper"}}
	for name, colours := range themes(t) {
		for least, pairs := range map[float64][][2]string{4.5: text, 3: marks} {
			for _, p := range pairs {
				if got := contrast(t, colours[p[0]], colours[p[1]]); got < least {
					t.Errorf("%s: %s on %s is %.2f:1, want %v:1", name, p[0], p[1], got, least)
				}
			}
		}
	}
	tested := map[string]bool{}
	for _, p := range text {
		tested[p[0]] = true
	}
	for _, use := range ink.FindAllStringSubmatch(Style, -1) {
		if !tested[use[1]] {
			t.Errorf("text in --%s, whose contrast is not tested", use[1])
		}
	}
}

// Nothing in the stylesheet is fetched, and it ends no element that holds it.
func TestStyleStandsAlone(t *testing.T) {
	for _, bad := range []string{"url(", "@import", "@font-face", "http", "<"} {
		if strings.Contains(Style, bad) {
			t.Errorf("%q in the stylesheet", bad)
		}
	}
	if strings.Count(Style, "{") != strings.Count(Style, "}") {
		t.Error("brackets do not match")
	}
}
