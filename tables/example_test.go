package tables_test

import (
	"fmt"
	"os"

	"gylebook/tables"
)

func ExampleTable_WriteText() {
	t := tables.Table{
		Title: "Two gyles, invented",
		Columns: []tables.Column{
			{Head: "gyle", Align: tables.Left},
			{Head: "reading °P", Align: tables.Right},
			{Head: "sample °C", Align: tables.Right},
		},
		Rows: [][]string{
			{"first", "12.4", "20.0"},
			{"second", "9.75", "18.5"},
		},
		Foot: []string{"Readings as written down."},
	}
	if err := t.WriteText(os.Stdout, 80); err != nil {
		fmt.Println(err)
	}
	// Output:
	// Two gyles, invented
	//
	// gyle    reading °P  sample °C
	// ------  ----------  ---------
	// first         12.4       20.0
	// second        9.75       18.5
	//
	// Readings as written down.
}
