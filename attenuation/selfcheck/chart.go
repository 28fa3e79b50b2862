package selfcheck

import (
	"strings"

	"gylebook/attenuation/control"
)

// individualsChart compares the lines of published charts: drawn from the data
// where these are printed, else the limits that go with the printed means.
func individualsChart(_ Relations, t *tally) {
	const unit = "of the chart"
	for _, row := range t.file.Rows {
		one := func(col string, got float64, err error) {
			t.row(control.ChartInfo, control.ChartInfo.ID, row, col, got, err, unit)
		}
		var points []float64
		for _, word := range strings.Fields(row.Text("data")) {
			points = append(points, t.parse(row, "data", word))
		}
		var l control.Limits
		var err error
		if len(points) > 0 {
			l, err = control.LimitsFrom(points)
			one("published_xbar", l.Centre, err)
			one("published_MRbar", l.MeanRange, err)
		} else {
			l = control.LimitsOf(t.number(row, "published_xbar"), t.number(row, "published_MRbar"))
		}
		one("published_UCL", l.Upper, err)
		one("published_LCL", l.Lower, err)
	}
}
