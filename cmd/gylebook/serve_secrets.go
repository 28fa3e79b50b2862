package main

import (
	"bufio"
	"bytes"
	"crypto/rand"
	"crypto/tls"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"net"
	"os"
	"path/filepath"
	"strings"
	"time"

	"github.com/adrg/xdg"
	"github.com/urfave/cli/v2"
	"golang.org/x/term"

	"gylebook/tables/web"
)

// Files of serve in the folder for settings: the hash of the passphrase, the
// certificate and its key. Only their owner reads them.
const (
	hashFile        = "passphrase.hash"
	certificateFile = "certificate.pem"
	keyFile         = "key.pem"
)

func settingsFile(name string) string { return filepath.Join(xdg.ConfigHome, "gylebook", name) }

// loopback reports whether an address is on this computer alone.
func loopback(address string) bool { return web.CheckListen(address, false, false) == nil }

// secretFor is the hash of the passphrase: of the file named, else the one kept here
// where the address asks for one; nil when there is none.
func (b *bench) secretFor(c *cli.Context) (*web.Hash, error) {
	if name := c.String("passphrase-file"); name != "" {
		secret, err := firstLine(name)
		if err != nil {
			return nil, err
		}
		return hashOf(secret)
	}
	if loopback(c.String("listen")) {
		return nil, nil
	}
	text, err := os.ReadFile(settingsFile(hashFile))
	if errors.Is(err, fs.ErrNotExist) {
		return nil, nil
	}
	if err != nil {
		return nil, noInput(err)
	}
	h, err := web.ParseHash(strings.TrimSpace(string(text)))
	if err != nil {
		return nil, dataError("gylebook serve --new-passphrase makes a new one", "%s: %v", settingsFile(hashFile), err)
	}
	return &h, nil
}

func hashOf(secret []byte) (*web.Hash, error) {
	h, err := web.HashPassphrase(secret, rand.Reader)
	if err != nil {
		return nil, dataError("choose a longer one: some words are easier to type than signs", "passphrase: %v", err)
	}
	return &h, nil
}

func noInput(err error) error { return &exitError{exitNoInput, err.Error(), ""} }

func firstLine(name string) ([]byte, error) {
	f, err := os.Open(name)
	if err != nil {
		return nil, noInput(err)
	}
	defer func() { _ = f.Close() }()
	return lineOf(f)
}

func lineOf(r io.Reader) ([]byte, error) {
	line, err := bufio.NewReaderSize(io.LimitReader(r, 4096), 4096).ReadBytes('\n')
	if err != nil && !errors.Is(err, io.EOF) {
		return nil, err
	}
	return bytes.TrimRight(line, "\r\n"), nil
}

// newPassphrase asks for a passphrase, twice on a terminal, and keeps its hash.
func (b *bench) newPassphrase(c *cli.Context) error {
	secret, err := b.askSecret(c.String("passphrase-file"))
	if err != nil {
		return err
	}
	h, err := hashOf(secret)
	if err != nil {
		return err
	}
	if err := keepPrivate(hashFile, []byte(string(*h)+"\n")); err != nil {
		return err
	}
	_, err = fmt.Fprintf(b.out, "passphrase kept as a hash in %s\n", settingsFile(hashFile))
	return err
}

func (b *bench) askSecret(file string) ([]byte, error) {
	if file != "" {
		return firstLine(file)
	}
	if !b.interactive() {
		return lineOf(b.in)
	}
	fd := int(b.in.(*os.File).Fd())
	var typed [2][]byte
	for k, question := range []string{"passphrase", "again"} {
		fmt.Fprintf(b.err, "%s? ", question)
		line, err := term.ReadPassword(fd)
		fmt.Fprintln(b.err)
		if err != nil {
			return nil, err
		}
		typed[k] = line
	}
	if !bytes.Equal(typed[0], typed[1]) {
		return nil, dataError("type it again", "the two passphrases differ; nothing was kept")
	}
	return typed[0], nil
}

// pairFor is the certificate with its key: the files named, else those made here
// where the address asks for them; nil when there is none.
func (b *bench) pairFor(c *cli.Context) (*tls.Config, error) {
	cert, key := c.String("certificate"), c.String("key")
	switch {
	case (cert == "") != (key == ""):
		return nil, usageError("", "--certificate and --key belong together")
	case cert == "" && loopback(c.String("listen")):
		return nil, nil
	case cert == "":
		cert, key = settingsFile(certificateFile), settingsFile(keyFile)
		if _, err := os.Stat(cert); errors.Is(err, fs.ErrNotExist) {
			return nil, nil
		}
	}
	certPEM, err := os.ReadFile(cert)
	if err != nil {
		return nil, noInput(err)
	}
	keyPEM, err := os.ReadFile(key)
	if err != nil {
		return nil, noInput(err)
	}
	config, _, err := web.ServerTLS(certPEM, keyPEM)
	if err != nil {
		return nil, dataError("gylebook serve --new-certificate makes a pair", "%s and %s: %v", cert, key, err)
	}
	return config, nil
}

// newCertificate makes a certificate that signs itself, for the names given.
func (b *bench) newCertificate(c *cli.Context) error {
	hosts := c.StringSlice("host")
	if host, _, err := net.SplitHostPort(c.String("listen")); err == nil && host != "" {
		if ip := net.ParseIP(host); ip == nil || !ip.IsUnspecified() {
			hosts = append(hosts, host)
		}
	}
	cert, key, fingerprint, err := web.NewCertificate(hosts, time.Now(), rand.Reader)
	if err != nil {
		return dataError("", "--new-certificate: %v", err)
	}
	if err := keepPrivate(keyFile, key); err != nil {
		return err
	}
	if err := keepPrivate(certificateFile, cert); err != nil {
		return err
	}
	_, err = fmt.Fprintf(b.out, "certificate for %s, one year\nkept in %s\nSHA-256 %s\n",
		strings.Join(hosts, ", "), settingsFile(certificateFile), fingerprint)
	return err
}

// keepPrivate writes a file of serve, for its owner's eyes alone.
func keepPrivate(name string, content []byte) error {
	whole := settingsFile(name)
	if err := os.MkdirAll(filepath.Dir(whole), 0o700); err != nil {
		return cannotWrite(whole, err)
	}
	return overFile(whole, ownOnly, func(w io.Writer) error {
		_, err := w.Write(content)
		return err
	})
}
