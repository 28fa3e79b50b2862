package web

import (
	"bytes"
	"context"
	"errors"
	"net/http"
	"net/url"
)

type readbackPage struct {
	Batch   Batch
	Name    string
	Typed   Reading
	Judged  Judged
	Ticket  string
	Token   string
	Keep    string // the reason typed
	Problem *problem
	Change  string // the form with what was typed
	Other   string // the path of the form for the vessel that is proposed
}

// typedReading is the reading of a form, complete, or what it lacks.
func (v *visit) typedReading(id string) (Reading, error) {
	if v.server.cfg.Passphrase != nil {
		v.form["operator"] = v.operator()
	}
	return v.form.reading(id), v.form.check(readingFields, readingNeeds)
}

// judge reads a reading back. It stores nothing.
func (s *Server) judge(v *visit) error {
	id, err := v.id()
	if err != nil {
		return err
	}
	r, err := v.typedReading(id)
	var j Judged
	if err == nil {
		v.session.rename(r.Operator)
		j, err = s.desk.Judge(v.r.Context(), r)
	}
	if err != nil {
		if !mistyped(err) {
			return err
		}
		wrong, status := problemOf(err, readingFields...)
		return v.batch(status, r, false, wrong, nil)
	}
	return v.readback(http.StatusOK, r, j, nil)
}

// readback writes the page that a reading is confirmed on, with a ticket for it.
func (v *visit) readback(status int, r Reading, j Judged, wrong *problem) error {
	b, err := v.server.desk.Batch(v.r.Context(), r.Batch, v.operator())
	if err != nil {
		return err
	}
	id, err := random(v.server.cfg.Rand)
	if err != nil {
		return err
	}
	b.Batch = r.Batch
	p := readbackPage{
		Batch: b, Name: nameOf(b), Typed: r, Judged: j, Ticket: id, Token: v.session.token, Keep: r.Keep, Problem: wrong,
		Change: batchPath(r.Batch, "?"+query(r)),
	}
	if j.Other != nil {
		p.Other = batchPath(j.Other.Value, "/reading")
	}
	r.Keep = ""
	if j.Taken != "" {
		r.Taken = j.Taken
	}
	v.session.issue(&ticket{id: id, issued: v.server.cfg.Now(), purpose: "store", batch: r.Batch, reading: r})
	title := "Is this right? "
	if j.Held != "" {
		title = "Held: "
	}
	return v.show(status, "readback", page{Title: title + p.Name, Here: "board", Main: p})
}

// store stores the reading that was read back, once.
func (s *Server) store(v *visit) error {
	id, err := v.id()
	if err != nil {
		return err
	}
	t, err := v.session.ticket(v.form["ticket"], "store", id, s.cfg.Now())
	if err != nil {
		v.again = batchPath(id, "")
		return errSession
	}
	r := t.reading
	r.Keep = v.form["keep"]
	_, err = t.once(func() (outcome, error) {
		ctx, done := s.act(v)
		defer done()
		answer, entry, err := s.desk.Log(ctx, r)
		message := "stored as #" + entry
		if entry == "" {
			message = "it was stored already"
		}
		return outcome{message: message, answer: answer}, err
	})
	if err == nil {
		v.redirect(donePath(id, t.id))
		return nil
	}
	if !mistyped(err) {
		return err
	}
	// Read back again: what it is judged against may have changed.
	j, errJudge := s.desk.Judge(v.r.Context(), r)
	if errJudge != nil {
		return err
	}
	wrong, status := problemOf(err, "keep")
	if j.Held == "" {
		wrong.Field = ""
	}
	return v.readback(status, r, j, wrong)
}

// act is a context for what changes the journal: it does not end when the browser
// goes away, for then nobody would know how far it came.
func (s *Server) act(v *visit) (context.Context, context.CancelFunc) {
	return context.WithTimeout(context.WithoutCancel(v.r.Context()), s.cfg.Limits.Act)
}

// donePath is the page of a batch with what was just done to it.
func donePath(id, ticket string) string {
	return batchPath(id, "?"+url.Values{"done": {ticket}}.Encode())
}

type fragment struct {
	Judged Judged
	Text   string // why it cannot be read
	Hint   string
}

// showReadback is what a reading would be read as, as a piece of a page, while it is
// typed.
func (s *Server) showReadback(v *visit) error {
	id, err := v.id()
	if err != nil {
		return err
	}
	asked, err := v.query()
	if err != nil {
		return err
	}
	r := asked.reading(id)
	r.Operator = v.operator()
	f, status := fragment{}, http.StatusOK
	if err = asked.check(readingFields, nil); err == nil && r.Gravity != "" && r.Temp != "" {
		f.Judged, err = s.desk.Judge(v.r.Context(), r)
	}
	if own := new(Refused); errors.As(err, &own) {
		own = refused(own)
		f.Text, f.Hint, status = own.Text, own.Hint, own.Status
	} else if err != nil {
		return err
	}
	var b bytes.Buffer
	if err := templates()["batch"].ExecuteTemplate(&b, "fragment", f); err != nil {
		return err
	}
	v.send(status, "text/html; charset=utf-8", b.Bytes())
	return nil
}
