package perf

import (
	"math"

	"levelspan/perf/num"
)

// heightOfDensityAltitude is the pressure altitude where the day's density altitude is the one given; false where
// that lies outside -2 to 20 km.
func (d day) heightOfDensityAltitude(target float64) (float64, bool) {
	lo, hi := d.at(lowestHeight), d.at(highestHeight)
	flo, fhi := heightOfDensity(lo.density)-target, heightOfDensity(hi.density)-target
	const slack = 1e-6 // m; the ends themselves count
	if !(flo <= slack && fhi >= -slack) {
		return math.NaN(), false
	}
	var r num.Root
	r.Start(lowestHeight, min(flo, 0), highestHeight, max(fhi, 0), 0)
	for r.Next() {
		s := d.at(r.X)
		r.Put(heightOfDensity(s.density) - target)
	}
	return r.X, true
}
