package main

import (
	"encoding/json"
	"fmt"
	"io"
	"text/tabwriter"
)

func writeScores(w io.Writer, rows []row, asJSON bool) error {
	if asJSON {
		return writeJSON(w, rows)
	}
	t := tabwriter.NewWriter(w, 0, 0, 2, ' ', tabwriter.AlignRight)
	fmt.Fprintln(t, "method\tk\tn\tFG MAE\tin 90 %\tCRPS\ttime MAE h\tin 90 %\t")
	for _, r := range rows {
		k := fmt.Sprint(r.K)
		if r.K == 0 {
			k = "mean"
		}
		fmt.Fprintf(t, "%s\t%s\t%d\t%s\t%s\t%s\t%s\t%s\t\n", r.Method, k, r.N,
			cell(r.FGMAE, 2), cell(r.FGCover, 2), cell(r.CRPS, 2), cell(r.TimeMAE, 1), cell(r.TimeCover, 2))
	}
	return t.Flush()
}

func writeJSON[R any](w io.Writer, rows []R) error {
	e := json.NewEncoder(w)
	e.SetIndent("", "  ")
	return e.Encode(struct {
		Rows []R `json:"rows"`
	}{rows})
}

// cell prints what is not known as a dash.
func cell(x *float64, decimals int) string {
	if x == nil {
		return "-"
	}
	return fmt.Sprintf("%.*f", decimals, *x)
}
