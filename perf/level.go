package perf

import (
	"math"

	"levelspan/perf/num"
)

// span is the stretch of speeds, at or above the stall, where the thrust is at least the drag.
type span struct {
	slow, fast     float64
	bySlow, byFast SetBy
}

// levelSpan is the span of a flight without a cap on the rpm. v is the speed of the greatest excess thrust, which must not be negative there.
func (z *Solver) levelSpan(f *flight, v float64) span {
	s := span{slow: f.stall, bySlow: SetByLift, byFast: SetByPower}
	var slow float64
	switch f.kind {
	case FixedPitch:
		// (a - t2) x^2 - (t0 + b) x + c = 0 with x = V^2
		lo, hi, ok := bothRoots(f.a-f.t2, f.t0+f.b, f.c)
		if !ok { // the two have met, within rounding
			lo, hi = v*v, v*v
		}
		slow, s.fast = math.Sqrt(lo), max(math.Sqrt(hi), v)
	case ConstantEfficiency:
		s.fast = f.efficiencyRoot(v, true)
		if f.useful < f.stall*f.drag.at(f.stall) {
			slow = f.efficiencyRoot(v, false)
		}
	case ConstantSpeed:
		u := f.inflow(v)
		s.fast = f.discRoot(v, u, true)
		us := f.inflow(f.stall)
		if f.useful/us < f.drag.at(f.stall) {
			slow = f.discRoot(v, u, false)
		}
	default:
		z.scan(f)
		q := z.peak
		if q.v != v {
			q, _ = f.scanMaximum(z.nodes, ofThrust)
		}
		lo, hi, stalled := f.scanBand(z.nodes, q)
		s.fast = hi
		if !stalled {
			slow = lo
		}
	}
	if slow > f.stall {
		s.slow, s.bySlow = slow, SetByPower
	}
	return s
}

// efficiencyRoot is the fast or slow root of D V = useful. D V bends up, so Newton from outside goes straight to the root. v lies
// between the two.
func (f *flight) efficiencyRoot(v float64, fast bool) float64 {
	var r num.Newton
	if fast {
		hi := math.Cbrt(f.useful/f.a) + math.Sqrt(max(f.b, 0)/f.a)
		hi = max(hi, v)
		r.Start(v, hi, hi, true)
	} else {
		lo := min(v, f.c/(f.useful+max(f.b, 0)*v))
		r.Start(lo, v, max(lo, f.stall), false)
	}
	for r.Next() {
		r.Put(r.X*f.drag.at(r.X)-f.useful, f.drag.powerSlope(r.X))
	}
	return r.X
}

// discRoot is the fast or slow root of T = D of an actuator disc, searched in u between the speed v (with its u) of the greatest
// excess and a bound from outside: there the thrust is not above that at v (fast), nor above the static one (slow).
func (f *flight) discRoot(v, u float64, fast bool) float64 {
	var r num.Newton
	if fast {
		_, x, ok := bothRoots(f.a, f.b+f.useful/u, f.c)
		hi := u
		if ok && x > v*v {
			hi = f.inflow(math.Sqrt(x))
		}
		r.Start(u, hi, hi, false)
	} else {
		x, _, ok := bothRoots(f.a, f.b+f.useful/math.Cbrt(f.swirl), f.c)
		lo := u
		if ok && x < v*v {
			lo = f.inflow(math.Sqrt(x))
		}
		r.Start(lo, u, lo, true)
	}
	for r.Next() {
		w := r.X
		w2 := w * w
		v = w - f.swirl/w2
		r.Put(f.useful/w-f.drag.at(v), -f.useful/w2-f.drag.slope(v)*(1+2*f.swirl/(w2*w)))
	}
	return r.X - f.swirl/(r.X*r.X)
}

// levelFlight finds the band of level flight and what sets its ends, or why there is none.
func (z *Solver) levelFlight(dst *Answer) (s span, ok bool) {
	f := &z.now
	if z.excess < 0 {
		dst.Outcome, dst.Shortfall, dst.ShortfallTAS = TooLittlePower, -z.power, TAS(z.vy)
		return s, false
	}
	s = z.levelSpan(f, z.vx)
	if n := z.k.cap; !math.IsInf(n, 1) {
		if !z.holdSpeed(&s, n, dst) {
			return s, false
		}
	}
	if vne := z.neverExceed; vne < s.fast {
		s.fast, s.byFast = vne, SetByPlacard
		if vne < s.slow {
			dst.Outcome = PlacardTooSlow
			return s, false
		}
	}
	return s, true
}

// holdSpeed narrows the band to where level flight, throttle set for it, takes no more than n rev/s.
func (z *Solver) holdSpeed(s *span, n float64, dst *Answer) bool {
	f, g := &z.now, &z.other
	if f.kind == Tabulated && f.below(s, n) {
		return true
	}
	z.capped(f, g, n)
	v, x := z.greatestGradient(g)
	if x >= 0 {
		h := z.levelSpan(g, v)
		if f.kind == Tabulated {
			// The capped curve holds the torque, the power and the cap already.
			if h.bySlow == SetByPower && f.revs(h.slow) > n*(1+1e-12) {
				h.bySlow = SetByRPM
			}
			if f.revs(h.fast) > n*(1+1e-12) {
				h.byFast = SetByRPM
			}
			*s = h
			return true
		}
		if h.bySlow == SetByPower && h.slow > s.slow {
			s.slow, s.bySlow = h.slow, SetByRPM
		}
		if h.fast < s.fast {
			s.fast, s.byFast = h.fast, SetByRPM
		}
		if s.slow <= s.fast {
			return true
		}
	}
	v, power := z.greatestRate(g)
	if f.kind == FixedPitch && f.thrust(v) < g.thrust(v) {
		// Full throttle gives less there; least is missing where the two curves meet.
		v = math.Sqrt((g.t0 - f.t0) / (f.t2 - g.t2))
		power = v * (f.thrust(v) - f.drag.at(v))
	}
	dst.Outcome, dst.Shortfall, dst.ShortfallTAS = RPMTooHigh, max(-power, 0), TAS(v)
	return false
}

// below reports whether a tabulated propeller turns slower than n all along the band. CP is monotone between the rows, so the
// rpm is greatest at a node or an end.
func (f *flight) below(s *span, n float64) bool {
	if f.revs(s.slow) > n || f.revs(s.fast) > n {
		return false
	}
	for i := range f.table.node {
		g := &f.table.node[i]
		r := f.nodeRevs(g)
		if v := g.j * r * f.dia; r > n && v > s.slow && v < s.fast {
			return false
		}
	}
	return true
}
