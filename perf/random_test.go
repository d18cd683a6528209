package perf

import (
	"math"
	"math/rand/v2"
)

// randomCase draws a physical aeroplane in a condition: every engine and propeller kind and power law, from hopelessly underpowered to
// absurdly strong, clean and dirty, banked, windy, placarded. It is a function of the seed.
func randomCase(seed uint64) (Aeroplane, Condition) {
	r := rand.New(rand.NewPCG(seed, 2))
	between := func(a, b float64) float64 { return a + (b-a)*r.Float64() }
	log := func(a, b float64) float64 { return a * math.Pow(b/a, r.Float64()) }
	chance := func(p float64) bool { return r.Float64() < p }

	area := log(4, 40)
	mass := area * log(15, 150)
	a := Aeroplane{
		WingArea: area, WingSpan: math.Sqrt(area * between(4, 16)),
		EmptyMass: max(5, mass*between(0.5, 1.05)),
		Polar:     Polar{ParasiteDrag: log(0.012, 0.07), OswaldEfficiency: between(0.5, 0.95)},
		Configurations: []Configuration{
			{Name: "clean", MaximumLift: between(1, 1.9)},
			{Name: "down", MaximumLift: between(1.7, 3), ParasiteDragRise: between(0, 0.06)},
		},
	}
	a.MaximumMass = max(a.EmptyMass, mass*between(0.95, 1.3))
	if chance(0.4) {
		a.Polar.LiftOfLeastDrag = between(-0.2, 0.5)
	}
	for i := range a.Configurations {
		if chance(0.3) {
			a.Configurations[i].PositionError = []PositionErrorPoint{{20, between(-2, 3)}, {40, between(-1, 2)}, {70, between(-2, 2)}}
		}
	}
	a.Engine = Engine{
		Kind: EngineKind(r.IntN(3)), Law: PowerLaw(r.IntN(2)),
		RatedPower: mass * log(15, 400), RatedSpeed: between(20, 60),
		DropOffConstant: between(0.08, 0.16), LapseExponent: between(0.5, 1),
		SpecificConsumption: between(0.2, 0.45) / KilowattHour,
	}
	e := &a.Engine
	if e.Kind == Piston && chance(0.3) {
		e.FullThrottleAltitude = between(1000, 7000)
	}
	if e.Kind == Turboprop && chance(0.7) {
		e.ThermalPower = e.RatedPower * between(1, 1.6)
	}
	if chance(0.35) {
		n := 2 + r.IntN(4)
		x := between(0.05, 0.3)
		for range n {
			e.ConsumptionTable = append(e.ConsumptionTable, ConsumptionPoint{x, between(0.24, 0.45) / KilowattHour})
			x += between(0.1, 0.35)
		}
	}
	if chance(0.4) {
		e.MaximumSpeed = e.RatedSpeed * between(0.85, 1.2)
	}
	a.Propeller = randomPropeller(r, e)
	p := &a.Placards
	if chance(0.4) {
		p.NeverExceedCAS = CAS(between(35, 110))
	}
	if chance(0.02) {
		p.NeverExceedCAS = CAS(between(5, 25))
	}
	if chance(0.3) {
		p.NeverExceedTAS = TAS(between(40, 130))
	}
	if chance(0.3) {
		p.ManoeuvringCAS = CAS(between(30, 70))
	}
	if chance(0.3) {
		p.FlapsExtendedCAS = CAS(between(25, 60))
	}
	c := Condition{
		Mass: mass, Configuration: r.IntN(2), PowerFraction: 1,
		Fuel: mass * between(0, 0.2),
	}
	if e.Kind == Electric {
		c.Fuel *= 5e5
	}
	if chance(0.3) {
		c.Bank = between(0, 60) * Degree
	}
	if chance(0.4) {
		c.PowerFraction = between(0.3, 1)
	}
	if chance(0.5) {
		c.Headwind = between(-20, 25)
	}
	if chance(0.3) {
		c.ClimbGradient = log(0.005, 0.2)
	}
	h := between(-1000, 7000)
	if chance(0.1) {
		h = between(7000, 18000)
	}
	t := StandardTemperature(h) + between(-25, 30)
	dew := 0.0
	if chance(0.3) {
		dew = max(t-between(0, 30), QuantityDewPoint.Domain().Min)
	}
	air, err := AirAt(h, t, dew)
	if err != nil {
		panic(err)
	}
	c.Air = air
	return a, c
}

// randomPropeller absorbs about the rated power at the rated speed at sea level.
func randomPropeller(r *rand.Rand, e *Engine) Propeller {
	between := func(a, b float64) float64 { return a + (b-a)*r.Float64() }
	p := Propeller{Kind: PropellerKind(r.IntN(4)), Efficiency: between(0.5, 0.9), BladeEfficiency: between(0.6, 0.95)}
	p.PolarSlope, p.PolarIntercept = between(1.2, 2.4), -between(0.03, 0.12)
	p.PowerCoefficientStatic, p.PowerCoefficientSlope = between(0.025, 0.08), -between(0, 0.05)
	n3 := e.RatedSpeed * e.RatedSpeed * e.RatedSpeed
	p.Diameter = math.Pow(e.RatedPower/(SeaLevelDensity*n3*p.PowerCoefficientStatic), 0.2) * between(0.85, 1.15)
	p.Diameter = min(max(p.Diameter, 0.1), 6)
	if p.Kind != Tabulated {
		return p
	}
	zero := between(0.5, 1.8) // advance ratio of no thrust
	ct0 := p.PowerCoefficientStatic * between(1, 2)
	bend := between(1.1, 2.4)
	first := between(0, 0.2) * float64(r.IntN(2))
	last := zero * between(0.8, 1.15)
	rows := 4 + r.IntN(12)
	ripple := 0.0
	if r.IntN(4) == 0 {
		ripple = 0.06
	}
	for i := range rows {
		j := first + (last-first)*float64(i)/float64(rows-1)
		x := j / zero
		p.Table = append(p.Table, PropellerRow{
			AdvanceRatio:      j,
			ThrustCoefficient: ct0 * (1 - math.Pow(x, bend)) * (1 + ripple*between(-1, 1)),
			PowerCoefficient:  p.PowerCoefficientStatic * (1 - 0.75*math.Pow(x/1.15, bend+0.5)) * (1 + ripple*between(-1, 1)),
		})
	}
	return p
}
