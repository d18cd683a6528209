package perf

import "math"

// craft is what an aeroplane brings into every height and mass of one question: computed once.
type craft struct {
	area     float64 // S
	k        float64 // 1/(pi A e)
	clmd     float64 // CLmd
	cd0      float64 // cd0 + dcd0
	clmax    float64
	load     float64 // n
	setting  float64
	kind     PropellerKind
	diameter float64
	disc     float64 // disc area, m^2
	cap      float64 // maximum speed, rev/s; +Inf where none is known
}

func (k *craft) set(a *Aeroplane, c *Condition) {
	g := &a.Configurations[c.Configuration]
	d := a.Propeller.Diameter
	*k = craft{
		area:     a.WingArea,
		k:        a.WingArea / (math.Pi * a.WingSpan * a.WingSpan * a.Polar.OswaldEfficiency),
		clmd:     a.Polar.LiftOfLeastDrag,
		cd0:      a.Polar.ParasiteDrag + g.ParasiteDragRise,
		clmax:    g.MaximumLift,
		load:     1 / math.Cos(c.Bank),
		setting:  c.PowerFraction,
		kind:     a.Propeller.Kind,
		diameter: d,
		disc:     math.Pi / 4 * d * d,
		cap:      math.Inf(1),
	}
	if a.Engine.MaximumSpeed > 0 && (k.kind == FixedPitch || k.kind == Tabulated) {
		k.cap = a.Engine.MaximumSpeed
	}
}

// drag is D(V) = a V^2 - b + c/V^2 of one mass, load factor and density: CD = cd0 + k (CL - CLmd)^2 with CL = n W/(q S),
// multiplied out.
type drag struct {
	a, b, c float64
}

func (k *craft) drag(rho, weight, load float64) drag {
	nw := load * weight
	return drag{
		a: 0.5 * rho * k.area * (k.cd0 + k.k*k.clmd*k.clmd),
		b: 2 * k.k * k.clmd * nw,
		c: 2 * k.k * nw * nw / (rho * k.area),
	}
}

// stall is the slowest speed at which the wing carries load times the weight, m/s.
func (k *craft) stall(rho, weight, load float64) float64 {
	return math.Sqrt(2 * load * weight / (rho * k.area * k.clmax))
}

// at is the drag at v > 0, N.
func (d *drag) at(v float64) float64 {
	x := v * v
	return d.a*x - d.b + d.c/x
}

// slope is dD/dV.
func (d *drag) slope(v float64) float64 { return 2 * (d.a*v - d.c/(v*v*v)) }

// powerSlope is d(D V)/dV.
func (d *drag) powerSlope(v float64) float64 {
	x := v * v
	return 3*d.a*x - d.b - d.c/x
}

// leastDrag is the speed of least drag: V^4 = c/a.
func (d *drag) leastDrag() float64 { return math.Sqrt(math.Sqrt(d.c / d.a)) }

// leastPower is the speed of least D V: the positive root of 3 a x^2 - b x - c = 0 with x = V^2.
func (d *drag) leastPower() float64 { return math.Sqrt(positiveRoot(3*d.a, -d.b, -d.c)) }

// positiveRoot is the one positive root of p x^2 + q x + r = 0 for p > 0 and r < 0, without cancellation.
func positiveRoot(p, q, r float64) float64 {
	s := math.Sqrt(q*q - 4*p*r)
	if q > 0 {
		return -2 * r / (q + s)
	}
	return (s - q) / (2 * p)
}

// bothRoots are the two roots of p x^2 - q x + r = 0 for p, r > 0; false where there are no positive ones.
func bothRoots(p, q, r float64) (low, high float64, ok bool) {
	disc := q*q - 4*p*r
	if !(q > 0 && disc >= 0) {
		return 0, 0, false
	}
	s := 0.5 * (q + math.Sqrt(disc))
	return r / s, s / p, true
}
