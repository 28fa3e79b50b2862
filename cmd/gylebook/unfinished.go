package main

import (
	"os"
	"sync"
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
