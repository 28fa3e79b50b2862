package main

import (
	"fmt"
	"math/rand/v2"
	"net/http"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"sync"
	"sync/atomic"
	"time"
)

// crowd is people at a page, each with a browser. What they do is what a round
// through the cellar is made of.
type crowd struct {
	url     string
	people  int
	lasts   time.Duration
	pause   time.Duration   // between two requests, half as long to one and a half times
	typed   []crowdReading  // readings that may be stored, each many times
	minutes int             // before now, in which they were taken
	next    atomic.Int64    // reading to store, so that no two are the same
	mu      sync.Mutex      // guards what follows
	took    []time.Duration // of every request
	kinds   map[string]int  // of requests
	wrong   []string
	stored  map[int64]string // entry to operator, as the pages said
}

// crowdReading is a reading that a batch would show now.
type crowdReading struct{ batch, gravity, temp, instrument string }

// storedAs is what the page says after a store.
var storedAs = regexp.MustCompile(`stored as #(\d+)`)

// run lets them all in and returns when the last has gone.
func (c *crowd) run() {
	c.kinds, c.stored = map[string]int{}, map[int64]string{}
	end := time.Now().Add(c.lasts)
	var all sync.WaitGroup
	for p := range c.people {
		all.Go(func() {
			one := &person{crowd: c, name: fmt.Sprintf("p%03d", p), v: newVisitor(c.url, nil), dice: rand.New(rand.NewPCG(uint64(p), 1))}
			defer one.v.client.CloseIdleConnections()
			one.wait() // they do not come all in one moment
			for time.Now().Before(end) {
				one.act()
			}
		})
	}
	all.Wait()
}

// person is one of a crowd.
type person struct {
	*crowd
	name string
	v    *visitor
	dice *rand.Rand
}

func (p *person) wait() {
	if p.pause > 0 {
		time.Sleep(p.pause/2 + time.Duration(p.dice.Int64N(int64(p.pause))))
	}
}

// act does one thing, and waits after each of its pages.
func (p *person) act() {
	r := p.typed[p.dice.IntN(len(p.typed))]
	switch n := p.dice.IntN(100); {
	case n < 40:
		p.get("board", "/")
	case n < 65:
		p.get("batch", "/batch/"+r.batch)
		p.get("picture", "/batch/"+r.batch+"/curve.svg?phone=1")
	case n < 90:
		p.get("read-back", "/batch/"+r.batch+"/readback?instrument="+r.instrument+"&gravity="+r.gravity+"&temp="+r.temp)
	default:
		p.store()
	}
	p.wait()
}

// store reads a reading back and stores it: two forms, and the page after them.
func (p *person) store() {
	n := int(p.next.Add(1))
	r := p.typed[n%len(p.typed)]
	n /= len(p.typed)
	taken := time.Unix(crowdNow, 0).UTC().Add(-time.Duration(n%p.minutes) * time.Minute).Format(time.RFC3339)
	n /= p.minutes
	temp := r.temp + "." + strconv.Itoa(n%10) + strconv.Itoa(n/10%10)
	page, ok := p.get("batch", "/batch/"+r.batch)
	if !ok {
		return
	}
	form := page.form("/batch/" + r.batch + "/reading")
	for name, value := range map[string]string{"gravity": r.gravity, "temp": temp, "taken": taken, "instrument": r.instrument, "operator": p.name} {
		form.Set(name, value)
	}
	p.wait()
	back, ok := p.ask("reading", http.StatusOK, func() (shown, error) { return p.v.post("/batch/"+r.batch+"/reading", form) })
	if !ok {
		return
	}
	p.wait()
	confirm := back.form("/batch/" + r.batch + "/store")
	done, ok := p.ask("store", http.StatusSeeOther, func() (shown, error) { return p.v.post("/batch/"+r.batch+"/store", confirm) })
	if !ok {
		p.fault("%s %s at %s: %s", r.batch, r.gravity, taken, back.heading())
		return
	}
	after, ok := p.get("stored", done.header.Get("Location"))
	m := storedAs.FindStringSubmatch(after.body)
	if m == nil {
		p.fault("after a store (%v): %s", ok, after.heading())
		return
	}
	number, err := strconv.ParseInt(m[1], 10, 64)
	p.mu.Lock()
	defer p.mu.Unlock()
	if was, twice := p.stored[number]; err != nil || twice {
		p.wrong = append(p.wrong, fmt.Sprintf("#%s was told to %s and to %s", m[1], was, p.name))
	}
	p.stored[number] = p.name
}

func (p *person) get(kind, path string) (shown, bool) {
	return p.ask(kind, http.StatusOK, func() (shown, error) { return p.v.get(path) })
}

func (p *person) ask(kind string, want int, send func() (shown, error)) (shown, bool) {
	began := time.Now()
	got, err := send()
	took := time.Since(began)
	p.mu.Lock()
	defer p.mu.Unlock()
	p.took = append(p.took, took)
	p.kinds[kind]++
	if err != nil || got.status != want {
		p.wrong = append(p.wrong, fmt.Sprintf("%s: status %d, %s, %v", kind, got.status, got.heading(), err))
		return got, false
	}
	return got, true
}

func (p *person) fault(format string, args ...any) {
	p.mu.Lock()
	defer p.mu.Unlock()
	p.wrong = append(p.wrong, fmt.Sprintf(format, args...))
}

// figures are the number of requests and how long they took.
func (c *crowd) figures() string {
	slices.Sort(c.took)
	at := func(part float64) float64 {
		if len(c.took) == 0 {
			return 0
		}
		return float64(c.took[int(part*float64(len(c.took)-1))].Microseconds()) / 1000
	}
	var kinds []string
	for kind, n := range c.kinds {
		kinds = append(kinds, fmt.Sprintf("%s %d", kind, n))
	}
	slices.Sort(kinds)
	return fmt.Sprintf("%d people, %v: %d requests (%s), %.0f a second, %d errors, %d stored, median %.1f ms, 99 %% within %.1f ms, longest %.1f ms",
		c.people, c.lasts, len(c.took), strings.Join(kinds, ", "), float64(len(c.took))/c.lasts.Seconds(), len(c.wrong), len(c.stored), at(0.5), at(0.99), at(1))
}
