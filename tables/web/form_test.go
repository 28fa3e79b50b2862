package web

import (
	"net/url"
	"strings"
	"testing"
	"unicode"
	"unicode/utf8"
)

func TestParseForm(t *testing.T) {
	for raw, want := range map[string]string{
		"gravity=1.016": "1.016", "gravity=+1.016+": "1.016", "gravity=1.016%09": "1.016", "gravity=a%0d%0ab": "a  b", "gravity=": "", "gravity": "",
		"gravity=%3Cscript%3E": "<script>", "gravity=12%C2%B0P": "12°P", "gravity=%E2%80%8Bx": "\u200bx",
	} {
		v, err := parseForm(raw)
		if err != nil || v["gravity"] != want {
			t.Errorf("%q: %q, %v, wanted %q", raw, v["gravity"], err, want)
		}
	}
	for _, raw := range []string{
		"a=1&a=2", "a=%00", "a=%1b", "a=%7f", "a=%c2%85", "a=%e2%80%ae", "a=%e2%80%a8", "a=%ef%bf%bf", "a=%ff", "a=%", "a;b",
		"a=" + strings.Repeat("x", maxText+1), strings.Repeat("n", 41) + "=1",
	} {
		if v, err := parseForm(raw); err == nil {
			t.Errorf("%.40q read as %q", raw, v)
		}
	}
}

func TestCheck(t *testing.T) {
	full := values{"gravity": "1.016", "temp": "18", "operator": "ines"}
	if err := full.check(readingFields, readingNeeds); err != nil {
		t.Error(err)
	}
	for name, value := range map[string]string{"gravity": "", "temp": "", "operator": "", "instrument": strings.Repeat("x", maxValue+1), "note": strings.Repeat("x", maxText+1)} {
		v := values{"gravity": "1.016", "temp": "18", "operator": "ines", name: value}
		err := v.check(readingFields, readingNeeds)
		if r := refused(err); r.Field != name || r.Status != 422 {
			t.Errorf("%s: %+v", name, r)
		}
	}
	// Nothing is lost on the way back to the form.
	r := Reading{Batch: "B1", Gravity: "12 °P", Temp: "18&x=y", Taken: "yesterday 18:30", Note: "a+b"}
	v, err := parseForm(query(r))
	if back := v.reading("B1"); err != nil || back != r {
		t.Errorf("%+v came back as %+v, %v", r, back, err)
	}
}

func FuzzParseForm(f *testing.F) {
	for _, seed := range []string{"gravity=1.016&temp=18", "a=%1b%5b2J", "a=1&a=2", "note=%E2%80%AE", "a=%ff", ";", "&&&", "=", "a=%0d%0a"} {
		f.Add(seed)
	}
	f.Fuzz(func(t *testing.T, raw string) {
		v, err := parseForm(raw)
		if err != nil {
			if refused(err).Status != 400 {
				t.Fatalf("%q: %v, wanted a refusal with 400", raw, err)
			}
			return
		}
		again := url.Values{}
		for name, value := range v {
			if !utf8.ValidString(value) || strings.ContainsFunc(value, unicode.IsControl) || utf8.RuneCountInString(value) > maxText || strings.TrimSpace(value) != value {
				t.Fatalf("%q: value %q", raw, value)
			}
			again.Set(name, value)
		}
		// What was read once is read the same again.
		w, err := parseForm(again.Encode())
		if err != nil || len(w) != len(v) {
			t.Fatalf("%q: %q, then %q, %v", raw, v, w, err)
		}
		for name := range v {
			if w[name] != v[name] {
				t.Fatalf("%q: %q, then %q", raw, v[name], w[name])
			}
		}
	})
}
