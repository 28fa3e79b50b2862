package main

import (
	"context"
	"crypto/rand"
	"crypto/tls"
	"errors"
	"fmt"
	"net"
	"os"
	"os/signal"
	"strings"
	"sync"
	"syscall"
	"time"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/tables/web"
)

// defaultListen is on this computer alone.
const defaultListen = "127.0.0.1:8380"

func (b *bench) serveCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "serve", Usage: "the page by the tank, for a phone or a shared laptop", ArgsUsage: " ",
		Description: `Open vessels, readings read back before they are stored, undo, the course of a batch, and a bench page. Serves this
			computer alone unless --listen names another address: that needs a passphrase (--new-passphrase) and a certificate
			(--new-certificate, or --certificate and --key). Names that browsers use for this computer are given with --host.
			Ctrl-C ends it when what is being stored is on disk.`,
		Flags: []cli.Flag{
			&cli.StringFlag{Name: "listen", Value: defaultListen, Usage: "`ADDRESS:PORT`"},
			&cli.StringSliceFlag{Name: "host", Usage: "`NAME` under which browsers reach it, may stand several times"},
			&cli.StringFlag{Name: "certificate", Usage: "`FILE` of the TLS certificate; the one made here unless given"},
			&cli.StringFlag{Name: "key", Usage: "`FILE` of its key"},
			&cli.StringFlag{Name: "passphrase-file", Usage: "`FILE` whose first line is the passphrase"},
			&cli.BoolFlag{Name: "new-passphrase", Usage: "ask for a passphrase, keep its hash, end"},
			&cli.BoolFlag{Name: "new-certificate", Usage: "make a certificate for --host and --listen, print its fingerprint, end"},
		},
	}, `gylebook serve
		gylebook serve --new-passphrase
		gylebook serve --new-certificate --host cellar.local
		gylebook serve --listen 0.0.0.0:8380 --host cellar.local`, b.serve)
}

func (b *bench) serve(c *cli.Context) error {
	if c.Args().Len() > 0 {
		return wanted(c, "none")
	}
	if err := b.pageForm(c, "it prints no figures"); err != nil {
		return err
	}
	switch {
	case c.Bool("new-passphrase"):
		return b.newPassphrase(c)
	case c.Bool("new-certificate"):
		return b.newCertificate(c)
	}
	secret, err := b.secretFor(c)
	if err != nil {
		return err
	}
	pair, err := b.pairFor(c)
	if err != nil {
		return err
	}
	if err := web.CheckListen(c.String("listen"), secret != nil, pair != nil); err != nil {
		hint := "gylebook serve --new-passphrase, then gylebook serve --new-certificate --host NAME"
		if web.CheckListen(c.String("listen"), true, true) != nil { // no address at all
			hint = "type an address and a port, such as " + defaultListen
		}
		return usageError(hint, "--listen: %v", err)
	}
	return b.withJournal(c.Context, func(s journal.Store) error {
		d := &desk{store: s, flags: deskFlags(c), now: b.clock}
		if d.file, err = os.Stat(b.place()); err != nil {
			return err
		}
		d.place = b.place()
		server, err := web.New(d, web.Config{
			Listen: c.String("listen"), Names: c.StringSlice("host"), Passphrase: secret, TLS: pair != nil,
			Now: time.Now, Rand: rand.Reader, Log: b.err,
		})
		if err != nil {
			return err
		}
		// The first visitors do not wait for the forecasts.
		ctx, stop := context.WithCancel(c.Context)
		var ready sync.WaitGroup
		ready.Go(func() { d.warm(ctx) })
		defer func() { stop(); ready.Wait() }()
		return b.serving(c, server, pair)
	})
}

// clock is the time in the zone of the cellar: SOURCE_DATE_EPOCH, which stands still,
// or that of the computer.
func (b *bench) clock() time.Time {
	if os.Getenv("SOURCE_DATE_EPOCH") != "" {
		return b.set.now.In(time.Local)
	}
	return time.Now().In(time.Local)
}

// deskFlags are the settings of this run that the pages keep.
func deskFlags(c *cli.Context) []string {
	var flags []string
	for _, name := range []string{"units", "scale"} {
		if v := c.String(name); v != "" {
			flags = append(flags, "--"+name+"="+v)
		}
	}
	return flags
}

// serving listens until an interrupt or a request to end, and then until what was
// asked before it is answered.
func (b *bench) serving(c *cli.Context, server *web.Server, pair *tls.Config) error {
	listener, err := net.Listen(family(c.String("listen")), c.String("listen"))
	if err != nil {
		return &exitError{exitFailed, fmt.Sprintf("cannot listen at %s: %v", c.String("listen"), reason(err)), "another gylebook serve may run there; --listen names another address"}
	}
	scheme := "http"
	if pair != nil {
		scheme = "https"
		listener = tls.NewListener(listener, pair)
	}
	ctx, stop := signal.NotifyContext(c.Context, syscall.SIGTERM)
	defer stop()
	defer gently()()
	b.note("gylebook serves %s://%s, Ctrl-C ends it", scheme, openedAt(listener.Addr(), c.StringSlice("host")))
	err = server.Serve(ctx, listener)
	if errors.Is(err, context.Canceled) || err == nil {
		b.note("ended; what was stored is on disk")
		return nil
	}
	return &exitError{exitFailed, err.Error(), ""}
}

// family is the network of an address. 0.0.0.0 is every address of IPv4, and not of
// IPv6 besides.
func family(address string) string {
	host, _, err := net.SplitHostPort(address)
	if ip := net.ParseIP(host); err == nil && ip != nil && ip.To4() != nil && !strings.Contains(host, ":") {
		return "tcp4"
	}
	return "tcp"
}

// openedAt is what a browser is told: the address, or the first name of this computer
// where the address is every one.
func openedAt(at net.Addr, names []string) string {
	host, port, err := net.SplitHostPort(at.String())
	if ip := net.ParseIP(host); err == nil && ip != nil && ip.IsUnspecified() && len(names) > 0 && !strings.Contains(names[0], ":") {
		return net.JoinHostPort(names[0], port)
	}
	return at.String()
}

// reason is what the system said, without the address again.
func reason(err error) error {
	var op *net.OpError
	if errors.As(err, &op) {
		return op.Err
	}
	return err
}
