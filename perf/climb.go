package perf

import (
	"math"

	"levelspan/perf/num"
)

// greatestRate is the speed of the greatest excess power (T - D) V at or above the stall, and that power, W.
func (z *Solver) greatestRate(f *flight) (v, power float64) {
	switch f.kind {
	case ConstantEfficiency:
		v = max(f.leastPower(), f.stall)
		return v, f.useful - v*f.drag.at(v)
	case FixedPitch:
		// 3 (a - t2) x^2 - (t0 + b) x - c = 0 with x = V^2
		v = max(math.Sqrt(positiveRoot(3*(f.a-f.t2), -(f.t0+f.b), -f.c)), f.stall)
		return v, v * (f.thrust(v) - f.drag.at(v))
	case ConstantSpeed:
		return f.discRate()
	}
	z.scan(f)
	q, m := f.scanMaximum(z.nodes, ofPower)
	return q.v, m
}

// greatestGradient is the speed of the greatest excess thrust T - D at or above the stall, and that thrust, N.
func (z *Solver) greatestGradient(f *flight) (v, thrust float64) {
	switch f.kind {
	case ConstantEfficiency:
		v = max(f.efficiencyGradient(), f.stall)
		return v, f.useful/v - f.drag.at(v)
	case FixedPitch:
		v = max(math.Sqrt(math.Sqrt(f.c/(f.a-f.t2))), f.stall)
		return v, f.thrust(v) - f.drag.at(v)
	case ConstantSpeed:
		return f.discGradient()
	}
	z.scan(f)
	q, m := f.scanMaximum(z.nodes, ofThrust)
	z.peak = q
	return q.v, m
}

// efficiencyGradient solves 2 a V^4 + useful V - 2 c = 0. The function rises and bends up, so Newton from above goes
// straight down to the root; both starts lie above it.
func (f *flight) efficiencyGradient() float64 {
	v := f.leastDrag()
	if f.useful <= 0 {
		return v
	}
	v = min(v, 2*f.c/f.useful)
	for range 100 {
		v3 := v * v * v
		step := (v*(2*f.a*v3+f.useful) - 2*f.c) / (8*f.a*v3 + f.useful)
		v -= step
		if step <= 4e-16*v {
			break
		}
	}
	return v
}

// discRate: the excess power of the actuator disc bends down in V, so its slope
// 3 useful swirl/(u^4 + 2 swirl u) - (3 a V^2 - b - c/V^2) has one zero, above the speed of least power required and below the
// speed where the second term alone equals the first one's value there.
func (f *flight) discRate() (v, power float64) {
	if f.swirl == 0 {
		v = max(f.leastPower(), f.stall)
		return v, -v * f.drag.at(v)
	}
	lo := max(f.leastPower(), f.stall)
	ulo := f.inflow(lo)
	gain := 3 * f.useful * f.swirl / (ulo * (ulo*ulo*ulo + 2*f.swirl))
	if gain <= f.drag.powerSlope(lo) {
		return lo, lo * (f.useful/ulo - f.drag.at(lo))
	}
	hi := math.Sqrt(positiveRoot(3*f.a, -(f.b + gain), -f.c))
	uhi := f.inflow(max(hi, lo))
	var r num.Newton
	r.Start(ulo, uhi, ulo+0.6*(uhi-ulo), false)
	for r.Next() {
		u := r.X
		u3 := u * u * u
		v = u - f.swirl/(u*u)
		x := v * v
		e := u * (u3 + 2*f.swirl)
		t := 3 * f.useful * f.swirl / e
		r.Put(t-f.drag.powerSlope(v),
			-t*(4*u3+2*f.swirl)/e-(6*f.a*v+2*f.c/(x*v))*(1+2*f.swirl/u3))
	}
	v = r.X - f.swirl/(r.X*r.X)
	return v, v * (f.useful/r.X - f.drag.at(v))
}

// discGradient: V^3 times the slope of the excess thrust, 2 c - 2 a V^4 - useful V^3 u/(u^3 + 2 swirl), falls all the way, from
// positive at rest to negative at the speed of least drag.
func (f *flight) discGradient() (v, thrust float64) {
	top := f.leastDrag()
	us := f.inflow(f.stall)
	if f.stall >= top || f.gradientSlope(f.stall, us) <= 0 {
		return f.stall, f.useful/us - f.drag.at(f.stall)
	}
	uhi := f.inflow(top)
	var r num.Newton
	r.Start(us, uhi, 0.5*(us+uhi), false)
	for r.Next() {
		u := r.X
		v = u - f.swirl/(u*u)
		u3 := u * u * u
		q := u3 + 2*f.swirl
		v3 := v * v * v
		h := u / q
		dv := 1 + 2*f.swirl/u3
		dh := (2*f.swirl - 2*u3) / (q * q)
		r.Put(f.gradientSlope(v, u), -8*f.a*v3*dv-f.useful*(3*v*v*h*dv+v3*dh))
	}
	v = r.X - f.swirl/(r.X*r.X)
	return v, f.useful/r.X - f.drag.at(v)
}

func (f *flight) gradientSlope(v, u float64) float64 {
	v3 := v * v * v
	return 2*f.c - 2*f.a*v3*v - f.useful*v3*u/(u*u*u+2*f.swirl)
}
