package chart

import (
	"slices"
	"strings"
	"testing"
)

func flagTexts(c Course, s Size) (texts []string) {
	for _, one := range shapesOf(c.draw(s), "flag") {
		texts = append(texts, one.text)
	}
	slices.Sort(texts)
	return texts
}

// Flags say what they are; close to each other they climb, and where that does not
// help they are numbered in the order of X.
func TestFlagsClimbThenNumbered(t *testing.T) {
	c := fall()
	if got := flagTexts(c, Page); !slices.Equal(got, []string{"dry hops", "oxygen", "racked"}) || c.Numbered(Page) {
		t.Errorf("flags far apart: %q", got)
	}
	c.Flags = []Flag{{3, "dry hops"}, {3.1, "nutrient"}, {3.2, "racked"}}
	f := c.draw(Page)
	heights := map[string]bool{}
	for _, one := range shapesOf(f, "flag") {
		heights[decimal(float64(one.bounds.y0), 1)] = true
	}
	if len(heights) != 3 || c.Numbered(Page) {
		t.Errorf("three flags close together stand in %d rows, wanted 3", len(heights))
	}
	c.Flags = nil
	for k := range 8 {
		c.Flags = append(c.Flags, Flag{X: 7 - float64(k), Text: strings.Repeat("roused ", 5)})
	}
	if got := flagTexts(c, Page); !slices.Equal(got, []string{"1", "2", "3", "4", "5", "6", "7", "8"}) || !c.Numbered(Page) {
		t.Errorf("eight flags with long texts: %q, wanted numbers", got)
	}
	for k := range c.Flags {
		c.Flags[k].X = 3 + float64(k)/1000
	}
	if got := flagTexts(c, Page); !slices.Equal(got, []string{"1–8"}) {
		t.Errorf("eight flags at one time: %q, wanted 1–8", got)
	}
}

func TestNumberedWithoutFlags(t *testing.T) {
	if (Course{}).Numbered(Page) || fall().Numbered(Size{}) {
		t.Error("flags that are not there, or not drawn, count as numbered")
	}
}
