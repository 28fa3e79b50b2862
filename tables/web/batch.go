package web

import "net/http"

type batchPage struct {
	Batch
	Name    string // vessel, product and batch, as there are
	Typed   Reading
	Problem *problem
	Done    *donePart
	Ask     bool   // the form asks who reads
	Token   string // of the form
}

// donePart is what was stored or voided just before.
type donePart struct {
	Message string
	Answer  Answer
}

// showBatch is the page of one batch. What a link or a form brings back stands in
// the form of a reading.
func (s *Server) showBatch(v *visit) error {
	id, err := v.id()
	if err != nil {
		return err
	}
	asked, err := v.query()
	if err != nil {
		return err
	}
	typed := asked.reading(id)
	typed.Operator = v.operator()
	_, chosen := asked["instrument"]
	var done *donePart
	if t, err := v.session.ticket(asked["done"], "", id, s.cfg.Now()); err == nil {
		if out, ok := t.result(); ok {
			done = &donePart{out.message, out.answer}
		}
	}
	return v.batch(http.StatusOK, typed, !chosen, nil, done)
}

// batch writes the page of a batch around what was typed. fresh is a form in which
// no instrument was chosen yet.
func (v *visit) batch(status int, typed Reading, fresh bool, wrong *problem, done *donePart) error {
	b, err := v.server.desk.Batch(v.r.Context(), typed.Batch, v.operator())
	if err != nil {
		return err
	}
	b.Batch = typed.Batch
	if fresh {
		typed.Instrument = b.Form.Instrument
	}
	p := batchPage{
		Batch: b, Name: nameOf(b), Typed: typed, Problem: wrong, Done: done,
		Ask: v.server.cfg.Passphrase == nil, Token: v.session.token,
	}
	title := p.Name
	switch {
	case wrong != nil:
		title = "Not read: " + title
	case done != nil:
		title = done.Message + " – " + title
	}
	return v.show(status, "batch", page{Title: title, Here: "board", Script: b.Open, Main: p})
}

// nameOf is what people call a batch: its vessel, or its id when it is in none.
func nameOf(b Batch) string {
	name := b.Vessel
	if name == "" {
		name = b.Batch
	}
	if b.Product != "" {
		name += " " + b.Product
	}
	return name
}

// showCurve is the picture of a batch.
func (s *Server) showCurve(form, kind string) func(*visit) error {
	return func(v *visit) error {
		id, err := v.id()
		if err != nil {
			return err
		}
		asked, err := v.query()
		if err != nil {
			return err
		}
		picture, err := s.desk.Curve(v.r.Context(), id, form, asked["phone"] == "1")
		if err != nil {
			return err
		}
		// A picture may style itself and can do nothing else, opened by itself too.
		v.w.Header().Set("Content-Security-Policy", "default-src 'none'; style-src 'unsafe-inline'; base-uri 'none'; form-action 'none'; frame-ancestors 'none'; sandbox")
		v.send(http.StatusOK, kind, picture)
		return nil
	}
}
