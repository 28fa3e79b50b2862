package season

import (
	"gylebook/attenuation/journal"
	"gylebook/gravity/asread"
)

// mostTexts bounds what is remembered. A season has a few hundred different marks
// and temperatures, however many readings there are.
const mostTexts = 4096

// texts remembers what typed texts mean, since the same ones come again and again. It
// belongs to one goroutine.
type texts struct {
	gravities    map[journal.Typed]asread.Reading
	temperatures map[journal.TypedTemp]asread.Temperature
}

func newTexts() *texts {
	return &texts{map[journal.Typed]asread.Reading{}, map[journal.TypedTemp]asread.Temperature{}}
}

// read parses a reading and its temperature.
func (t *texts) read(r *journal.Reading) (typed asread.Reading, temp asread.Temperature, err error) {
	typed, ok := t.gravities[r.Gravity]
	if !ok {
		if typed, err = r.Gravity.Reading(); err != nil {
			return typed, temp, err
		}
		if len(t.gravities) < mostTexts {
			t.gravities[r.Gravity] = typed
		}
	}
	if temp, ok = t.temperatures[r.Temp]; !ok {
		if temp, err = r.Temp.Temperature(); err == nil && len(t.temperatures) < mostTexts {
			t.temperatures[r.Temp] = temp
		}
	}
	return typed, temp, err
}
