package outlook

import "gylebook/attenuation/journal"

// What is left of the readings of a logger: the curve bins them further, and each
// one costs a correction.
const (
	mostReadings = 240
	newestOnes   = 80 // of these the newest, all of them
)

// Thin returns a record with at most 240 readings that are not void: the newest 80
// and of those before them every so many, the first one among them. One with fewer
// is returned as it is. left is how many were left out.
func Thin(rec *journal.Record) (thinned *journal.Record, left int) {
	if len(rec.Readings) <= mostReadings {
		return rec, 0
	}
	var list []journal.Numbered[journal.Reading]
	for _, r := range rec.Readings {
		if !r.Void {
			list = append(list, r)
		}
	}
	then := *rec
	then.Readings = list
	if len(list) <= mostReadings {
		return &then, 0
	}
	old := list[:len(list)-newestOnes]
	step := (len(old) + mostReadings - newestOnes - 1) / (mostReadings - newestOnes)
	then.Readings = nil
	for k := 0; k < len(old); k += step {
		then.Readings = append(then.Readings, old[k])
	}
	then.Readings = append(then.Readings, list[len(list)-newestOnes:]...)
	return &then, len(list) - len(then.Readings)
}
