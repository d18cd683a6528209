package estimate

import (
	"strconv"
	"testing"
	"time"

	"levelspan/perf"
)

// benchRuns is a case of that many runs.
func benchRuns(kind perf.PropellerKind, n int) Case {
	c, _ := campaign(1, kind, richPlan())
	flown := c.Runs
	for len(c.Runs) < n {
		c.Runs = append(c.Runs, flown...)
	}
	c.Runs = c.Runs[:n]
	return c
}

// BenchmarkFit: 40 runs (10 unknowns with a constant-speed propeller), and 10,000.
func BenchmarkFit(b *testing.B) {
	for _, n := range []int{40, 1000, 10000} {
		for _, k := range kinds[1:3] {
			b.Run(k.name+"/"+strconv.Itoa(n), func(b *testing.B) {
				c := benchRuns(k.kind, n)
				var e Estimator
				var p Posterior
				b.ReportAllocs()
				for b.Loop() {
					if err := e.Fit(&c, &p); err != nil {
						b.Fatal(err)
					}
				}
				b.ReportMetric(float64(p.Iterations), "steps")
			})
		}
	}
}

// BenchmarkBands is a frame's intervals: 512 draws, every limit and ceiling.
func BenchmarkBands(b *testing.B) {
	for _, k := range kinds {
		b.Run(k.name, func(b *testing.B) {
			_, p := fitted(b, 4, k.kind, richPlan())
			var d Draws
			d.Set(&p, DefaultDraws)
			var s Bands
			var got Intervals
			c := today()
			b.ReportAllocs()
			for i := 0; b.Loop(); i++ {
				c.Mass = 700 + float64(i%64)
				if err := s.Solve(&d, &c, &got); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

// BenchmarkGrowth tells how many times as long a step of the fit takes with ten times the runs; 10 is in proportion. It is a
// ratio of two times, which another program may spoil: hence no test.
func BenchmarkGrowth(b *testing.B) {
	cases := []Case{benchRuns(perf.ConstantSpeed, 300), benchRuns(perf.ConstantSpeed, 3000)}
	var best [2]float64
	var e Estimator
	var p Posterior
	for b.Loop() {
		for i := range cases {
			start := time.Now()
			if err := e.Fit(&cases[i], &p); err != nil {
				b.Fatal(err)
			}
			if x := time.Since(start).Seconds() / float64(p.Iterations); best[i] == 0 || x < best[i] {
				best[i] = x
			}
		}
	}
	b.ReportMetric(best[1]/best[0], "times")
}
