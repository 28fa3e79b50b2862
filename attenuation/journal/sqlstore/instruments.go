package sqlstore

import (
	"context"
	"fmt"

	"gylebook/attenuation/journal"
)

// Instruments implements journal.Reader.
func (v *view) Instruments(ctx context.Context) ([]*journal.InstrumentRecord, error) {
	var list []*journal.InstrumentRecord
	byID := make(map[string]*journal.InstrumentRecord)
	var head journal.InstrumentRecord
	dest := append([]any{&head.Number}, instruments.dest(&head.Instrument)...)
	err := v.each(ctx, "SELECT b.number, "+instruments.list("b")+" FROM instrument b WHERE "+notVoid+" ORDER BY b.id", nil, dest, func() error {
		r := head
		list = append(list, &r)
		byID[r.Instrument.ID] = &r
		return nil
	})
	if err != nil {
		return nil, err
	}
	err = history(ctx, v, certificates, func(n journal.Numbered[journal.Certificate]) {
		if r := byID[n.Body.Instrument]; r != nil {
			r.Certificates = append(r.Certificates, n)
		}
	})
	if err != nil {
		return nil, err
	}
	err = history(ctx, v, checks, func(n journal.Numbered[journal.Check]) {
		if r := byID[n.Body.Instrument]; r != nil {
			r.Checks = append(r.Checks, n)
		}
	})
	if err != nil {
		return nil, err
	}
	err = history(ctx, v, retirements, func(n journal.Numbered[journal.Retire]) {
		if r := byID[n.Body.Instrument]; r != nil {
			r.Retired = &n
		}
	})
	if err != nil {
		return nil, err
	}
	for _, r := range list {
		for k := range r.Certificates {
			c := &r.Certificates[k]
			if c.Body.Points, err = v.points(ctx, c.Number); err != nil {
				return nil, err
			}
		}
	}
	return list, nil
}

// history runs over what happened to the instruments and is not void, in the order
// of its time.
func history[B journal.Body](ctx context.Context, v *view, t table[B], add func(journal.Numbered[B])) error {
	var n journal.Numbered[B]
	dest := append([]any{&n.Number, recordedOf{&n.RecordedAt}, &n.By}, t.dest(&n.Body)...)
	query := "SELECT b.number, e.recorded_at, e.operator, " + t.list("b") + " FROM " + t.name + " b CROSS JOIN entry e" +
		" WHERE e.number = b.number AND " + notVoid + " ORDER BY b.instrument, b.at_ms, b.number"
	return v.each(ctx, query, nil, dest, func() error {
		add(n)
		return nil
	})
}

// points returns the points of a certificate, which are numbered from 1.
func (v *view) points(ctx context.Context, number int64) ([]journal.CertificatePoint, error) {
	var list []journal.CertificatePoint
	var p journal.CertificatePoint
	var place int
	err := v.each(ctx, "SELECT place, reading, correction, u FROM certificate_point WHERE number = ? ORDER BY place",
		[]any{number}, []any{&place, &p.Reading, &p.Correction, &p.U}, func() error {
			if place != len(list)+1 {
				return fmt.Errorf("%w: point %d of its certificate is missing", journal.ErrTampered, len(list)+1)
			}
			list = append(list, p)
			return nil
		})
	return list, err
}

func (v *view) insertPoints(ctx context.Context, number int64, points []journal.CertificatePoint) error {
	for k, p := range points {
		err := v.exec(ctx, "INSERT INTO certificate_point (number, place, reading, correction, u) VALUES (?, ?, ?, ?, ?)",
			number, k+1, p.Reading, p.Correction, p.U)
		if err != nil {
			return err
		}
	}
	return nil
}
