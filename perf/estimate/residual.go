package estimate

import (
	"math"

	"levelspan/perf"
)

// flown is a run made ready: what no value of the unknowns changes.
type flown struct {
	run     *Run
	outcome Outcome
	rows    int // of residuals: 2 where a setting and an rpm are read
	// The air with the temperature and the pressure altitude off by about half a standard deviation either way.
	warm, cold, above, below perf.Air
	warmth, height           float64  // warm less cold, K; above less below, m
	tas, tasSD               float64  // of GPS legs
	byRevolutions            bool     // the thrust is that of the rpm read
	v                        perf.TAS // true airspeed of the reading with the present position error
}

// prepare readies a run. A run that cannot be used keeps why in its outcome.
func (f *flown) prepare(r *Run, a *perf.Aeroplane, s *Instruments) {
	*f = flown{run: r, rows: 1, outcome: r.usable(a)}
	if f.outcome != Fitted {
		return
	}
	air := &r.Air
	f.warm, f.cold, f.above, f.below = *air, *air, *air, *air
	moved := func(dst *perf.Air, dh, dt float64) float64 {
		b, err := perf.AirAt(air.PressureAltitude+dh, air.Temperature+dt, air.DewPoint)
		if err != nil {
			return 0
		}
		*dst = b
		return math.Abs(dh + dt)
	}
	f.warmth = moved(&f.warm, 0, 0.5*s.Temperature) + moved(&f.cold, 0, -0.5*s.Temperature)
	f.height = moved(&f.above, 0.5*s.Altitude, 0) + moved(&f.below, -0.5*s.Altitude, 0)
	switch r.Kind {
	case Level, Climb:
		read := r.readsRevolutions(a)
		switch {
		case read && r.HasSetting:
			f.rows = 2
		case read:
			f.byRevolutions = true
		}
		if r.HasSetting && !(a.Engine.FullPower(air) > 0) {
			f.outcome = NoThrust
		}
	case GPSLegs:
		v := float64(air.TASFromCAS(perf.CAS(r.IAS)))
		w := Legs(r.Legs, s.IAS*v/float64(r.IAS))
		f.outcome, f.tas, f.tasSD = w.Outcome, float64(w.TAS), w.TASSD
	}
}

// readings is one set of readings of a run, for a residual; a residual is what was flown less what the model says:
//
//	level, climb, glide  rate times the climb factor, less the specific excess power, m/s
//	                     second row: rpm less the one that the setting gives, rev/s
//	stall                calibrated airspeed at which the model stalls less that read, m/s: the error of the reading itself, so that a low reading
//	                     weighs no more than a high one; reported as a lift coefficient
//	gps-legs             calibrated airspeed of the legs' true airspeed less that of the IAS, m/s
type readings struct {
	ias, mass, setting, revolutions, rate, tas float64
	air                                        *perf.Air
	v                                          perf.TAS // of ias in air where it is known already; 0: not
}

func (f *flown) readings() readings {
	r := f.run
	return readings{float64(r.IAS), r.Mass, r.Setting, r.RevolutionRate, r.Rate, f.tas, &r.Air, 0}
}

// residual is that of readings d of run f with the numbers c.
func (f *flown) residual(c *craft, e *perf.Evaluator, d *readings) (r [2]float64) {
	g := f.run.Configuration
	cas := c.cas(g, d.ias)
	if f.run.Kind == GPSLegs {
		r[0] = float64(d.air.CASFromTAS(perf.TAS(d.tas))) - cas
		return r
	}
	s := perf.State{Air: *d.air, Mass: d.mass, Configuration: g}
	if f.run.Kind == Stall {
		r[0] = float64(d.air.CASFromTAS(e.StallSpeed(&c.a, &s))) - cas
		return r
	}
	v := d.v
	if v == 0 {
		v = d.air.TASFromCAS(perf.CAS(cas))
	}
	s.TAS = v
	if f.run.Kind == Glide {
		s.PowerOff, s.DragArea = true, c.area[f.run.Propeller]
	} else if f.byRevolutions {
		s.Revolutions = d.revolutions
	} else {
		s.PowerFraction = d.setting
		if f.rows == 2 {
			r[1] = d.revolutions - e.RevolutionRate(&c.a, &s)
		}
	}
	r[0] = d.rate*d.air.ClimbFactor(v) - e.SpecificExcessPower(&c.a, &s)
	return r
}

// spread is the covariance of a residual from the readings' spreads, through central differences over about a standard deviation:
// s[0], s[1] of the first row and the second, s[2] between them.
func (f *flown) spread(c *craft, e *perf.Evaluator, s *Instruments) (v [3]float64) {
	r := f.run
	d := f.readings()
	add := func(low, high [2]float64, step, sd float64) {
		if !(step > 0) {
			return
		}
		a, b := (high[0]-low[0])/step*sd, (high[1]-low[1])/step*sd
		v[0] += a * a
		v[1] += b * b
		v[2] += a * b
	}
	low, high := d, d
	low.ias, high.ias = max(d.ias-0.5*s.IAS, 1e-3), d.ias+0.5*s.IAS
	add(f.residual(c, e, &low), f.residual(c, e, &high), high.ias-low.ias, s.IAS)
	low, high = d, d
	low.air, high.air = &f.cold, &f.warm
	add(f.residual(c, e, &low), f.residual(c, e, &high), f.warmth, s.Temperature)
	low.air, high.air = &f.below, &f.above
	add(f.residual(c, e, &low), f.residual(c, e, &high), f.height, s.Altitude)
	if r.Kind == GPSLegs {
		low, high = d, d
		low.tas, high.tas = d.tas-0.5*f.tasSD, d.tas+0.5*f.tasSD
		add(f.residual(c, e, &low), f.residual(c, e, &high), f.tasSD, f.tasSD)
		return v
	}
	d.v = d.air.TASFromCAS(perf.CAS(c.cas(r.Configuration, d.ias)))
	f.v = d.v
	low, high = d, d
	low.mass, high.mass = d.mass*(1-0.5*s.Mass), d.mass*(1+0.5*s.Mass)
	add(f.residual(c, e, &low), f.residual(c, e, &high), high.mass-low.mass, s.Mass*d.mass)
	if r.Kind == Stall {
		return v
	}
	rate := s.Rate * d.air.ClimbFactor(d.v)
	v[0] += rate * rate
	if r.Kind == Glide {
		return v
	}
	if f.byRevolutions {
		low, high = d, d
		low.revolutions, high.revolutions = d.revolutions-0.5*s.RevolutionRate, d.revolutions+0.5*s.RevolutionRate
		low.revolutions = max(low.revolutions, 1e-3)
		add(f.residual(c, e, &low), f.residual(c, e, &high), high.revolutions-low.revolutions, s.RevolutionRate)
		return v
	}
	if r.Setting != 1 {
		low, high = d, d
		low.setting, high.setting = d.setting*(1-0.5*s.Power), min(d.setting*(1+0.5*s.Power), 1)
		add(f.residual(c, e, &low), f.residual(c, e, &high), high.setting-low.setting, s.Power*d.setting)
	}
	if f.rows == 2 {
		v[1] += s.RevolutionRate * s.RevolutionRate
	}
	return v
}

// knows reports whether run f says something of an unknown.
func (f *flown) knows(k *unknown) bool {
	r := f.run
	switch k.kind {
	case PositionOffset, PositionSlope:
		return true
	case MaximumLift:
		return r.Kind == Stall && k.index == r.Configuration
	}
	switch r.Kind {
	case Stall, GPSLegs:
		return false
	case Glide:
		return k.kind <= OswaldEfficiency || k.kind == PropellerDragArea && k.index == int(r.Propeller)
	}
	return k.kind != PropellerDragArea && !(k.kind == PowerScale && f.byRevolutions)
}

// lift is a stall's residual as a lift coefficient, that flown less cl_max, with its standard deviation: that of the speed by the slope between the
// speed read and the model's.
func (f *flown) lift(c *craft, residual, sd float64) (cl, clSD float64) {
	r := f.run
	cas := c.cas(r.Configuration, float64(r.IAS))
	s := perf.State{Air: r.Air, Mass: r.Mass, Configuration: r.Configuration, TAS: r.Air.TASFromCAS(perf.CAS(cas))}
	flown := c.a.LiftCoefficient(&s)
	cl = flown - c.a.Configurations[r.Configuration].MaximumLift
	if math.Abs(residual) > 1e-6*sd {
		return cl, cl / residual * sd
	}
	return cl, 2 * flown / max(cas, 1) * sd
}
