package main

import (
	"crypto/sha256"
	"crypto/tls"
	"crypto/x509"
	"encoding/pem"
	"fmt"
	"net/http"
	"net/url"
	"os"
	"regexp"
	"strings"
	"testing"
)

// Where others reach it: over TLS with the certificate made here, by the passphrase,
// and what is stored stands under the name given at the log-in.
func TestServeToOthers(t *testing.T) {
	t.Parallel()
	s := newServed(t)
	secret := s.place + ".secret"
	if err := os.WriteFile(secret, []byte(passphrase+"\n"), 0o600); err != nil {
		t.Fatal(err)
	}
	made := s.run("serve", "--new-certificate", "--host", "cellar.example", "--host", "127.0.0.1")
	kept := regexp.MustCompile(`kept in (\S+)`).FindStringSubmatch(made)
	if kept == nil {
		t.Fatalf("--new-certificate printed %s", made)
	}
	text, err := os.ReadFile(kept[1])
	if err != nil {
		t.Fatal(err)
	}
	block, _ := pem.Decode(text)
	if print := strings.ReplaceAll(fmt.Sprintf("% X", sha256.Sum256(block.Bytes)), " ", ":"); !strings.Contains(made, print) {
		t.Errorf("--new-certificate printed %s, the file has %s", made, print)
	}
	roots := x509.NewCertPool()
	if !roots.AppendCertsFromPEM(text) {
		t.Fatal("the certificate cannot be read")
	}
	s.start("--listen", "0.0.0.0:0", "--passphrase-file", secret, "--host", "cellar.example")
	if !strings.HasPrefix(s.url, "https://cellar.example:") {
		t.Errorf("it says that it serves %s, wanted the name of the computer", s.url)
	}
	port := s.url[strings.LastIndexByte(s.url, ':'):]
	v := newVisitor("https://127.0.0.1"+port, &tls.Config{RootCAs: roots})
	before := len(s.exported())

	moved := v.see(t, "/batch/LB-17").expect(t, "a page before the log-in", http.StatusSeeOther)
	at := moved.header.Get("Location")
	if at != "/login?next=%2Fbatch%2FLB-17" {
		t.Errorf("led to %s", at)
	}
	v.see(t, "/batch/LB-17/curve.svg").expect(t, "a picture before the log-in", http.StatusForbidden)
	page := v.see(t, at).expect(t, "the log-in", http.StatusOK)
	early := page.header.Get("Set-Cookie")
	form := page.form("/login")
	form.Set("operator", "ines")
	form.Set("passphrase", passphrase)
	in := v.do(t, "/login", form).expect(t, "the passphrase", http.StatusSeeOther)
	if in.header.Get("Location") != "/batch/LB-17" {
		t.Errorf("led to %s", in.header.Get("Location"))
	}
	cookie := in.header.Get("Set-Cookie")
	for _, flag := range []string{"__Host-", "Secure", "HttpOnly", "SameSite=Strict", "Path=/"} {
		if !strings.Contains(cookie, flag) {
			t.Errorf("cookie %q, wanted %s in it", cookie, flag)
		}
	}
	if early == "" || early == cookie {
		t.Errorf("the session before the log-in is that after it: %q, %q", early, cookie)
	}
	// Somebody else's name in the form does not count.
	confirm, back, err := v.readBack("LB-17", "1.0115", "20", "")
	if err != nil {
		t.Fatal(err)
	}
	back.expect(t, "a reading", http.StatusOK)
	v.do(t, "/batch/LB-17/store", confirm).expect(t, "a store", http.StatusSeeOther)
	all := s.exported()
	if len(all) != before+1 || all[before].By != "ines" {
		t.Fatalf("stored %+v, wanted one reading by ines", all[before:])
	}

	v.do(t, "/logout", url.Values{"token": {v.see(t, "/").form("/logout").Get("token")}})
	v.see(t, "/").expect(t, "the board after logging out", http.StatusSeeOther)
	page = v.see(t, "/login")
	form = page.form("/login")
	form.Set("operator", "ines")
	form.Set("passphrase", "amber lantern on the stairs")
	for k := range 5 {
		v.do(t, "/login", form).expect(t, fmt.Sprintf("wrong passphrase %d", k+1), http.StatusUnprocessableEntity)
	}
	late := v.do(t, "/login", form).expect(t, "one attempt too many", http.StatusTooManyRequests)
	if late.header.Get("Retry-After") == "" {
		t.Error("no word of when to try again")
	}
	form.Set("passphrase", passphrase)
	v.do(t, "/login", form).expect(t, "the passphrase at once after them", http.StatusTooManyRequests)
	if said := s.stderr(); strings.Contains(said, "amber") {
		t.Errorf("the log holds a passphrase: %s", said)
	}
	if got, err := newVisitor("https://[::1]"+port, &tls.Config{RootCAs: roots, ServerName: "cellar.example"}).get("/login"); err == nil {
		t.Errorf("asked for 0.0.0.0, it answers on IPv6: status %d", got.status)
	}
	// Without TLS there is nothing, and with a certificate that is not trusted no more.
	if got, err := newVisitor("http://127.0.0.1"+port, nil).get("/"); err == nil && got.status < 400 {
		t.Errorf("without TLS: status %d", got.status)
	}
	if _, err := newVisitor("https://127.0.0.1"+port, nil).get("/"); err == nil {
		t.Error("the certificate was trusted by somebody who does not know it")
	}
}
