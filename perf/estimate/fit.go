package estimate

import (
	"math"

	"levelspan/perf"
	"levelspan/perf/num"
)

// Stop is why the fit ended.
type Stop uint8

// The reasons.
const (
	Settled      Stop = iota // the last step was negligible
	NothingToFit             // no run counts: the posterior is the prior
	NoProgress               // no step makes the misfit less, though the last was not negligible
	StepLimit                // the steps ran out
	stopCount
)

var stopTexts = [stopCount]string{"settled", "no runs: the prior", "no further progress", "step limit"}

// String says it in words.
func (s Stop) String() string {
	if s < stopCount {
		return stopTexts[s]
	}
	return "unknown"
}

// How far the fit goes: steps a stage, the step (in standard deviations before flight) that counts as none, and after how many
// steps the spreads are held, so that nothing can go round in circles.
const (
	maximumSteps  = 80
	roughStep     = 1e-2
	finestStep    = 1e-8
	heldAfter     = 30
	maximumRetry  = 14
	boundStrength = 1e8
)

// Estimator makes estimates. It owns all working store and is not safe for concurrent use; the zero value is ready.
type Estimator struct {
	l         layout
	ev        perf.Evaluator
	base      craft
	moved     craft
	instr     Instruments
	runs      []flown
	first     []int     // first row of each run
	r, z      []float64 // residuals, and whitened, a row
	rTrial    []float64
	chol      []float64 // 3 a run: Cholesky factor of the spread's covariance
	jac       []float64 // rows x unknowns, whitened, against u
	low, high []float64 // residuals at a step either way
	u, x      []float64
	uTrial    []float64
	xTrial    []float64
	xMoved    []float64
	step      []float64
	row       []float64
	slope     []float64 // down the misfit
	full      []float64 // of the posterior: see sandwich
	inverse   []float64
	pulls     []float64
	worths    []worth
	counted   []float64 // how much of each run counts
	bound     []bool
	last      []float64 // the step before
	stretched bool
	ls        num.LeastSquares
	rows      int

	// Of row.go.
	single [1]Run
	solver perf.Solver
	answer perf.Answer
	store  []perf.Configuration
	points []perf.PositionErrorPoint
}

// Fit fills dst with the posterior of the case. The error is that of Validate; a run that cannot be used is an Outcome of its own in
// dst.Runs. The posterior keeps what it needs; the prior's lists are shared until the next Fit.
func (e *Estimator) Fit(c *Case, dst *Posterior) error {
	if err := c.Validate(); err != nil {
		*dst = Posterior{}
		return err
	}
	e.start(c)
	counted := 0
	for i := range e.runs {
		if e.counts(i) {
			counted += e.runs[i].rows
		}
	}
	stop, steps := NothingToFit, 0
	if counted > 0 {
		var n int
		_, n = e.minimise(huber, roughStep)
		stop, steps = e.minimise(student, finestStep)
		steps += n
	} else {
		e.linearise()
	}
	dst.fill(c, e)
	dst.Stop, dst.Converged, dst.Iterations = stop, stop == Settled || stop == NothingToFit, steps
	dst.DegreesOfFreedom = counted
	return nil
}

// start readies everything for the unknowns at the prior.
func (e *Estimator) start(c *Case) {
	e.l.set(c)
	e.begin(c)
}

// begin is start with the unknowns listed.
func (e *Estimator) begin(c *Case) {
	e.instr = c.Instruments
	n := len(e.l.list)
	e.base.start(&e.l)
	e.moved.start(&e.l)
	e.runs = resize(e.runs, len(c.Runs))
	e.first = resize(e.first, len(c.Runs))
	e.rows = 0
	for i := range c.Runs {
		f := &e.runs[i]
		f.prepare(&c.Runs[i], c.Prior, &e.instr)
		e.first[i] = e.rows
		e.rows += f.rows
	}
	m := e.rows
	e.r, e.z, e.rTrial, e.low, e.high = resize(e.r, m), resize(e.z, m), resize(e.rTrial, m), resize(e.low, m), resize(e.high, m)
	e.chol = resize(e.chol, 3*len(c.Runs))
	e.jac = resize(e.jac, m*n)
	e.u, e.x, e.uTrial, e.xTrial, e.xMoved = resize(e.u, n), resize(e.x, n), resize(e.uTrial, n), resize(e.xTrial, n), resize(e.xMoved, n)
	e.step, e.row, e.slope, e.bound = resize(e.step, n), resize(e.row, n), resize(e.slope, n), resize(e.bound, n)
	e.last = resize(e.last, n)
	clear(e.u)
	clear(e.bound)
	e.place(e.u, e.x)
}

func resize[T any](s []T, n int) []T {
	if cap(s) < n {
		return make([]T, n)
	}
	return s[:n]
}

// place fills x for u and takes u back to the bounds.
func (e *Estimator) place(u, x []float64) {
	for i := range e.l.list {
		k := &e.l.list[i]
		x[i] = k.at(u[i])
		if k.spread > 0 && x[i] != k.center+k.spread*u[i] {
			u[i] = (x[i] - k.center) / k.spread
		}
	}
}

// counts reports whether run i takes part in the fit.
func (e *Estimator) counts(i int) bool {
	return e.runs[i].outcome == Fitted && e.runs[i].run.LeftOut == ""
}

// residuals fills r at x.
func (e *Estimator) residuals(c *craft, x, r []float64) {
	c.apply(&e.l, x)
	for i := range e.runs {
		f := &e.runs[i]
		if f.outcome != Fitted {
			continue
		}
		d := f.readings()
		d.v = f.run.Air.TASFromCAS(perf.CAS(c.cas(f.run.Configuration, d.ias)))
		f.v = d.v
		v := f.residual(c, &e.ev, &d)
		k := e.first[i]
		r[k] = v[0]
		if f.rows == 2 {
			r[k+1] = v[1]
		}
	}
}

// whiten divides the residuals of run i by the factor of their covariance.
func (e *Estimator) whiten(i int, r, z []float64) {
	l := e.chol[3*i : 3*i+3]
	k := e.first[i]
	z[k] = r[k] / l[0]
	if e.runs[i].rows == 2 {
		z[k+1] = (r[k+1] - l[2]*z[k]) / l[1]
	}
}

// square is the square of the whitened residual of run i.
func (e *Estimator) square(i int, z []float64) float64 {
	k := e.first[i]
	d := z[k] * z[k]
	if e.runs[i].rows == 2 {
		d += z[k+1] * z[k+1]
	}
	return d
}

// spreads takes the covariance of each residual at the present numbers.
func (e *Estimator) spreads() {
	e.base.apply(&e.l, e.x)
	for i := range e.runs {
		f := &e.runs[i]
		if f.outcome != Fitted {
			continue
		}
		v := f.spread(&e.base, &e.ev, &e.instr)
		l := e.chol[3*i : 3*i+3]
		l[0] = math.Sqrt(max(v[0], 1e-24))
		l[2] = v[2] / l[0]
		l[1] = math.Sqrt(max(v[1]-l[2]*l[2], 1e-24))
	}
}

// stepOf is how far x is moved for a central difference.
func (k *unknown) stepOf() float64 {
	if k.kind == PositionOffset {
		return 1e-3
	}
	return 1e-5
}

// jacobian fills jac: the slopes of the whitened residuals against u.
func (e *Estimator) jacobian() {
	n := len(e.l.list)
	clear(e.jac)
	e.moved.apply(&e.l, e.x)
	for j := range e.l.list {
		k := &e.l.list[j]
		if k.spread == 0 {
			continue
		}
		h := k.stepOf()
		for side := range 2 {
			x, r := e.x[j]+h, e.high
			if side == 1 {
				x, r = e.x[j]-h, e.low
			}
			e.moved.put(&e.l, k, k.value(x))
			for i := range e.runs {
				f := &e.runs[i]
				if f.outcome != Fitted || !f.knows(k) {
					continue
				}
				d := f.readings()
				if k.kind != PositionOffset && k.kind != PositionSlope {
					d.v = f.v
				}
				v := f.residual(&e.moved, &e.ev, &d)
				r[e.first[i]] = v[0]
				if f.rows == 2 {
					r[e.first[i]+1] = v[1]
				}
			}
		}
		e.moved.put(&e.l, k, k.value(e.x[j]))
		s := k.spread / (2 * h)
		for i := range e.runs {
			f := &e.runs[i]
			if f.outcome != Fitted || !f.knows(k) {
				continue
			}
			l := e.chol[3*i : 3*i+3]
			m := e.first[i]
			a := s * (e.high[m] - e.low[m]) / l[0]
			e.jac[m*n+j] = a
			if f.rows == 2 {
				e.jac[(m+1)*n+j] = (s*(e.high[m+1]-e.low[m+1]) - l[2]*a) / l[1]
			}
		}
	}
}

// linearise takes residuals, spreads and slopes at the present numbers.
func (e *Estimator) linearise() {
	e.spreads()
	e.weigh()
}

// weigh is linearise with the spreads held.
func (e *Estimator) weigh() {
	e.residuals(&e.base, e.x, e.r)
	for i := range e.runs {
		if e.runs[i].outcome == Fitted {
			e.whiten(i, e.r, e.z)
		}
	}
	e.jacobian()
}

// misfit is what the fit makes least: half the square of u, and each run's loss.
func (e *Estimator) misfit(s stage, u, z []float64) float64 {
	sum := 0.0
	for _, x := range u {
		sum += 0.5 * x * x
	}
	for i := range e.runs {
		if e.counts(i) {
			sum += s.loss(e.square(i, z))
		}
	}
	return sum
}

// minimise goes down to the least misfit by Newton's steps, the residuals' own curvature left out (Gauss), damped after Levenberg and Marquardt
// where a step does not make the misfit less.
func (e *Estimator) minimise(s stage, tolerance float64) (Stop, int) {
	lambda := 0.0
	clear(e.bound)
	clear(e.last)
	for n := 1; n <= maximumSteps; n++ {
		if n <= heldAfter {
			e.linearise()
		} else {
			e.weigh()
		}
		before := e.misfit(s, e.u, e.z)
		size, better := 0.0, false
		for try := range maximumRetry {
			size = e.propose(s, lambda)
			e.stretched = false
			if try == 0 && lambda == 0 && size >= tolerance {
				e.stretch()
			}
			if size < tolerance && lambda == 0 {
				better = true
				break
			}
			e.residuals(&e.moved, e.xTrial, e.rTrial)
			for i := range e.runs {
				if e.runs[i].outcome == Fitted {
					e.whiten(i, e.rTrial, e.rTrial)
				}
			}
			if after := e.misfit(s, e.uTrial, e.rTrial); after <= before*(1+1e-12)+1e-14 {
				better = true
				break
			}
			if try == 0 && e.stretched {
				continue // once more, as far as the step itself goes
			}
			lambda = max(10*lambda, 1e-3)
		}
		if !better {
			return NoProgress, n
		}
		for j := range e.u {
			e.last[j] = e.uTrial[j] - e.u[j]
		}
		if e.stretched {
			clear(e.last)
			size = max(size, 2*tolerance)
		}
		copy(e.u, e.uTrial)
		copy(e.x, e.xTrial)
		if size < tolerance && lambda == 0 {
			e.linearise()
			return Settled, n
		}
		if lambda *= 0.1; lambda < 1e-4 {
			lambda = 0
		}
	}
	return StepLimit, maximumSteps
}

// pull adds run i to the normal equations of a step: its slope is that of the weight, its curvature that of the loss along the residual and
// the weight across it.
func (e *Estimator) pull(s stage, i int) {
	n := len(e.l.list)
	k := e.first[i]
	d2 := e.square(i, e.z)
	w, c := s.weight(d2), math.Sqrt(s.curvature(d2))
	if e.runs[i].rows == 1 {
		row := e.jac[k*n : k*n+n]
		for j := range n {
			e.slope[j] -= w * e.z[k] * row[j]
			e.row[j] = c * row[j]
		}
		e.ls.Add(e.row, 0)
		return
	}
	a, b := e.jac[k*n:k*n+n], e.jac[(k+1)*n:(k+2)*n]
	along, across := 1.0, 0.0
	if d2 > 0 {
		along, across = e.z[k]/math.Sqrt(d2), e.z[k+1]/math.Sqrt(d2)
	}
	for j := range n {
		e.slope[j] -= w * (e.z[k]*a[j] + e.z[k+1]*b[j])
		e.row[j] = c * (along*a[j] + across*b[j])
	}
	e.ls.Add(e.row, 0)
	w = math.Sqrt(w)
	for j := range n {
		e.row[j] = w * (along*b[j] - across*a[j])
	}
	e.ls.Add(e.row, 0)
}

// stretch lengthens a step that is a fixed share of the last one in the same direction to where the row of such steps would end (Aitken): the spreads
// that change from step to step, and the negative curvature of a bad run's loss, which steps leave out, make such rows.
func (e *Estimator) stretch() {
	e.stretched = false
	var dot, last, now float64
	for j := range e.u {
		d := e.uTrial[j] - e.u[j]
		dot += d * e.last[j]
		last += e.last[j] * e.last[j]
		now += d * d
	}
	if !(last > 0) || !(dot > 0.95*math.Sqrt(last*now)) {
		return
	}
	ratio := dot / last
	if !(ratio > 0.2 && ratio < 0.98) {
		return
	}
	for j := range e.u {
		e.uTrial[j] = e.u[j] + (e.uTrial[j]-e.u[j])/(1-ratio)
	}
	e.stretched = true
	e.place(e.uTrial, e.xTrial)
}

// propose fills the trial with the next step and says how far it goes. An unknown at a bound that the step would cross is held
// there, and the others step without it.
func (e *Estimator) propose(s stage, lambda float64) float64 {
	n := len(e.l.list)
	clear(e.bound)
	for range n + 1 {
		e.ls.Reset(n)
		for j := range n {
			clear(e.row)
			e.row[j] = 1
			e.ls.Add(e.row, 0)
			e.slope[j] = -e.u[j]
			if lambda > 0 {
				e.row[j] = math.Sqrt(lambda)
				e.ls.Add(e.row, 0)
			}
			if e.bound[j] {
				e.row[j] = boundStrength
				e.ls.Add(e.row, 0)
			}
		}
		for i := range e.runs {
			if e.counts(i) {
				e.pull(s, i)
			}
		}
		if !e.ls.SolveNormal(e.slope, e.step) {
			clear(e.step)
		}
		crossed := false
		for j := range e.l.list {
			k := &e.l.list[j]
			if e.bound[j] || k.spread == 0 {
				continue
			}
			x := e.x[j] + k.spread*e.step[j]
			edge := 1e-9 * k.spread
			if (e.x[j] <= k.low+edge && x < k.low) || (e.x[j] >= k.high-edge && x > k.high) {
				e.bound[j], crossed = true, true
			}
		}
		if !crossed {
			break
		}
	}
	for j := range n {
		e.uTrial[j] = e.u[j] + e.step[j]
		if e.bound[j] {
			e.uTrial[j] = e.u[j]
		}
	}
	e.place(e.uTrial, e.xTrial)
	size := 0.0
	for j := range n {
		size = max(size, math.Abs(e.uTrial[j]-e.u[j]))
	}
	return size
}
