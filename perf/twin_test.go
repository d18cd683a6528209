package perf

import "math"

// twin is the slow, obviously right solver: thrust and drag from the first formulas, every implicit relation by plain bisection, every
// question by a dense scan of true airspeed. It shares with the solver only the definition of the air, of full power and of the cubic between
// the rows of a table.
type twin struct {
	a     *Aeroplane
	c     *Condition
	air   Air
	mass  float64
	load  float64
	phi   float64
	table propellerTable
}

func newTwin(a *Aeroplane, c *Condition) *twin {
	w := &twin{a: a, c: c, load: 1 / math.Cos(c.Bank)}
	if a.Propeller.Kind == Tabulated {
		w.table.set(a.Propeller.Table)
	}
	w.move(c.Air, c.Mass)
	return w
}

func (w *twin) move(air Air, mass float64) {
	w.air, w.mass = air, mass
	w.phi = w.a.Engine.FullPower(&air) / w.a.Engine.RatedPower
}

func (w *twin) config() *Configuration { return &w.a.Configurations[w.c.Configuration] }
func (w *twin) weight() float64        { return w.mass * StandardGravity }

func (w *twin) dragAt(v, load float64) float64 {
	q := 0.5 * w.air.Density * v * v
	cl := load * w.weight() / (q * w.a.WingArea)
	aspect := w.a.WingSpan * w.a.WingSpan / w.a.WingArea
	d := cl - w.a.Polar.LiftOfLeastDrag
	cd := w.a.Polar.ParasiteDrag + w.config().ParasiteDragRise + d*d/(math.Pi*aspect*w.a.Polar.OswaldEfficiency)
	return q * w.a.WingArea * cd
}

func (w *twin) stall(load float64) float64 {
	return math.Sqrt(2 * load * w.weight() / (w.air.Density * w.a.WingArea * w.config().MaximumLift))
}

// bisect finds where f, which rises, passes zero.
func bisect(lo, hi float64, f func(float64) float64) float64 {
	for range 200 {
		m := 0.5 * (lo + hi)
		if m == lo || m == hi {
			break
		}
		if f(m) > 0 {
			hi = m
		} else {
			lo = m
		}
	}
	return 0.5 * (lo + hi)
}

// thrust at full throttle or the power asked for, the rpm held to most.
func (w *twin) thrust(v, most float64) float64 {
	e, p := &w.a.Engine, &w.a.Propeller
	rho, d := w.air.Density, p.Diameter
	shaft := e.RatedPower * min(w.c.PowerFraction, w.phi)
	torque := e.RatedPower * w.phi / (2 * math.Pi * e.RatedSpeed)
	switch p.Kind {
	case ConstantEfficiency:
		return p.Efficiency * shaft / v
	case ConstantSpeed:
		area := math.Pi / 4 * d * d
		top := math.Cbrt(p.BladeEfficiency * shaft / (2 * rho * area))
		i := bisect(0, top*1.01, func(i float64) float64 { return 2*rho*area*i*(v+i)*(v+i) - p.BladeEfficiency*shaft })
		return 2 * rho * area * i * (v + i)
	case FixedPitch:
		n := min(w.revsOfTorque(v, torque*w.c.PowerFraction), most)
		return w.thrustOfRevs(v, n)
	}
	if shaft == 0 {
		return 0
	}
	n := bisect(0, 1e4, func(n float64) float64 {
		_, _, cp, _ := w.table.at(v / (n * d))
		q := rho * n * n * d * d * d * d * d * cp / (2 * math.Pi)
		return max(q/torque, 2*math.Pi*q*n/shaft) - 1
	})
	n = min(n, most)
	return w.thrustOfRevs(v, n)
}

// revsOfTorque of a fixed-pitch propeller: the engine's torque is the propeller's, rho n^2 D^5 CP(J)/(2 pi).
func (w *twin) revsOfTorque(v, torque float64) float64 {
	p := &w.a.Propeller
	d5 := p.Diameter * p.Diameter * p.Diameter * p.Diameter * p.Diameter
	return bisect(0, 1e5, func(n float64) float64 {
		j2 := v * v / (n * n * p.Diameter * p.Diameter)
		cp := p.PowerCoefficientStatic + p.PowerCoefficientSlope*j2
		return w.air.Density*n*n*d5*cp/(2*math.Pi) - torque
	})
}

func (w *twin) thrustOfRevs(v, n float64) float64 {
	p := &w.a.Propeller
	d := p.Diameter
	j := v / (n * d)
	var ct float64
	if p.Kind == FixedPitch {
		ct = p.PolarSlope*(p.PowerCoefficientStatic+p.PowerCoefficientSlope*j*j) + p.PolarIntercept*j*j
	} else {
		ct, _, _, _ = w.table.at(j)
	}
	return w.air.Density * n * n * d * d * d * d * ct
}

// shaftFor is the shaft power that thrust t takes at v.
func (w *twin) shaftFor(v, t float64) float64 {
	p := &w.a.Propeller
	rho, d := w.air.Density, p.Diameter
	switch p.Kind {
	case ConstantEfficiency:
		return t * v / p.Efficiency
	case ConstantSpeed:
		area := math.Pi / 4 * d * d
		i := bisect(0, math.Sqrt(t/(2*rho*area))*1.01, func(i float64) float64 { return 2*rho*area*i*(v+i) - t })
		return t * (v + i) / p.BladeEfficiency
	}
	n := bisect(0, 1e5, func(n float64) float64 { return w.thrustOfRevs(v, n) - t })
	if p.Kind == FixedPitch {
		j2 := v * v / (n * n * d * d)
		return rho * n * n * n * d * d * d * d * d * (p.PowerCoefficientStatic + p.PowerCoefficientSlope*j2)
	}
	_, _, cp, _ := w.table.at(v / (n * d))
	return rho * n * n * n * d * d * d * d * d * cp
}

const twinNodes = 240

// speeds are those scanned: from the stall to well beyond the least drag, where the drag has left the thrust behind.
func (w *twin) speeds() (grid [twinNodes]float64) {
	lo := w.stall(w.load)
	hi, least := lo*1.2, 0.0
	for i := 0; i < 200; i++ {
		a, b := w.dragAt(hi, w.load), w.dragAt(hi*1.02, w.load)
		if b > a && least == 0 {
			least = hi
		}
		if b > a && hi > 1.4*least && w.thrust(hi, math.Inf(1)) < a && w.thrust(hi*1.5, math.Inf(1)) < w.dragAt(hi*1.5, w.load) {
			break
		}
		hi *= 1.1
	}
	for i := range grid {
		grid[i] = lo * math.Pow(hi/lo, float64(i)/(twinNodes-1))
	}
	return grid
}

// maximum of f over the grid, each hump refined by golden section.
func maximum(grid []float64, f func(float64) float64) (x, y float64) {
	y = math.Inf(-1)
	n := len(grid)
	vals := make([]float64, n)
	for i, v := range grid {
		vals[i] = f(v)
	}
	for i := range grid {
		if i > 0 && vals[i] < vals[i-1] || i < n-1 && vals[i] < vals[i+1] {
			continue
		}
		a, b := grid[max(i-1, 0)], grid[min(i+1, n-1)]
		m := sectionMaximum(a, b, f)
		for _, c := range []float64{grid[i], m} {
			if v := f(c); v > y {
				x, y = c, v
			}
		}
	}
	return x, y
}

// sectionMaximum is golden section, then bisection on a centred difference, which knows the place of a smooth maximum better than values
// do; at a corner the values know better.
func sectionMaximum(a, b float64, f func(float64) float64) float64 {
	const g = 0.6180339887498949
	lo, hi := a, b
	x1, x2 := hi-g*(hi-lo), lo+g*(hi-lo)
	f1, f2 := f(x1), f(x2)
	for i := 0; i < 60 && hi-lo > 1e-9*hi; i++ {
		if f1 >= f2 {
			hi, x2, f2 = x2, x1, f1
			x1 = hi - g*(hi-lo)
			f1 = f(x1)
		} else {
			lo, x1, f1 = x1, x2, f2
			x2 = lo + g*(hi-lo)
			f2 = f(x2)
		}
	}
	m, top := x1, f1
	if f2 > f1 {
		m, top = x2, f2
	}
	const h = 3e-5
	lo, hi = max(a, m*(1-1e-5)), min(b, m*(1+1e-5))
	d := func(x float64) float64 { return f(x*(1-h)) - f(x*(1+h)) }
	if lo > a && hi < b && d(lo) < 0 && d(hi) > 0 {
		if x := bisect(lo, hi, d); f(x) >= top-1e-12*math.Abs(top) {
			return x
		}
	}
	return m
}

// twinAnswer is what the twin says.
type twinAnswer struct {
	outcome      Outcome
	shortfall    float64
	shortfallTAS float64
	vx, excess   float64
	vy, power    float64
	slow, fast   float64
	bySlow       SetBy
	byFast       SetBy
	margin       float64 // how far from a change of outcome, relative
}

func (w *twin) excess(v, most float64) float64 { return w.thrust(v, most) - w.dragAt(v, w.load) }

func (w *twin) solve() (r twinAnswer) {
	inf := math.Inf(1)
	grid := w.speeds()
	r.vx, r.excess = maximum(grid[:], func(v float64) float64 { return w.excess(v, inf) })
	r.vy, r.power = maximum(grid[:], func(v float64) float64 { return v * w.excess(v, inf) })
	r.margin = math.Abs(r.excess) / w.dragAt(r.vx, w.load)
	if r.excess < 0 {
		r.outcome, r.shortfall, r.shortfallTAS = TooLittlePower, -r.power, r.vy
		return r
	}
	most := inf
	if k := w.a.Propeller.Kind; (k == FixedPitch || k == Tabulated) && w.a.Engine.MaximumSpeed > 0 {
		most = w.a.Engine.MaximumSpeed
	}
	best, top := maximum(grid[:], func(v float64) float64 { return w.excess(v, most) })
	r.margin = min(r.margin, math.Abs(top)/w.dragAt(best, w.load))
	if top < 0 {
		v, p := maximum(grid[:], func(v float64) float64 { return v * w.excess(v, most) })
		r.outcome, r.shortfall, r.shortfallTAS = RPMTooHigh, -p, v
		return r
	}
	r.slow, r.bySlow = grid[0], SetByLift
	above := best
	for i := len(grid) - 1; i >= 0; i-- {
		if grid[i] >= best {
			continue
		}
		if w.excess(grid[i], most) < 0 {
			r.slow = bisect(grid[i], above, func(v float64) float64 { return w.excess(v, most) })
			r.bySlow = w.endSetBy(r.slow, most)
			break
		}
		above = grid[i]
	}
	below := best
	for _, v := range grid {
		if v <= best {
			continue
		}
		if w.excess(v, most) < 0 {
			r.fast = bisect(below, v, func(v float64) float64 { return -w.excess(v, most) })
			r.byFast = w.endSetBy(r.fast, most)
			break
		}
		below = v
	}
	vne := inf
	if v := w.a.Placards.NeverExceedCAS; v > 0 {
		vne = float64(w.air.TASFromCAS(v))
	}
	if v := float64(w.a.Placards.NeverExceedTAS); v > 0 {
		vne = min(vne, v)
	}
	if vne < r.fast {
		r.fast, r.byFast = vne, SetByPlacard
	}
	r.margin = min(r.margin, math.Abs(vne/r.slow-1))
	if vne < r.slow {
		r.outcome = PlacardTooSlow
	}
	return r
}

// endSetBy: where the thrust without the cap is more than the drag, the cap is what sets the end.
func (w *twin) endSetBy(v, most float64) SetBy {
	if w.excess(v, math.Inf(1)) > 1e-9*w.dragAt(v, w.load) {
		return SetByRPM
	}
	return SetByPower
}

// bestRange is the speed in slow..fast of least flow over ground speed.
func (w *twin) bestRange(slow, fast float64) (v float64, cost func(float64) float64, ok bool) {
	cost = func(v float64) float64 {
		if v <= w.c.Headwind {
			return math.Inf(1)
		}
		return w.a.Engine.Flow(w.shaftFor(v, w.dragAt(v, w.load))) / (v - w.c.Headwind)
	}
	lo := max(slow, w.c.Headwind)
	if fast <= lo {
		return 0, cost, fast > w.c.Headwind && false
	}
	const n = 160
	grid := make([]float64, n+1)
	for i := range grid {
		grid[i] = lo + (fast-lo)*float64(i)/n
	}
	v, _ = maximum(grid, func(v float64) float64 { return -cost(v) })
	return v, cost, true
}

// turn is the tightest turn: at each speed the load factor by bisection, the radius from it.
func (w *twin) turn() (v, radius float64, lifted bool) {
	load := func(v float64) (n float64, byLift bool) {
		vs := w.stall(1)
		most := v * v / (vs * vs)
		t := w.thrust(v, math.Inf(1))
		if most < 1 {
			return 1, false
		}
		if t >= w.dragAt(v, most) {
			return most, true
		}
		// Drag grows with the load factor only above the lift coefficient of least drag, so look from the top down.
		least := w.a.Polar.LiftOfLeastDrag / w.config().MaximumLift * most
		if t < w.dragAt(v, max(least, 1)) {
			return 1, false
		}
		return bisect(max(least, 1), most, func(n float64) float64 { return w.dragAt(v, n) - t }), false
	}
	tight := func(v float64) float64 {
		n, _ := load(v)
		return (n*n - 1) / (v * v * v * v)
	}
	lo := w.stall(1)
	hi := lo
	for i := 0; i < 400 && (w.thrust(hi, math.Inf(1)) >= w.dragAt(hi, 1) || i < 10); i++ {
		hi *= 1.06
	}
	grid := make([]float64, 300)
	for i := range grid {
		grid[i] = lo * math.Pow(hi/lo, float64(i)/float64(len(grid)-1))
	}
	v, best := maximum(grid, tight)
	t := w.thrust(v, math.Inf(1))
	vs := w.stall(1)
	lifted = math.Abs(t/w.dragAt(v, v*v/(vs*vs))-1) < 1e-5
	if !(best > 0) {
		return v, math.Inf(1), lifted
	}
	return v, 1 / (StandardGravity * math.Sqrt(best)), lifted
}
