package web

import (
	"cmp"
	"fmt"
	"net/http"

	"gylebook/tables"
)

type boardPage struct {
	Heading, Count string
	Groups         []vesselGroup
	Notes          []tables.Note
}

type vesselGroup struct {
	ID, Heading string
	Vessels     []Vessel
}

// showBoard is the list of open batches, those that need attention by themselves
// and first.
func (s *Server) showBoard(v *visit) error {
	b, err := s.desk.Board(v.r.Context())
	if err != nil {
		return err
	}
	attend := vesselGroup{ID: "attend", Heading: "Needs attention"}
	course := vesselGroup{ID: "course", Heading: "In course"}
	for _, one := range b.Vessels {
		if one.Attend {
			attend.Vessels = append(attend.Vessels, one)
		} else {
			course.Vessels = append(course.Vessels, one)
		}
	}
	p := boardPage{Heading: cmp.Or(b.Title, "Open vessels"), Count: fmt.Sprintf("%d open", len(b.Vessels)), Notes: b.Notes}
	for _, g := range []vesselGroup{attend, course} {
		if len(g.Vessels) > 0 {
			p.Groups = append(p.Groups, g)
		}
	}
	if n := len(attend.Vessels); n > 0 {
		p.Count = fmt.Sprintf("%d to look at, %s", n, p.Count)
	}
	return v.show(http.StatusOK, "board", page{Title: p.Count, Here: "board", Main: p})
}
