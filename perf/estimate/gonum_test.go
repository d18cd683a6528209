package estimate

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/optimize"

	"levelspan/perf"
)

// The same posterior written down a second time, from the contract and the doc comments, with the solver's public curves, and handed to a
// general-purpose minimiser that knows nothing of residuals.

// second is a posterior for the minimiser: x holds the logarithms over the prior of cd0, e, cl_max (clean, landing), power and the propeller's numbers; the
// drag areas stopped and windmilling, offset and slope.
type second struct {
	c     *Case
	v0    float64
	sigma [][3]float64 // per run: the spreads' covariance, held
	z     perf.Solver
}

func (s *second) propellerNumbers(a *perf.Aeroplane) []*float64 {
	p := &a.Propeller
	switch p.Kind {
	case perf.ConstantEfficiency:
		return []*float64{&p.Efficiency}
	case perf.ConstantSpeed:
		return []*float64{&p.BladeEfficiency}
	case perf.FixedPitch:
		return []*float64{&p.PolarSlope, &p.PolarIntercept, &p.PowerCoefficientStatic, &p.PowerCoefficientSlope}
	}
	return nil
}

// plane is the aeroplane of x without its position error, and the rest.
func (s *second) plane(x []float64) (a perf.Aeroplane, area [stateCount]float64, offset, slope float64) {
	a = *s.c.Prior
	a.Configurations = append([]perf.Configuration(nil), a.Configurations...)
	a.Polar.ParasiteDrag *= math.Exp(x[0])
	a.Polar.OswaldEfficiency *= math.Exp(x[1])
	a.Configurations[0].MaximumLift *= math.Exp(x[2])
	a.Configurations[1].MaximumLift *= math.Exp(x[3])
	a.Engine.RatedPower *= math.Exp(x[4])
	i := 5
	for _, p := range s.propellerNumbers(&a) {
		*p *= math.Exp(x[i])
		i++
	}
	area[Stopped], area[Windmilling] = x[i], x[i+1]
	return a, area, x[i+2], x[i+3]
}

// moves are errors of the readings.
type moves struct{ ias, temperature, height, mass, setting, revolutions float64 }

// scaled is the moves times f.
func (m moves) scaled(f float64) moves {
	return moves{m.ias * f, m.temperature * f, m.height * f, m.mass * f, m.setting * f, m.revolutions * f}
}

// residual is that of a run with its readings moved.
func (s *second) residual(x []float64, r *Run, m moves, tas float64) [2]float64 {
	a, area, offset, slope := s.plane(x)
	air, err := perf.AirAt(r.Air.PressureAltitude+m.height, r.Air.Temperature+m.temperature, r.Air.DewPoint)
	if err != nil {
		panic(err)
	}
	ias := float64(r.IAS) + m.ias
	k := &a.Configurations[r.Configuration]
	cas := float64(k.CASFromIAS(perf.IAS(ias))) + offset + slope*(min(max(ias, s.v0/4), 4*s.v0)-s.v0)
	v := air.TASFromCAS(perf.CAS(cas))
	mass := r.Mass * (1 + m.mass)
	rho, w := air.Density, mass*perf.StandardGravity
	switch r.Kind {
	case GPSLegs:
		return [2]float64{float64(air.CASFromTAS(perf.TAS(tas))) - cas}
	case Stall:
		stall := math.Sqrt(2 * w / (rho * a.WingArea * k.MaximumLift))
		return [2]float64{float64(air.CASFromTAS(perf.TAS(stall))) - cas}
	}
	// Drag of level flight by the polar, thrust by the solver or, at an rpm, by the propeller's own relations.
	q := 0.5 * rho * float64(v) * float64(v)
	cl := w / (q * a.WingArea)
	cd := a.Polar.ParasiteDrag + k.ParasiteDragRise + cl*cl/(math.Pi*a.WingSpan*a.WingSpan/a.WingArea*a.Polar.OswaldEfficiency)
	drag, thrust, rpm := q*a.WingArea*cd, 0.0, 0.0
	switch {
	case r.Kind == Glide:
		drag += q * area[r.Propeller]
	case r.HasSetting:
		if err := s.z.Prepare(&a, &perf.Condition{Mass: mass, Air: air, Configuration: r.Configuration, PowerFraction: r.Setting + m.setting}); err != nil {
			panic(err)
		}
		thrust = s.z.Thrust(v)
		if r.RevolutionRate > 0 {
			rpm = r.RevolutionRate + m.revolutions - s.z.FullSpeed(v)
		}
	default:
		p := &a.Propeller
		n := r.RevolutionRate + m.revolutions
		j := float64(v) / (n * p.Diameter)
		cp := p.PowerCoefficientStatic + p.PowerCoefficientSlope*j*j
		thrust = rho * n * n * math.Pow(p.Diameter, 4) * (p.PolarSlope*cp + p.PolarIntercept*j*j)
	}
	// Climb at constant equivalent airspeed: the true airspeed grows as the density falls.
	above, err1 := perf.AirAt(air.PressureAltitude+5, air.Temperature-0.0065*5, air.DewPoint)
	below, err2 := perf.AirAt(air.PressureAltitude-5, air.Temperature+0.0065*5, air.DewPoint)
	if err1 != nil || err2 != nil {
		panic("the air of a run has none beside it")
	}
	fall := (math.Log(below.Density) - math.Log(above.Density)) / 10
	factor := air.Temperature/perf.StandardTemperature(air.PressureAltitude) + float64(v)*float64(v)*fall/(2*perf.StandardGravity)
	return [2]float64{r.Rate*factor - (thrust-drag)*float64(v)/w, rpm}
}

// spreads fills sigma at x, by central differences over a standard deviation of each reading.
func (s *second) spreads(x []float64) {
	i := &s.c.Instruments
	s.sigma = s.sigma[:0]
	for k := range s.c.Runs {
		r := &s.c.Runs[k]
		var v [3]float64
		tas, tasSD := s.legs(r)
		list := []moves{{ias: i.IAS}, {temperature: i.Temperature}, {height: i.Altitude}, {mass: i.Mass}}
		if r.HasSetting && r.Setting != 1 {
			list = append(list, moves{setting: i.Power * r.Setting})
		}
		if r.RevolutionRate > 0 {
			list = append(list, moves{revolutions: i.RevolutionRate})
		}
		for _, m := range list {
			high, low := s.residual(x, r, m.scaled(0.5), tas), s.residual(x, r, m.scaled(-0.5), tas)
			a, b := high[0]-low[0], high[1]-low[1]
			v[0], v[1], v[2] = v[0]+a*a, v[1]+b*b, v[2]+a*b
		}
		switch r.Kind {
		case GPSLegs:
			d := s.residual(x, r, moves{}, tas+tasSD/2)[0] - s.residual(x, r, moves{}, tas-tasSD/2)[0]
			v[0] += d * d
		case Level, Climb, Glide:
			moved := *r
			moved.Rate++
			d := s.residual(x, &moved, moves{}, tas)[0] - s.residual(x, r, moves{}, tas)[0]
			v[0] += d * d * i.Rate * i.Rate
		}
		s.sigma = append(s.sigma, v)
	}
}

func (s *second) legs(r *Run) (tas, sd float64) {
	if r.Kind != GPSLegs {
		return 0, 0
	}
	w := Legs(r.Legs, s.c.Instruments.IAS*float64(r.Air.TASFromCAS(perf.CAS(r.IAS)))/float64(r.IAS))
	return float64(w.TAS), w.TASSD
}

// misfit is minus the logarithm of the posterior, spreads held.
func (s *second) misfit(x []float64) float64 {
	b := &s.c.Beliefs
	spread := func(relative float64) float64 { return math.Sqrt(math.Log(1 + relative*relative)) }
	sum := 0.0
	prior := func(x, sd float64) { sum += 0.5 * x * x / (sd * sd) }
	prior(x[0], spread(b.ParasiteDrag))
	prior(x[1], spread(b.OswaldEfficiency))
	prior(x[2], spread(b.MaximumLift))
	prior(x[3], spread(b.MaximumLift))
	prior(x[4], spread(b.Power))
	i := 5
	for range s.propellerNumbers(s.c.Prior) {
		prior(x[i], spread(b.Propeller))
		i++
	}
	stopped, windmilling, _ := s.c.Prior.PropellerDragArea()
	prior(x[i]-stopped, 0.5*stopped)
	prior(x[i+1]-windmilling, 0.5*windmilling)
	prior(x[i+2], b.PositionError)
	prior(x[i+3], b.PositionError/s.v0)
	for k := range s.c.Runs {
		r := &s.c.Runs[k]
		tas, _ := s.legs(r)
		z, v := s.residual(x, r, moves{}, tas), s.sigma[k]
		d2 := z[0] * z[0] / v[0]
		if r.HasSetting && r.RevolutionRate > 0 {
			d2 = (z[0]*z[0]*v[1] - 2*z[0]*z[1]*v[2] + z[1]*z[1]*v[0]) / (v[0]*v[1] - v[2]*v[2])
		}
		sum += 3 * math.Log1p(d2/6)
	}
	return sum
}

// TestAgreesWithAGeneralMinimiser: the fit is where a general-purpose minimiser of the same posterior, written a second time, ends that starts from the
// prior: the spreads taken anew at its end until it moves no more. To 1e-6 of each unknown's spread before flight.
func TestAgreesWithAGeneralMinimiser(t *testing.T) {
	for _, k := range kinds[:3] {
		c, p := fitted(t, 21, k.kind, richPlan())
		s := second{c: &c, v0: 2 * math.Sqrt(2*c.Prior.MaximumMass*perf.StandardGravity/(perf.SeaLevelDensity*c.Prior.WingArea*c.Prior.Configurations[0].MaximumLift))}
		n := len(p.x)
		at := make([]float64, n)
		at[n-4], at[n-3], _ = c.Prior.PropellerDragArea()
		// In units of about the posterior's spreads, so that one step of a finite difference does for all.
		scale, full := make([]float64, n), make([]float64, n)
		for i := range scale {
			scale[i] = p.l.list[i].spread * math.Sqrt(p.cov[i*n+i])
		}
		place := func(y []float64) []float64 {
			for i := range full {
				full[i] = at[i] + scale[i]*y[i]
			}
			return full
		}
		problem := optimize.Problem{
			Func: func(y []float64) float64 { return s.misfit(place(y)) },
			Grad: func(g, y []float64) {
				z := append([]float64(nil), y...)
				const h = 1e-3
				for i := range z {
					d := func(f float64) float64 { z[i] = y[i] + f*h; return s.misfit(place(z)) }
					g[i] = (8*(d(1)-d(-1)) - (d(2) - d(-2))) / (12 * h)
					z[i] = y[i]
				}
			},
		}
		s.spreads(at)
		for range 12 {
			result, err := optimize.Minimize(problem, make([]float64, n), &optimize.Settings{GradientThreshold: 2e-8, MajorIterations: 400}, &optimize.BFGS{})
			if result == nil {
				t.Fatal(err)
			}
			moved := 0.0
			for i := range at {
				moved = max(moved, math.Abs(result.X[i]))
				at[i] += scale[i] * result.X[i]
			}
			s.spreads(at)
			if moved < 1e-8 {
				break
			}
		}
		worst := 0.0
		for i := range at {
			u := &p.l.list[i]
			got := p.x[i]
			if u.log {
				got -= u.center
			}
			d := math.Abs(got-at[i]) / u.spread
			worst = max(worst, d)
			if !(d <= 1e-6) {
				t.Errorf("%s, %s: %.10f, the minimiser has %.10f: %.2g of the believed spread", k.name, p.Parameters[i].Name, got, at[i], d)
			}
		}
		t.Logf("%s: %.1g of a believed spread at most", k.name, worst)
	}
}
