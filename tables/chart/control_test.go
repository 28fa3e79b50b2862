package chart

import (
	"math"
	"slices"
	"strconv"
	"strings"
	"testing"

	"gonum.org/v1/plot/vg"
	"pgregory.net/rapid"
)

func TestControlElements(t *testing.T) {
	list := elements(t, written(t, season(32), SVG, Page))
	for class, want := range map[string]int{
		"point": 32, "ring": 2, "run": 1, "centre": 1, "warning": 2, "action": 2, "limit-name": 5, "key": 3, "sample": 3,
	} {
		if got := len(ofClass(list, class)); got != want {
			t.Errorf("%d of %s, wanted %d", got, class, want)
		}
	}
	var named []string
	for _, e := range ofClass(list, "label") {
		named = append(named, e.attr["aria-label"])
	}
	slices.Sort(named)
	if want := []string{"B-130", "B-148"}; !slices.Equal(named, want) { // 100 + 3·10, 100 + 3·16
		t.Errorf("flagged points named %q, wanted %q", named, want)
	}

	bare := season(6)
	bare.HasLimits = false
	for k := range bare.Points {
		bare.Points[k].Group = 2
	}
	list = elements(t, written(t, bare, SVG, Phone))
	for class, want := range map[string]int{"point": 6, "centre": 0, "warning": 0, "action": 0, "limit-name": 0, "key": 0} {
		if got := len(ofClass(list, class)); got != want {
			t.Errorf("without limits: %d of %s, wanted %d", got, class, want)
		}
	}
}

// Every limit stands where the printed axis has its value, and says it.
func TestLimitsToScale(t *testing.T) {
	c := season(32)
	f := c.draw(Page)
	scale, base := yScale(t, f), shapesOf(f, "grid")[0].points()[0].Y
	zero := labelled(t, f, base)
	for class, want := range map[string][]float64{
		"action": {c.ActionHigh, c.ActionLow}, "warning": {c.WarningHigh, c.WarningLow}, "centre": {c.Centre},
	} {
		for k, s := range shapesOf(f, class) {
			if got := zero + float64(s.points()[0].Y-base)/scale; math.Abs(got-want[k]) > 1e-6 {
				t.Errorf("%s at %g, wanted %g", class, got, want[k])
			}
		}
	}
	var texts []string
	for _, s := range shapesOf(f, "limit-name") {
		texts = append(texts, s.text)
	}
	if want := "action 81.7, warning 80.8, centre 79.1, warning 77.4, action 76.5"; strings.Join(texts, ", ") != want {
		t.Errorf("limits are named %q, wanted %q", strings.Join(texts, ", "), want)
	}
}

// A generation has one shape, and no two have the same.
func TestGroupsDiffer(t *testing.T) {
	f := season(32).draw(Page)
	corners := map[int]int{}
	for k, s := range shapesOf(f, "point") {
		group := 1 + k%3
		if n, seen := corners[group]; seen && n != len(s.path) {
			t.Errorf("group %d is drawn in two shapes", group)
		}
		corners[group] = len(s.path)
	}
	if corners[1] == corners[2] || corners[2] == corners[3] || corners[1] == corners[3] {
		t.Errorf("groups share a shape: %v", corners)
	}
}

func TestGroupsBeyondTheShapes(t *testing.T) {
	c := season(40)
	for k := range c.Points {
		c.Points[k].Group = k % 10
	}
	var texts []string
	for _, s := range shapesOf(c.draw(Page), "key") {
		texts = append(texts, s.text)
	}
	if want := "generation 1, 2, 3, 4, 5, 6 and later"; strings.Join(texts, ", ") != want {
		t.Errorf("legend is %q, wanted %q", strings.Join(texts, ", "), want)
	}
}

func TestControlLegible(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		name := rapid.StringOfN(rapid.RuneFrom([]rune("abc WMil-0123")), 0, 40, -1)
		lo := rapid.Float64Range(-1000, 1000).Draw(t, "low")
		y := rapid.Float64Range(lo, lo+rapid.SampledFrom([]float64{0, 0.001, 0.05, 10, 5000}).Draw(t, "span"))
		c := Control{Title: name.Draw(t, "title"), XLabel: name.Draw(t, "x label"), YLabel: name.Draw(t, "y label"), GroupName: name.Draw(t, "group name")}
		for range rapid.IntRange(0, 60).Draw(t, "points") {
			c.Points = append(c.Points, Individual{name.Draw(t, "label"), y.Draw(t, "y"), rapid.IntRange(0, 9).Draw(t, "group"), rapid.Bool().Draw(t, "flagged")})
		}
		if c.HasLimits = rapid.Bool().Draw(t, "limits"); c.HasLimits {
			five := []float64{y.Draw(t, "limit"), y.Draw(t, "limit"), y.Draw(t, "limit"), y.Draw(t, "limit"), y.Draw(t, "limit")}
			slices.Sort(five)
			c.ActionLow, c.WarningLow, c.Centre, c.WarningHigh, c.ActionHigh = five[0], five[1], five[2], five[3], five[4]
		}
		if err := c.check(); err != nil {
			t.Fatal(err)
		}
		legible(t, c.draw(Size{rapid.Float64Range(60, 250).Draw(t, "width"), rapid.Float64Range(60, 200).Draw(t, "height")}))
	})
}

// Heights that are far enough apart stay; others keep the distance, their order and
// the bounds.
func TestApart(t *testing.T) {
	if got := apart([]vg.Length{90, 60, 30}, 10, 0, 100); !slices.Equal(got, []vg.Length{90, 60, 30}) {
		t.Errorf("heights far apart moved to %v", got)
	}
	if got := apart([]vg.Length{52, 50, 48}, 10, 0, 100); !slices.Equal(got, []vg.Length{60, 50, 40}) {
		t.Errorf("heights around 50 moved to %v, wanted 60, 50, 40", got)
	}
	if got := apart([]vg.Length{100, 99}, 10, 0, 100); !slices.Equal(got, []vg.Length{100, 90}) {
		t.Errorf("heights at the top moved to %v, wanted 100, 90", got)
	}
}

// Points without a label are numbered.
func TestIndividualsNumbered(t *testing.T) {
	c := Control{Points: make([]Individual, 5)}
	f := c.draw(Page)
	for k, tick := range f.individuals(c.Points) {
		if want := strconv.Itoa(k + 1); tick.text != want || tick.at != float64(k+1) {
			t.Errorf("tick %q at %g, wanted %s", tick.text, tick.at, want)
		}
	}
}
