package web

import (
	"fmt"
	"strings"
	"testing"

	"golang.org/x/net/html"
)

func parse(t *testing.T, text string) *html.Node {
	t.Helper()
	n, err := html.Parse(strings.NewReader(text))
	if err != nil {
		t.Fatal(err)
	}
	return n
}

// all are the elements of a name below n, every element for "".
func all(n *html.Node, name string) []*html.Node {
	var out []*html.Node
	for c := range n.Descendants() {
		if c.Type == html.ElementNode && (name == "" || c.Data == name) {
			out = append(out, c)
		}
	}
	return out
}

func attr(n *html.Node, name string) string {
	value, _ := attribute(n, name)
	return value
}

func attribute(n *html.Node, name string) (string, bool) {
	for _, a := range n.Attr {
		if a.Key == name {
			return a.Val, true
		}
	}
	return "", false
}

func textOf(n *html.Node) string {
	var b strings.Builder
	for c := range n.Descendants() {
		if c.Type == html.TextNode {
			b.WriteString(c.Data)
		}
	}
	return strings.Join(strings.Fields(b.String()), " ")
}

// faults are what is wrong with the structure of a page.
func faults(root *html.Node) []string {
	var out []string
	fault := func(format string, args ...any) { out = append(out, fmt.Sprintf(format, args...)) }
	ids, labels := map[string]bool{}, map[string]string{}
	for _, n := range all(root, "") {
		if id, has := attribute(n, "id"); has {
			if id == "" || strings.ContainsAny(id, " \t\n") || ids[id] {
				fault("id %q is empty, has a space or is there twice", id)
			}
			ids[id] = true
		}
	}
	for _, n := range all(root, "label") {
		labels[attr(n, "for")] = textOf(n)
	}
	for _, name := range []string{"h1", "main", "title"} {
		if found := all(root, name); len(found) != 1 || textOf(found[0]) == "" {
			fault("%d of %s, wanted one with text", len(found), name)
		}
	}
	if lang := attr(all(root, "html")[0], "lang"); lang != "en" {
		fault("lang %q", lang)
	}
	for _, n := range all(root, "") {
		if _, has := attribute(n, "style"); has {
			fault("style attribute on %s", n.Data)
		}
		for _, a := range n.Attr {
			if strings.HasPrefix(a.Key, "on") {
				fault("handler %s on %s", a.Key, n.Data)
			}
			switch a.Key {
			case "aria-describedby", "aria-labelledby":
				for _, id := range strings.Fields(a.Val) {
					if !ids[id] {
						fault("%s of %s names %q, which is not there", a.Key, n.Data, id)
					}
				}
			case "href", "src", "action", "srcset":
				if target, local := strings.CutPrefix(a.Val, "#"); local && !ids[target] {
					fault("link to #%s, which is not there", target)
				} else if !local && (!strings.HasPrefix(a.Val, "/") || strings.HasPrefix(a.Val, "//")) {
					fault("%s=%q leads elsewhere", a.Key, a.Val)
				}
			}
		}
		switch n.Data {
		case "input", "select", "textarea":
			if attr(n, "type") != "hidden" && labels[attr(n, "id")] == "" {
				fault("%s %q has no label", n.Data, attr(n, "name"))
			}
			if attr(n, "type") == "text" && attr(n, "autocomplete") == "" {
				fault("input %q lets the browser fill it in", attr(n, "name"))
			}
		case "button", "a":
			if textOf(n) == "" {
				fault("%s without text", n.Data)
			}
		case "img":
			if attr(n, "alt") == "" {
				fault("picture without alt")
			}
		case "style":
			fault("inline style")
		case "script":
			if attr(n, "src") == "" || n.FirstChild != nil {
				fault("inline script")
			}
		}
	}
	level := 0
	for _, n := range all(root, "") {
		if len(n.Data) == 2 && n.Data[0] == 'h' && n.Data[1] >= '1' && n.Data[1] <= '6' {
			now := int(n.Data[1] - '0')
			if now > level+1 {
				fault("heading of level %d after %d: %q", now, level, textOf(n))
			}
			level = now
		}
	}
	return out
}

// The checker must be able to fail.
func TestFaults(t *testing.T) {
	const good = `<html lang="en"><head><title>x</title></head><body><main><h1>x</h1>%s</main></body></html>`
	for _, c := range []struct{ body, want string }{
		{``, ""},
		{`<label for="a">A</label><input id="a" name="a">`, ""},
		{`<input id="a" name="a">`, "has no label"},
		{`<p id="a"></p><p id="a"></p>`, "there twice"},
		{`<h1>y</h1>`, "2 of h1"},
		{`<h3>y</h3>`, "heading of level 3"},
		{`<p style="x">`, "style attribute"},
		{`<p onclick="x">`, "handler onclick"},
		{`<script>x</script>`, "inline script"},
		{`<a href="#b">y</a>`, "link to #b"},
		{`<a href="https://cellar.example/">y</a>`, "leads elsewhere"},
		{`<p aria-describedby="b"></p>`, "names \"b\""},
	} {
		got := strings.Join(faults(parse(t, fmt.Sprintf(good, c.body))), "; ")
		if c.want == "" && got != "" || !strings.Contains(got, c.want) {
			t.Errorf("%s: %q, wanted %q", c.body, got, c.want)
		}
	}
}
