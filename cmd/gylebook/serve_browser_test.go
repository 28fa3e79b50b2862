package main

import (
	"context"
	"os"
	"os/exec"
	"testing"

	"github.com/chromedp/chromedp"
)

// The pages as a browser shows them. One browser serves all tests; each has its own
// tab, cookies and journal.
func TestServeInBrowser(t *testing.T) {
	b := openBrowser(t)
	for _, c := range []struct {
		name string
		test func(*testing.T, *browser)
	}{
		{"reading", browserReading},
		{"slip", browserSlip},
		{"without script", browserNoScript},
		{"keyboard", browserKeyboard},
		{"hostile text", browserHostileText},
		{"every page", browserEveryPage},
		{"axe is there", func(t *testing.T, _ *browser) { axe(t) }},
		{"cards on paper", browserCards},
		{"reports on paper", browserReports},
	} {
		t.Run(c.name, func(t *testing.T) { c.test(t, b) })
	}
}

// browser is a chromium of its own, with a profile that nobody used before.
type browser struct{ ctx context.Context }

func openBrowser(t *testing.T) *browser {
	t.Helper()
	chromium, err := exec.LookPath("chromium")
	if err != nil {
		without(t, "chromium is not there (Debian package chromium)")
	}
	ctx, stop := chromedp.NewExecAllocator(context.Background(),
		chromedp.ExecPath(chromium), chromedp.Headless, chromedp.NoSandbox, chromedp.DisableGPU, chromedp.NoFirstRun,
		chromedp.UserDataDir(t.TempDir()), chromedp.Flag("disable-quic", true), chromedp.Flag("disable-background-networking", true),
		chromedp.Flag("disable-component-update", true), chromedp.Flag("disable-sync", true), chromedp.Flag("disable-dev-shm-usage", true),
	)
	t.Cleanup(stop)
	ctx, end := chromedp.NewContext(ctx)
	t.Cleanup(end)
	if err := chromedp.Do(ctx); err != nil {
		t.Fatalf("chromium: %v", err)
	}
	return &browser{ctx}
}

// without ends a test that needs an outside program: skipped, or failed where all of
// them have to be there.
func without(t *testing.T, why string) {
	t.Helper()
	if os.Getenv("GYLEBOOK_CI") == "1" {
		t.Fatal(why)
	}
	t.Skip(why)
}
