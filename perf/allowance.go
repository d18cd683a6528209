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

// tableRatio is the best ratio of a tabulated propeller, with the power already applied. It goes along the advance ratio: each, at one
// thrust coefficient, belongs to the slower of the speeds where d asks for it.
func (z *Solver) tableRatio(d *drag) float64 {
	f := &z.now
	start := f.table.advanceOf(d.at(f.stall) / (f.rho * f.dia * f.dia * f.stall * f.stall))
	j1 := start
	r1, _ := f.massRatio(d, start)
	best := r1
	j0, r0 := j1, 0.0
	nodes := f.table.node
	for i := 0; i < len(nodes)+60; i++ {
		var j2, r2 float64
		if i < len(nodes) {
			g := &nodes[i]
			if j2 = g.j; j2 <= start*(1+1e-9) {
				continue
			}
			r2, _ = f.ratioAt(d, j2, g.tau, 1/(g.r2*g.r2))
		} else {
			j2 = j1 * 1.5
			r2, _ = f.massRatio(d, j2)
		}
		if r1 >= r2 && r1 >= r0 {
			best = max(best, f.refineRatio(d, j0, j2))
		}
		if r2 == 0 {
			break
		}
		j0, r0, j1, r1 = j1, r1, j2, r2
	}
	return best
}

// massRatio is how many times today's mass the propeller could carry at an advance ratio, and whether it is the power that limits; 0 where d
// nowhere asks for it.
func (f *flight) massRatio(d *drag, j float64) (float64, bool) {
	ct, _, cp, _ := f.table.at(j)
	return f.ratioAt(d, j, ct/(j*j), cp)
}

func (f *flight) ratioAt(d *drag, j, tau, cp float64) (ratio float64, byPower bool) {
	// The thrust tau rho V^2 D^2 is d.at(V): a x^2 - b x + c = 0 with x = V^2. x = 2 c/(b + sqrt(b^2 - 4 a c)) is the slower where a > 0 and
	// the only one where a < 0.
	a := d.a - tau*f.rho*f.dia*f.dia
	disc := d.b*d.b - 4*a*d.c
	if !(disc >= 0) {
		return 0, false
	}
	q := d.b + math.Sqrt(disc)
	if !(q > 0) {
		return 0, false
	}
	x := max(2*d.c/q, f.stall*f.stall)
	torque := f.rhoD4 / (f.dia * 2 * math.Pi) * cp * x / (j * j)
	power := 2 * math.Pi * torque * math.Sqrt(x) / (j * f.dia)
	r, p := f.torque0/torque, f.shaft/power
	if p*p < r*r*r {
		return math.Cbrt(p * p), true
	}
	return r, false
}

// refineRatio is the greatest ratio between two advance ratios. Where one of torque and power sets it all along, a place known to a part in
// 1e5 gives the value to one in 1e10; where they change over it is a corner, and the place must be known as well as the value.
func (f *flight) refineRatio(d *drag, a, b float64) float64 {
	var m num.Minimum
	tol := 1e-5 * b
	m.Start(a, b, tol)
	for m.Next() {
		r, _ := f.massRatio(d, m.X)
		m.Put(-r)
	}
	lo, hi := max(a, m.X-2*tol), min(b, m.X+2*tol)
	_, byLo := f.massRatio(d, lo)
	_, byHi := f.massRatio(d, hi)
	if byLo == byHi {
		return -m.F
	}
	m.Start(lo, hi, 0)
	for m.Next() {
		r, _ := f.massRatio(d, m.X)
		m.Put(-r)
	}
	return -m.F
}

// allowance fills the inverse answers for a gradient above 0.
func (z *Solver) allowance(dst *Allowance, gradient float64, absolute *Ceiling) {
	if m, ok := z.greatestMass(gradient); ok {
		dst.MassApplies, dst.Mass = true, m
	}
	h, ok := z.gradientHeight(gradient, absolute)
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
