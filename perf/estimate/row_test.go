package estimate

import (
	"math"
	"testing"

	"levelspan/perf"
)

// TestRowForetellsTheFit: the covariance after one more run, by the linear update, is that of the fit with the run whose readings are exactly what the
// estimate says.
func TestRowForetellsTheFit(t *testing.T) {
	for _, k := range kinds {
		c, p := fitted(t, 11, k.kind, sparsePlan())
		n := len(p.x)
		var a perf.Aeroplane
		p.Aeroplane(&a)
		run := c.Runs[1] // the climb
		if run.Kind != Climb {
			t.Fatal("the plan has changed")
		}
		var e Estimator
		rows := make([]float64, 2*n)
		m, o := e.sayOf(&p, &run, rows)
		if o != Fitted {
			t.Fatal(o)
		}
		want := append([]float64(nil), p.cov...)
		for r := range m {
			a := rows[r*n : r*n+n]
			ca := make([]float64, n)
			g := 1.0
			for i := range n {
				for j := range n {
					ca[i] += want[i*n+j] * a[j]
				}
				g += a[i] * ca[i]
			}
			for i := range n {
				for j := range n {
					want[i*n+j] -= ca[i] * ca[j] / g
				}
			}
		}
		c.Runs = append(c.Runs, run)
		var after Posterior
		if err := e.Fit(&c, &after); err != nil {
			t.Fatal(err)
		}
		for i := range n {
			before, foretold, found := p.cov[i*n+i], want[i*n+i], after.cov[i*n+i]
			if math.Abs(math.Sqrt(found/foretold)-1) > 0.12 {
				t.Errorf("%s, %s: standard deviation %.4f, foretold %.4f, found %.4f", k.name, p.Parameters[i].Name, math.Sqrt(before), math.Sqrt(foretold), math.Sqrt(found))
			}
		}
	}
}

// TestLimitGradient: with the posterior's covariance it gives the width of the draws' interval, for a figure that is nearly linear.
func TestLimitGradient(t *testing.T) {
	for _, k := range kinds {
		_, p := fitted(t, 12, k.kind, richPlan())
		c := today()
		var e Estimator
		g := make([]float64, len(p.x))
		value, ok := e.limitGradient(&p, &c, func(a *perf.Answer) (float64, bool) {
			l := &a.Limits[perf.FastestLevel]
			return float64(l.CAS), l.Applies
		}, g)
		if !ok {
			t.Fatal("no fastest level speed")
		}
		variance := 0.0
		n := len(g)
		for i := range n {
			for j := range n {
				variance += g[i] * g[j] * p.cov[i*n+j]
			}
		}
		var d Draws
		var b Bands
		var got Intervals
		d.Set(&p, DefaultDraws)
		if err := b.Solve(&d, &c, &got); err != nil {
			t.Fatal(err)
		}
		i := got.Limits[perf.FastestLevel].CAS
		if w := 2 * 1.959964 * math.Sqrt(variance); math.Abs(i.Width()/w-1) > 0.1 || !i.Holds(value) {
			t.Errorf("%s: %.3f m/s with an interval of %.3f, by the draws %.3f to %.3f", k.name, value, w, i.Low, i.High)
		}
	}
}
