package page

import (
	"html/template"
	"slices"
	"strings"
	"testing"

	"golang.org/x/net/html"
)

// parse reads a fragment as a browser does.
func parse(t *testing.T, fragment template.HTML) *html.Node {
	t.Helper()
	doc, err := html.Parse(strings.NewReader("<!DOCTYPE html><title>t</title>" + string(fragment)))
	if err != nil {
		t.Fatal(err)
	}
	return doc
}

// all are the elements of that name, in order; "" is every element.
func all(n *html.Node, name string) []*html.Node {
	var out []*html.Node
	for d := range n.Descendants() {
		if d.Type == html.ElementNode && (name == "" || d.Data == name) {
			out = append(out, d)
		}
	}
	return out
}

func attr(n *html.Node, key string) string {
	for _, a := range n.Attr {
		if a.Key == key {
			return a.Val
		}
	}
	return ""
}

// said is the text of n, spaces made single.
func said(n *html.Node) string {
	var b strings.Builder
	for d := range n.Descendants() {
		if d.Type == html.TextNode {
			b.WriteString(d.Data)
		}
	}
	return strings.Join(strings.Fields(b.String()), " ")
}

func texts(nodes []*html.Node) []string {
	out := make([]string, len(nodes))
	for i, n := range nodes {
		out[i] = said(n)
	}
	return out
}

func same(t *testing.T, what string, got, want []string) {
	t.Helper()
	if !slices.Equal(got, want) {
		t.Errorf("%s: %q, want %q", what, got, want)
	}
}
