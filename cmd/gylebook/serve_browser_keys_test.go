package main

import (
	"strings"
	"testing"

	"github.com/chromedp/chromedp"
	"github.com/chromedp/chromedp/kb"
)

// focused says what has the focus and whether that can be seen: by an outline, a
// border or a shadow that it has not got otherwise.
const focused = `(() => {
	const e = document.activeElement, look = () => { const s = getComputedStyle(e);
		return [s.outlineStyle == "none" ? "" : s.outlineWidth + s.outlineColor, s.boxShadow, s.borderColor].join() };
	if (e == document.body) return {at: "", marked: true};
	const there = look(); e.blur(); const away = look(); e.focus({preventScroll: true});
	return {at: e.getAttribute("href") ?? (e.id || e.innerText), marked: there != away, shown: e.getBoundingClientRect().top >= 0};
})()`

// toFocus presses Tab until something has the focus whose link, id or words are
// these.
func (p *tab) toFocus(want string) {
	p.t.Helper()
	var way []string
	for range 60 {
		p.do(chromedp.KeyEvent(kb.Tab))
		f := get[struct {
			At            string
			Marked, Shown bool
		}](p, focused)
		way = append(way, f.At)
		if !f.Marked {
			p.t.Errorf("on %s the focus cannot be seen", f.At)
		}
		if f.At == want {
			if !f.Shown {
				p.t.Errorf("%s has the focus and is not in view", want)
			}
			return
		}
	}
	p.t.Fatalf("Tab does not come to %q, but to %q", want, way)
}

// Nothing but the keyboard.
func browserKeyboard(t *testing.T, b *browser) {
	s := newServed(t).start()
	p := b.tab(t, s.url)
	p.size(1280, 800)
	p.still()
	_, before := s.stands(t, "LB-17")
	p.open("/")
	gravity := expectedNow.FindStringSubmatch(p.text(`a[href="/batch/LB-17"]`))[1]
	enter := chromedp.KeyEvent(kb.Enter)
	p.toFocus("#main") // the way past the bar comes first
	p.shot("skip")
	p.do(enter)
	p.toFocus("/batch/LB-17")
	p.shot("vessel")
	p.do(enter, seen("#reading"))
	p.toFocus("gravity")
	p.do(chromedp.KeyEvent(gravity))
	p.toFocus("temp")
	p.do(chromedp.KeyEvent("20"))
	p.toFocus("instrument")
	p.do(chromedp.KeyEvent("H1"))
	p.toFocus("operator")
	p.do(chromedp.KeyEvent("nell"))
	p.toFocus("Read it back")
	p.shot("button")
	p.do(enter, seen("#store button"))
	p.toFocus("Store it")
	p.do(enter, seen(".done"))
	if last, n := s.stands(t, "LB-17"); n != before+1 || last["input"] != gravity || last["operator"] != "nell" {
		t.Fatalf("%d entries more, the newest %v", n-before, last)
	}
	p.toFocus("/batch/LB-17/undo")
	p.do(enter, seen(`form[action$="/undo"]`))
	p.toFocus(p.text(`form[action$="/undo"] button`))
	p.do(enter, seen(".done"))
	if last, _ := s.stands(t, "LB-17"); last["status"] != "void" {
		t.Errorf("the newest reading is %v", last)
	}
}

// Text that would be a script, had it been put into a page as it is.
func browserHostileText(t *testing.T, b *browser) {
	const (
		product = `<script>window.ran=1</script>`
		reader  = `"><img src=x onerror=window.ran=2>`
		note    = `</td><script>window.ran=3</script><svg onload=window.ran=4>`
	)
	s := newServed(t)
	s.run("batch", "open", "B1", "--vessel", "T9", "--product", product, "--og", "1.048", "--pitched", "2026-11-25 12:00")
	for _, line := range []string{"1.040|2026-11-26 12:00", "1.030|2026-11-26 20:00", "1.024|2026-11-27 08:00"} {
		gravity, taken, _ := strings.Cut(line, "|")
		s.run("log", "B1", gravity, "20", "--taken", taken, "--note", note, "--operator", reader)
	}
	s.start()
	p := b.tab(t, s.url)
	clean := func(where string, want ...string) {
		t.Helper()
		if ran := get[int](p, `window.ran ?? 0`); ran != 0 {
			t.Errorf("%s: text ran as a script (%d)", where, ran)
		}
		if n := get[int](p, `document.querySelectorAll("[onerror], [onload], main script, img[src=x]").length`); n != 0 {
			t.Errorf("%s: %d elements were made of text", where, n)
		}
		for _, text := range want {
			if said := p.text("body"); !strings.Contains(said, text) {
				t.Errorf("%s: %s is not shown as text: %s", where, text, said)
			}
		}
		p.shot(where)
	}
	p.open("/")
	clean("board", product)
	p.do(tap(`a[href="/batch/B1"]`), seen("#reading"))
	clean("batch", product, note)
	p.do(typed("#gravity", "1.022"), typed("#temp", "20"), typed("#operator", reader), seen("#readback *"))
	clean("read-back while it is typed")
	p.do(tap("summary"), seen("#note"), typed("#note", note), tap("#reading button"), seen("#store button"))
	clean("read-back", product)
	p.do(tap("#store button"), seen(".done"))
	clean("stored", product, reader)
	p.open("/batch/B1/curve.svg")
	if ran := get[int](p, `document.querySelectorAll("script, [onerror], [onload], img").length`); ran != 0 {
		t.Errorf("the picture holds %d elements made of text", ran)
	}
	p.open("/bench?what=convert&value=" + `%3Cscript%3Ewindow.ran=5%3C/script%3E`)
	clean("bench", "<script>")
	p.open("/%3Cscript%3Ewindow.ran=6%3C%2Fscript%3E")
	clean("not found", "<script>")
	p.allow("404")
	p.allow("422")
}
