package perf

import "testing"

var propellerKinds = []struct {
	name string
	kind PropellerKind
}{
	{"constant-efficiency", ConstantEfficiency}, {"constant-speed", ConstantSpeed}, {"fixed-pitch", FixedPitch}, {"table", Tabulated},
}

// benchCase is a typical light aeroplane (100 hp, 800 kg) with one of the propeller kinds.
func benchCase(kind PropellerKind) (Aeroplane, Condition) {
	a := Aeroplane{
		WingArea: 16.5, WingSpan: 10.8, EmptyMass: 480, MaximumMass: 800, UsableFuel: 57.6,
		Polar:          Polar{ParasiteDrag: 0.034, OswaldEfficiency: 0.75},
		Configurations: []Configuration{{Name: "clean", MaximumLift: 1.45, PositionError: []PositionErrorPoint{{25, 0.8}, {45, 0.2}, {60, -0.3}}}},
		Engine: Engine{Kind: Piston, RatedPower: 74600, RatedSpeed: 2750 * RevPerMin, MaximumSpeed: 2800 * RevPerMin,
			DropOffConstant: 0.12, SpecificConsumption: 0.30 / KilowattHour},
		Propeller: Propeller{Kind: kind, Efficiency: 0.8, Diameter: 1.9, BladeEfficiency: 0.87},
		Placards:  Placards{NeverExceedCAS: 70, NeverExceedTAS: 80, ManoeuvringCAS: 48, FlapsExtendedCAS: 40},
	}
	p := &a.Propeller
	switch kind {
	case FixedPitch:
		p.Diameter = 1.75
		p.PolarSlope, p.PolarIntercept, p.PowerCoefficientStatic, p.PowerCoefficientSlope = 1.75, -0.055, 0.045, -0.02
	case Tabulated:
		p.Diameter = 1.75
		for i := range 15 {
			j := 0.07 * float64(i)
			p.Table = append(p.Table, PropellerRow{j, 0.105 * (1 - j*j*0.95 - 0.15*j), 0.048 * (1 - 0.6*j*j*j)})
		}
	}
	air, _ := AirAt(1200, 301, 0)
	return a, Condition{Mass: 760, Air: air, PowerFraction: 1, Fuel: 57.6, Headwind: 5, ClimbGradient: 0.03}
}

// conditions are 64 of them, so that nothing is known beforehand.
func benchConditions(c Condition) []Condition {
	list := make([]Condition, 64)
	for i := range list {
		list[i] = c
		list[i].Mass = 600 + 3*float64(i)
		air, err := c.Air.MovedToPressureAltitude(float64(i%16) * 150)
		if err != nil {
			panic(err)
		}
		list[i].Air = air
	}
	return list
}

// BenchmarkSolve is one full solve: 11 limits, 2 ceilings, the turn, the inverse answers for level flight and for a gradient.
func BenchmarkSolve(b *testing.B) {
	for _, k := range propellerKinds {
		b.Run(k.name, func(b *testing.B) {
			a, c := benchCase(k.kind)
			list := benchConditions(c)
			var z Solver
			var got Answer
			b.ReportAllocs()
			for i := 0; b.Loop(); i++ {
				if err := z.Solve(&a, &list[i%len(list)], &got); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

// BenchmarkTwin is the baseline: the dense-scan twin on the level band and the climb alone, in the same run.
func BenchmarkTwin(b *testing.B) {
	for _, k := range propellerKinds {
		b.Run(k.name, func(b *testing.B) {
			a, c := benchCase(k.kind)
			list := benchConditions(c)
			for i := 0; b.Loop(); i++ {
				w := newTwin(&a, &list[i%len(list)])
				w.solve()
			}
		})
	}
}

// BenchmarkCurves is what drawing asks for: power required and available at 400 speeds.
func BenchmarkCurves(b *testing.B) {
	for _, k := range propellerKinds {
		b.Run(k.name, func(b *testing.B) {
			a, c := benchCase(k.kind)
			var z Solver
			if err := z.Prepare(&a, &c); err != nil {
				b.Fatal(err)
			}
			sum := 0.0
			for b.Loop() {
				for i := range 400 {
					v := TAS(15 + 0.15*float64(i))
					sum += z.PowerAvailable(v) - z.PowerRequired(v)
				}
			}
			if sum == 0 {
				b.Fatal("no power")
			}
		})
	}
}
