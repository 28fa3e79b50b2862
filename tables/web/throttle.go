package web

import (
	"math"
	"net"
	"net/netip"
	"sync"
	"time"
)

// Attempts to log in: so many at once, then one each interval.
const (
	burstAddress    = 5
	everyAddress    = 20 * time.Second
	burstAll        = 20
	everyAll        = 4 * time.Second
	throttleEntries = 1024
)

// throttle counts attempts to log in, each address by itself and all together.
type throttle struct {
	now func() time.Time

	mu   sync.Mutex
	all  bucket
	each map[netip.Prefix]*bucket
}

// bucket fills with time and is emptied by attempts.
type bucket struct {
	used float64 // attempts not yet paid for by time
	at   time.Time
}

// drain forgets what time has paid for since.
func (b *bucket) drain(now time.Time, every time.Duration) {
	if passed := now.Sub(b.at); passed > 0 {
		b.used = math.Max(0, b.used-float64(passed)/float64(every))
		b.at = now
	}
}

// wait is how long until another attempt fits in.
func (b *bucket) wait(burst int, every time.Duration) time.Duration {
	over := b.used + 1 - float64(burst)
	if over <= 0 {
		return 0
	}
	return time.Duration(over * float64(every))
}

// take counts one attempt from a remote address. If it is one too many it says how
// long to wait.
func (t *throttle) take(remote string) (time.Duration, bool) {
	now := t.now()
	t.mu.Lock()
	defer t.mu.Unlock()
	from := t.bucketOf(remote, now)
	from.drain(now, everyAddress)
	t.all.drain(now, everyAll)
	if wait := max(from.wait(burstAddress, everyAddress), t.all.wait(burstAll, everyAll)); wait > 0 {
		return wait, false
	}
	from.used++
	t.all.used++
	return 0, true
}

// forgive forgets the attempts of an address that has given the passphrase.
func (t *throttle) forgive(remote string) {
	t.mu.Lock()
	defer t.mu.Unlock()
	delete(t.each, network(remote))
}

// bucketOf finds or makes the bucket of an address. When there are too many, those
// that time has emptied go; if none is, the newcomers share one.
func (t *throttle) bucketOf(remote string, now time.Time) *bucket {
	key := network(remote)
	if b := t.each[key]; b != nil {
		return b
	}
	if len(t.each) >= throttleEntries {
		for k, b := range t.each {
			if b.drain(now, everyAddress); b.used == 0 {
				delete(t.each, k)
			}
		}
	}
	if len(t.each) >= throttleEntries {
		key = netip.Prefix{}
		if b := t.each[key]; b != nil {
			return b
		}
	}
	b := &bucket{at: now}
	t.each[key] = b
	return b
}

// network is what counts as one address: for IPv6 a /64, for one machine has all
// of that.
func network(remote string) netip.Prefix {
	host, _, err := net.SplitHostPort(remote)
	if err != nil {
		host = remote
	}
	ip, err := netip.ParseAddr(host)
	if err != nil {
		return netip.Prefix{}
	}
	bits := 32
	if ip = ip.Unmap().WithZone(""); ip.Is6() {
		bits = 64
	}
	p, err := ip.Prefix(bits)
	if err != nil {
		return netip.Prefix{}
	}
	return p
}
