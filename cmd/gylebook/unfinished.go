package main

import (
	"os"
	"sync"
	"sync/atomic"
)

// unfinished are the files that are being written beside their names. An interrupt
// ends the program wherever it stands, and takes them with it.
var unfinished halves

type halves struct {
	mu    sync.Mutex
	names map[string]bool
}

// add notes a file; the function returned forgets it.
func (h *halves) add(name string) (forget func()) {
	h.mu.Lock()
	defer h.mu.Unlock()
	if h.names == nil {
		h.names = map[string]bool{}
	}
	h.names[name] = true
	return func() {
		h.mu.Lock()
		defer h.mu.Unlock()
		delete(h.names, name)
	}
}

// remove takes away what is not finished. The program ends after it.
func (h *halves) remove() {
	h.mu.Lock()
	defer h.mu.Unlock()
	for name := range h.names {
		_ = os.Remove(name)
	}
}

// gentle is set while an interrupt is left to the command, which ends by itself.
var gentle atomic.Bool

// gently leaves interrupts to the caller until the function returned is called.
func gently() (end func()) {
	gentle.Store(true)
	return func() { gentle.Store(false) }
}
