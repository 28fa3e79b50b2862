package main

import (
	"net/http"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
)

// Every page, report and card is sound HTML by html-validate with its standard rules.
func TestServeHTML(t *testing.T) {
	program := os.Getenv("GYLEBOOK_HTML_VALIDATE")
	if program == "" {
		without(t, "GYLEBOOK_HTML_VALIDATE does not name the program (npm package html-validate)")
	}
	folder := t.TempDir()
	pageFiles(t, folder)
	config, err := filepath.Abs(filepath.Join(moduleRoot(t), "testdata", "html", "htmlvalidate.json"))
	if err != nil {
		t.Fatal(err)
	}
	files, err := filepath.Glob(filepath.Join(folder, "*.html"))
	if err != nil || len(files) < 16 {
		t.Fatalf("%d pages, %v", len(files), err)
	}
	if out, err := exec.Command(program, append([]string{"--config", config, "--formatter", "text"}, files...)...).CombinedOutput(); err != nil {
		t.Errorf("%v\n%s", err, out)
	}
}

// pageFiles writes every kind of page into a folder, as a validator reads them.
func pageFiles(t *testing.T, folder string) {
	t.Helper()
	s := newServed(t).start()
	v := newVisitor(s.url, nil)
	keep := func(name string, got shown, status int) {
		t.Helper()
		got.expect(t, name, status)
		if err := os.WriteFile(folder+"/"+name+".html", []byte(got.body), 0o600); err != nil {
			t.Fatal(err)
		}
	}
	keep("board", v.see(t, "/"), http.StatusOK)
	keep("batch", v.see(t, "/batch/LB-17"), http.StatusOK)
	keep("closed", v.see(t, "/batch/LB-14"), http.StatusOK)
	keep("bench", v.see(t, "/bench?what=correct&reading=1.048&temp=28&instrument=H1"), http.StatusOK)
	keep("bench-not-read", v.see(t, "/bench?what=abv&og=1.048&fg=beer"), http.StatusUnprocessableEntity)
	keep("not-found", v.see(t, "/nowhere"), http.StatusNotFound)
	keep("not-this-server", func() shown {
		got, err := v.ask(http.MethodGet, "/", "", func(r *http.Request) { r.Host = "elsewhere.example" })
		if err != nil {
			t.Fatal(err)
		}
		return got
	}(), http.StatusMisdirectedRequest)
	form, back, err := v.readBack("LB-17", "1.0135", "20", "")
	if err != nil {
		t.Fatal(err)
	}
	keep("read-back", back, http.StatusOK)
	done := v.do(t, "/batch/LB-17/store", form)
	keep("stored", v.see(t, done.header.Get("Location")), http.StatusOK)
	keep("undo", v.see(t, "/batch/LB-17/undo"), http.StatusOK)
	_, held, err := v.readBack("LB-16", "1.0149", "20", "")
	if err != nil {
		t.Fatal(err)
	}
	if !strings.Contains(held.body, "Held") {
		t.Errorf("not held: %s", held.heading())
	}
	keep("held", held, http.StatusOK)
	_, wrong, err := v.readBack("LB-16", "beer", "20", "")
	if err != nil {
		t.Fatal(err)
	}
	keep("not-read", wrong, http.StatusUnprocessableEntity)
	for name, args := range map[string][]string{
		"report-batch": {"report", "batch", "LB-17"}, "report-closed": {"report", "batch", "LB-14"}, "report-season": {"report", "season"},
		"card-temperature": {"card", "temperature", "--instrument", "H1"}, "card-scales": {"card", "scales"}, "card-rounds": {"card", "rounds"},
	} {
		s.run(append(args, "--out", folder+"/"+name+".html")...)
	}
}
