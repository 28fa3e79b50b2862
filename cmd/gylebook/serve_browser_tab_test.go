package main

import (
	"context"
	"fmt"
	"net/url"
	"os"
	"path/filepath"
	"strings"
	"sync"
	"testing"
	"time"

	"github.com/chromedp/cdproto/emulation"
	"github.com/chromedp/cdproto/log"
	"github.com/chromedp/cdproto/network"
	"github.com/chromedp/cdproto/runtime"
	"github.com/chromedp/chromedp"
)

// tab is a page of the browser, and all that it asked for and complained of.
type tab struct {
	t   *testing.T
	ctx context.Context
	url string

	mu      sync.Mutex
	asked   []string
	console []string
}

// tab opens a page the size of a telephone.
func (b *browser) tab(t *testing.T, address string) *tab {
	t.Helper()
	ctx, end := chromedp.NewContext(b.ctx, chromedp.WithNewBrowserContext())
	t.Cleanup(end)
	p := &tab{t: t, ctx: ctx, url: address}
	if err := chromedp.Listen(ctx, p.hear); err != nil {
		t.Fatal(err)
	}
	p.size(360, 800)
	t.Cleanup(p.settle)
	return p
}

func (p *tab) hear(event any) {
	p.mu.Lock()
	defer p.mu.Unlock()
	switch e := event.(type) {
	case *network.EventRequestWillBeSent:
		p.asked = append(p.asked, e.Request.URL)
	case *runtime.EventConsoleAPICalled:
		p.console = append(p.console, fmt.Sprintf("console.%s", e.Type))
	case *runtime.EventExceptionThrown:
		p.console = append(p.console, "exception: "+e.ExceptionDetails.Text)
	case *log.EventEntryAdded:
		if e.Entry.Level == log.EntryLevelError || e.Entry.Level == log.EntryLevelWarning {
			p.console = append(p.console, fmt.Sprintf("%s: %s %s", e.Entry.Level, e.Entry.Text, e.Entry.URL))
		}
	}
}

// settle demands that nothing was asked of another host and nothing stands on the
// console.
func (p *tab) settle() {
	p.t.Helper()
	p.mu.Lock()
	defer p.mu.Unlock()
	for _, one := range p.asked {
		if u, err := url.Parse(one); err != nil || u.Scheme+"://"+u.Host != p.url && u.Scheme != "file" && one != "about:blank" {
			p.t.Errorf("the page asked for %s", one)
		}
	}
	for _, one := range p.console {
		p.t.Errorf("on the console: %s", one)
	}
}

// allow takes complaints off the console that a test brings about: the browser
// notes every answer that is an error.
func (p *tab) allow(status string) {
	p.mu.Lock()
	defer p.mu.Unlock()
	var rest []string
	for _, one := range p.console {
		if !strings.Contains(one, "responded with a status of "+status) {
			rest = append(rest, one)
		}
	}
	p.console = rest
}

// do runs steps, in half a minute at most.
func (p *tab) do(steps ...chromedp.Action[chromedp.Void]) {
	p.t.Helper()
	ctx, end := context.WithTimeout(p.ctx, 30*time.Second)
	defer end()
	if err := chromedp.Do(ctx, steps...); err != nil {
		p.shot("failed")
		p.t.Fatalf("%v; the page shows: %s", err, p.text("body"))
	}
}

// get runs a script in the page and returns what it gives.
func get[T any](p *tab, script string, opts ...chromedp.EvaluateOption) T {
	p.t.Helper()
	ctx, end := context.WithTimeout(p.ctx, time.Minute)
	defer end()
	v, err := chromedp.Run(ctx, chromedp.Evaluate[T](script, opts...))
	if err != nil {
		p.t.Fatalf("%.120s: %v", script, err)
	}
	return v
}

// text is what an element says, "" when it is not there.
func (p *tab) text(css string) string {
	p.t.Helper()
	return get[string](p, fmt.Sprintf(`(document.querySelector(%q)?.innerText ?? "").replace(/\s+/g, " ").trim()`, css))
}

// open goes to a page of the server.
func (p *tab) open(path string) { p.t.Helper(); p.do(chromedp.Navigate(p.url + path)) }

// seen waits for an element to be seen.
func seen(css string) chromedp.Action[chromedp.Void] { return chromedp.WaitVisible(chromedp.CSS(css)) }

// tap presses something. It is a click, for on a busy machine the two ends of a touch
// come so far apart that it is a long one, which opens a menu.
func tap(css string) chromedp.Action[chromedp.Void] { return chromedp.Click(chromedp.CSS(css)) }

func typed(css, text string) chromedp.Action[chromedp.Void] {
	return chromedp.SendKeys(chromedp.CSS(css), text)
}

// size makes the page that wide and high; below 600 it is a telephone.
func (p *tab) size(width, height int64) {
	p.t.Helper()
	if width < 600 {
		p.do(chromedp.EmulateViewport(width, height, chromedp.EmulateScale(2), chromedp.EmulateMobile, chromedp.EmulateTouch))
		return
	}
	p.do(chromedp.EmulateViewport(width, height))
}

// media shows the page as on a medium, in a colour scheme; "" is the usual.
func (p *tab) media(medium, scheme string) {
	p.t.Helper()
	set := emulation.SetEmulatedMediaParams{Media: medium}
	if scheme != "" {
		set.Features = []*emulation.MediaFeature{{Name: "prefers-color-scheme", Value: scheme}}
	}
	if _, err := chromedp.Call(p.ctx, emulation.SetEmulatedMedia, set); err != nil {
		p.t.Fatal(err)
	}
}

// still shows the page to somebody who wants nothing to move.
func (p *tab) still() {
	p.t.Helper()
	if _, err := chromedp.Call(p.ctx, emulation.SetEmulatedMedia, emulation.SetEmulatedMediaParams{
		Features: []*emulation.MediaFeature{{Name: "prefers-reduced-motion", Value: "reduce"}},
	}); err != nil {
		p.t.Fatal(err)
	}
}

// shot keeps a picture of the page in the folder GYLEBOOK_SHOTS, if that is set.
func (p *tab) shot(name string) {
	folder := os.Getenv("GYLEBOOK_SHOTS")
	if folder == "" {
		return
	}
	ctx, end := context.WithTimeout(p.ctx, 20*time.Second)
	defer end()
	picture, err := chromedp.Run(ctx, chromedp.FullScreenshot(100))
	if err == nil {
		err = os.WriteFile(filepath.Join(folder, strings.ReplaceAll(p.t.Name()+"_"+name, "/", "_")+".png"), picture, 0o600)
	}
	if err != nil {
		p.t.Logf("no picture of %s: %v", name, err)
	}
}
