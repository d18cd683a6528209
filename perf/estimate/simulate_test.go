package estimate

import (
	"math"
	"math/rand/v2"

	"levelspan/perf"
)

// The simulator: an aeroplane is drawn from the beliefs, flies a plan, and its instruments are read. It uses the solver's curves, not the evaluator that
// the fit uses, and draws every reading's error by itself.

// priorCase is a case without runs: a light aeroplane with one of the propeller kinds.
func priorCase(kind perf.PropellerKind) Case {
	a := perf.Aeroplane{
		WingArea: 16.5, WingSpan: 10.8, EmptyMass: 480, MaximumMass: 800, UsableFuel: 57.6,
		Polar: perf.Polar{ParasiteDrag: 0.034, OswaldEfficiency: 0.75},
		Configurations: []perf.Configuration{
			{Name: "clean", MaximumLift: 1.45, PositionError: []perf.PositionErrorPoint{{IAS: 25, Correction: 0.8}, {IAS: 45, Correction: 0.2}, {IAS: 60, Correction: -0.3}}},
			{Name: "landing", MaximumLift: 2.0, ParasiteDragRise: 0.035}},
		Engine: perf.Engine{Kind: perf.Piston, RatedPower: 74600, RatedSpeed: 2750 * perf.RevPerMin, DropOffConstant: 0.12,
			SpecificConsumption: 0.30 / perf.KilowattHour},
		Propeller: perf.Propeller{Kind: kind, Efficiency: 0.8, Diameter: 1.9, BladeEfficiency: 0.87},
	}
	p := &a.Propeller
	switch kind {
	case perf.FixedPitch:
		p.Diameter = 1.75
		p.PolarSlope, p.PolarIntercept, p.PowerCoefficientStatic, p.PowerCoefficientSlope = 1.75, -0.055, 0.045, -0.02
	case perf.Tabulated:
		p.Diameter = 1.75
		for i := range 15 {
			j := 0.07 * float64(i)
			p.Table = append(p.Table, perf.PropellerRow{AdvanceRatio: j, ThrustCoefficient: 0.105 * (1 - j*j*0.95 - 0.15*j), PowerCoefficient: 0.048 * (1 - 0.6*j*j*j)})
		}
	}
	return Case{Prior: &a, Beliefs: DefaultBeliefs(), Instruments: DefaultInstruments()}
}

// truth is an aeroplane drawn from the beliefs.
type truth struct {
	a    perf.Aeroplane
	area [stateCount]float64
	// by the contract's names, for the comparison
	value map[string]float64
}

// logNormal has the median m and a standard deviation of relative times its mean.
func logNormal(r *rand.Rand, m, relative float64) float64 {
	return m * math.Exp(math.Sqrt(math.Log1p(relative*relative))*r.NormFloat64())
}

func drawTruth(r *rand.Rand, c *Case) truth {
	for {
		t := truth{a: *c.Prior, value: map[string]float64{}}
		a := &t.a
		a.Configurations = append([]perf.Configuration(nil), a.Configurations...)
		put := func(name string, x float64) float64 { t.value[name] = x; return x }
		b := &c.Beliefs
		a.Polar.ParasiteDrag = put("cd0", logNormal(r, a.Polar.ParasiteDrag, b.ParasiteDrag))
		a.Polar.OswaldEfficiency = put("oswald_e", logNormal(r, a.Polar.OswaldEfficiency, b.OswaldEfficiency))
		scale := put("power_scale", logNormal(r, 1, b.Power))
		a.Engine.RatedPower *= scale
		p := &a.Propeller
		switch p.Kind {
		case perf.ConstantEfficiency:
			p.Efficiency = put("efficiency", logNormal(r, p.Efficiency, b.Propeller))
		case perf.ConstantSpeed:
			p.BladeEfficiency = put("blade_efficiency", logNormal(r, p.BladeEfficiency, b.Propeller))
		case perf.FixedPitch:
			p.PolarSlope = put("polar_slope", logNormal(r, p.PolarSlope, b.Propeller))
			p.PolarIntercept = put("polar_intercept", logNormal(r, p.PolarIntercept, b.Propeller))
			p.PowerCoefficientStatic = put("power_coefficient_static", logNormal(r, p.PowerCoefficientStatic, b.Propeller))
			p.PowerCoefficientSlope = put("power_coefficient_slope", logNormal(r, p.PowerCoefficientSlope, b.Propeller))
		}
		stopped, windmilling, feathered := c.Prior.PropellerDragArea()
		for i, m := range []float64{stopped, windmilling, feathered} {
			s := Stopped + PropellerState(i)
			x := 0.0
			for x < m/100 {
				x = m * (1 + 0.5*r.NormFloat64())
			}
			t.area[s] = put("propeller_drag_area_m2."+s.String(), x)
		}
		offset := put("position_offset_mps", b.PositionError*r.NormFloat64())
		v0 := 2 * math.Sqrt(2*a.MaximumMass*perf.StandardGravity/(1.225*a.WingArea*c.Prior.Configurations[0].MaximumLift))
		slope := put("position_slope", b.PositionError/v0*r.NormFloat64())
		for i := range a.Configurations {
			k := &a.Configurations[i]
			k.MaximumLift = put("cl_max."+k.Name, logNormal(r, k.MaximumLift, b.MaximumLift))
			was := *k
			k.PositionError = nil
			for v := perf.IAS(12); v <= 150; v += 1 {
				k.PositionError = append(k.PositionError, perf.PositionErrorPoint{IAS: v,
					Correction: float64(was.CASFromIAS(v)) - float64(v) + offset + slope*(float64(v)-v0)})
			}
		}
		if a.Validate() == nil {
			return t
		}
	}
}

// flyer reads runs of a truth.
type flyer struct {
	r *rand.Rand
	c *Case
	t *truth
	z perf.Solver
}

// excess is the truth's specific excess power at an IAS, with a setting (0: power off).
func (f *flyer) excess(g int, air perf.Air, mass, ias, setting, area float64) (ps float64, v perf.TAS, rev float64) {
	power := max(setting, 0.01)
	if err := f.z.Prepare(&f.t.a, &perf.Condition{Mass: mass, Air: air, Configuration: g, PowerFraction: power}); err != nil {
		panic(err)
	}
	v = air.TASFromCAS(f.t.a.Configurations[g].CASFromIAS(perf.IAS(ias)))
	p := -f.z.PowerRequired(v) - 0.5*air.Density*math.Pow(float64(v), 3)*area
	if setting > 0 {
		p += f.z.PowerAvailable(v)
		rev = f.z.FullSpeed(v)
	}
	return p / (mass * perf.StandardGravity), v, rev
}

// plan is one run to fly. ias is the true one; 0: as fast as full throttle carries it level.
type plan struct {
	kind      Kind
	g         int
	ias       float64
	setting   float64 // 0: the one that holds height
	height    float64
	mass      float64
	propeller PropellerState
	rpm       bool // the rpm is read, where the propeller has one
	setted    bool // the setting is read
}

// fly flies a plan and reads the instruments; false where the aeroplane cannot.
func (f *flyer) fly(p plan) (Run, bool) {
	n := f.r.NormFloat64
	s := &f.c.Instruments
	temperature := perf.StandardTemperature(p.height) + 8
	air, err := perf.AirAt(p.height, temperature, 0)
	if err != nil {
		panic(err)
	}
	// What is read: air, mass and IAS about the true ones.
	readAir, err := perf.AirAt(p.height+s.Altitude*n(), temperature+s.Temperature*n(), 0)
	if err != nil {
		panic(err)
	}
	run := Run{Kind: p.kind, Configuration: p.g, Air: readAir, Mass: p.mass * (1 + s.Mass*n()), Propeller: p.propeller}
	ias, setting := p.ias, p.setting
	switch p.kind {
	case Level:
		drift := s.Rate * n() // the height was not held quite: read as level all the same
		gap := func(ias, setting float64) float64 {
			ps, v, _ := f.excess(p.g, air, p.mass, ias, setting, 0)
			return ps - drift*air.ClimbFactor(v)
		}
		if ias == 0 {
			low, high := 36.0, 110.0
			if gap(low, setting) < 0 {
				return run, false
			}
			for range 60 {
				if m := 0.5 * (low + high); gap(m, setting) > 0 {
					low = m
				} else {
					high = m
				}
			}
			ias = low
		} else {
			low, high := 0.02, 0.9
			if gap(ias, high) < 0 || gap(ias, low) > 0 {
				return run, false
			}
			for range 60 {
				if m := 0.5 * (low + high); gap(ias, m) > 0 {
					high = m
				} else {
					low = m
				}
			}
			setting = high
		}
		_, _, rev := f.excess(p.g, air, p.mass, ias, setting, 0)
		f.set(&run, p, setting, rev)
	case Climb:
		ps, v, rev := f.excess(p.g, air, p.mass, ias, setting, 0)
		run.Rate = ps/air.ClimbFactor(v) + s.Rate*n()
		f.set(&run, p, setting, rev)
	case Glide:
		ps, v, _ := f.excess(p.g, air, p.mass, ias, 0, f.t.area[p.propeller])
		run.Rate = ps/air.ClimbFactor(v) + s.Rate*n()
	case Stall:
		f.excess(p.g, air, p.mass, 30, 0.5, 0)
		k := &f.t.a.Configurations[p.g]
		ias = float64(k.IASFromCAS(air.CASFromTAS(f.z.StallSpeed())))
	case GPSLegs:
		_, v, _ := f.excess(p.g, air, p.mass, ias, 0.5, 0)
		wn, we := 6*n(), 6*n()
		for i := range 4 {
			heading := float64(i)*math.Pi/2 + 0.2*n()
			tas := float64(v) + s.IAS*float64(v)/ias*n()
			north, east := tas*math.Cos(heading)+wn, tas*math.Sin(heading)+we
			run.Legs = append(run.Legs, Leg{GroundSpeed: math.Hypot(north, east), Track: math.Atan2(east, north)})
		}
	}
	run.IAS = perf.IAS(ias + s.IAS*n())
	return run, true
}

// set reads setting and rpm.
func (f *flyer) set(run *Run, p plan, setting, rev float64) {
	s := &f.c.Instruments
	turns := f.c.Prior.Propeller.Kind == perf.FixedPitch || f.c.Prior.Propeller.Kind == perf.Tabulated
	if p.setted || !turns || setting == 1 {
		run.HasSetting, run.Setting = true, setting
		if setting != 1 {
			run.Setting = min(setting*(1+s.Power*f.r.NormFloat64()), 0.9999)
		}
	}
	if p.rpm && turns {
		run.RevolutionRate = rev + s.RevolutionRate*f.r.NormFloat64()
	}
}

// sparsePlan is a short morning; richPlan a whole test programme.
func sparsePlan() []plan {
	return []plan{
		{kind: Stall, mass: 720, height: 900}, {kind: Climb, ias: 33, setting: 1, mass: 715, height: 700, rpm: true},
		{kind: Level, setting: 1, mass: 710, height: 900, rpm: true}, {kind: Level, ias: 42, mass: 705, height: 900, rpm: true},
		{kind: Glide, ias: 32, mass: 700, height: 1200, propeller: Windmilling}, {kind: GPSLegs, ias: 40, mass: 700, height: 900},
	}
}

func richPlan() []plan {
	list := []plan{
		{kind: Stall, mass: 720, height: 900}, {kind: Stall, mass: 718, height: 900}, {kind: Stall, g: 1, mass: 716, height: 900}, {kind: Stall, g: 1, mass: 714, height: 900},
		{kind: GPSLegs, ias: 30, mass: 700, height: 900}, {kind: GPSLegs, ias: 42, mass: 700, height: 900}, {kind: GPSLegs, ias: 52, mass: 700, height: 900},
		{kind: Level, setting: 1, mass: 740, height: 300, rpm: true}, {kind: Level, setting: 1, mass: 640, height: 2200, rpm: true},
		{kind: Glide, ias: 28, mass: 700, height: 1500, propeller: Stopped}, {kind: Glide, ias: 36, mass: 700, height: 1300, propeller: Stopped},
		{kind: Glide, ias: 30, mass: 690, height: 1500, propeller: Windmilling}, {kind: Glide, ias: 40, mass: 690, height: 1500, propeller: Windmilling},
	}
	for i := range 4 {
		list = append(list, plan{kind: Climb, ias: 30 + 3*float64(i), setting: 1, mass: 720, height: 600 + 300*float64(i), rpm: i%2 == 0})
	}
	for i := range 8 {
		list = append(list, plan{kind: Level, ias: 29 + 2.6*float64(i), mass: 760 - 12*float64(i), height: 500 + 200*float64(i%4), rpm: i%2 == 0, setted: i%2 == 1})
	}
	return list
}

// campaign flies a plan in a truth of its own.
func campaign(seed uint64, kind perf.PropellerKind, plans []plan) (Case, truth) {
	r := rand.New(rand.NewPCG(seed, uint64(kind)+7))
	c := priorCase(kind)
	t := drawTruth(r, &c)
	f := flyer{r: r, c: &c, t: &t}
	for _, p := range plans {
		if run, ok := f.fly(p); ok {
			c.Runs = append(c.Runs, run)
		}
	}
	return c, t
}
