package web

import (
	"fmt"
	"net"
	"net/netip"
	"strings"
)

// CheckListen refuses an address, HOST:PORT, that others can reach unless there are
// both a passphrase and TLS. Only 127.0.0.0/8, [::1] and localhost are the machine
// itself; an empty host is every address of the machine. The error says what is
// needed.
func CheckListen(addr string, haveSecret, haveTLS bool) error {
	host, port, err := net.SplitHostPort(addr)
	if err != nil || port == "" {
		return fmt.Errorf("read address %.80q, wanted HOST:PORT, as 127.0.0.1:8080 or [::1]:8080", addr)
	}
	if loopback(host) || haveSecret && haveTLS {
		return nil
	}
	where := "an address that others can reach"
	if host == "" {
		where = "every address of the machine"
	}
	need := "a passphrase and TLS"
	switch {
	case haveSecret:
		need = "TLS"
	case haveTLS:
		need = "a passphrase"
	}
	return fmt.Errorf("read address %.80q, %s, wanted %s with it; or listen on 127.0.0.1:%s for this machine alone", addr, where, need, port)
}

// loopback reports whether a host is the machine itself. A name other than
// localhost may mean another address tomorrow, so it is not.
func loopback(host string) bool {
	if strings.EqualFold(host, "localhost") {
		return true
	}
	ip, err := netip.ParseAddr(host)
	return err == nil && ip.Unmap().IsLoopback()
}

// hosts are the names that a request may be sent to. A page of another site can
// have its own name resolved to this machine (DNS rebinding); the name in the Host
// header gives it away.
type hosts struct {
	names   map[string]bool
	anyAddr bool // listening on every address: the one that the connection came to
}

func newHosts(listen string, names []string) (hosts, error) {
	h := hosts{names: map[string]bool{}}
	for _, name := range names {
		host, ok := hostOf(name)
		if !ok {
			return hosts{}, fmt.Errorf("read host name %.80q, wanted a name or an address, as cellar.example or 192.0.2.7", name)
		}
		h.names[host] = true
	}
	host, _, err := net.SplitHostPort(listen)
	if err != nil {
		return hosts{}, fmt.Errorf("read address %.80q, wanted HOST:PORT", listen)
	}
	if ip, err := netip.ParseAddr(host); host == "" || err == nil && ip.IsUnspecified() {
		h.anyAddr = true
	} else if name, ok := hostOf(net.JoinHostPort(host, "0")); ok {
		h.names[name] = true
	}
	if loopback(host) {
		for _, name := range []string{"localhost", "127.0.0.1", "::1"} {
			h.names[name] = true
		}
	}
	return h, nil
}

// allow reports whether a Host header names this server. local is the address that
// the connection came to, nil if not known. The port may differ: a tunnel changes
// it, and another port is no other machine.
func (h hosts) allow(header string, local net.Addr) bool {
	host, ok := hostOf(header)
	if !ok {
		return false
	}
	if h.names[host] {
		return true
	}
	at, isTCP := local.(*net.TCPAddr)
	if !h.anyAddr || !isTCP {
		return false
	}
	ip, err := netip.ParseAddr(host)
	return err == nil && ip == at.AddrPort().Addr().Unmap().WithZone("")
}

// hostOf is the host of a Host header in one form: lower-case, an address as
// netip prints it and without brackets.
func hostOf(header string) (string, bool) {
	host := header
	if strings.HasPrefix(header, "[") || strings.Count(header, ":") == 1 {
		var port string
		var err error
		if host, port, err = net.SplitHostPort(header); err != nil {
			if host, port = strings.Trim(header, "[]"), ""; "["+host+"]" != header {
				return "", false
			}
		}
		if strings.Trim(port, "0123456789") != "" || len(port) > 5 {
			return "", false
		}
	}
	if ip, err := netip.ParseAddr(host); err == nil {
		return ip.Unmap().String(), ip.Zone() == ""
	}
	for _, r := range host {
		if !(r >= 'a' && r <= 'z' || r >= 'A' && r <= 'Z' || r >= '0' && r <= '9' || r == '-' || r == '.' || r == '_') {
			return "", false
		}
	}
	return strings.ToLower(host), host != ""
}
