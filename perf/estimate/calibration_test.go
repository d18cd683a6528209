package estimate

import (
	"flag"
	"fmt"
	"math"
	"math/rand/v2"
	"sort"
	"testing"

	"levelspan/perf"
)

var campaigns = flag.Int("campaigns", 0, "made-up campaigns of each propeller kind and plan in TestCalibration; 0: as the test has it")

// tally counts how often an interval held the truth.
type tally map[string][2]int // held, of

func (m tally) add(name string, held bool) {
	n := m[name]
	if held {
		n[0]++
	}
	n[1]++
	m[name] = n
}

// blunder spoils one run of a rich plan as a pilot does: a speed read 12 kt off, a rate with the wrong sign or in the wrong unit, a setting written down
// for another run. It says which.
func blunder(r *rand.Rand, c *Case) int {
	for {
		i := r.IntN(len(c.Runs))
		q := &c.Runs[i]
		switch {
		case q.Kind == Level && q.IAS > 40:
			q.IAS += 12 * perf.Knot
		case q.Kind == Climb:
			q.Rate = -q.Rate
			if math.Abs(q.Rate) < 1 {
				continue
			}
		case q.Kind == Glide:
			q.Rate *= 1.8
		case q.Kind == Stall:
			q.IAS += 9 * perf.Knot
		default:
			continue
		}
		return i
	}
}

// worker keeps what campaigns can share.
type worker struct {
	e Estimator
	p Posterior
	d Draws
	b Bands
}

// measure flies one campaign and adds to the tallies.
func (w *worker) measure(seed uint64, kind perf.PropellerKind, plans []plan, spoilt bool, limits, parameters, flags tally) error {
	c, truth := campaign(seed, kind, plans)
	bad := -1
	r := rand.New(rand.NewPCG(seed, 99))
	if spoilt {
		bad = blunder(r, &c)
	}
	p := &w.p
	if err := w.e.Fit(&c, p); err != nil {
		return err
	}
	if !p.Converged {
		return fmt.Errorf("campaign %d: %v after %d steps", seed, p.Stop, p.Iterations)
	}
	for i := range p.Runs {
		if i == bad {
			flags.add("blundered run flagged", p.Runs[i].Flagged)
		} else {
			flags.add("good run flagged", p.Runs[i].Flagged)
		}
	}
	for i := range p.Parameters {
		k := &p.l.list[i]
		name := p.Parameters[i].Name
		x := truth.value[name]
		if k.log {
			x = math.Log(math.Abs(x))
		}
		sd := k.spread * math.Sqrt(p.cov[i*len(p.x)+i])
		parameters.add(name, math.Abs(x-p.x[i]) <= 1.959964*sd)
	}
	air, err := perf.AirAt(200+2000*r.Float64(), perf.StandardTemperature(1000)+20*r.Float64(), 0)
	if err != nil {
		return err
	}
	condition := perf.Condition{Mass: 620 + 180*r.Float64(), Air: air, Configuration: r.IntN(2), PowerFraction: 1, Fuel: 50, Headwind: 5, ClimbGradient: 0.02}
	d, b := &w.d, &w.b
	var got Intervals
	d.Set(p, DefaultDraws)
	if err := b.Solve(d, &condition, &got); err != nil {
		return err
	}
	var z perf.Solver
	var want perf.Answer
	if err := z.Solve(&truth.a, &condition, &want); err != nil {
		return err
	}
	held := func(name string, i Interval, x float64) {
		if i.Applies {
			limits.add(name, i.Low*(1-1e-12) <= x && x <= i.High*(1+1e-12))
		}
	}
	names := [perf.KeyCount]string{"stall", "slowest_level", "least_power", "steepest_climb", "fastest_climb", "best_glide", "best_range", "carson", "manoeuvring", "fastest_level", "never_exceed"}
	for k := range want.Limits {
		w, g := &want.Limits[k], &got.Limits[k]
		if !w.Applies {
			continue
		}
		n := names[k]
		held(n+" CAS", g.CAS, float64(w.CAS))
		held(n+" IAS", g.IAS, float64(w.IAS))
		switch perf.Key(k) {
		case perf.FastestClimb:
			held(n+" rate", g.Rate, w.Rate)
		case perf.SteepestClimb:
			held(n+" gradient", g.Gradient, w.Gradient)
		case perf.BestGlide:
			held(n+" ratio", g.Ratio, w.Ratio)
			held(n+" sink", g.Sink, w.Sink)
		case perf.LeastPower:
			held(n+" endurance", g.Endurance, w.Endurance)
		case perf.BestRange:
			held(n+" distance", g.Distance, w.Distance)
		}
	}
	if want.Service.Applies {
		held("service ceiling", got.Service.PressureAltitude, want.Service.PressureAltitude)
	}
	if want.Absolute.Applies {
		held("absolute ceiling", got.Absolute.PressureAltitude, want.Absolute.PressureAltitude)
	}
	if want.Turn.Applies {
		held("turn radius", got.Turn.Radius, want.Turn.Radius)
	}
	if want.Level.MassApplies {
		held("greatest mass", got.Level.Mass, want.Level.Mass)
	}
	return nil
}

// TestCalibration flies made-up campaigns, each with an aeroplane of its own drawn from the beliefs and readings drawn from the instruments: the 95 % intervals
// must hold the truth in 93 to 97 % of them, for every limit and every parameter, and the blundered run must be flagged in at least 9 of 10.
func TestCalibration(t *testing.T) {
	n := 160
	if testing.Short() {
		n = 12
	}
	if *campaigns > 0 {
		n = *campaigns
	}
	limits, parameters, flags := tally{}, tally{}, tally{}
	type part struct {
		plan                      string
		limits, parameters, flags tally
	}
	byPlan := tally{}
	plans := []struct {
		name   string
		plans  []plan
		spoilt bool
	}{{"sparse", sparsePlan(), false}, {"rich", richPlan(), false}, {"rich with a blunder", richPlan(), true}}
	results := make(chan part)
	failed := make(chan error, 100)
	jobs := 0
	for i, k := range kinds[:3] {
		for j, p := range plans {
			jobs++
			go func() {
				var w worker
				r := part{p.name, tally{}, tally{}, tally{}}
				for s := range n {
					if err := w.measure(uint64(1000000*i+100000*j+s), k.kind, p.plans, p.spoilt, r.limits, r.parameters, r.flags); err != nil {
						select {
						case failed <- fmt.Errorf("%s, %s: %w", k.name, p.name, err):
						default:
						}
					}
				}
				results <- r
			}()
		}
	}
	for range jobs {
		r := <-results
		for _, v := range r.limits {
			w := byPlan[r.plan]
			byPlan[r.plan] = [2]int{w[0] + v[0], w[1] + v[1]}
		}
		for _, m := range []struct{ from, to tally }{{r.limits, limits}, {r.parameters, parameters}, {r.flags, flags}} {
			for k, v := range m.from {
				w := m.to[k]
				m.to[k] = [2]int{w[0] + v[0], w[1] + v[1]}
			}
		}
	}
	close(failed)
	for err := range failed {
		t.Error(err)
	}
	for _, m := range []struct {
		what string
		m    tally
	}{{"limit", limits}, {"parameter", parameters}} {
		var names []string
		for k := range m.m {
			names = append(names, k)
		}
		sort.Strings(names)
		for _, k := range names {
			v := m.m[k]
			share := float64(v[0]) / float64(v[1])
			t.Logf("%-10s %-36s held in %5.2f %% of %d", m.what, k, 100*share, v[1])
			// 2 % either way, or what chance may do to as few campaigns as one propeller has.
			if slack := max(0.02, 3.5*math.Sqrt(0.95*0.05/float64(v[1]))); !(math.Abs(share-0.95) <= slack) {
				t.Errorf("the interval of %s %s holds the truth in %.1f %% of %d campaigns", m.what, k, 100*share, v[1])
			}
		}
	}
	for _, p := range plans {
		t.Logf("all limits, %s: held in %.2f %% of %d", p.name, 100*float64(byPlan[p.name][0])/float64(byPlan[p.name][1]), byPlan[p.name][1])
	}
	for k, v := range flags {
		t.Logf("%s: %.2f %% of %d", k, 100*float64(v[0])/float64(v[1]), v[1])
	}
	if v := flags["blundered run flagged"]; float64(v[0]) < 0.9*float64(v[1]) {
		t.Errorf("the blundered run is flagged in %d of %d", v[0], v[1])
	}
	if v := flags["good run flagged"]; float64(v[0]) > 0.01*float64(v[1]) {
		t.Errorf("a good run is flagged in %d of %d", v[0], v[1])
	}
}
