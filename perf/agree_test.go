package perf

import (
	"fmt"
	"math"
	"runtime"
	"sync"
	"testing"
)

// agreeCases is how many random cases the solver must agree on with the twin.
const agreeCases = 21000

func relative(a, b float64) float64 { return math.Abs(a-b) / max(math.Abs(a), math.Abs(b), 1e-300) }

// TestTwinAgrees holds the solver to the dense-scan twin on random aeroplanes and conditions: speeds to 1e-6, what sets them always, and
// on a part of them ceilings, allowances and turns.
func TestTwinAgrees(t *testing.T) {
	cases := agreeCases
	if testing.Short() {
		cases /= 20
	}
	var mu sync.Mutex
	counts := map[string]int{}
	failures := 0
	var wg sync.WaitGroup
	workers := runtime.GOMAXPROCS(0)
	for k := range workers {
		wg.Add(1)
		go func() {
			defer wg.Done()
			var z Solver
			for seed := k; seed < cases; seed += workers {
				what, problems := compare(&z, uint64(seed))
				mu.Lock()
				counts[what]++
				for _, p := range problems {
					if failures++; failures <= 40 {
						t.Errorf("seed %d (%s): %s", seed, what, p)
					}
				}
				mu.Unlock()
			}
		}()
	}
	wg.Wait()
	t.Log(counts, failures, "failures")
	for _, o := range []Outcome{LevelFlight, TooLittlePower, PlacardTooSlow, RPMTooHigh} {
		if counts[o.String()] == 0 {
			t.Errorf("no case ended in %s", o)
		}
	}
	if n := counts["refused"]; n > cases/20 {
		t.Errorf("%d of %d cases were refused", n, cases)
	}
}

func compare(z *Solver, seed uint64) (string, []string) {
	a, c := randomCase(seed)
	var got Answer
	if err := z.Solve(&a, &c, &got); err != nil {
		if a.Propeller.Kind == Tabulated {
			return "refused", nil // a rippled table may be crooked
		}
		return "refused", []string{err.Error()}
	}
	w := newTwin(&a, &c)
	want := w.solve()
	if want.margin < 1e-7 {
		return "marginal", nil
	}
	var bad []string
	fail := func(format string, args ...any) { bad = append(bad, fmt.Sprintf(format, args...)) }
	speed := func(name string, got TAS, want float64) {
		if !(relative(float64(got), want) <= 1e-6) {
			fail("%s is %.9g m/s, the twin says %.9g", name, float64(got), want)
		}
	}
	name := got.Outcome.String()
	if got.Outcome != want.outcome {
		return name, []string{fmt.Sprintf("outcome %s, the twin says %s", got.Outcome, want.outcome)}
	}
	l := &got.Limits
	speed("stall", l[Stall].TAS, w.stall(w.load))
	if got.Outcome == TooLittlePower || got.Outcome == RPMTooHigh {
		if relative(got.Shortfall, want.shortfall) > 1e-6 {
			fail("shortfall %.9g W, the twin says %.9g", got.Shortfall, want.shortfall)
		}
		speed("shortfall's speed", got.ShortfallTAS, want.shortfallTAS)
	}
	compareAirframe(w, l, speed)
	if got.Outcome == LevelFlight {
		speed("slowest level", l[SlowestLevel].TAS, want.slow)
		speed("fastest level", l[FastestLevel].TAS, want.fast)
		speed("VX", l[SteepestClimb].TAS, want.vx)
		speed("VY", l[FastestClimb].TAS, want.vy)
		if l[SlowestLevel].SetBy != want.bySlow || l[FastestLevel].SetBy != want.byFast {
			fail("ends set by %q and %q, the twin says %q and %q", l[SlowestLevel].SetBy, l[FastestLevel].SetBy, want.bySlow, want.byFast)
		}
		if wantBy := lifted(want.vx, w.stall(w.load)); l[SteepestClimb].SetBy != wantBy {
			fail("VX set by %q, the twin says %q", l[SteepestClimb].SetBy, wantBy)
		}
		if wantBy := lifted(want.vy, w.stall(w.load)); l[FastestClimb].SetBy != wantBy {
			fail("VY set by %q, the twin says %q", l[FastestClimb].SetBy, wantBy)
		}
		if relative(l[FastestClimb].Rate, want.power/w.weight()) > 1e-6 && want.margin > 1e-5 {
			fail("rate %.9g, the twin says %.9g", l[FastestClimb].Rate, want.power/w.weight())
		}
		compareRange(w, &got, want, fail)
		if seed%4 == 0 {
			compareTurn(w, &got, fail)
		}
	} else {
		for _, k := range []Key{SlowestLevel, SteepestClimb, FastestClimb, BestRange, Carson, FastestLevel} {
			if l[k].Applies {
				fail("%s applies without level flight", k)
			}
		}
	}
	if seed%24 == 0 {
		compareHeights(w, &got, fail)
		compareMass(w, &got, fail)
	}
	return name, bad
}

func lifted(v, stall float64) SetBy {
	if v <= stall*(1+1e-9) {
		return SetByLift
	}
	return SetByOptimum
}

func compareAirframe(w *twin, l *[KeyCount]Limit, speed func(string, TAS, float64)) {
	lo := w.stall(w.load)
	grid := make([]float64, 120)
	for i := range grid {
		grid[i] = lo * math.Pow(12, float64(i)/float64(len(grid)-1))
	}
	v, _ := maximum(grid, func(v float64) float64 { return -v * w.dragAt(v, w.load) })
	speed("least power", l[LeastPower].TAS, v)
	v, d := maximum(grid, func(v float64) float64 { return -w.dragAt(v, w.load) })
	speed("best glide", l[BestGlide].TAS, v)
	speed("glide ratio", TAS(l[BestGlide].Ratio), -w.weight()/d)
}

func compareRange(w *twin, got *Answer, want twinAnswer, fail func(string, ...any)) {
	v, cost, ok := w.bestRange(want.slow, want.fast)
	l := &got.Limits[BestRange]
	if l.Applies != ok {
		if want.fast > w.c.Headwind*(1+1e-9) || l.Applies {
			fail("best range applies %v, the twin says %v", l.Applies, ok)
		}
		return
	}
	if !ok {
		return
	}
	by := SetByOptimum
	switch {
	case v <= want.slow*(1+1e-9):
		by = want.bySlow
	case v >= want.fast*(1-1e-9):
		by = want.byFast
	}
	x := float64(l.TAS)
	switch {
	case relative(x, v) <= 1e-6 && l.SetBy == by:
	case relative(cost(x), cost(v)) < 1e-12 && relative(x, v) < 1e-5:
		// A bottom so flat that values cannot tell; the solver works on slopes.
	default:
		fail("best range %.9g by %q (cost %.12g), the twin says %.9g by %q (%.12g)", x, l.SetBy, cost(x), v, by, cost(v))
	}
	p := w.shaftFor(x, w.dragAt(x, w.load))
	if relative(l.ShaftPower, p) > 1e-9 {
		fail("shaft power %.12g, the twin says %.12g", l.ShaftPower, p)
	}
	if q := w.a.Engine.Flow(p); w.c.Fuel > 0 && relative(l.Distance, w.c.Fuel/q*(x-w.c.Headwind)) > 1e-8 {
		fail("distance %.9g", l.Distance)
	}
}

func compareTurn(w *twin, got *Answer, fail func(string, ...any)) {
	v, radius, lift := w.turn()
	if math.IsInf(radius, 1) || radius > 1e5 {
		return
	}
	u := &got.Turn
	if !u.Applies {
		fail("no turn, the twin says %.6g m", radius)
		return
	}
	if relative(u.Radius, radius) > 2e-6 {
		fail("radius %.9g at %.9g, the twin says %.9g at %.9g", u.Radius, float64(u.TAS), radius, v)
	}
	by := SetByPower
	if lift {
		by = SetByLift
	}
	if u.SetBy != by {
		fail("turn set by %q, the twin says %q (%.9g, %.9g m/s)", u.SetBy, by, float64(u.TAS), v)
	}
}

// climb is the twin's greatest rate, or greatest gradient, at a height.
func (w *twin) climb(h float64, gradient bool) float64 {
	d := w.c.Air.day()
	s := d.at(h)
	w.move(s.air(d), w.c.Mass)
	defer w.move(w.c.Air, w.c.Mass)
	grid := w.speeds()
	_, x := maximum(grid[:], func(v float64) float64 {
		e := w.excess(v, math.Inf(1)) / w.weight()
		if gradient {
			return e
		}
		return e * v
	})
	return x
}

func compareHeights(w *twin, got *Answer, fail func(string, ...any)) {
	type question struct {
		name     string
		ok       bool
		h        float64
		target   float64
		gradient bool
	}
	list := []question{
		{"service ceiling", got.Service.Applies, got.Service.PressureAltitude, ServiceRate, false},
		{"absolute ceiling", got.Absolute.Applies, got.Absolute.PressureAltitude, 0, false},
	}
	if w.c.ClimbGradient > 0 {
		list = append(list, question{"gradient's height", got.Climb.AltitudeApplies, got.Climb.PressureAltitude, w.c.ClimbGradient, true})
	}
	if got.Level.AltitudeApplies != got.Absolute.Applies || got.Level.PressureAltitude != got.Absolute.PressureAltitude {
		fail("the height of level flight is not the absolute ceiling")
	}
	for _, q := range list {
		if q.ok {
			if x := w.climb(q.h, q.gradient); math.Abs(x-q.target) > 1e-6*max(1, q.target) {
				fail("%s %.6f m: the twin climbs %.9g there", q.name, q.h, x)
			}
		} else if w.climb(highestHeight, q.gradient) >= q.target {
			continue
		}
		from := lowestHeight
		if q.ok {
			from = q.h + 1
		}
		for i := range 13 {
			h := from + (highestHeight-from)*float64(i)/12
			if x := w.climb(h, q.gradient); x > q.target+1e-9 {
				fail("%s %v %.3f m: at %.3f m the twin still climbs %.9g", q.name, q.ok, q.h, h, x)
				break
			}
		}
	}
}

func compareMass(w *twin, got *Answer, fail func(string, ...any)) {
	possible := func(m, gradient float64) bool {
		w.move(w.c.Air, m)
		defer w.move(w.c.Air, w.c.Mass)
		grid := w.speeds()
		_, x := maximum(grid[:], func(v float64) float64 { return w.excess(v, math.Inf(1)) - gradient*w.weight() })
		return x >= 0
	}
	check := func(name string, ok bool, m, gradient float64) {
		if !ok {
			if w.phi > 0 {
				fail("no greatest mass for %s", name)
			}
			return
		}
		if !possible(m*(1-1e-6), gradient) {
			fail("%s: %.9g kg is too much, says the twin", name, m)
		}
		for _, f := range []float64{1 + 1e-6, 1.01, 1.1, 1.5, 3} {
			if possible(m*f, gradient) {
				fail("%s: more than %.9g kg is possible, says the twin: %g times", name, m, f)
			}
		}
	}
	check("level flight", got.Level.MassApplies, got.Level.Mass, 0)
	if w.c.ClimbGradient > 0 {
		check("the gradient", got.Climb.MassApplies, got.Climb.Mass, w.c.ClimbGradient)
	}
}
