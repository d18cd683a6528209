package perf

import "math"

// Solver answers questions about one aeroplane in one condition. It owns all working store, so that a solve
// allocates nothing once it has seen a propeller table of that length; it is not safe for concurrent use. The zero value is
// ready. It keeps a copy of what it was given, but the lists of the aeroplane are shared: prepare again after changing them.
type Solver struct {
	a                     Aeroplane
	c                     Condition
	k                     craft
	day                   day
	now                   flight // today
	other                 flight // today with the rpm held
	high                  flight // at another height
	table                 propellerTable
	nodes                 []point // scan of the flight whose serial is scanned
	serial                uint64
	scanned               uint64
	hump                  float64 // advance ratio of the greatest climb seen at a glance
	peak                  point   // of the greatest excess thrust that greatestGradient found by scanning
	highest, highestSpeed float64 // height of high, and the speed of the greatest climb there
	above, there          float64 // from this height upwards the climb is known to be less than there
	overhead              bool    // there is a height of level flight
	vx, excess            float64 // speed of the greatest excess thrust, and that thrust
	vy, power             float64 // speed of the greatest excess power, and that power
	neverExceed           float64 // TAS; +Inf where none is placarded
	tasBinds              bool
	lowJ, highJ           float64 // span of the propeller's model
	levelRevs             [KeyCount]float64
	faults                faults
	ready                 bool
}

// Prepare readies the solver for the curve functions, without solving the limits. The error is that of Validate: joined *DomainError.
// After an error the curve functions give 0.
func (z *Solver) Prepare(a *Aeroplane, c *Condition) error {
	z.ready = false
	z.faults = nil
	a.validate(&z.faults, &z.table)
	c.validate(&z.faults, a)
	if len(z.faults) > 0 {
		return z.faults.err()
	}
	z.a, z.c = *a, *c
	z.k.set(a, c)
	z.day = c.Air.day()
	s := z.day.at(c.Air.PressureAltitude)
	// What the caller holds, not what went through the deviation and back.
	s.temperature, s.density, s.pressure, s.vapour = c.Air.Temperature, c.Air.Density, c.Air.Pressure, c.Air.VapourPressure
	z.fly(&z.now, &s, c.Mass)
	switch a.Propeller.Kind {
	case FixedPitch:
		j := a.Propeller.efficientAdvance()
		z.lowJ, z.highJ = lowAdvance*j, highAdvance*j
	case Tabulated:
		t := a.Propeller.Table
		z.lowJ, z.highJ = t[0].AdvanceRatio, t[len(t)-1].AdvanceRatio
	}
	z.highest = math.NaN()
	z.ready = true
	return nil
}

// Solve fills dst with every limit, ceiling, turn and inverse answer. The error is that of Validate (joined
// faults, which Faults takes apart), and dst is then zero; having no level flight is an Outcome, not an error.
func (z *Solver) Solve(a *Aeroplane, c *Condition, dst *Answer) error {
	*dst = Answer{}
	if err := z.Prepare(a, c); err != nil {
		return err
	}
	f := &z.now
	z.vx, z.excess = z.greatestGradient(f)
	z.vy, z.power = z.greatestRate(f)
	z.placards(dst)
	s, level := z.levelFlight(dst)
	z.airframeLimits(dst)
	if level {
		z.levelLimits(dst, s)
		z.tightestTurn(&dst.Turn)
	}
	z.ceilings(dst)
	z.levelAllowance(dst)
	if c.ClimbGradient > 0 {
		z.allowance(&dst.Climb, c.ClimbGradient, &dst.Absolute)
	}
	for k := range dst.Limits {
		if l := &dst.Limits[k]; l.Applies && l.CAS == 0 {
			z.readings(l)
		}
	}
	z.cautions(dst, s, z.k.stall(f.rho, f.weight, 1))
	return nil
}

// placards fills the limits that come from the papers alone.
func (z *Solver) placards(dst *Answer) {
	p := &z.a.Placards
	z.neverExceed, z.tasBinds = math.Inf(1), false
	if p.NeverExceedCAS > 0 {
		z.neverExceed = float64(z.c.Air.TASFromCAS(p.NeverExceedCAS))
	}
	if v := float64(p.NeverExceedTAS); v > 0 && v < z.neverExceed {
		z.neverExceed, z.tasBinds = v, true
	}
	if !math.IsInf(z.neverExceed, 1) {
		l := &dst.Limits[NeverExceed]
		*l = Limit{Applies: true, SetBy: SetByPlacard, TAS: TAS(z.neverExceed)}
	}
	if p.ManoeuvringCAS > 0 {
		cas := CAS(float64(p.ManoeuvringCAS) * math.Sqrt(min(1, z.c.Mass/z.a.MaximumMass)))
		l := &dst.Limits[Manoeuvring]
		*l = Limit{Applies: true, SetBy: SetByPlacard, TAS: z.c.Air.TASFromCAS(cas)}
	}
}

// held is v, or the stall where that is faster.
func (f *flight) held(v float64) (float64, SetBy) {
	if v < f.stall {
		return f.stall, SetByLift
	}
	return v, SetByOptimum
}

// airframeLimits fills the limits that need no level flight.
func (z *Solver) airframeLimits(dst *Answer) {
	f := &z.now
	dst.Limits[Stall] = Limit{Applies: true, SetBy: SetByLift, TAS: TAS(f.stall)}
	v, by := f.held(f.leastPower())
	l := &dst.Limits[LeastPower]
	*l = Limit{Applies: true, SetBy: by, TAS: TAS(v)}
	z.cruiseFigures(l, LeastPower)
	glide, by := f.held(f.leastDrag())
	d := f.drag.at(glide)
	dst.Limits[BestGlide] = Limit{
		Applies: true, SetBy: by, TAS: TAS(glide),
		Ratio: f.weight / d, Sink: d * glide / f.weight, LeastSinkTAS: TAS(v),
	}
}

// levelLimits fills the limits that need level flight.
func (z *Solver) levelLimits(dst *Answer, s span) {
	f := &z.now
	dst.Limits[SlowestLevel] = Limit{Applies: true, SetBy: s.bySlow, TAS: TAS(s.slow)}
	l := &dst.Limits[FastestLevel]
	*l = Limit{Applies: true, SetBy: s.byFast, TAS: TAS(s.fast)}
	z.cruiseFigures(l, FastestLevel)

	w := f.weight
	dst.Limits[SteepestClimb] = Limit{
		Applies: true, SetBy: z.climbSetBy(z.vx), TAS: TAS(z.vx), Gradient: z.excess / w, Rate: z.excess * z.vx / w,
	}
	dst.Limits[FastestClimb] = Limit{
		Applies: true, SetBy: z.climbSetBy(z.vy), TAS: TAS(z.vy), Gradient: z.power / (w * z.vy), Rate: z.power / w,
	}

	// Endurance counts only where the speed can be held.
	if l := &dst.Limits[LeastPower]; float64(l.TAS) >= s.slow && float64(l.TAS) <= s.fast && l.FuelFlow > 0 {
		l.Endurance = finite(z.c.Fuel / l.FuelFlow)
	}
	if v, by, ok := z.bestRange(s); ok {
		l := &dst.Limits[BestRange]
		*l = Limit{Applies: true, SetBy: by, TAS: TAS(v)}
		z.cruiseFigures(l, BestRange)
		if l.FuelFlow > 0 {
			l.Distance = finite(z.c.Fuel / l.FuelFlow * (v - z.c.Headwind))
		}
	}
	carson := fourthRootOfThree * f.leastDrag()
	by := SetByOptimum
	if carson < s.slow {
		carson, by = s.slow, s.bySlow
	} else if carson > s.fast {
		carson, by = s.fast, s.byFast
	}
	l = &dst.Limits[Carson]
	*l = Limit{Applies: true, SetBy: by, TAS: TAS(carson)}
	z.cruiseFigures(l, Carson)
}

const fourthRootOfThree = 1.31607401295249246081921890179697

func (z *Solver) climbSetBy(v float64) SetBy {
	if v <= z.now.stall {
		return SetByLift
	}
	return SetByOptimum
}

// cruiseFigures fills what level flight takes at a limit's speed.
func (z *Solver) cruiseFigures(l *Limit, k Key) {
	v := float64(l.TAS)
	p, _, n := z.now.levelAt(v)
	l.PowerRequired = v * z.now.drag.at(v)
	l.ShaftPower = p
	z.levelRevs[k] = n
	if k != FastestLevel {
		l.FuelFlow = z.a.Engine.Flow(p)
	}
}
