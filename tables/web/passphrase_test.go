package web

import (
	"bytes"
	"crypto/rand"
	"errors"
	"io"
	"strings"
	"testing"
)

func TestPassphrase(t *testing.T) {
	h, err := hashOnce()
	if err != nil {
		t.Fatal(err)
	}
	if !strings.HasPrefix(string(h), "$argon2id$v=19$m=65536,t=3,p=4$") || strings.Count(string(h), "$") != 5 {
		t.Errorf("hash %q, wanted the form of PHC with the cost of RFC 9106", h)
	}
	for typed, want := range map[string]bool{
		secret: true, secret + "\n": true, " " + secret: true, "Four words of cellar": false, "": false, secret + "x": false, secret[1:]: false,
		strings.Repeat("x", MaxPassphrase+1): false, secret + "\x00": false,
	} {
		if got := h.Verify([]byte(typed)); got != want {
			t.Errorf("%q: %v, wanted %v", typed, got, want)
		}
	}
	parsed, err := ParseHash(" " + string(h) + "\n")
	if err != nil || parsed != h {
		t.Errorf("read back as %q, %v", parsed, err)
	}
	if Hash("").Verify(nil) || Hash("x").Verify([]byte("x")) {
		t.Error("what is no hash verified")
	}
}

func TestPassphraseRefused(t *testing.T) {
	for name, typed := range map[string]string{
		"short": "elevenchars", "short without the spaces": "  elevenchars  ", "long": strings.Repeat("x", MaxPassphrase+1),
		"two lines that a form cannot hold": "four words\x1bof cellar", "no UTF-8": "four words \xff\xfe", "empty": "",
	} {
		if h, err := HashPassphrase([]byte(typed), rand.Reader); err == nil {
			t.Errorf("%s: got %q", name, h)
		} else if len(typed) > 3 && strings.Contains(err.Error(), typed) {
			t.Errorf("%s: the error shows it: %v", name, err)
		}
	}
	if _, err := HashPassphrase([]byte(secret), bytes.NewReader(nil)); !errors.Is(err, io.EOF) {
		t.Errorf("without random bytes: %v", err)
	}
}

func TestParseHash(t *testing.T) {
	const salt, key = "c29tZXNhbHRzb21lc2FsdA", "AAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAA"
	if _, err := ParseHash("$argon2id$v=19$m=19456,t=2,p=1$" + salt + "$" + key); err != nil {
		t.Errorf("a hash of another cost: %v", err)
	}
	for _, text := range []string{
		"", "$", "secret words here", "$argon2i$v=19$m=65536,t=3,p=4$" + salt + "$" + key, "$argon2id$v=16$m=65536,t=3,p=4$" + salt + "$" + key,
		"$argon2id$v=19$m=4294967295,t=3,p=4$" + salt + "$" + key, "$argon2id$v=19$m=65536,t=4000000,p=4$" + salt + "$" + key,
		"$argon2id$v=19$m=65536,t=3,p=255$" + salt + "$" + key, "$argon2id$v=19$m=8,t=1,p=1$" + salt + "$" + key, "$argon2id$v=19$m=65536,t=0,p=4$" + salt + "$" + key,
		"$argon2id$v=19$t=3,m=65536,p=4$" + salt + "$" + key, "$argon2id$v=19$m=65536,t=3$" + salt + "$" + key,
		"$argon2id$v=19$m=65536,t=3,p=4$$" + key, "$argon2id$v=19$m=65536,t=3,p=4$" + salt + "$AAAA", "$argon2id$v=19$m=65536,t=3,p=4$" + salt + "$!!!",
		"$argon2id$v=19$m=-1,t=3,p=4$" + salt + "$" + key, "$argon2id$v=19$m=65536,t=3,p=4$" + salt + "$" + key + "$x",
	} {
		if h, err := ParseHash(text); err == nil {
			t.Errorf("%q read as %q", text, h)
		} else if len(text) > 20 && strings.Contains(err.Error(), salt) {
			t.Errorf("the error shows the hash: %v", err)
		}
	}
}
