package estimate

import (
	"math"
	"testing"
)

// atTruth puts the estimator at the numbers of a truth.
func (e *Estimator) atTruth(c *Case, t *truth) {
	e.start(c)
	for i := range e.l.list {
		k := &e.l.list[i]
		name, _ := e.l.name(i)
		x := t.value[name]
		if k.log {
			x = math.Log(math.Abs(x))
		}
		e.u[i] = (x - k.center) / k.spread
	}
	e.place(e.u, e.x)
	e.linearise()
}

// TestResidualsAtTheTruth: with the true numbers the whitened residuals of every kind of run are standard normal. That is the
// effective variance at work: every reading's error reaches the residual as foretold.
func TestResidualsAtTheTruth(t *testing.T) {
	type sums struct{ n, s, q, four float64 }
	all := map[string]*sums{}
	var e Estimator
	n := 400
	if testing.Short() {
		n = 100
	}
	for _, k := range kinds {
		for seed := range n {
			c, truth := campaign(uint64(90000+seed), k.kind, richPlan())
			e.atTruth(&c, &truth)
			for i := range e.runs {
				if e.runs[i].outcome != Fitted {
					t.Fatalf("%v: %v", e.runs[i].run.Kind, e.runs[i].outcome)
				}
				for m := range e.runs[i].rows {
					name := e.runs[i].run.Kind.String()
					if m == 1 {
						name = "rpm"
					} else if e.runs[i].byRevolutions {
						name = "level by rpm"
					}
					a := all[name]
					if a == nil {
						a = &sums{}
						all[name] = a
					}
					z := e.z[e.first[i]+m]
					a.n++
					a.s += z
					a.q += z * z
					a.four += z * z * z * z
				}
			}
		}
	}
	for name, a := range all {
		mean, variance, four := a.s/a.n, a.q/a.n, a.four/a.n
		t.Logf("%-14s %6.0f residuals: mean %+.3f, variance %.3f, fourth moment %.2f (3)", name, a.n, mean, variance, four)
		if math.Abs(mean) > 4.5/math.Sqrt(a.n) || math.Abs(variance-1) > 4.5*math.Sqrt(2/a.n) {
			t.Errorf("%s: mean %+.3f, variance %.3f of %g whitened residuals, want 0 and 1", name, mean, variance, a.n)
		}
	}
	if len(all) < 7 {
		t.Errorf("only %d kinds of residual were seen", len(all))
	}
}
