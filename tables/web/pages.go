package web

import (
	"crypto/sha256"
	"embed"
	"encoding/base64"
	"html/template"
	"io"
	"net/http"
	"strings"
	"sync"

	pagekit "gylebook/tables/page"
)

//go:embed templates
var templateFiles embed.FS

//go:embed static/tank.css
var tankStyle string

//go:embed static/tank.js
var tankScript []byte

//go:embed static/tank.svg
var tankIcon []byte

// page is what every page has.
type page struct {
	Title    string // of the window; the name of the program comes after it
	Here     string // the entry of the navigation that it belongs to: "board", "bench" or ""
	Script   bool
	Token    string // of the session
	Operator string
	LogOut   bool
	Bare     bool // nothing that refers to another page
	Bar      bool // the navigation
	Main     any
}

var functions = template.FuncMap{
	"ladder": pagekit.Ladder,
	"table":  pagekit.Table,
	"notes":  pagekit.Notes,
	"clean":  pagekit.Text,
	"path":   func(id string, below ...string) string { return batchPath(id, strings.Join(below, "")) },
	"filled": pagekit.Texts,
}

// templates are the pages by name, each with the layout around it, parsed when a
// server is made: most runs of the program are none.
var templates = sync.OnceValue(func() map[string]*template.Template {
	return parseTemplates("board", "batch", "readback", "undo", "bench", "login", "error")
})

func parseTemplates(names ...string) map[string]*template.Template {
	out := map[string]*template.Template{}
	shared := template.Must(template.New("").Funcs(functions).ParseFS(templateFiles, "templates/layout.html", "templates/parts.html"))
	for _, name := range names {
		out[name] = template.Must(template.Must(shared.Clone()).ParseFS(templateFiles, "templates/"+name+".html"))
	}
	return out
}

// render writes a page.
func render(w io.Writer, name string, p page) error {
	return templates()[name].ExecuteTemplate(w, "layout", p)
}

// asset is a file that pages refer to.
type asset struct {
	kind, tag string
	body      []byte
}

func newAsset(kind string, body []byte) asset {
	sum := sha256.Sum256(body)
	return asset{kind, `"` + base64.RawURLEncoding.EncodeToString(sum[:12]) + `"`, body}
}

var assets = map[string]asset{
	"tank.css": newAsset("text/css; charset=utf-8", []byte(pagekit.Style+"\n"+tankStyle)),
	"tank.js":  newAsset("text/javascript; charset=utf-8", tankScript),
	"tank.svg": newAsset("image/svg+xml", tankIcon),
}

// showStatic answers with a file. Browsers keep it and ask whether it has changed.
func (s *Server) showStatic(v *visit) error {
	a, ok := assets[v.r.PathValue("file")]
	if !ok {
		return notFound(v.r)
	}
	h := v.w.Header()
	h.Set("Cache-Control", "no-cache")
	h.Set("ETag", a.tag)
	if v.r.Header.Get("If-None-Match") == a.tag {
		v.status = http.StatusNotModified
		v.w.WriteHeader(v.status)
		return nil
	}
	v.send(http.StatusOK, a.kind, a.body)
	return nil
}

// problem is an error in a form: its text, what to type instead, and the id of the
// field.
type problem struct{ Text, Hint, Field string }

// problemOf is err as a problem of a form whose fields have these ids; one that is
// about no field in particular leads to the first.
func problemOf(err error, ids ...string) (*problem, int) {
	r := refused(err)
	p := &problem{Text: r.Text, Hint: r.Hint, Field: ids[0]}
	for _, id := range ids {
		if id == r.Field {
			p.Field = id
		}
	}
	return p, r.Status
}

// mistyped reports whether err is about what was typed, so that the form is shown
// again. What is gone, or failed, has a page of its own.
func mistyped(err error) bool {
	switch refused(err).Status {
	case http.StatusUnprocessableEntity, http.StatusConflict, http.StatusServiceUnavailable:
		return true
	}
	return false
}
