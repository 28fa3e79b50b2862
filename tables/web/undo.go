package web

import (
	"net/http"
)

type undoPage struct {
	Batch   Batch
	Name    string
	Entry   string
	Ticket  string
	Token   string
	Who     string
	Reason  string
	Ask     bool
	Problem *problem
}

var undoFields = []string{"reason", "operator"}

// showUndo asks whether the last entry is to be voided.
func (s *Server) showUndo(v *visit) error {
	id, err := v.id()
	if err != nil {
		return err
	}
	b, err := s.desk.Batch(v.r.Context(), id, v.operator())
	if err != nil {
		return err
	}
	b.Batch = id
	if b.LastEntry == "" {
		return &Refused{Status: http.StatusConflict, Text: "there is nothing here to undo", Hint: "only your own last entry can be undone"}
	}
	code, err := random(s.cfg.Rand)
	if err != nil {
		return err
	}
	t := &ticket{id: code, issued: s.cfg.Now(), purpose: "undo", batch: id, entry: b.LastEntry}
	v.session.issue(t)
	return v.undo(http.StatusOK, undoPage{Batch: b, Name: nameOf(b), Entry: t.entry, Ticket: t.id, Who: v.operator()})
}

func (v *visit) undo(status int, p undoPage) error {
	p.Ask, p.Token = v.server.cfg.Passphrase == nil, v.session.token
	return v.show(status, "undo", page{Title: "Undo #" + p.Entry + "? " + p.Name, Here: "board", Main: p})
}

// undo voids the entry that was shown, once.
func (s *Server) undo(v *visit) error {
	id, err := v.id()
	if err != nil {
		return err
	}
	t, err := v.session.ticket(v.form["ticket"], "undo", id, s.cfg.Now())
	if err != nil {
		v.again = batchPath(id, "")
		return errSession
	}
	if s.cfg.Passphrase != nil {
		v.form["operator"] = v.operator()
	}
	who, reason := v.form["operator"], v.form["reason"]
	if err = v.form.check(undoFields, map[string]string{"operator": "type who voids it"}); err == nil {
		v.session.rename(who)
		_, err = t.once(func() (outcome, error) {
			ctx, done := s.act(v)
			defer done()
			answer, err := s.desk.Undo(ctx, t.entry, who, reason)
			return outcome{message: "voided #" + t.entry, answer: answer}, err
		})
	}
	if err == nil {
		v.redirect(donePath(id, t.id))
		return nil
	}
	if !mistyped(err) {
		return err
	}
	b, errBatch := s.desk.Batch(v.r.Context(), id, v.operator())
	if errBatch != nil {
		return errBatch
	}
	b.Batch = id
	wrong, status := problemOf(err, undoFields...)
	return v.undo(status, undoPage{Batch: b, Name: nameOf(b), Entry: t.entry, Ticket: t.id, Who: who, Reason: reason, Problem: wrong})
}
