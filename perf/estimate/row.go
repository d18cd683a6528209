package estimate

import (
	"math"

	"levelspan/perf"
)

// A linear update works in u, the unknowns in standard deviations before flight about the prior's values: p.cov is the posterior's covariance of u. With sayOf's
// gradient a and unit variance, the covariance after a run is C - C a a' C/(1 + a' C a) for each row in turn.

// sayOf fills dst, one stretch of the unknowns a row, with what a run flown as written would say of the unknowns at the estimate: the slopes against u
// of its residuals, whitened by the spreads of its readings. It gives how many rows there are (two where a setting and an rpm are read), 0 where
// the run could not be used. Legs of a hypothetical GPS run may be any that lie as they would be flown. e's last fit is overwritten.
func (e *Estimator) sayOf(p *Posterior, run *Run, dst []float64) (int, Outcome) {
	n := len(p.x)
	if n == 0 {
		return 0, OutOfDomain
	}
	e.single[0] = *run
	c := Case{Prior: &p.own, Instruments: p.instr, Runs: e.single[:]}
	e.l = layout{prior: &p.own, list: append(e.l.list[:0], p.l.list...), reference: p.l.reference}
	e.begin(&c)
	copy(e.u, p.u)
	copy(e.x, p.x)
	f := &e.runs[0]
	if f.outcome != Fitted {
		return 0, f.outcome
	}
	e.linearise()
	copy(dst, e.jac[:f.rows*n])
	return f.rows, Fitted
}

// limitGradient fills dst with the slopes of a figure of the answer against u at the estimate, by central differences of a third of a posterior standard
// deviation, and gives the figure. It reports false where the figure does not apply at the estimate or at a step. pick chooses the figure and says whether
// it applies.
func (e *Estimator) limitGradient(p *Posterior, c *perf.Condition, pick func(*perf.Answer) (float64, bool), dst []float64) (float64, bool) {
	n := len(p.x)
	e.xMoved = append(e.xMoved[:0], p.x...)
	at := func() (float64, bool) {
		var a perf.Aeroplane
		e.store, e.points = p.l.assemble(e.xMoved, &a, e.store, e.points)
		if err := e.solver.Solve(&a, c, &e.answer); err != nil {
			return 0, false
		}
		return pick(&e.answer)
	}
	value, ok := at()
	if !ok {
		return 0, false
	}
	for j := range n {
		k := &p.l.list[j]
		dst[j] = 0
		h := k.spread * math.Sqrt(p.cov[j*n+j]) / 3
		high, low := min(p.x[j]+h, k.high), max(p.x[j]-h, k.low)
		if !(high > low) {
			continue
		}
		e.xMoved[j] = high
		a, okA := at()
		e.xMoved[j] = low
		b, okB := at()
		e.xMoved[j] = p.x[j]
		if !okA || !okB {
			return 0, false
		}
		dst[j] = (a - b) / (high - low) * k.spread
	}
	return value, true
}
