package perf

import "levelspan/perf/num"

// ServiceRate is the rate of climb that is left at the service ceiling, m/s: 100 ft/min (common practice).
const ServiceRate = 0.508

// ceilingStep is the coarse step, m, of the search from above where the climb need not fall all the way with height.
const ceilingStep = 1000.0

// climbAt is the greatest rate of climb (m/s), or the greatest gradient, at a height, less the one wanted.
func (z *Solver) climbAt(h, target float64, gradient bool) float64 {
	s := z.day.at(h)
	f := &z.high
	z.fly(f, &s, z.c.Mass)
	var x float64
	if gradient {
		_, x = z.greatestGradient(f)
	} else {
		_, x = z.greatestRate(f)
	}
	return x/f.weight - target
}

// falls reports whether the greatest rate and gradient can only fall with height: the power does, and at one equivalent airspeed what
// the propeller makes of it does not grow faster than the power required.
func (z *Solver) falls() bool {
	switch z.a.Propeller.Kind {
	case ConstantEfficiency:
		return true
	case FixedPitch:
		return z.a.Engine.Kind == Piston && z.a.Engine.FullThrottleAltitude == 0
	}
	return false
}

// peaks reports whether they can at most rise to one peak and then fall, as with a supercharged, flat-rated or electric engine. A
// tabulated propeller may do anything.
func (z *Solver) peaks() bool { return z.a.Propeller.Kind != Tabulated }

// greatestHeight is the greatest height inside the atmosphere's domain at which the climb is at least the target; false where
// it is so even at the top, or nowhere. here is today's climb less the target.
func (z *Solver) greatestHeight(target, here float64, gradient bool) (float64, bool) {
	top := z.climbAt(highestHeight, target, gradient)
	if top >= 0 {
		return 0, false
	}
	lo, flo := z.c.Air.PressureAltitude, here
	hi, fhi := highestHeight, top
	switch {
	case here >= 0 && z.peaks():
	case z.falls():
		hi, fhi = lo, here
		lo, flo = lowestHeight, z.climbAt(lowestHeight, target, gradient)
		if flo < 0 {
			return 0, false
		}
	default:
		found := false
		critical := z.a.Engine.FullThrottleAltitude
		for !found && hi > lowestHeight {
			h := max(hi-ceilingStep, lowestHeight)
			if h < critical && critical < hi {
				h = critical
			}
			x := z.climbAt(h, target, gradient)
			if x >= 0 {
				lo, flo, found = h, x, true
			} else {
				hi, fhi = h, x
			}
		}
		if !found {
			return 0, false
		}
	}
	var r num.Root
	r.Start(lo, flo, hi, fhi, 1e-7)
	for r.Next() {
		r.Put(z.climbAt(r.X, target, gradient))
	}
	return r.X, true
}

// ceiling fills the ceiling where the greatest rate of climb falls to rate.
func (z *Solver) ceiling(dst *Ceiling, rate float64) {
	dst.Rate = rate
	h, ok := z.greatestHeight(rate, z.power/z.now.weight-rate, false)
	if !ok {
		return
	}
	s := z.day.at(h)
	z.fly(&z.high, &s, z.c.Mass)
	v, _ := z.greatestRate(&z.high)
	dst.Applies = true
	dst.PressureAltitude = h
	dst.DensityAltitude = heightOfDensity(s.density)
	dst.TAS = TAS(v)
}
