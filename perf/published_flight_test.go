package perf_test

// Worked examples and handbook figures of propeller-aeroplane performance, solved with the solver that the program uses.

import (
	"math"
	"testing"

	. "levelspan/perf"
)

// lift is a maximum lift coefficient high enough that the stall sets none of the speeds under test.
const lift = 6

// solve answers with a power fraction of 1 in still air; mass in kg.
func solve(t *testing.T, a Aeroplane, mass float64, air Air, change ...func(*Condition)) Answer {
	t.Helper()
	if a.Configurations == nil {
		a.Configurations = []Configuration{{Name: "clean", MaximumLift: lift}}
	}
	if a.MaximumMass == 0 {
		a.EmptyMass, a.MaximumMass = mass/2, mass
	}
	c := Condition{Mass: mass, Air: air, PowerFraction: 1}
	for _, f := range change {
		f(&c)
	}
	var s Solver
	var answer Answer
	if err := s.Solve(&a, &c, &answer); err != nil {
		t.Fatal(err)
	}
	return answer
}

// constantThrust is a stand-in for a jet of the textbooks: a fixed-pitch propeller whose thrust loss with speed is made
// negligible (diameter 0.1 m, intercept -0.0001), the torque chosen for the thrust.
func constantThrust(a *Aeroplane, thrust float64) {
	const d, m, n = 0.1, 1.0, 100
	a.Propeller = Propeller{Kind: FixedPitch, Diameter: d, PolarSlope: m, PolarIntercept: -0.0001,
		PowerCoefficientStatic: 0.05, PowerCoefficientSlope: -0.01}
	a.Engine = Engine{Kind: Electric, RatedPower: thrust * d / m * n, RatedSpeed: n}
}

// Anderson, Introduction to Flight, the light propeller aeroplane of Examples 6.1-6.12, in SI. The printed 13.62, 12.81
// and 81 m/s are readings off a graph (0.1, 0.15 and 1.6 % from the exact values); the printed CL of 0.634 at best
// lift-to-drag is a point of the author's grid (theory: 0.680) and is not used.
func TestWorkedExampleCP1(t *testing.T) {
	published(t, "CP1-SI")
	const (
		span, area, weight = 10.912, 16.165, 13127.5
		fuel               = 1632.5 / StandardGravity
		sfc                = 2.0025 / StandardGravity / (746 * Hour)
	)
	mass := weight / StandardGravity
	a := Aeroplane{
		WingArea: area, WingSpan: span, UsableFuel: fuel,
		Polar:     Polar{ParasiteDrag: 0.025, OswaldEfficiency: 0.8},
		Engine:    Engine{Kind: Piston, Law: DensityAltitudeLaw, RatedPower: 230 * 746, RatedSpeed: 45, DropOffConstant: 0.12, SpecificConsumption: sfc},
		Propeller: Propeller{Kind: ConstantEfficiency, Efficiency: 0.8},
	}
	sea := standardDay(t, 0)
	got := solve(t, a, mass, sea, func(c *Condition) { c.Fuel = fuel })
	near(t, "best lift-to-drag (printed)", got.Limits[BestGlide].Ratio, 13.62, 0.02)
	nearRel(t, "best lift-to-drag (exact)", got.Limits[BestGlide].Ratio, 13.60619, 1e-5)
	near(t, "fastest level (printed, off a graph)", float64(got.Limits[FastestLevel].TAS), 81, 1.4)
	nearRel(t, "fastest level (exact)", float64(got.Limits[FastestLevel].TAS), 79.7338, 1e-5)
	nearRel(t, "rate of climb (exact)", got.Limits[FastestClimb].Rate, 7.60947, 1e-5)
	nearRel(t, "speed of fastest climb (exact)", float64(got.Limits[FastestClimb].TAS), 33.5441, 1e-5)
	near(t, "glide angle, degrees", math.Atan(1/got.Limits[BestGlide].Ratio)/Degree, 4.2, 0.05)
	near(t, "glide from 3048 m, km", 3.048*got.Limits[BestGlide].Ratio, 41.45, 0.1)

	// The printed glide speeds belong to the printed CL, 0.634 (53.13 and 47.03 m/s), and to L = W cos(4.2 degrees) where
	// this model's small angles have L = W; speed goes with sqrt(L/(CL rho)).
	for _, p := range []struct{ rho, printed float64 }{{0.905, 53.13}, {1.155, 47.03}} {
		air := densityOf(t, p.rho)
		v := float64(solve(t, a, mass, air).Limits[BestGlide].TAS)
		near(t, "glide speed", v*math.Sqrt(0.680309/0.634*math.Cos(4.2*Degree)), p.printed, 0.02)
	}

	// (CL^1.5/CD)max from the least power required: P = W sqrt(2 W/(rho S))/(CL^1.5/CD).
	p := got.Limits[LeastPower].PowerRequired
	ratio := weight * math.Sqrt(2*weight/(sea.Density*area)) / p
	near(t, "CL^1.5/CD (printed)", ratio, 12.81, 0.025)
	nearRel(t, "CL^1.5/CD (exact)", ratio, 12.790885, 1e-5)

	// At constant mass on all the fuel: the integrals of the book (1.9386e6 m, 51748 s) let the mass fall, by
	// ln(m0/m1)/(1 - m1/m0) for range and 2 (sqrt(m0/m1) - 1)/(1 - m1/m0) for endurance.
	m0, m1 := mass, mass-fuel
	nearRel(t, "range of the book", got.Limits[BestRange].Distance*math.Log(m0/m1)/(1-m1/m0), 1938581, 1e-5)
	nearRel(t, "endurance of the book", got.Limits[LeastPower].Endurance*2*(math.Sqrt(m0/m1)-1)/(1-m1/m0), 51748.3, 1e-5)
}

// The same example in feet (printed values from memory): 1398 ft/min at 150 ft/s, ceilings 27,000 and 25,000 ft with
// power falling as the density. The printed Vmax of 265 ft/s is a graph's (exact 261.6).
func TestWorkedExampleCP1Feet(t *testing.T) {
	published(t, "CP1-FT")
	const weight = 2950 * PoundForce
	mass := weight / StandardGravity
	a := Aeroplane{
		WingArea: 174 * Foot * Foot, WingSpan: 35.8 * Foot,
		Polar: Polar{ParasiteDrag: 0.025, OswaldEfficiency: 0.8},
		// Power falling as the density is the turboprop law with an exponent of 1, or Gagg & Ferrar with c = 0.
		Engine:    Engine{Kind: Piston, Law: DensityAltitudeLaw, RatedPower: 230 * Horsepower, RatedSpeed: 45, DropOffConstant: 0},
		Propeller: Propeller{Kind: ConstantEfficiency, Efficiency: 0.8},
	}
	air := standardDay(t, 0)
	got := solve(t, a, mass, air)
	near(t, "fastest level, ft/s", float64(got.Limits[FastestLevel].TAS)/Foot, 265, 4)
	nearRel(t, "fastest level, ft/s (exact)", float64(got.Limits[FastestLevel].TAS)/Foot, 261.556, 5e-5)
	nearRel(t, "rate of climb, ft/min (exact)", got.Limits[FastestClimb].Rate/FootPerMin, 1498.03, 1e-4)
	near(t, "absolute ceiling, ft (printed)", got.Absolute.DensityAltitude/Foot, 27000, 350)
	near(t, "service ceiling, ft (printed)", got.Service.DensityAltitude/Foot, 25000, 350)
	near(t, "absolute ceiling, ft (exact)", got.Absolute.DensityAltitude/Foot, 26818, 5)
	near(t, "service ceiling, ft (exact)", got.Service.DensityAltitude/Foot, 24691, 5)

	var s Solver
	a.Configurations = []Configuration{{Name: "clean", MaximumLift: lift}}
	a.EmptyMass, a.MaximumMass = mass/2, mass
	c := Condition{Mass: mass, Air: air, PowerFraction: 1}
	if err := s.Prepare(&a, &c); err != nil {
		t.Fatal(err)
	}
	at := TAS(150 * Foot)
	rate := (s.PowerAvailable(at) - s.PowerRequired(at)) / weight
	near(t, "rate of climb at 150 ft/s, ft/min", rate/FootPerMin, 1398, 5)
	near(t, "drag at 200 ft/s, lbf", s.PowerRequired(200*Foot)/(200*Foot)/PoundForce, 263, 1)

	// With Gagg & Ferrar, 1/7.55 form (c = 1/8.55): 23,750 and 21,867 ft.
	a.Engine.DropOffConstant = 1 / 8.55
	got = solve(t, a, mass, air)
	near(t, "absolute ceiling, Gagg-Ferrar, ft", got.Absolute.DensityAltitude/Foot, 23750, 10)
	near(t, "service ceiling, Gagg-Ferrar, ft", got.Service.DensityAltitude/Foot, 21867, 10)
}

// densityOf is the standard day's air of a given density.
func densityOf(t *testing.T, rho float64) Air {
	t.Helper()
	lo, hi := -2000.0, 20000.0
	for range 100 {
		mid := (lo + hi) / 2
		if standardDay(t, mid).Density > rho {
			lo = mid
		} else {
			hi = mid
		}
	}
	return standardDay(t, lo)
}

// H. Smith, Aircraft Flight Mechanics (open course text), performance exercises: constant thrust at 6 km geometric; the
// weight is the one that makes 2500 N the least drag, and 10 % more thrust gives two level speeds.
func TestWorkedExampleSmith(t *testing.T) {
	published(t, "SMITH-MD")
	const area, aspect, k = 20.0, 8.0, 0.04
	a := Aeroplane{
		WingArea: area, WingSpan: math.Sqrt(area * aspect),
		Polar: Polar{ParasiteDrag: 0.015, OswaldEfficiency: 1 / (math.Pi * aspect * k)},
	}
	air := standardDay(t, geopotential(6000))
	weight := 2500 / (2 * math.Sqrt(0.015*k))
	near(t, "weight, kN", weight/1000, 51.0, 0.05)
	constantThrust(&a, 2750)
	got := solve(t, a, weight/StandardGravity, air)
	near(t, "least-drag speed", float64(got.Limits[BestGlide].TAS), 112.36, 0.005)
	near(t, "slow level speed", float64(got.Limits[SlowestLevel].TAS), 90.0, 0.05)
	near(t, "fast level speed", float64(got.Limits[FastestLevel].TAS), 140.3, 0.05)
	near(t, "climb angle, degrees", math.Asin(got.Limits[SteepestClimb].Gradient)/Degree, 0.3, 0.05)
	near(t, "rate of climb at the least-drag speed", got.Limits[SteepestClimb].Gradient*112.36, 0.55, 0.005)

	published(t, "SMITH-DW") // CD = .018 + .016 CL^2, least power at 60 m/s EAS: D/W at 200 m/s EAS 0.1115
	const wide = 24.0        // aspect ratio at which e of this k stays inside its domain
	a.Polar = Polar{ParasiteDrag: 0.018, OswaldEfficiency: 1 / (math.Pi * wide * 0.016)}
	a.WingSpan = math.Sqrt(area * wide)
	sea := standardDay(t, 0)
	q := 0.5 * sea.Density * 60 * 60
	weight = q * area * math.Sqrt(3*0.018/0.016)
	a.Configurations = []Configuration{{Name: "clean", MaximumLift: lift}}
	a.EmptyMass, a.MaximumMass = weight/StandardGravity/2, weight/StandardGravity
	var s Solver
	if err := s.Prepare(&a, &Condition{Mass: weight / StandardGravity, Air: sea, PowerFraction: 1}); err != nil {
		t.Fatal(err)
	}
	near(t, "drag over weight at 200 m/s EAS", s.PowerRequired(200)/200/weight, 0.1115, 5e-5)
	near(t, "speed of least power", float64(solve(t, a, weight/StandardGravity, sea).Limits[LeastPower].TAS), 60, 1e-6)
}

// S. Lea, San Francisco State University, Physics 220: 120 hp of excess power at 85 kt lift 3000 lb at 6.7 m/s, sine of
// the climb angle 0.153. Flown here by an aeroplane whose speed of fastest climb is 85 kt.
func TestWorkedExampleExcessPower(t *testing.T) {
	published(t, "SFSU-CLIMB")
	const weight, v = 3000 * PoundForce, 85 * Knot
	sea := standardDay(t, 0)
	// Least power at v: A v^4 = C/3; choose A for a power required of 60 hp there (A v^3 + C/v = 4 A v^3).
	drag := 60 * Horsepower / (4 * v * v * v)
	const area, aspect = 16.0, 7.0
	cd0 := 2 * drag / (sea.Density * area)
	k := 3 * drag * v * v * v * v * sea.Density * area / (2 * weight * weight)
	a := Aeroplane{
		WingArea: area, WingSpan: math.Sqrt(area * aspect),
		Polar:     Polar{ParasiteDrag: cd0, OswaldEfficiency: 1 / (math.Pi * aspect * k)},
		Engine:    Engine{Kind: Electric, RatedPower: 180 * Horsepower / 0.9, RatedSpeed: 45},
		Propeller: Propeller{Kind: ConstantEfficiency, Efficiency: 0.9},
	}
	got := solve(t, a, weight/StandardGravity, sea).Limits[FastestClimb]
	near(t, "speed, kt", float64(got.TAS)/Knot, 85, 1e-6)
	near(t, "rate, m/s", got.Rate, 6.7, 0.05)
	near(t, "sine of the angle", got.Gradient, 0.153, 0.0005)
}

// EASA question bank ECQB-2020: VA 181 kt at 5.7 t is 154 kt at 4.1 t.
func TestWorkedExampleManoeuvringSpeed(t *testing.T) {
	published(t, "ECQB-VA")
	a := Aeroplane{
		WingArea: 30, WingSpan: 15, EmptyMass: 3000, MaximumMass: 5700,
		Polar:     Polar{ParasiteDrag: 0.025, OswaldEfficiency: 0.8},
		Engine:    Engine{Kind: Turboprop, RatedPower: 1e6, RatedSpeed: 30, LapseExponent: 0.7},
		Propeller: Propeller{Kind: ConstantEfficiency, Efficiency: 0.8},
		Placards:  Placards{ManoeuvringCAS: 181 * Knot},
	}
	got := solve(t, a, 4100, standardDay(t, 0)).Limits[Manoeuvring]
	near(t, "VA, kt", float64(got.CAS)/Knot, 154, 0.5)
	near(t, "VA, kt (exact)", float64(got.CAS)/Knot, 153.509, 0.001)
}

// J.T. Lowry's fixed-pitch method (JAAER 6(1) 1995; Performance of Light Aircraft, AIAA 1999); the plate is from memory,
// the speeds are the method's own arithmetic done apart from this program.
func TestWorkedExampleFixedPitch(t *testing.T) {
	published(t, "LOWRY-C172")
	const n = 2700 * RevPerMin
	torque := 311.2 * Foot * PoundForce
	area := 174 * Foot * Foot
	a := Aeroplane{
		WingArea: area, WingSpan: math.Sqrt(7.38 * area),
		Polar:  Polar{ParasiteDrag: 0.037, OswaldEfficiency: 0.72},
		Engine: Engine{Kind: Piston, Law: DensityAltitudeLaw, RatedPower: torque * 2 * math.Pi * n, RatedSpeed: n, DropOffConstant: 0.12},
		Propeller: Propeller{Kind: FixedPitch, Diameter: 6.25 * Foot, PolarSlope: 1.70, PolarIntercept: -0.0564,
			PowerCoefficientStatic: 0.05, PowerCoefficientSlope: -0.02},
	}
	rows := []struct{ lb, da, vx, vy, vm, vmin, vbg, vmd, rate float64 }{
		{2400, 0, 63.20, 75.85, 115.26, 34.65, 72.00, 54.71, 700.3},
		{2400, 4000, 67.06, 76.75, 112.41, 40.01, 76.40, 58.05, 518.7},
		{2400, 12000, 75.91, 79.34, 102.12, 56.43, 86.48, 65.71, 174.0},
		{2000, 0, 57.69, 74.16, 116.95, 28.46, 65.73, 49.94, 961.2},
	}
	for _, r := range rows {
		mass := r.lb * Pound
		got := solve(t, a, mass, standardDay(t, r.da*Foot))
		kt := func(k Key) float64 { return float64(got.Limits[k].TAS) / Knot }
		near(t, "VX", kt(SteepestClimb), r.vx, 0.011)
		near(t, "VY", kt(FastestClimb), r.vy, 0.011)
		near(t, "fastest level", kt(FastestLevel), r.vm, 0.011)
		near(t, "slowest level", kt(SlowestLevel), r.vmin, 0.011)
		near(t, "best glide", kt(BestGlide), r.vbg, 0.011)
		near(t, "least sink", float64(got.Limits[BestGlide].LeastSinkTAS)/Knot, r.vmd, 0.011)
		near(t, "rate of climb, ft/min", got.Limits[FastestClimb].Rate/FootPerMin, r.rate, 0.2)
		if r.lb == 2400 {
			near(t, "absolute ceiling, ft", got.Absolute.DensityAltitude/Foot, 16184, 3)
			near(t, "service ceiling, ft", got.Service.DensityAltitude/Foot, 13771, 3)
		}
	}
}

// An exam page whose key says 101 m/s: wrong, since drag without any induced part already stops the aeroplane at
// 94.3 m/s. The right answers are 87.104 and 36.080.
func TestPublishedTrap(t *testing.T) {
	published(t, "BAD-COLLEGEDUNIA")
	const area, aspect, k = 15.0, 8.0, 0.05
	a := Aeroplane{WingArea: area, WingSpan: math.Sqrt(area * aspect),
		Polar: Polar{ParasiteDrag: 0.025, OswaldEfficiency: 1 / (math.Pi * aspect * k)}}
	constantThrust(&a, 1000)
	got := solve(t, a, 10000/StandardGravity, densityOf(t, 0.6))
	near(t, "fast end", float64(got.Limits[FastestLevel].TAS), 87.1042, 1e-3)
	near(t, "slow end", float64(got.Limits[SlowestLevel].TAS), 36.0797, 1e-3)
}

// The cruise rows of a two-seat trainer's handbook (source in checks.json, POH-C152-CRUISE): with the polar fitted to
// P_iw V_iw against V_iw^4 (CD0/eta 0.04123, K/eta 0.08902), the solver's fastest level speed at each power setting
// must come back within the residual of that fit (0.72 hp) and the table's rounding, about 1 kt at the slow end.
func TestHandbookCruise(t *testing.T) {
	published(t, "POH-C152-CRUISE")
	area, span := 159.5*Foot*Foot, 33.33*Foot
	aspect := span * span / area
	a := Aeroplane{
		WingArea: area, WingSpan: span,
		Polar:     Polar{ParasiteDrag: 0.04123, OswaldEfficiency: 1 / (math.Pi * aspect * 0.08902)},
		Engine:    Engine{Kind: Piston, RatedPower: 110 * Horsepower, RatedSpeed: 2550 * RevPerMin, DropOffConstant: 0.12},
		Propeller: Propeller{Kind: ConstantEfficiency, Efficiency: 1},
	}
	for _, r := range [][3]float64{
		{0, 75, 100}, {4000, 75, 103}, {8000, 75, 107}, {0, 65, 94}, {4000, 65, 97}, {8000, 65, 100},
		{0, 55, 87}, {4000, 55, 89}, {8000, 55, 91}, {0, 45, 77}, {4000, 45, 78}, {8000, 45, 79},
	} {
		got := solve(t, a, 1670*Pound, standardDay(t, r[0]*Foot), func(c *Condition) { c.PowerFraction = r[1] / 100 })
		near(t, "handbook cruise, KTAS", float64(got.Limits[FastestLevel].TAS)/Knot, r[2], 1.2)
	}
}

// The published speed polar of a training sailplane (ASK21-POLAR): sink w = a V^3 + b/V fitted to its rows gives 32.8 at
// 92.34 km/h and least sink at 70.16 km/h. The weight is not stated and does not matter: w fixes A/W and C/W.
func TestPublishedGlidePolar(t *testing.T) {
	published(t, "ASK21-POLAR")
	const a3, b1 = 2.31715e-5, 10.02955
	const area, aspect, mass = 17.0, 16.0, 500.0
	sea := standardDay(t, 0)
	weight := mass * StandardGravity
	cd0 := 2 * a3 * weight / (sea.Density * area)
	k := b1 * weight * sea.Density * area / (2 * weight * weight)
	a := Aeroplane{WingArea: area, WingSpan: math.Sqrt(area * aspect),
		Polar: Polar{ParasiteDrag: cd0, OswaldEfficiency: 1 / (math.Pi * aspect * k)}}
	constantThrust(&a, 500)
	got := solve(t, a, mass, sea).Limits[BestGlide]
	near(t, "best glide ratio", got.Ratio, 32.8, 0.05)
	near(t, "best glide, km/h", float64(got.TAS)/KmPerHour, 92.34, 0.01)
	near(t, "least sink, km/h", float64(got.LeastSinkTAS)/KmPerHour, 70.16, 0.01)
}

// The climb table of a four-seat handbook (POH-C172N-CLIMB; the table's body from memory, its specification page read):
// an aeroplane fitted to the standard-day column alone must foretell the cold and hot ones. The pressure-altitude law
// does; the textbook's density-altitude law errs several times as much. The model's delivered power is at most the
// rated one, where the handbook's engine gives more than that in cold air at sea level: those rows (-20 and 0 C below
// 2000 ft) are left out of the comparison and only required to err on the safe side.
func TestHandbookClimb(t *testing.T) {
	published(t, "POH-C172N-CLIMB")
	table := []struct {
		pa, kias float64
		rate     [4]float64 // at -20, 0, 20, 40 C; 0: not given
	}{
		{0, 73, [4]float64{875, 815, 755, 695}},
		{2000, 72, [4]float64{765, 705, 650, 590}},
		{4000, 71, [4]float64{655, 600, 545, 485}},
		{6000, 70, [4]float64{545, 495, 440, 385}},
		{8000, 69, [4]float64{440, 390, 335, 280}},
		{10000, 68, [4]float64{335, 285, 230, 0}},
		{12000, 67, [4]float64{230, 180, 0, 0}},
	}
	temps := [4]float64{-20, 0, 20, 40}
	standard := []float64{770.0, 674.6, 580.5, 486.4, 392.1, 297.0, 201.9}
	mass := 2300 * Pound
	area, span := 174*Foot*Foot, 35.83*Foot
	plane := func(eta, cd0 float64, law PowerLaw) Aeroplane {
		return Aeroplane{
			WingArea: area, WingSpan: span, EmptyMass: mass / 2, MaximumMass: mass,
			Configurations: []Configuration{{Name: "clean", MaximumLift: lift}},
			Polar:          Polar{ParasiteDrag: cd0, OswaldEfficiency: 0.75},
			Engine:         Engine{Kind: Piston, Law: law, RatedPower: 160 * Horsepower, RatedSpeed: 45, DropOffConstant: 0.12},
			Propeller:      Propeller{Kind: ConstantEfficiency, Efficiency: eta},
		}
	}
	rate := func(a Aeroplane, pa, temperature, kcas float64) float64 {
		air := must(t)(AirAt(pa*Foot, temperature, 0))
		var s Solver
		if err := s.Prepare(&a, &Condition{Mass: mass, Air: air, PowerFraction: 1}); err != nil {
			t.Fatal(err)
		}
		v := air.TASFromCAS(CAS(kcas * Knot))
		return (s.PowerAvailable(v) - s.PowerRequired(v)) / (mass * StandardGravity) / FootPerMin
	}
	for _, law := range []PowerLaw{PressureAltitudeLaw, DensityAltitudeLaw} {
		// Fit efficiency and parasite drag to the standard day by a plain search.
		bestEta, bestCD0, best := 0.0, 0.0, math.Inf(1)
		for eta := 0.55; eta < 0.9; eta += 0.005 {
			for cd0 := 0.02; cd0 < 0.06; cd0 += 0.0005 {
				sum := 0.0
				a := plane(eta, cd0, law)
				for i, row := range table {
					d := rate(a, row.pa, 288.15-0.0065*row.pa*Foot, row.kias) - standard[i]
					sum += d * d
				}
				if sum < best {
					bestEta, bestCD0, best = eta, cd0, sum
				}
			}
		}
		fit := math.Sqrt(best / float64(len(table)))
		a := plane(bestEta, bestCD0, law)
		n, sum, worst := 0, 0.0, 0.0
		for _, row := range table {
			for j, tc := range temps {
				if row.rate[j] == 0 {
					continue
				}
				d := rate(a, row.pa, tc+ZeroCelsius, row.kias) - row.rate[j]
				if row.pa == 0 && tc < 15 {
					if d > 10 {
						t.Errorf("law %d: %g ft, %g C: %.0f ft/min more than the handbook", law, row.pa, tc, d)
					}
					continue
				}
				n++
				sum += d * d
				worst = math.Max(worst, math.Abs(d))
			}
		}
		rms := math.Sqrt(sum / float64(n))
		t.Logf("law %d: eta %.3f, cd0 %.4f, standard day within %.1f ft/min rms; all columns %.1f rms, %.1f worst", law, bestEta, bestCD0, fit, rms, worst)
		if fit > 12 {
			t.Errorf("law %d does not fit the standard day: %.1f ft/min rms", law, fit)
		}
		switch law {
		case PressureAltitudeLaw:
			if rms > 32 {
				t.Errorf("the pressure-altitude law misses the off-standard columns by %.1f ft/min rms", rms)
			}
			// The specification's service ceiling (read): 14,200 ft, flown at the table's speeds continued (66 KIAS there). The
			// solver's own ceiling is higher, since it climbs at its best speed, which the table's speeds do not pin down.
			near(t, "rate at the service ceiling, ft/min", rate(a, 14200, 288.15-0.0065*14200*Foot, 66), 100, 25)
		case DensityAltitudeLaw:
			if rms < 50 {
				t.Errorf("the density-altitude law is expected to miss by 75-92 ft/min rms, here %.1f: the laws are not told apart", rms)
			}
		}
	}
}

// Gagg & Ferrar's fall of power with the density (SAE Journal 34, 1934, from memory), in the form with c = 0.12, as the
// solver delivers it: power available over efficiency over rated power.
func TestPublishedPowerLapse(t *testing.T) {
	for _, c := range published(t, "GF-") {
		var in struct {
			DA float64 `json:"density_alt_ft"`
		}
		var want struct {
			C12 float64 `json:"form_C0p12"`
			C   float64 `json:"form_1over7p55"`
		}
		into(t, c.Inputs, &in)
		into(t, c.Expected, &want)
		for _, form := range []struct{ c, want float64 }{{0.12, want.C12}, {1 / 8.55, want.C}} {
			for _, law := range []PowerLaw{PressureAltitudeLaw, DensityAltitudeLaw} { // the same on a standard day
				a := Aeroplane{WingArea: 16, WingSpan: 11, EmptyMass: 500, MaximumMass: 1000,
					Polar:          Polar{ParasiteDrag: 0.03, OswaldEfficiency: 0.8},
					Configurations: []Configuration{{Name: "clean", MaximumLift: 1.5}},
					Engine:         Engine{Kind: Piston, Law: law, RatedPower: 1e5, RatedSpeed: 45, DropOffConstant: form.c},
					Propeller:      Propeller{Kind: ConstantEfficiency, Efficiency: 0.8}}
				var s Solver
				if err := s.Prepare(&a, &Condition{Mass: 800, Air: standardDay(t, in.DA*Foot), PowerFraction: 1}); err != nil {
					t.Fatal(err)
				}
				near(t, c.ID, s.PowerAvailable(40)/0.8/1e5, form.want, 1e-4)
			}
		}
	}
}
