package perf

import (
	"math"

	"levelspan/perf/num"
)

// turning is the thrust-limited side of a level turn. With m = n/V^2 the balance T = D is c1 m^2 - b1 m - (T/V^2 - a) = 0, where b1
// and c1 are those of load factor 1. The radius is 1/(g sqrt(m^2 - 1/V^4)), so the tightest turn has the greatest m^2 - 1/V^4. At
// the lift limit m is the same at every speed.
type turning struct {
	f    *flight
	unit drag // at load factor 1
	lift float64
}

// at is V, the thrust-limited m, and half of V^5 d(m^2 - 1/V^4)/dV, at parameter p. m is 0, and the last -1, where the thrust carries nothing.
func (t *turning) at(p float64) (v, m, half float64) {
	return t.of(t.f.at(p))
}

func (t *turning) of(v, th, dth float64) (_, m, half float64) {
	x := v * v
	disc := t.unit.b*t.unit.b + 4*t.unit.c*(th/x-t.unit.a)
	if !(disc > 0) {
		return v, 0, -1
	}
	r := math.Sqrt(disc)
	m = (t.unit.b + r) / (2 * t.unit.c)
	if !(m > 0) {
		return v, 0, -1
	}
	return v, m, m*(dth-2*th/v)/r*x*v + 2
}

// crossover is the speed at which lift and thrust limit the turn alike, with its parameter. There the drag coefficient is that of the
// greatest lift, so T/V^2 is a constant of the aeroplane and every propeller has a closed form.
func (t *turning) crossover() (p, v float64) {
	f, d := t.f, &t.unit
	drag := d.a - d.b*t.lift + d.c*t.lift*t.lift
	switch f.kind {
	case ConstantEfficiency:
		v = math.Cbrt(f.useful / drag)
		return v, v
	case FixedPitch:
		v = math.Sqrt(f.t0 / (drag - f.t2))
		return v, v
	case ConstantSpeed:
		// w = omega V with omega (1 + omega) = drag/disc
		omega := 2 * drag / f.disc / (1 + math.Sqrt(1+4*drag/f.disc))
		v = math.Cbrt(f.useful / (drag * (1 + omega)))
		return v * (1 + omega), v
	}
	p = f.table.advanceOf(drag / (f.rho * f.dia * f.dia))
	v, _, _ = f.at(p)
	return p, v
}

// tightestTurn fills the turn of least radius that thrust at the condition's setting and lift can hold level.
func (z *Solver) tightestTurn(dst *Turn) {
	f := &z.now
	stall := z.k.stall(f.rho, f.weight, 1)
	t := turning{f: f, unit: z.k.drag(f.rho, f.weight, 1), lift: 1 / (stall * stall)}
	p, v := t.crossover()
	by := SetByLift
	m := t.lift
	if !(v > stall) {
		by = SetByPower
		v, p = stall, f.param(stall)
		_, m, _ = t.at(p)
	}
	best := m*m - 1/(v*v*v*v)
	if f.kind == Tabulated {
		z.scanTurn(&t, p, &best, &v, &m, &by)
	} else if _, _, half := t.at(p); half > 0 {
		a, fa := p, half
		b, fb := a, fa
		for i := 0; i < 100 && fb > 0; i++ {
			a, fa = b, fb
			b *= 1.4
			_, _, fb = t.at(b)
		}
		t.improve(a, fa, b, fb, &best, &v, &m, &by)
	}
	if !(best*v*v*v*v > 1e-12) {
		return
	}
	load := m * v * v
	*dst = Turn{
		Applies: true, SetBy: by, LoadFactor: load, Bank: math.Acos(1 / load),
		Radius: 1 / (StandardGravity * math.Sqrt(best)), TAS: TAS(v),
	}
	dst.Rate = v / dst.Radius
}

// improve takes the local optimum between two parameters, rising at the first and falling at the second, if it is better.
func (t *turning) improve(a, fa, b, fb float64, best, v, m *float64, by *SetBy) {
	var r num.Root
	r.Start(a, fa, b, fb, 0)
	for r.Next() {
		_, _, half := t.at(r.X)
		r.Put(half)
	}
	v2, m2, _ := t.at(r.X)
	if q := m2*m2 - 1/(v2*v2*v2*v2); q > *best {
		*best, *v, *m, *by = q, v2, m2, SetByPower
	}
}

// scanTurn looks for every local optimum of a tabulated propeller beyond the first parameter.
func (z *Solver) scanTurn(t *turning, p float64, best, v, m *float64, by *SetBy) {
	a := p
	_, _, fa := t.at(a)
	for i := range t.f.table.node {
		g := &t.f.table.node[i]
		b := g.j
		if b <= p*(1+1e-9) {
			continue
		}
		v2, m2, fb := t.of(t.f.atNode(g))
		if fa > 0 && fb <= 0 {
			t.improve(a, fa, b, fb, best, v, m, by)
		}
		if m2*v2*v2 < 1 && v2 > z.vx {
			return
		}
		a, fa = b, fb
	}
	for i := 0; i < 60 && fa > 0; i++ {
		b := a * 1.5
		_, _, fb := t.at(b)
		if fb <= 0 {
			t.improve(a, fa, b, fb, best, v, m, by)
		}
		a, fa = b, fb
	}
}
