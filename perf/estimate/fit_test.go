package estimate

import (
	"math"
	"testing"

	"levelspan/perf"
)

var kinds = []struct {
	name string
	kind perf.PropellerKind
}{
	{"constant-efficiency", perf.ConstantEfficiency}, {"constant-speed", perf.ConstantSpeed}, {"fixed-pitch", perf.FixedPitch}, {"table", perf.Tabulated},
}

// TestFitShow prints one campaign of each kind (-v).
func TestFitShow(t *testing.T) {
	for _, k := range kinds {
		c, truth := campaign(1, k.kind, richPlan())
		var e Estimator
		var p Posterior
		if err := e.Fit(&c, &p); err != nil {
			t.Fatal(err)
		}
		t.Logf("%s: %d runs, %d steps, %v, chi-square %.1f of %d", k.name, len(c.Runs), p.Iterations, p.Stop, p.ChiSquare, p.DegreesOfFreedom)
		for i := range p.Parameters {
			q := &p.Parameters[i]
			z := (truth.value[q.Name] - q.Estimate) / q.SD
			t.Logf("  %-36s prior %10.5f +- %8.5f  estimate %10.5f +- %8.5f  truth %10.5f (%.1f sd)", q.Name, q.Prior, q.PriorSD, q.Estimate, q.SD, truth.value[q.Name], z)
			if !(math.Abs(z) < 4.5) {
				t.Errorf("%s: %s is %.1f standard deviations from the truth", k.name, q.Name, z)
			}
		}
		for _, s := range p.Indistinct {
			t.Logf("  %s", s)
		}
		if !p.Converged {
			t.Errorf("%s: %v after %d steps", k.name, p.Stop, p.Iterations)
		}
	}
}
