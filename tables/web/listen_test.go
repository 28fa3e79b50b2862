package web

import (
	"crypto/ecdsa"
	"crypto/elliptic"
	"crypto/rand"
	"crypto/tls"
	"crypto/x509"
	"encoding/pem"
	"strings"
	"testing"
	"time"
)

func TestCheckListen(t *testing.T) {
	for _, c := range []struct {
		addr        string
		secret, tls bool
		want        string // part of the error, "" for none
	}{
		{"127.0.0.1:8080", false, false, ""},
		{"[::1]:8080", false, false, ""},
		{"localhost:8080", false, false, ""},
		{"127.1.2.3:0", false, false, ""},
		{"0.0.0.0:8380", true, true, ""},
		{":8380", true, true, ""},
		{"192.0.2.7:8380", true, true, ""},
		{"0.0.0.0:8380", false, false, "a passphrase and TLS"},
		{"0.0.0.0:8380", true, false, "wanted TLS"},
		{"0.0.0.0:8380", false, true, "wanted a passphrase"},
		{":8380", false, false, "every address"},
		{"192.0.2.7:8380", false, false, "127.0.0.1:8380"},
		{"[::]:8380", false, false, "a passphrase and TLS"},
		{"cellar.example:8380", false, false, "a passphrase and TLS"},
		{"localhost.example:80", true, false, "wanted TLS"},
		{"[::ffff:192.0.2.7]:80", false, false, "a passphrase and TLS"},
		{"8080", true, true, "HOST:PORT"},
		{"", false, false, "HOST:PORT"},
		{"127.0.0.1:", false, false, "HOST:PORT"},
	} {
		err := CheckListen(c.addr, c.secret, c.tls)
		if c.want == "" && err != nil || c.want != "" && (err == nil || !strings.Contains(err.Error(), c.want)) {
			t.Errorf("%q secret=%v tls=%v: %v, wanted %q", c.addr, c.secret, c.tls, err, c.want)
		}
	}
}

func TestNewRefuses(t *testing.T) {
	good := Config{Listen: testHost, Now: time.Now, Rand: rand.Reader}
	bad := Hash("x")
	for name, change := range map[string]func(*Config){
		"open to all":  func(c *Config) { c.Listen = "0.0.0.0:80" },
		"no clock":     func(c *Config) { c.Now = nil },
		"no chance":    func(c *Config) { c.Rand = nil },
		"no hash":      func(c *Config) { c.Passphrase = &bad },
		"no host name": func(c *Config) { c.Names = []string{"http://cellar.example"} },
	} {
		cfg := good
		change(&cfg)
		if _, err := New(&fakeDesk{}, cfg); err == nil {
			t.Errorf("%s: taken", name)
		}
	}
	if _, err := New(nil, good); err == nil {
		t.Error("no desk: taken")
	}
}

func TestCertificate(t *testing.T) {
	now := time.Date(2026, 11, 18, 12, 0, 0, 0, time.UTC)
	certPEM, keyPEM, print, err := NewCertificate([]string{"cellar.example", "192.0.2.7", "[2001:db8::1]"}, now, rand.Reader)
	if err != nil {
		t.Fatal(err)
	}
	block, rest := pem.Decode(certPEM)
	if block == nil || len(rest) > 0 {
		t.Fatalf("certificate %q", certPEM)
	}
	c, err := x509.ParseCertificate(block.Bytes)
	if err != nil {
		t.Fatal(err)
	}
	for host, want := range map[string]bool{"cellar.example": true, "192.0.2.7": true, "2001:db8::1": true, "other.example": false, "192.0.2.8": false} {
		if got := c.VerifyHostname(host) == nil; got != want {
			t.Errorf("%s: %v, wanted %v", host, got, want)
		}
	}
	key, ok := c.PublicKey.(*ecdsa.PublicKey)
	if !ok || key.Curve != elliptic.P256() || c.IsCA || c.SerialNumber.Sign() <= 0 {
		t.Errorf("key %T, CA %v, serial %v", c.PublicKey, c.IsCA, c.SerialNumber)
	}
	if now.Before(c.NotBefore) || !c.NotAfter.Equal(now.AddDate(1, 0, 0)) {
		t.Errorf("from %v to %v, wanted a year from %v", c.NotBefore, c.NotAfter, now)
	}
	if len(print) != 32*3-1 || strings.Count(print, ":") != 31 || strings.ToUpper(print) != print {
		t.Errorf("fingerprint %q, wanted 32 pairs", print)
	}
	cfg, again, err := ServerTLS(certPEM, keyPEM)
	if err != nil || again != print || cfg.MinVersion < tls.VersionTLS12 {
		t.Errorf("%v, fingerprint %q, wanted %q", err, again, print)
	}
	if _, _, err := ServerTLS(certPEM, certPEM); err == nil {
		t.Error("a key that is none was taken")
	}
	for _, hosts := range [][]string{nil, {"a b"}, {""}} {
		if _, _, _, err := NewCertificate(hosts, now, rand.Reader); err == nil {
			t.Errorf("hosts %q taken", hosts)
		}
	}
}
