package report

import (
	"fmt"
	"strings"

	"gylebook/tables"
	"gylebook/tables/page"
)

const made = "2026-11-18T12:20:00Z"

// course is a picture as a chart room would draw it.
func course(id string) []byte {
	var b strings.Builder
	b.WriteString("<?xml version=\"1.0\"?>\n<svg xmlns=\"http://www.w3.org/2000/svg\" width=\"640\" height=\"260\" viewBox=\"0 0 640 260\" font-family=\"sans-serif\" font-size=\"13\">\n")
	b.WriteString(`<title id="` + id + `">course</title><rect width="640" height="260" fill="#fff"/>`)
	for i := range 5 {
		fmt.Fprintf(&b, `<path d="M60 %d H620" stroke="#ccc"/><text x="50" y="%d" text-anchor="end">1.0%d0</text>`, 20+i*50, 24+i*50, 5-i)
	}
	b.WriteString(`<path d="M60 30 C180 30 200 190 320 200 S560 205 620 205" fill="none" stroke="#1f5f66" stroke-width="2.5"/></svg>` + "\n")
	return []byte(b.String())
}

// batch is a report with everything in it.
func batch() Report {
	present := tables.Ladder{
		Answer: []string{"1.0176 SG 20/20", "±0.0031 (k=2)", "4.48 °P apparent"},
		Rungs: []tables.Rung{
			{Name: "read", Value: "1.016", Remark: "SG 1.016 at 26 °C, glass 20/20, bottom of meniscus"},
			{Name: "certificate", Value: "0", Remark: "no instrument named"},
			{Name: "temperature", Value: "+0.0016", Remark: "fermenting model (Balling, OIML R 22, ICUMSA SPS-4), glass 25e-6/K"},
			{Name: "corrected", Value: "1.0176", Remark: "apparent; about 4.0 % vol alcohol in it"},
		},
		Lines: []string{"the reading before was 1.0320, 24 h earlier"},
	}
	readings := tables.Table{
		Title: "Readings",
		Columns: []tables.Column{
			{Head: "taken"},
			{Head: "read", Align: tables.Right},
			{Head: "°C", Align: tables.Right},
			{Head: "SG 20/20", Align: tables.Right},
			{Head: "change", Align: tables.Right},
			{Head: "remark"},
		},
		Foot: []string{"change in points from the reading before; instrument error not included"},
	}
	for i := range 44 {
		readings.Rows = append(readings.Rows, []string{
			fmt.Sprintf("2026-11-%02d %02d:00", 2+i/3, 6+i%3*6), fmt.Sprintf("1.0%02d", 50-i*3/4), fmt.Sprint(18 + i%3),
			fmt.Sprintf("1.0%02d0", 50-i*3/4), fmt.Sprintf("-%d.%d", i%2, i%10), []string{"", "hand on the cooler", "yeast still in suspension, foam read through"}[i%3],
		})
	}
	broad := tables.Table{Title: "The season, a row a batch", Columns: []tables.Column{{Head: "batch"}}}
	for i := range 15 {
		broad.Columns = append(broad.Columns, tables.Column{Head: fmt.Sprintf("measure %d", i), Align: tables.Right})
	}
	for i := range 6 {
		row := []string{fmt.Sprintf("B26-%d", i+1)}
		for j := range 15 {
			row = append(row, fmt.Sprintf("%d.%d", 10+i*j, j%10))
		}
		broad.Rows = append(broad.Rows, row)
	}
	return Report{
		Title: "B26-1 Lane Bitter", Subtitle: "vessel T4, pitched 2026-11-16 18:00",
		Lead: []string{"Fermenting as its peers did: 58.2 % apparent after two days, the end expected on Friday between 1.010 and 1.013."},
		Sections: []Section{
			{
				Heading: "Where it stands", Ladders: []tables.Ladder{present},
				Lines: []string{"The next reading says most if it is taken on Thursday morning."},
				Notes: []tables.Note{{Code: "hot-sample", Text: "the sample was 26 °C; cool it below 25 °C for the stated error"}, {Code: "caution", Text: "do not bottle on this reading: it is not known to be the last"}},
			},
			{
				Heading: "Course", Figures: []page.Figure{{
					ID: "course", Alt: "gravity over time", Caption: "Gravity since pitching, with the forecast", SVG: course("a"),
					Text: []string{"From 1.048 on Monday evening to 1.0176 on Wednesday noon; the forecast flattens at 1.0115 (90 %: 1.010 to 1.013) on Friday."},
				}},
				Tables: []tables.Table{readings},
			},
			{Heading: "Season", Tables: []tables.Table{broad}},
			{Heading: "Attenuation", Ladders: []tables.Ladder{{Answer: []string{"fell 12.4 points in 24.3 h, as much as the fastest of five batches", "apparent 58.2 %"}}}},
		},
		Methods: []Method{
			{"SG 20/20", "the floating body, fermenting model", "OIML R 22 (1975), ICUMSA SPS-4"},
			{"°P", "asbc", "ASBC Beer-6A; the polynomial as printed there"},
			{"alcohol", "balling", "Balling 1865, with the factors of the extract table and the correction for the extract that the yeast took up"},
		},
		Cautions: []string{"A forecast is no measurement: two equal readings are what proves the end."},
		Made:     made,
	}
}

var basis = []string{"instrument H1, glass, divisions of 0.001", "SG 20/20", "sucrose model (ICUMSA SPS-4), glass 25e-6/K", "before fermentation"}

// chart is a temperature card: rows of sample temperatures, columns of gravities.
func chart(rows, columns int) Card {
	t := &tables.Table{
		Title:   "Add to the reading, in points",
		Columns: []tables.Column{{Head: "°C", Align: tables.Right}},
		Foot:    []string{"best between 15 and 25 °C; instrument error not included"},
	}
	for i := range columns - 1 {
		t.Columns = append(t.Columns, tables.Column{Head: fmt.Sprintf("1.%03d", i*15), Align: tables.Right})
	}
	for i := range rows {
		row := []string{fmt.Sprint(10 + i)}
		for j := range columns - 1 {
			row = append(row, fmt.Sprintf("%+.1f", (float64(i)-10)*0.21+float64(j*(i-10))*0.01))
		}
		t.Rows = append(t.Rows, row)
	}
	return Card{
		Title: "Hydrometer H1: temperature", Basis: basis, Table: t, Made: made,
		Cautions: []string{"Above 30 °C cool the sample first."},
	}
}

// scale is a strip card of so many pairs.
func scale(pairs int) Card {
	s := &Strip{Left: "SG 20/20", Right: "°P"}
	for i := range pairs {
		s.Rows = append(s.Rows, [2]string{fmt.Sprintf("%.3f", 0.996+float64(i)/1000), fmt.Sprintf("%.2f", float64(i-4)*0.25)})
	}
	return Card{Title: "SG and °P", Basis: []string{"fit asbc", "SG 20/20"}, Strip: s, Made: made}
}

// rounds is a blank sheet.
func rounds(rows int) Card {
	return Card{
		Title: "Rounds", Basis: []string{"a line a vessel; read at the bottom of the meniscus"},
		Sheet:    &Sheet{Columns: []string{"vessel", "reading", "sample_temp", "taken", "by", "remark"}, Rows: rows},
		Cautions: []string{"Rinse the hydrometer between vessels."},
		Made:     made, Landscape: true,
	}
}

// cards are cards that fill their page.
func cards() map[string]Card {
	across := chart(10, 12)
	across.Landscape = true
	return map[string]Card{
		"chart": chart(21, 9), "small chart": chart(6, 4), "landscape chart": across,
		"strip": scale(85), "short strip": scale(12), "sheet": rounds(12),
	}
}
