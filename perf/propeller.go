package perf

import (
	"math"

	"levelspan/perf/num"
)

// flight is one aeroplane at one height and mass, ready for evaluation.
//
// Each propeller has a parameter p in which speed and thrust are both explicit, so that a search needs no root inside:
//
//	constant efficiency   p = V           T = useful/V, useful = eta P
//	constant speed        p = u = V + w   T = useful/u, V = u - swirl/u^2, useful = kappa P, swirl = useful/(2 rho Adisc)
//	fixed pitch           p = V           T = t0 + t2 V^2
//	tabulated             p = J           n from torque or power, V = J n D, T = rho n^2 D^4 CT
//
// The actuator disc is R. E. Froude's; the linear propeller polar J. T. Lowry's, J. Aircraft 33 (1996) (from memory).
type flight struct {
	rho    float64
	weight float64 // W, N
	drag
	stall float64

	kind   PropellerKind
	shaft  float64 // shaft power delivered, W; of a fixed-pitch propeller 0
	useful float64 // W
	swirl  float64 // m^3/s^3
	disc   float64 // 2 rho Adisc, kg/m

	t0, t2 float64 // fixed pitch

	table   *propellerTable
	dia     float64
	tq, tp  float64 // n = tq CP^(-1/2) at full throttle, n = tp CP^(-1/3) at the power asked for
	turn    float64 // CP above which the torque is the less
	serial  uint64  // which flight the solver's scan belongs to
	cap     float64 // no more than this, rev/s
	rhoD4   float64
	torque0 float64 // full torque (table) or torque at the setting (fixed pitch), N m

	// fixed pitch: n^2 = (2 pi Q/(rho D^5) - cp1 V^2/D^2)/cp0
	cp0, cp1, slope float64
	eta             float64 // efficiency or blade efficiency
}

// fly readies f for the air s at a mass.
func (z *Solver) fly(f *flight, s *sky, mass float64) {
	k := &z.k
	rho := s.density
	w := mass * StandardGravity
	f.rho, f.weight = rho, w
	f.drag = k.drag(rho, w, k.load)
	f.stall = k.stall(rho, w, k.load)
	f.kind = k.kind
	f.dia = k.diameter
	f.cap = math.Inf(1)
	e := &z.a.Engine
	p := &z.a.Propeller
	full := e.fullPower(s)
	f.shaft = e.RatedPower * min(k.setting, full)
	switch k.kind {
	case ConstantEfficiency:
		f.eta = p.Efficiency
		f.useful = f.eta * f.shaft
	case ConstantSpeed:
		f.eta = p.BladeEfficiency
		f.useful = f.eta * f.shaft
		f.disc = 2 * rho * k.disc
		f.swirl = f.useful / f.disc
	case FixedPitch:
		d := k.diameter
		f.shaft = 0
		f.torque0 = k.setting * full * e.RatedPower / (2 * math.Pi * e.RatedSpeed)
		f.t0 = 2 * math.Pi * p.PolarSlope * f.torque0 / d
		f.t2 = rho * d * d * p.PolarIntercept
		f.cp0, f.cp1, f.slope = p.PowerCoefficientStatic, p.PowerCoefficientSlope, p.PolarSlope
		f.rhoD4 = rho * d * d * d * d
	case Tabulated:
		d := k.diameter
		f.table = &z.table
		f.rhoD4 = rho * d * d * d * d
		f.torque0 = full * e.RatedPower / (2 * math.Pi * e.RatedSpeed)
		q, p := 2*math.Pi*f.torque0/(f.rhoD4*d), f.shaft/(f.rhoD4*d)
		f.tq, f.tp, f.turn = math.Sqrt(q), math.Cbrt(p), q*q*q/(p*p)
		z.serial++
		f.serial = z.serial
		if !(f.tq > 0 && f.tp > 0) {
			f.kind, f.useful, f.eta = ConstantEfficiency, 0, 1 // no power: no thrust
		}
	}
}

// at is the speed, the thrust and dT/dV at parameter p.
func (f *flight) at(p float64) (v, t, slope float64) {
	switch f.kind {
	case ConstantEfficiency:
		t = f.useful / p
		return p, t, -t / p
	case ConstantSpeed:
		u3 := p * p * p
		return p - f.swirl/(p*p), f.useful / p, -f.useful * p / (u3 + 2*f.swirl)
	case FixedPitch:
		return p, f.t0 + f.t2*p*p, 2 * f.t2 * p
	}
	ct, dct, cp, dcp := f.table.at(p)
	n, dn := f.speedOfTable(cp, dcp)
	v = p * n * f.dia
	t = f.rhoD4 * n * n * ct
	return v, t, f.rhoD4 * n * (2*dn*ct + n*dct) / (f.dia * (n + p*dn))
}

// atNode is at for a node of the table's scan.
func (f *flight) atNode(g *tableNode) (v, t, slope float64) {
	n, dn := f.tq*g.r2, 0.0
	if m := f.tp * g.r3; m < n {
		n, dn = m, -m*g.lcp/3
	} else {
		dn = -0.5 * n * g.lcp
	}
	if f.cap <= n {
		n, dn = f.cap, 0
	}
	return g.j * n * f.dia, f.rhoD4 * n * n * g.ct, f.rhoD4 * n * (2*dn*g.ct + n*g.dct) / (f.dia * (n + g.j*dn))
}

// speedOfTable is the rpm (rev/s) at full throttle, or at the power asked for where that is less, or the cap, and its slope against J.
func (f *flight) speedOfTable(cp, dcp float64) (n, dn float64) {
	if cp >= f.turn {
		n = f.tq / math.Sqrt(cp)
		dn = -0.5 * n * dcp / cp
	} else {
		n = f.tp / math.Cbrt(cp)
		dn = -n * dcp / (3 * cp)
	}
	if f.cap <= n {
		return f.cap, 0
	}
	return n, dn
}

// param is the parameter at speed v > 0.
func (f *flight) param(v float64) float64 {
	switch f.kind {
	case ConstantSpeed:
		return f.inflow(v)
	case Tabulated:
		return f.advance(v)
	}
	return v
}

// inflow is the u = V + w of the disc at full power: u^3 - V u^2 - swirl = 0. The function u - swirl/u^2 - V rises and bends
// down with a slope of at least 1, so from any start Newton is left of the root after one step, above 0, and stays there.
func (f *flight) inflow(v float64) float64 {
	if f.swirl == 0 {
		return v
	}
	u := v + f.swirl/(v*v)
	if 2*v*v*v < f.swirl {
		u = math.Cbrt(f.swirl) + v/3
	}
	for range 60 {
		i := f.swirl / (u * u)
		step := (v + i - u) / (1 + 2*i/u)
		u += step
		if math.Abs(step) <= 4e-16*u {
			break
		}
	}
	return u
}

// advance is the advance ratio of a tabulated propeller at speed v under full throttle.
func (f *flight) advance(v float64) float64 {
	t := f.table
	nodes := t.node
	lo, hi := -1, len(nodes)
	for hi-lo > 1 {
		m := (lo + hi) / 2
		if f.nodeSpeed(&nodes[m]) <= v {
			lo = m
		} else {
			hi = m
		}
	}
	a, b := 0.0, 0.0
	if lo >= 0 {
		a = nodes[lo].j
	}
	if hi < len(nodes) {
		b = nodes[hi].j
	}
	je := t.j[len(t.j)-1]
	if a >= je || b > 0 && b <= t.j[0] {
		// CP is held there, so V is proportional to J.
		cp := t.cpEnd
		if a < je {
			cp = t.cp[0].A
		}
		n, _ := f.speedOfTable(cp, 0)
		return v / (n * f.dia)
	}
	var r num.Newton
	r.Start(a, b, 0.5*(a+b), true)
	for r.Next() {
		_, _, cp, dcp := t.at(r.X)
		n, dn := f.speedOfTable(cp, dcp)
		r.Put(r.X*n*f.dia-v, f.dia*(n+r.X*dn))
	}
	return r.X
}

// nodeRevs is the rpm (rev/s) at a node; comparisons, for the built-in min minds signs of zero and is slow in a browser.
func (f *flight) nodeRevs(g *tableNode) float64 {
	n := f.tq * g.r2
	if m := f.tp * g.r3; m < n {
		n = m
	}
	if f.cap < n {
		n = f.cap
	}
	return n
}

func (f *flight) nodeSpeed(g *tableNode) float64 {
	return g.j * f.dia * f.nodeRevs(g)
}

// thrust is the thrust at speed v > 0, N.
func (f *flight) thrust(v float64) float64 {
	switch f.kind {
	case ConstantEfficiency:
		return f.useful / v
	case FixedPitch:
		return f.t0 + f.t2*v*v
	}
	_, t, _ := f.at(f.param(v))
	return t
}

// level is the shaft power (W) that a thrust takes at speed v, throttle set for it, with its slope along a thrust that changes by
// dt per m/s, and the rpm (rev/s; 0 where the propeller has none).
func (f *flight) level(v, t, dt float64) (p, dp, n float64) {
	switch f.kind {
	case ConstantEfficiency:
		return t * v / f.eta, (t + v*dt) / f.eta, 0
	case ConstantSpeed:
		r := math.Sqrt(v*v + 4*t/f.disc)
		u := 0.5 * (v + r)
		du := 0.5 * (1 + (v+2*dt/f.disc)/r)
		return t * u / f.eta, (dt*u + t*du) / f.eta, 0
	case FixedPitch:
		c := f.dia / (2 * math.Pi * f.slope)
		q, dq := c*(t-f.t2*v*v), c*(dt-2*f.t2*v)
		g := 2 * math.Pi / (f.rhoD4 * f.dia)
		d2 := f.dia * f.dia
		n = math.Sqrt((g*q - f.cp1*v*v/d2) / f.cp0)
		dn := (g*dq - 2*f.cp1*v/d2) / (f.cp0 * 2 * n)
		return 2 * math.Pi * n * q, 2 * math.Pi * (dn*q + n*dq), n
	}
	d2 := f.dia * f.dia
	scale := 1 / (f.rho * d2)
	tau := t * scale / (v * v)
	j := f.table.advanceOf(tau)
	ct, dct, cp, dcp := f.table.at(j)
	dtau := dt*scale/(v*v) - 2*tau/v
	// tau = CT/J^2, so dtau/dJ = (CT' - 2 CT/J)/J^2.
	dj := dtau * j * j / (dct - 2*ct/j)
	g := f.rho * d2 * v * v / (j * j * j)
	p = g * v * cp
	dp = g * (3*cp + v*(dcp-3*cp/j)*dj)
	return p, dp, v / (j * f.dia)
}

// revs is the rpm (rev/s) at full throttle at speed v; 0 where the propeller has none.
func (f *flight) revs(v float64) float64 {
	switch f.kind {
	case FixedPitch:
		d2 := f.dia * f.dia
		return math.Sqrt((2*math.Pi*f.torque0/(f.rhoD4*f.dia) - f.cp1*v*v/d2) / f.cp0)
	case Tabulated:
		return v / (f.advance(v) * f.dia)
	}
	return 0
}

// capped is the flight with the rpm held to its maximum, n: for a fixed-pitch propeller the curve at that rpm itself, which is again
// of the form t0 + t2 V^2; for a tabulated one the full-throttle curve where the rpm is below.
func (z *Solver) capped(f, g *flight, n float64) {
	*g = *f
	z.serial++
	g.serial = z.serial
	g.cap = n
	if f.kind == FixedPitch {
		g.t0 = f.slope * f.rhoD4 * f.cp0 * n * n
		g.t2 = f.t2 + f.slope*f.rhoD4/(f.dia*f.dia)*f.cp1
	}
}

// efficientAdvance is the advance ratio of best efficiency of a fixed-pitch propeller: the root of d(J CT/CP)/dJ with
// CT = m CP + b J^2 and CP = cp0 + cp1 J^2, a quadratic in J^2.
func (p *Propeller) efficientAdvance() float64 {
	m, b, c0, c1 := p.PolarSlope, p.PolarIntercept, p.PowerCoefficientStatic, p.PowerCoefficientSlope
	q2, q1, q0 := c1*(m*c1+b), c0*(2*m*c1+3*b), m*c0*c0
	disc := max(q1*q1-4*q2*q0, 0)
	return math.Sqrt(2 * q0 / (math.Sqrt(disc) - q1))
}
