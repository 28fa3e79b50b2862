package main

import (
	"fmt"
	"os"
	"testing"

	"github.com/chromedp/chromedp"
)

// everyPage visits each kind of page, in the state in which it has most on it.
func (p *tab) everyPage(look func(name string)) {
	p.t.Helper()
	fill := func(gravity string) chromedp.Action[chromedp.Void] {
		return chromedp.Steps(chromedp.SetValue(chromedp.CSS("#gravity"), gravity), chromedp.SetValue(chromedp.CSS("#temp"), "20"),
			chromedp.SetValue(chromedp.CSS("#instrument"), "H1"), chromedp.SetValue(chromedp.CSS("#operator"), "nell"))
	}
	send := chromedp.Evaluate[chromedp.Void](`document.querySelector("#reading").requestSubmit()`)
	p.open("/")
	look("board")
	p.open("/batch/LB-17")
	p.do(chromedp.Evaluate[chromedp.Void](`document.querySelector("details").open = true`), fill("1.0135"),
		typed("#note", "clear"), seen("#readback .ladder"))
	look("batch")
	p.do(send, seen("#store button"))
	look("read-back")
	p.do(chromedp.Evaluate[chromedp.Void](`document.querySelector("#store").requestSubmit()`), seen(".done"))
	look("stored")
	p.open("/batch/LB-17/undo")
	look("undo")
	p.open("/batch/LB-16")
	p.do(fill("1.0149"), send, seen(".held"))
	look("held")
	p.open("/batch/LB-16")
	p.do(fill("beer"), send, seen(".problem"))
	look("not read")
	p.open("/bench?what=correct&reading=1.048&temp=28&instrument=H1")
	look("bench")
	p.open("/bench?what=abv&og=1.048&fg=beer")
	look("bench, not read")
	p.open("/batch/LB-14")
	look("closed batch")
	p.open("/nowhere")
	look("not found")
	p.allow("404")
	p.allow("409")
	p.allow("422")
}

// loginPage serves with a passphrase, which has a page of its own. Others reach that
// address, so it is the address of this machine with TLS left to the test of it.
func loginPage(t *testing.T, b *browser) *tab {
	t.Helper()
	s := newServed(t)
	secret := s.place + ".secret"
	if err := os.WriteFile(secret, []byte(passphrase+"\n"), 0o600); err != nil {
		t.Fatal(err)
	}
	s.start("--passphrase-file", secret)
	p := b.tab(t, s.url)
	p.open("/batch/LB-17")
	p.do(seen("#passphrase"))
	return p
}

// tooSmall lists what a finger cannot hit: less than 44 px high or 24 wide. A link in
// running text is as high as its line.
const tooSmall = `(() => {
	const running = e => e.localName == "a" && getComputedStyle(e).display == "inline" &&
		[...e.parentNode.childNodes].some(n => n.nodeType == 3 && n.data.trim() != "");
	const all = [...document.querySelectorAll("a[href], button, input:not([type=hidden]), select, summary, textarea")]
		.filter(e => e.checkVisibility() && !running(e)).map(e => [e, e.getBoundingClientRect()]);
	if (all.length < 3) return ["only " + all.length + " targets found"];
	return all.filter(([e, r]) => r.height < 43.99 || r.width < 24)
		.map(([e, r]) => e.localName + " " + (e.id || e.innerText) + " " + r.width + " x " + r.height);
})()`

// beyond lists what makes the page wider than the screen.
const beyond = `(() => {
	const wide = document.documentElement.clientWidth;
	if (document.documentElement.scrollWidth <= wide) return [];
	return ["scrolls to " + document.documentElement.scrollWidth].concat([...document.querySelectorAll("body *")]
		.filter(e => e.getBoundingClientRect().right > wide + 0.5).map(e => e.localName + "." + e.className).slice(0, 5));
})()`

// axeRun finds what people cannot use who see, hear or move differently.
const axeRun = `axe.run(document, {resultTypes: ["violations"], runOnly: %s}).then(r => r.violations
	.filter(v => v.impact == "serious" || v.impact == "critical")
	.map(v => v.impact + " " + v.id + ": " + v.nodes.slice(0, 3).map(n => n.target + " " + n.failureSummary).join(" | ")))`

// axe is the script of axe-core.
func axe(t *testing.T) string {
	t.Helper()
	place := os.Getenv("GYLEBOOK_AXE")
	if place == "" {
		without(t, "GYLEBOOK_AXE does not name axe.min.js (npm package axe-core)")
	}
	script, err := os.ReadFile(place)
	if err != nil {
		t.Fatal(err)
	}
	return string(script)
}

// Every page: on a telephone all can be hit with a finger, nothing stands beyond the
// edge, in light, in dark and on paper; axe-core finds nothing that bars anybody,
// narrow and wide.
func browserEveryPage(t *testing.T, b *browser) {
	script := ""
	if os.Getenv("GYLEBOOK_AXE") != "" {
		script = axe(t)
	}
	s := newServed(t).start()
	p := b.tab(t, s.url)
	p.everyPage(func(name string) { p.look(name, script) })
	login := loginPage(t, b)
	login.look("log-in", script)
	// The narrowest telephone.
	p.size(320, 640)
	for _, path := range []string{"/", "/batch/LB-17", "/bench"} {
		p.open(path)
		p.demand(path+" on 320 px", beyond)
	}
}

// demand reports each line that a script finds.
func (p *tab) demand(where, script string, opts ...chromedp.EvaluateOption) {
	p.t.Helper()
	for _, one := range get[[]string](p, script, opts...) {
		p.t.Errorf("%s: %s", where, one)
	}
}

// look checks the page that is shown, in every form; script is that of axe, "" for
// none.
func (p *tab) look(name, script string) {
	p.t.Helper()
	if script != "" {
		p.do(chromedp.Evaluate[chromedp.Void](script))
	}
	for _, width := range []int64{1280, 360} {
		p.size(width, 800)
		for _, scheme := range []string{"light", "dark"} {
			p.media("", scheme)
			where := fmt.Sprintf("%s, %d px, %s", name, width, scheme)
			p.demand(where, beyond)
			p.shot(where)
			rules := "undefined"
			if scheme == "dark" {
				rules = `["color-contrast"]` // only colours differ
			}
			if script != "" {
				p.demand(where, fmt.Sprintf(axeRun, rules), chromedp.EvalAwaitPromise)
			}
		}
	}
	p.demand(name, tooSmall)
	p.media("print", "")
	p.size(718, 1000) // A4 with margins of 10 mm
	p.demand(name+" on paper", beyond)
	p.shot(name + " on paper")
	p.media("", "")
	p.size(360, 800)
}
