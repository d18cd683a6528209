package estimate

import "levelspan/perf"

// assemble makes dst the aeroplane of x. Its lists are built in the memory of configurations and points where that is enough, of which it
// gives back what it used.
func (l *layout) assemble(x []float64, dst *perf.Aeroplane, configurations []perf.Configuration, points []perf.PositionErrorPoint) ([]perf.Configuration, []perf.PositionErrorPoint) {
	var c craft
	c.a = *l.prior
	c.a.Configurations = append(configurations[:0], l.prior.Configurations...)
	c.apply(l, x)
	points = points[:0]
	n := 0
	for i := range l.prior.Configurations {
		n += len(l.prior.Configurations[i].PositionError) + 2
	}
	if cap(points) < n {
		points = make([]perf.PositionErrorPoint, 0, n)
	}
	for i := range c.a.Configurations {
		// Half of it, half again, where the whole would make the calibrated airspeed fall or vanish; the prior's own stands.
		for share := 1.0; ; share *= 0.5 {
			if share < 1e-3 {
				share = 0
			}
			own := l.calibrate(points[len(points):], &l.prior.Configurations[i], share*c.offset, share*c.slope)
			if calibrated(own) || share == 0 {
				c.a.Configurations[i].PositionError = own
				points = points[:len(points)+len(own)]
				break
			}
		}
		if c.offset == 0 && c.slope == 0 {
			c.a.Configurations[i].PositionError = l.prior.Configurations[i].PositionError
		}
	}
	*dst = c.a
	return c.a.Configurations, points
}

// calibrate appends to dst the configuration's calibration with offset and slope added: the table's own points, and the two where the
// slope ends.
func (l *layout) calibrate(dst []perf.PositionErrorPoint, k *perf.Configuration, offset, slope float64) []perf.PositionErrorPoint {
	start := len(dst)
	ends := [2]float64{lowestShare * l.reference, highestHeld(l.reference)}
	table := k.PositionError
	put := func(v perf.IAS) {
		if len(dst) > start && !(v > dst[len(dst)-1].IAS) {
			return
		}
		correction := float64(k.CASFromIAS(v)) - float64(v)
		if offset != 0 || slope != 0 {
			correction += offset + slope*(held(float64(v), l.reference)-l.reference)
		}
		dst = append(dst, perf.PositionErrorPoint{IAS: v, Correction: correction})
	}
	e := 0
	for i := range table {
		for e < 2 && ends[e] < float64(table[i].IAS) {
			put(perf.IAS(ends[e]))
			e++
		}
		put(table[i].IAS)
	}
	for ; e < 2; e++ {
		put(perf.IAS(ends[e]))
	}
	return dst[start:len(dst):len(dst)]
}

// calibrated reports whether a calibration is one that the model takes.
func calibrated(p []perf.PositionErrorPoint) bool {
	ias, correction := perf.QuantityPositionErrorIAS.Domain(), perf.QuantityPositionErrorCorrection.Domain()
	if len(p) > maximumPoints {
		return false
	}
	last := 0.0
	for i := range p {
		cas := float64(p[i].IAS) + p[i].Correction
		if !(cas > last) || !ias.Holds(float64(p[i].IAS)) || !correction.Holds(p[i].Correction) {
			return false
		}
		last = cas
	}
	return true
}

// maximumPoints is the greatest number of points of a calibration that the model takes.
const maximumPoints = 200
