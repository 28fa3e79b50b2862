package main

import (
	"encoding/json"
	"regexp"
	"strings"
	"testing"

	"github.com/chromedp/cdproto/emulation"
	"github.com/chromedp/chromedp"
)

// expectedNow is the gravity that the board expects of a vessel.
var expectedNow = regexp.MustCompile(`expected (\d\.\d+)`)

// toBatch goes from the board to a batch and returns what the board expects of it.
func (p *tab) toBatch(batch string) (expected string) {
	p.t.Helper()
	p.open("/")
	link := `a[href="/batch/` + batch + `"]`
	p.do(seen(link))
	m := expectedNow.FindStringSubmatch(p.text(link))
	if m == nil {
		p.t.Fatalf("the board says of %s: %s", batch, p.text(link))
	}
	p.do(tap(link), seen("#reading"))
	return m[1]
}

// stands is the newest reading of a batch, and how many entries the journal has,
// both by another process.
func (s *served) stands(t *testing.T, batch string) (last map[string]any, entries int) {
	t.Helper()
	var d struct {
		Records []struct{ Readings []map[string]any }
	}
	if err := json.Unmarshal([]byte(s.run("batch", "show", batch, "--json")), &d); err != nil {
		t.Fatal(err)
	}
	list := d.Records[0].Readings
	return list[len(list)-1], len(s.exported())
}

// From the open board to a reading on disk, and back: read back while it is typed,
// confirmed, stored, drawn, undone.
func browserReading(t *testing.T, b *browser) {
	s := newServed(t).start()
	p := b.tab(t, s.url)
	_, before := s.stands(t, "LB-17")
	gravity := p.toBatch("LB-17")
	p.shot("batch")
	p.do(typed("#gravity", gravity), typed("#temp", "20"), chromedp.SetValue(chromedp.CSS("#instrument"), "H1"),
		typed("#operator", "nell"), seen("#readback .ladder"))
	if said := p.text("#readback"); !strings.Contains(said, "LB-17") || !strings.Contains(said, "SG "+gravity+" at 20") {
		t.Errorf("read back while it is typed: %s", said)
	}
	p.shot("typed")
	if _, n := s.stands(t, "LB-17"); n != before {
		t.Fatalf("%d entries were stored by typing", n-before)
	}
	p.do(tap("#reading button"), seen("#store button"))
	if said := p.text("main"); !strings.Contains(said, "SG "+gravity+" at 20") {
		t.Errorf("read back: %s", said)
	}
	p.shot("read-back")
	p.do(tap("#store button"), seen(".done"))
	number := regexp.MustCompile(`(?i)stored as #(\d+)`).FindStringSubmatch(p.text(".done h2"))
	if number == nil {
		t.Fatalf("after storing: %s", p.text(".done"))
	}
	p.shot("stored")
	last, n := s.stands(t, "LB-17")
	if n != before+1 || last["input"] != gravity || last["operator"] != "nell" || last["sample_temp_c"] != 20.0 {
		t.Errorf("%d entries more, the newest %v", n-before, last)
	}
	const drawn = `(async () => { const i = document.querySelector("figure img"); i.scrollIntoView(); await i.decode(); return i.naturalWidth > 0 && i.currentSrc.includes("/curve.svg?phone=1") })()`
	if !get[bool](p, drawn, chromedp.EvalAwaitPromise) {
		t.Errorf("the curve is not shown")
	}

	p.do(tap(".undo a"), seen(`form[action$="/undo"] button`))
	p.shot("undo")
	p.do(typed("#reason", "wrong sample"), tap(`form[action$="/undo"] button`), seen(".done"))
	if said := p.text(".done h2"); !strings.EqualFold(said, "voided #"+number[1]) {
		t.Errorf("after undo: %s", said)
	}
	if table := p.text(".read"); !strings.Contains(table, "void") || !strings.Contains(table, "wrong sample") {
		t.Errorf("the voided reading is not in sight: %s", table)
	}
	p.shot("undone")
	if last, n := s.stands(t, "LB-17"); n != before+2 || last["status"] != "void" {
		t.Errorf("%d entries more, the newest %v", n-before, last)
	}
}

// A slip of the pen and a reading of another tank are held, and nothing is stored.
func browserSlip(t *testing.T, b *browser) {
	s := newServed(t).start()
	p := b.tab(t, s.url)
	_, before := s.stands(t, "LB-16")
	for name, gravity := range map[string]string{"slip": "12.1", "another tank": "1.0149"} {
		p.toBatch("LB-16")
		p.do(typed("#gravity", gravity), typed("#temp", "20"), chromedp.SetValue(chromedp.CSS("#instrument"), "H1"),
			chromedp.SetValue(chromedp.CSS("#operator"), "nell"), seen("#readback *"))
		p.do(tap("#reading button"), seen("#keep, .problem")) // not what was read back as it was typed
		p.shot(name)
		if said := p.text("h1") + p.text(".problem"); !strings.Contains(said, "Held") && p.text(".problem") == "" {
			t.Errorf("%s: the page says %s", name, said)
		}
		if get[bool](p, `[...document.querySelectorAll("button")].some(b => b.innerText == "Store it")`) {
			t.Errorf("%s can be stored as if nothing were wrong", name)
		}
	}
	if _, n := s.stands(t, "LB-16"); n != before {
		t.Errorf("%d entries were stored", n-before)
	}
	p.allow("409")
	p.allow("422")
}

// All of it without script, as in a browser that has it switched off.
func browserNoScript(t *testing.T, b *browser) {
	s := newServed(t).start()
	p := b.tab(t, s.url)
	if _, err := chromedp.Call(p.ctx, emulation.SetScriptExecutionDisabled, emulation.SetScriptExecutionDisabledParams{Value: true}); err != nil {
		t.Fatal(err)
	}
	_, before := s.stands(t, "LB-17")
	gravity := p.toBatch("LB-17")
	p.do(typed("#gravity", gravity), typed("#temp", "20"), typed("#instrument", "H1"), typed("#operator", "nell"))
	p.do(tap("#reading button"), seen("#store button"))
	p.do(tap("#store button"), seen(".done"))
	p.do(tap(".undo a"), seen(`form[action$="/undo"] button`))
	p.do(tap(`form[action$="/undo"] button`), seen(".done"))
	if said := p.text(".done h2"); !strings.HasPrefix(strings.ToLower(said), "voided #") {
		t.Errorf("after undo: %s", said)
	}
	if last, n := s.stands(t, "LB-17"); n != before+2 || last["status"] != "void" || last["input"] != gravity {
		t.Errorf("%d entries more, the newest %v", n-before, last)
	}
	for _, one := range p.asked {
		if strings.Contains(one, "/readback") {
			t.Errorf("a script ran: %s", one)
		}
	}
}
