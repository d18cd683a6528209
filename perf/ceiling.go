package perf

import (
	"math"

	"levelspan/perf/num"
)

// ServiceRate is the rate of climb that is left at the service ceiling, m/s: 100 ft/min (common practice).
const ServiceRate = 0.508

// ceilingStep is the coarse step, m, of the search from above where the climb need not fall all the way with height.
const ceilingStep = 1000.0

// climbAt is the greatest rate of climb (m/s), or the greatest gradient, at a height, less the one wanted.
func (z *Solver) climbAt(h, target float64, gradient bool) float64 {
	s := z.day.at(h)
	f := &z.high
	z.fly(f, &s, z.c.Mass)
	var v, x float64
	if gradient {
		v, x = z.greatestGradient(f)
	} else {
		v, x = z.greatestRate(f)
	}
	z.highest, z.highestSpeed = h, v
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
// it is so even at the top, or nowhere. here is today's climb less the target; above is a height with the climb there less the target, from which
// upwards it is known to be less.
func (z *Solver) greatestHeight(target, here float64, gradient bool, above, there float64) (float64, bool) {
	today := z.c.Air.PressureAltitude
	lo, flo := today, here
	hi, fhi := above, there
	switch {
	case here >= 0 && z.peaks():
	case z.falls():
		hi, fhi = today, here
		lo, flo = lowestHeight, z.climbAt(lowestHeight, target, gradient)
		if flo < 0 {
			return 0, false
		}
	default:
		step := ceilingStep
		if here >= 0 {
			step *= 2 // there is a crossing above for certain; only a second one could hide
		}
		critical := z.a.Engine.FullThrottleAltitude
		for flo = -1; flo < 0; {
			if hi <= lowestHeight {
				return 0, false
			}
			h := max(hi-step, lowestHeight)
			if h < critical && critical < hi {
				h = critical
			}
			if here >= 0 && h < today && today < hi {
				lo, flo = today, here
				z.hump = z.now.param(z.vy)
				if gradient {
					z.hump = z.now.param(z.vx)
				}
				break
			}
			x := z.glance(h, target, gradient)
			if x < 0 {
				hi, fhi = h, x
			} else {
				lo, flo = h, x
			}
		}
		if z.k.kind == Tabulated {
			return z.tableHeight(lo, flo, hi, fhi, target, gradient), true
		}
	}
	var r num.Root
	r.Start(lo, flo, hi, fhi, 1e-7)
	for r.Next() {
		r.Put(z.climbAt(r.X, target, gradient))
	}
	return r.X, true
}

// glanceMargin is by how much of the drag (or power required) the nodes of a table may miss the top of a hump between them: with
// nodes a sixth apart the drag is a few hundredths above its least.
const glanceMargin = 0.06

// glance has the sign of climbAt. For a tabulated propeller it looks at the nodes of the table alone where that decides.
func (z *Solver) glance(h, target float64, gradient bool) float64 {
	if z.k.kind != Tabulated {
		return z.climbAt(h, target, gradient)
	}
	s := z.day.at(h)
	f := &z.high
	z.highest = math.NaN()
	z.fly(f, &s, z.c.Mass)
	if f.kind != Tabulated {
		return -1 - target // no power: no thrust
	}
	best, drag := math.Inf(-1), 0.0
	first, at := -1, -1
	z.hump = 0
	aim := target * f.weight
	for i := range f.table.node {
		g := &f.table.node[i]
		n := f.nodeRevs(g)
		v := g.j * n * f.dia
		if v < f.stall {
			continue
		}
		d := f.drag.at(v)
		x := f.rhoD4*n*n*g.ct - d
		if !gradient {
			x *= v
			d *= v
		}
		if first < 0 {
			first = i
		}
		if x > best {
			best, drag, at = x, d, i
		}
	}
	if at >= 0 {
		z.hump = f.table.node[at].j
	}
	// With the best at the first node the top may lie between it and the stall.
	if x := best - aim; x >= 0 || at > first && x < -glanceMargin*drag {
		return x / f.weight
	}
	return z.climbAt(h, target, gradient)
}

// tableHeight is the height in a bracket where a tabulated propeller's climb is the target. The advance ratio of the best climb, at
// first the hump seen at the lower end, is carried from height to height and only nudged; where another hump might be the greater, the whole
// scan is done at every height.
func (z *Solver) tableHeight(lo, flo, hi, fhi, target float64, gradient bool) float64 {
	of := ofPower
	if gradient {
		of = ofThrust
	}
	f := &z.high
	z.highest = math.NaN()
	var r num.Root
	if j := z.hump; j > 0 {
		var x float64
		r.Start(lo, flo, hi, fhi, 1e-7)
		for r.Next() {
			j, x = z.carried(r.X, j, of)
			r.Put(x/f.weight - target)
		}
		j, x = z.carried(r.X, j, of)
		if math.Abs(x/f.weight-target) <= 1e-9*max(1, target) && f.otherHumpsBelow(j, x, of) {
			z.highest = r.X
			z.highestSpeed, _, _ = f.at(j)
			return r.X
		}
	}
	r.Start(lo, flo, hi, fhi, 1e-7)
	for r.Next() {
		r.Put(z.climbAt(r.X, target, gradient))
	}
	return r.X
}

// carried is the best climb at height h on the hump of advance ratio j.
func (z *Solver) carried(h, j float64, of int) (float64, float64) {
	s := z.day.at(h)
	f := &z.high
	z.fly(f, &s, z.c.Mass)
	if f.kind != Tabulated {
		return j, -f.weight // no power: no thrust
	}
	return f.nudge(j, of)
}

// otherHumpsBelow reports whether the nodes show no hump away from j that could be as high as x.
func (f *flight) otherHumpsBelow(j, x float64, of int) bool {
	nodes := f.table.node
	before, here, hereDrag := math.Inf(-1), math.Inf(-1), 0.0
	left, at := 0.0, 0.0
	for i := 0; i <= len(nodes); i++ {
		after, drag, right := math.Inf(-1), 0.0, math.Inf(1)
		if i < len(nodes) {
			g := &nodes[i]
			right = g.j
			n := f.nodeRevs(g)
			if v := g.j * n * f.dia; v >= f.stall {
				drag = f.drag.at(v)
				after = f.rhoD4*n*n*g.ct - drag
				if of == ofPower {
					after *= v
					drag *= v
				}
			}
		}
		if here >= before && here >= after && here > x-glanceMargin*hereDrag && !(j >= left && j <= right) {
			return false
		}
		before, here, hereDrag = here, after, drag
		left, at = at, right
	}
	return true
}

// nudge moves an advance ratio to the top of the hump it is on by secant steps on the slope, and gives the merit there. It is held
// at or above the stall.
func (f *flight) nudge(j float64, of int) (float64, float64) {
	m, d, q := f.meritSlope(j, of)
	best, top := j, m
	h := 1e-3 * j
	if d < 0 {
		h = -h
	}
	for range 12 {
		k := j + h
		m2, d2, q2 := f.meritSlope(k, of)
		if q2.v < f.stall {
			k = f.param(f.stall)
			m2, _, _ = f.meritSlope(k, of)
			if m2 >= top || q.v < f.stall {
				return k, m2
			}
			return best, top
		}
		if m2 > top || q.v < f.stall {
			best, top = k, m2
		}
		step := -d2 * (k - j) / (d2 - d)
		if math.Abs(step) > 0.1*k || math.IsNaN(step) {
			step = math.Copysign(0.05*k, d2)
		}
		j, d, h, q = k, d2, step, q2
		if math.Abs(step) < 1e-7*k {
			break
		}
	}
	return best, top
}

// ceilings fills both ceilings: the greatest height for a rate of 0 bounds the one for any rate or gradient above it.
func (z *Solver) ceilings(dst *Answer) {
	dst.Service.Rate = ServiceRate
	rate := z.power / z.now.weight
	z.above, z.there, z.overhead = highestHeight, z.climbAt(highestHeight, 0, false), true
	if z.there < 0 {
		h, ok := z.greatestHeight(0, rate, false, z.above, z.there)
		if !ok {
			z.overhead = false
			return
		}
		z.ceiling(&dst.Absolute, h)
		z.above, z.there = h, 0
	}
	if z.there -= ServiceRate; z.there < 0 {
		if h, ok := z.greatestHeight(ServiceRate, rate-ServiceRate, false, z.above, z.there); ok {
			z.ceiling(&dst.Service, h)
		}
	}
}

func (z *Solver) ceiling(dst *Ceiling, h float64) {
	if z.highest != h {
		z.climbAt(h, 0, false)
	}
	dst.Applies = true
	dst.PressureAltitude = h
	dst.DensityAltitude = heightOfDensity(z.high.rho)
	dst.TAS = TAS(z.highestSpeed)
}

// gradientHeight is the greatest height for a gradient above 0.
func (z *Solver) gradientHeight(gradient float64, absolute *Ceiling) (float64, bool) {
	if !z.overhead {
		return 0, false
	}
	here := z.excess/z.now.weight - gradient
	if absolute.Applies {
		return z.greatestHeight(gradient, here, true, absolute.PressureAltitude, -gradient)
	}
	top := z.climbAt(highestHeight, gradient, true)
	if top >= 0 {
		return 0, false
	}
	return z.greatestHeight(gradient, here, true, highestHeight, top)
}
