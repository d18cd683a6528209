package perf

import (
	"math"

	"levelspan/perf/num"
)

// greatestMass is the greatest mass at today's air at which a climb gradient (0: level flight) is still possible.
//
// At a fixed lift coefficient V^2, D and W are in proportion, and with them the thrust D + gradient W that is asked for. So the torque that a
// propeller asks for is in proportion to W and the power to W^1.5, at every lift coefficient alike: the answer is today's mass
// times the best ratio of what there is to what is asked for, taken to the power 1 or 2/3, over the speeds at or above the stall. The same
// speed would have been found at any mass.
func (z *Solver) greatestMass(gradient float64) (float64, bool) {
	f := &z.now
	d := f.drag
	d.b -= gradient * f.weight // drag and component of weight together
	var ratio float64
	switch f.kind {
	case ConstantEfficiency:
		v := max(d.leastPower(), f.stall)
		ratio = f.useful / (v * d.at(v))
		ratio = math.Cbrt(ratio * ratio)
	case FixedPitch:
		v := max(math.Sqrt(math.Sqrt(d.c/(d.a-f.t2))), f.stall)
		ratio = f.t0 / (d.at(v) - f.t2*v*v)
	case ConstantSpeed:
		ratio = f.shaft / f.leastShaft(&d)
		ratio = math.Cbrt(ratio * ratio)
	default:
		ratio = z.tableRatio(&d)
	}
	m := ratio * z.c.Mass
	return m, m > 0 && !math.IsInf(m, 0)
}

// leastShaft is the least shaft power that an actuator disc takes for the thrust d.at(V), over V at or above the stall. The power
// bends up in V.
func (f *flight) leastShaft(d *drag) float64 {
	lo := f.stall
	p, slope, _ := f.level(lo, d.at(lo), d.slope(lo))
	if slope >= 0 {
		return p
	}
	// The ideal power grows with V at one thrust, so the least lies below the speed of least thrust... and power: at leastPower of d
	// the induced part alone still falls.
	hi, rise := lo, slope
	for i := 0; i < 100 && rise < 0; i++ {
		lo, slope = hi, rise
		hi *= 1.3
		_, rise, _ = f.level(hi, d.at(hi), d.slope(hi))
	}
	var r num.Root
	r.Start(lo, slope, hi, rise, 0)
	for r.Next() {
		_, s, _ := f.level(r.X, d.at(r.X), d.slope(r.X))
		r.Put(s)
	}
	p, _, _ = f.level(r.X, d.at(r.X), d.slope(r.X))
	return p
}

// tableRatio is the best ratio of a tabulated propeller, with the power already applied.
func (z *Solver) tableRatio(d *drag) float64 {
	f := &z.now
	best := f.massRatio(d, f.stall)
	// The nodes of the table, each at the slower of the speeds where the thrust asked for needs its advance ratio.
	last, lastRatio := f.stall, best
	before, beforeRatio := last, 0.0
	for i := range f.table.node {
		g := &f.table.node[i]
		v, ok := f.speedAtAdvance(d, g.tau)
		if !ok || v <= last*(1+1e-12) {
			continue
		}
		ratio := f.massRatio(d, v)
		if lastRatio >= ratio && lastRatio >= beforeRatio {
			best = max(best, f.refineRatio(d, before, v))
		}
		before, beforeRatio = last, lastRatio
		last, lastRatio = v, ratio
	}
	for i := 0; i < 60; i++ {
		v := last * 1.3
		ratio := f.massRatio(d, v)
		if lastRatio >= ratio && lastRatio >= beforeRatio {
			best = max(best, f.refineRatio(d, before, v))
		}
		before, beforeRatio = last, lastRatio
		last, lastRatio = v, ratio
		if ratio < beforeRatio && v > 2*f.leastDrag() {
			break
		}
	}
	return best
}

// speedAtAdvance is the slower speed at which the thrust d.at(V) is tau rho V^2 D^2.
func (f *flight) speedAtAdvance(d *drag, tau float64) (float64, bool) {
	a := d.a - tau*f.rho*f.dia*f.dia
	if !(a > math.Inf(-1)) {
		return 0, false
	}
	// a x^2 - b x + c = 0; the root with x = 2 c/(b + sqrt(b^2 - 4 a c)) is the slower where a > 0, the only one where a < 0.
	disc := d.b*d.b - 4*a*d.c
	if disc < 0 {
		return 0, false
	}
	q := d.b + math.Sqrt(disc)
	if !(q > 0) {
		return 0, false
	}
	return math.Sqrt(2 * d.c / q), true
}

// massRatio is how many times today's mass the propeller could carry at the lift coefficient of v.
func (f *flight) massRatio(d *drag, v float64) float64 {
	t := d.at(v)
	p, _, n := f.level(v, t, 0)
	torque := p / (2 * math.Pi * n)
	r := f.shaft / p
	return min(f.torque0/torque, math.Cbrt(r*r))
}

func (f *flight) refineRatio(d *drag, a, b float64) float64 {
	var m num.Minimum
	m.Start(a, b, 0)
	for m.Next() {
		m.Put(-f.massRatio(d, m.X))
	}
	return -m.F
}

// allowance fills the inverse answers for a gradient; 0 is level flight.
func (z *Solver) allowance(dst *Allowance, gradient float64) {
	m, ok := z.greatestMass(gradient)
	dst.MassApplies, dst.Mass = ok, m
	if !ok {
		dst.Mass = 0
	}
	h, ok := z.greatestHeight(gradient, z.excess/z.now.weight-gradient, true)
	if !ok {
		return
	}
	s := z.day.at(h)
	dst.AltitudeApplies = true
	dst.PressureAltitude = h
	dst.DensityAltitude = heightOfDensity(s.density)
}

// levelAllowance fills the inverse answers for level flight. Excess thrust and excess power vanish at the same height, so its height is
// that of the absolute ceiling.
func (z *Solver) levelAllowance(dst *Answer) {
	m, ok := z.greatestMass(0)
	if ok {
		dst.Level.MassApplies, dst.Level.Mass = true, m
	}
	c := &dst.Absolute
	dst.Level.AltitudeApplies = c.Applies
	dst.Level.PressureAltitude, dst.Level.DensityAltitude = c.PressureAltitude, c.DensityAltitude
}
