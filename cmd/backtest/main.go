// Command backtest scores the forecast on courses that have ended: it sees the
// first readings of a course, not yet near the end, with a few other courses
// as history, and is compared with what came.
package main

import (
	"errors"
	"flag"
	"fmt"
	"io"
	"os"
	"slices"
	"strconv"
	"strings"
)

const usage = `backtest -curves DIR [-k 3,4,5] [-history 5] [-seed 1] [-seeds 3] [-replay] [-json]

DIR holds .csv files with the columns series, hours, gravity_value, unit.
Units: degP, degBrix_app, sg_points, sg_points_derived, co2_g_per_L.

`

func main() {
	err := run(os.Args[1:], os.Stdout, os.Stderr)
	if errors.Is(err, flag.ErrHelp) {
		return
	}
	if err != nil {
		fmt.Fprintln(os.Stderr, "backtest:", err)
		os.Exit(1)
	}
}

func run(args []string, stdout, stderr io.Writer) error {
	flags := flag.NewFlagSet("backtest", flag.ContinueOnError)
	flags.SetOutput(stderr)
	flags.Usage = func() {
		fmt.Fprint(stderr, usage)
		flags.PrintDefaults()
	}
	dir := flags.String("curves", "", "folder of the courses")
	ks := flags.String("k", "3,4,5", "readings seen, the first being the original gravity")
	history := flags.Int("history", 5, "finished courses of the same class as history; 0 for none")
	seed := flags.Uint64("seed", 1, "first seed of the thinning and of the draw of the history")
	seeds := flags.Int("seeds", 3, "seeds to average over")
	u := flags.Float64("u", 0.5, "standard uncertainty of a reading in points")
	only := flags.String("only", "", "take only files whose class begins so, such as beer")
	replayed := flags.Bool("replay", false, "replay the rules of the end instead of the forecast")
	asJSON := flags.Bool("json", false, "write JSON")
	if err := flags.Parse(args); err != nil {
		return err
	}
	if flags.NArg() > 0 {
		return fmt.Errorf("argument %.40q not understood, wanted flags only", flags.Arg(0))
	}
	s, err := settingsOf(*ks, *history, *seed, *seeds, *u)
	if err != nil {
		return err
	}
	if *dir == "" {
		return errors.New("no folder given, wanted -curves DIR")
	}
	cs, err := readFolder(*dir)
	if err != nil {
		return err
	}
	cs = slices.DeleteFunc(cs, func(c course) bool { return !strings.HasPrefix(c.class, *only) })
	if len(cs) == 0 {
		return fmt.Errorf("no course whose class begins with %.40q", *only)
	}
	if *replayed {
		rows, err := replay(cs, s)
		if err != nil {
			return err
		}
		return writeReplay(stdout, rows, *asJSON)
	}
	rows, err := scores(cs, s)
	if err != nil {
		return err
	}
	return writeScores(stdout, rows, *asJSON)
}

func settingsOf(ks string, history int, seed uint64, seeds int, u float64) (settings, error) {
	s := settings{history: history, seed: seed, seeds: seeds, u: u}
	for part := range strings.SplitSeq(ks, ",") {
		k, err := strconv.Atoi(strings.TrimSpace(part))
		if err != nil || k < 1 || k > 1000 {
			return s, fmt.Errorf("-k holds %.40q, wanted whole numbers from 1, as in 3,4,5", part)
		}
		s.ks = append(s.ks, k)
	}
	switch {
	case history < 0:
		return s, fmt.Errorf("-history is %d, wanted 0 or more", history)
	case seeds < 1 || seeds > 1000:
		return s, fmt.Errorf("-seeds is %d, wanted 1 to 1000", seeds)
	case !(u > 0 && u <= 10):
		return s, fmt.Errorf("-u is %g, wanted above 0 and up to 10 points", u)
	}
	return s, nil
}
