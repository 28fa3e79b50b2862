package web

import (
	"context"
	"errors"
	"fmt"
	"net/http"
)

// errPanic is a page that panicked, which has its line in the log already.
var errPanic = errors.New("panic")

// headings are what an error page is called.
var headings = map[int]string{
	http.StatusBadRequest:            "Cannot be read",
	http.StatusForbidden:             "Not from here",
	http.StatusNotFound:              "Not found",
	http.StatusMethodNotAllowed:      "Not in this way",
	http.StatusRequestTimeout:        "Too slow",
	http.StatusConflict:              "Changed meanwhile",
	http.StatusRequestEntityTooLarge: "Too large",
	http.StatusUnsupportedMediaType:  "Not a form",
	http.StatusMisdirectedRequest:    "Not this server",
	http.StatusUnprocessableEntity:   "Refused",
	http.StatusTooManyRequests:       "Too many attempts",
	http.StatusServiceUnavailable:    "Not now",
}

type errorPage struct {
	Heading, Text, Hint string
	Again               string // the page to open from here
}

// fail shows an error as a page.
func (v *visit) fail(err error) {
	r := refused(err)
	gone := errors.Is(err, context.Canceled) && v.r.Context().Err() != nil
	if r.Status == http.StatusInternalServerError && !errors.Is(err, errPanic) && !gone {
		v.server.record(fmt.Sprintf("failed %s %s: %.200q", v.r.Method, v.r.URL.EscapedPath(), err.Error()))
	}
	if v.status != 0 {
		return // an answer is on its way
	}
	heading := headings[r.Status]
	if heading == "" {
		heading = "Failed"
	}
	p := errorPage{Heading: heading, Text: r.Text, Hint: r.Hint, Again: v.again}
	if v.show(r.Status, "error", page{Title: heading, Bare: v.bare, Main: p}) != nil {
		v.send(http.StatusInternalServerError, "text/plain; charset=utf-8", []byte("failed\n"))
	}
}
