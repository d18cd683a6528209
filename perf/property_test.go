package perf

import (
	"math"
	"testing"
)

func mustSolve(t *testing.T, a *Aeroplane, c *Condition) (got Answer) {
	t.Helper()
	var z Solver
	if err := z.Solve(a, c, &got); err != nil {
		t.Fatal(err)
	}
	return got
}

// TestSpeedsScaleWithTheRootOfMass: at fixed lift coefficient speeds go with sqrt(m), power required with m^1.5, the glide ratio not at all.
func TestSpeedsScaleWithTheRootOfMass(t *testing.T) {
	for _, k := range propellerKinds {
		a, c := benchCase(k.kind)
		a.Polar.LiftOfLeastDrag = 0.2
		one := mustSolve(t, &a, &c)
		c.Mass *= 1.21
		two := mustSolve(t, &a, &c)
		for _, key := range []Key{Stall, LeastPower, BestGlide} {
			if r := float64(two.Limits[key].TAS / one.Limits[key].TAS); math.Abs(r-1.1) > 1e-12 {
				t.Errorf("%s: %s goes with %.15g", k.name, key, r)
			}
		}
		if r := two.Limits[LeastPower].PowerRequired / one.Limits[LeastPower].PowerRequired; math.Abs(r-1.331) > 1e-12 {
			t.Errorf("%s: least power goes with %.15g", k.name, r)
		}
		if r := two.Limits[BestGlide].Ratio / one.Limits[BestGlide].Ratio; math.Abs(r-1) > 1e-12 {
			t.Errorf("%s: glide ratio goes with %.15g", k.name, r)
		}
		if relative(one.Level.Mass, two.Level.Mass) > 1e-9 {
			t.Errorf("%s: the greatest mass depends on today's: %g, %g", k.name, one.Level.Mass, two.Level.Mass)
		}
		if relative(one.Climb.Mass, two.Climb.Mass) > 1e-9 {
			t.Errorf("%s: the greatest mass for a gradient depends on today's: %g, %g", k.name, one.Climb.Mass, two.Climb.Mass)
		}
	}
}

// TestMoreIsWorse: more mass, more height, more bank, less power: never a better climb, never a slower stall.
func TestMoreIsWorse(t *testing.T) {
	steps := []struct {
		name string
		make func(a *Aeroplane, c *Condition)
	}{
		{"mass", func(_ *Aeroplane, c *Condition) { c.Mass *= 1.02 }},
		{"bank", func(_ *Aeroplane, c *Condition) { c.Bank = min(c.Bank+4*Degree, 75*Degree) }},
		{"drag", func(a *Aeroplane, _ *Condition) { a.Polar.ParasiteDrag *= 1.02 }},
		{"power", func(_ *Aeroplane, c *Condition) { c.PowerFraction *= 0.97 }},
	}
	for seed := uint64(0); seed < 400; seed++ {
		for _, s := range steps {
			a, c := randomCase(seed)
			if a.Polar.LiftOfLeastDrag > 0 || a.Validate() != nil {
				continue // with lift to spare more load can mean less drag
			}
			one := mustSolve(t, &a, &c)
			s.make(&a, &c)
			two := mustSolve(t, &a, &c)
			worse := func(what string, before, after float64) {
				t.Helper()
				if after > before+1e-9*math.Abs(before) {
					t.Errorf("seed %d: more %s makes %s %.9g, before %.9g", seed, s.name, what, after, before)
				}
			}
			worse("stall slower by", -float64(one.Limits[Stall].TAS), -float64(two.Limits[Stall].TAS))
			if s.name != "mass" {
				worse("the greatest mass", one.Level.Mass, two.Level.Mass)
			}
			if one.Absolute.Applies && two.Absolute.Applies {
				worse("the absolute ceiling", one.Absolute.PressureAltitude+2e4, two.Absolute.PressureAltitude+2e4)
			}
			if one.Outcome == TooLittlePower && two.Outcome == LevelFlight {
				t.Errorf("seed %d: more %s makes level flight possible", seed, s.name)
			}
			if one.Outcome == LevelFlight && two.Outcome == LevelFlight {
				worse("the rate of climb", one.Limits[FastestClimb].Rate, two.Limits[FastestClimb].Rate)
				worse("the gradient", one.Limits[SteepestClimb].Gradient, two.Limits[SteepestClimb].Gradient)
				worse("the slow end", -float64(one.Limits[SlowestLevel].TAS), -float64(two.Limits[SlowestLevel].TAS))
			}
		}
	}
}

// TestClimbFallsWithDensityAltitude where the engine's power does.
func TestClimbFallsWithDensityAltitude(t *testing.T) {
	for _, k := range propellerKinds {
		a, c := benchCase(k.kind)
		last := math.Inf(1)
		for h := -1500.0; h < 6000; h += 250 {
			c.Air, _ = AirAtDensityAltitude(h)
			got := mustSolve(t, &a, &c)
			rate := got.Limits[FastestClimb].Rate
			if got.Outcome != LevelFlight {
				rate = -1
			}
			if rate > last || rate == last && rate > 0 {
				t.Errorf("%s: at %g m the climb is %g, lower down %g", k.name, h, rate, last)
			}
			last = rate
		}
	}
}

// TestOrderOfLimits: what must lie above what.
func TestOrderOfLimits(t *testing.T) {
	var z Solver
	var got Answer
	for seed := uint64(0); seed < 2000; seed++ {
		a, c := randomCase(seed)
		if z.Solve(&a, &c, &got) != nil {
			continue
		}
		l := &got.Limits
		stall := l[Stall].TAS * (1 - 1e-12)
		for k := range l {
			if l[k].Applies && Key(k) != Manoeuvring && Key(k) != NeverExceed && l[k].TAS < stall {
				t.Errorf("seed %d: %s below the stall", seed, Key(k))
			}
		}
		if l[BestGlide].LeastSinkTAS > l[BestGlide].TAS*(1+1e-12) && a.Polar.LiftOfLeastDrag <= 0 {
			t.Errorf("seed %d: least sink is faster than the best glide", seed)
		}
		if got.Service.Applies && got.Absolute.Applies && got.Service.PressureAltitude >= got.Absolute.PressureAltitude {
			t.Errorf("seed %d: the service ceiling is above the absolute one", seed)
		}
		if got.Outcome != LevelFlight {
			if c.Mass < got.Level.Mass*(1-1e-9) && got.Outcome == TooLittlePower {
				t.Errorf("seed %d: too little power, yet up to %g kg level flight is possible", seed, got.Level.Mass)
			}
			continue
		}
		if c.Mass > got.Level.Mass*(1+1e-9) {
			t.Errorf("seed %d: level flight at %g kg, yet only up to %g kg", seed, c.Mass, got.Level.Mass)
		}
		if l[SteepestClimb].TAS > l[FastestClimb].TAS*(1+1e-9) {
			t.Errorf("seed %d: VX is above VY", seed)
		}
		if l[SteepestClimb].Gradient < l[FastestClimb].Gradient*(1-1e-9) || l[FastestClimb].Rate < l[SteepestClimb].Rate*(1-1e-9) {
			t.Errorf("seed %d: VY climbs steeper than VX, or VX faster than VY", seed)
		}
		for _, k := range []Key{BestRange, Carson} {
			if l[k].Applies && (l[k].TAS < l[SlowestLevel].TAS*(1-1e-12) || l[k].TAS > l[FastestLevel].TAS*(1+1e-12)) {
				t.Errorf("seed %d: %s is outside level flight", seed, k)
			}
		}
		if l[NeverExceed].Applies && l[FastestLevel].TAS > l[NeverExceed].TAS {
			t.Errorf("seed %d: the fast end is above never exceed", seed)
		}
		if u := &got.Turn; u.Applies {
			if relative(math.Cos(u.Bank), 1/u.LoadFactor) > 1e-9 || relative(u.Rate*u.Radius, float64(u.TAS)) > 1e-9 {
				t.Errorf("seed %d: the turn's figures do not belong together: %+v", seed, *u)
			}
			if g := StandardGravity * math.Tan(u.Bank) / float64(u.TAS); relative(g, u.Rate) > 1e-6 {
				t.Errorf("seed %d: rate of turn %g, g tan(bank)/V is %g", seed, u.Rate, g)
			}
		}
	}
}

// TestWindMovesBestRange: into a headwind one flies faster, with a tail wind slower.
func TestWindMovesBestRange(t *testing.T) {
	for _, k := range propellerKinds {
		a, c := benchCase(k.kind)
		last := TAS(0)
		for wind := -20.0; wind <= 20; wind += 2.5 {
			c.Headwind = wind
			l := mustSolve(t, &a, &c).Limits[BestRange]
			if !l.Applies || l.TAS < last || l.TAS == last && l.SetBy == SetByOptimum {
				t.Errorf("%s: at a headwind of %g m/s best range is at %g m/s, with less wind %g", k.name, wind, float64(l.TAS), float64(last))
			}
			last = l.TAS
		}
		c.Headwind = 100
		if mustSolve(t, &a, &c).Limits[BestRange].Applies {
			t.Errorf("%s: there is a best range without headway", k.name)
		}
	}
}

// TestCeilingIsWhereTheClimbEnds: carried to its ceiling the aeroplane climbs at just that rate; to the height for a gradient, at that gradient.
func TestCeilingIsWhereTheClimbEnds(t *testing.T) {
	for _, k := range propellerKinds {
		a, c := benchCase(k.kind)
		c.Air, _ = AirAt(900, 303, 293)
		got := mustSolve(t, &a, &c)
		there := c
		for _, x := range []struct {
			name   string
			h, da  float64
			figure func(*Answer) float64
			want   float64
		}{
			{"service", got.Service.PressureAltitude, got.Service.DensityAltitude, func(g *Answer) float64 { return g.Limits[FastestClimb].Rate }, ServiceRate},
			{"gradient", got.Climb.PressureAltitude, got.Climb.DensityAltitude, func(g *Answer) float64 { return g.Limits[SteepestClimb].Gradient }, c.ClimbGradient},
		} {
			air, err := c.Air.MovedToPressureAltitude(x.h)
			if err != nil {
				t.Fatal(err)
			}
			there.Air = air
			up := mustSolve(t, &a, &there)
			if y := x.figure(&up); math.Abs(y-x.want) > 1e-8 {
				t.Errorf("%s, %s: %g at the ceiling, want %g", k.name, x.name, y, x.want)
			}
			if math.Abs(air.DensityAltitude-x.da) > 1e-6 {
				t.Errorf("%s, %s: density altitude %g, the air there says %g", k.name, x.name, x.da, air.DensityAltitude)
			}
		}
		air, _ := c.Air.MovedToPressureAltitude(got.Absolute.PressureAltitude + 1)
		there.Air = air
		if up := mustSolve(t, &a, &there); up.Outcome != TooLittlePower || up.Shortfall > 1000 {
			t.Errorf("%s: a metre above the absolute ceiling: %s, %g W missing", k.name, up.Outcome, up.Shortfall)
		}
	}
}
