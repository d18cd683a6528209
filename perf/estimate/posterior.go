package estimate

import (
	"math"

	"levelspan/perf"
)

// RunResult is what the estimate says of one run. Residuals are what was flown less what the estimate says: m/s of specific excess power (level, climb,
// glide), lift coefficient (stall), m/s of calibrated airspeed (gps-legs).
type RunResult struct {
	Outcome      Outcome
	Residual     float64
	SD           float64 // that the readings' spreads give the residual
	Standardised float64 // Residual/SD
	Weight       float64 // 1: a run like the others; towards 0: it speaks against them. 0 for a run left out
	Pull         float64 // the farthest that an unknown would move if the run were left out, in that unknown's posterior standard deviations
	Flagged      bool    // too far from what the other runs and the prior foretell: check the readings
	HasRPM       bool    // a setting and an rpm are read; the fields below count then
	RPMResidual  float64 // rev/s read less what the setting gives
	RPMSD        float64
}

// flagBound is from how many standard deviations, the uncertainty of the foretelling counted, a run is flagged: 3 in 1000 good ones are.
const flagBound = 3

// Posterior is the estimate.
type Posterior struct {
	Parameters       []Parameter
	Correlation      []float64 // one row after another, of the logarithms of the positive parameters
	Runs             []RunResult
	ChiSquare        float64 // sum of the squares of the standardised residuals that count and of the prior's
	DegreesOfFreedom int     // how many residuals count; a chi-square of about that is as it should be
	Iterations       int
	Converged        bool
	Stop             Stop
	Indistinct       []string // what the runs cannot tell apart, or say nothing of

	l     layout
	own   perf.Aeroplane // the prior as it was
	instr Instruments
	u     []float64
	x     []float64
	cov   []float64 // of u
}

// fill takes the state of the estimator, linearised at the estimate.
func (p *Posterior) fill(c *Case, e *Estimator) {
	n := len(e.l.list)
	*p = Posterior{Parameters: p.Parameters[:0], Correlation: resize(p.Correlation, n*n), Runs: resize(p.Runs, len(c.Runs)),
		u: append(p.u[:0], e.u...), x: append(p.x[:0], e.x...), cov: resize(p.cov, n*n), instr: c.Instruments, own: *c.Prior,
		l: layout{list: append(p.l.list[:0], e.l.list...), reference: e.l.reference}}
	p.l.prior = &p.own
	for _, u := range e.u {
		p.ChiSquare += u * u
	}
	for i := range e.runs {
		if e.counts(i) {
			p.ChiSquare += e.square(i, e.z)
		}
	}
	e.sandwich(p.cov)
	for i := range n {
		for j := range n {
			p.Correlation[i*n+j] = p.cov[i*n+j] / math.Sqrt(p.cov[i*n+i]*p.cov[j*n+j])
		}
		p.Correlation[i*n+i] = 1
	}
	for i := range e.l.list {
		k := &e.l.list[i]
		name, words := e.l.name(i)
		p.Parameters = append(p.Parameters, Parameter{Kind: k.kind, Index: k.index, Name: name, Words: words,
			Prior: k.value(k.center), PriorSD: k.sd(k.center, k.spread),
			Estimate: k.value(e.x[i]), SD: k.sd(e.x[i], k.spread*math.Sqrt(p.cov[i*n+i]))})
	}
	for i := range e.runs {
		p.Runs[i] = p.result(e, i)
	}
	p.Indistinct = p.indistinct(e)
}

// sandwich fills cov with the covariance of u, A^-1 B A^-1, and e.full with the inverse of all that prior and runs say, the runs by their weight. The
// prior counts in each like readings of the unknowns, one each.
func (e *Estimator) sandwich(cov []float64) {
	n := len(e.l.list)
	e.full, e.inverse, e.pulls = resize(e.full, n*n), resize(e.inverse, n*n), resize(e.pulls, n*n)
	// The leverages first, from the weights alone.
	e.worths, e.counted = resize(e.worths, len(e.runs)), resize(e.counted, len(e.runs))
	for i := range e.runs {
		if e.counts(i) {
			e.counted[i] = student.weight(e.square(i, e.z))
		}
	}
	e.gather(e.full)
	for i := range e.runs {
		if !e.counts(i) {
			continue
		}
		f := &e.runs[i]
		g := 0.0
		for k := e.first[i]; k < e.first[i]+f.rows; k++ {
			g += e.variance(e.jac[k*n:k*n+n], e.full) / float64(f.rows)
		}
		e.worths[i] = worthOf(e.counted[i] * g)
		e.counted[i], _ = e.worths[i].of(e.square(i, e.z))
	}
	e.gather(e.inverse)
	for i := range e.runs {
		if e.counts(i) {
			e.counted[i] = e.worths[i].information(e.square(i, e.z))
		}
	}
	e.gather(e.full)
	clear(e.pulls)
	for i := range n {
		e.pulls[i*n+i] = 1
	}
	for i := range e.runs {
		if !e.counts(i) {
			continue
		}
		_, b := e.worths[i].of(e.square(i, e.z))
		for k := e.first[i]; k < e.first[i]+e.runs[i].rows; k++ {
			row := e.jac[k*n : k*n+n]
			for p := range n {
				for q := range n {
					e.pulls[p*n+q] += b * row[p] * row[q]
				}
			}
		}
	}
	for i := range n {
		for j := range n {
			s := 0.0
			for k := range n {
				s += e.inverse[i*n+k] * e.pulls[k*n+j]
			}
			e.row[j] = s
		}
		for j := range n {
			s := 0.0
			for k := range n {
				s += e.row[k] * e.inverse[k*n+j]
			}
			cov[i*n+j] = s
		}
	}
}

// variance is row C row', and leaves C row' in e.row.
func (e *Estimator) variance(row, c []float64) float64 {
	n := len(row)
	g := 0.0
	for a := range n {
		s := 0.0
		for b := range n {
			s += c[a*n+b] * row[b]
		}
		e.row[a] = s
		g += row[a] * s
	}
	return g
}

// gather fills c with the inverse of the prior's information and the runs', each run as often as e.counted says.
func (e *Estimator) gather(c []float64) {
	n := len(e.l.list)
	e.ls.Reset(n)
	for j := range n {
		clear(e.row)
		e.row[j] = 1
		e.ls.Add(e.row, 0)
	}
	for i := range e.runs {
		if !e.counts(i) {
			continue
		}
		h := math.Sqrt(e.counted[i])
		for k := e.first[i]; k < e.first[i]+e.runs[i].rows; k++ {
			for j := range n {
				e.row[j] = h * e.jac[k*n+j]
			}
			e.ls.Add(e.row, 0)
		}
	}
	e.ls.Covariance(c)
}

// result says what the estimate makes of run i. With g the variance that the unknowns give the foretelling, in units of the run's own, and h
// the run's information, leaving the run out makes it g/(1 - h g); that is the linear update taken back.
func (p *Posterior) result(e *Estimator, i int) RunResult {
	f := &e.runs[i]
	if f.outcome != Fitted {
		return RunResult{Outcome: f.outcome}
	}
	n := len(e.l.list)
	k := e.first[i]
	l := e.chol[3*i : 3*i+3]
	q := RunResult{Residual: e.r[k], SD: l[0], Standardised: e.r[k] / l[0]}
	if f.run.Kind == Stall {
		q.Residual, q.SD = f.lift(&e.base, e.r[k], l[0])
	}
	if f.rows == 2 {
		q.HasRPM, q.RPMResidual, q.RPMSD = true, e.r[k+1], math.Hypot(l[1], l[2])
	}
	w, h := 0.0, 0.0
	if e.counts(i) {
		w = student.weight(e.square(i, e.z))
		h = e.counted[i]
	} else {
		q.Outcome = WasLeftOut
	}
	q.Weight = w
	clear(e.step)
	for m := k; m < k+f.rows; m++ {
		row := e.jac[m*n : m*n+n]
		g := e.variance(row, e.full)
		z := e.z[m]
		without := z / max(1-w*g, 1e-9)
		variance := (1 - h*g + g) / max(1-h*g, 1e-9)
		if without*without > flagBound*flagBound*variance {
			q.Flagged = true
		}
		for a := range n {
			e.step[a] += w * without * e.row[a]
		}
	}
	for a := range n {
		q.Pull = max(q.Pull, math.Abs(e.step[a])/math.Sqrt(e.full[a*n+a]))
	}
	return q
}

// Aeroplane makes dst the estimated aeroplane: the prior with the estimate's numbers and the position error added to the calibration of every
// configuration. A zero posterior gives a zero aeroplane.
func (p *Posterior) Aeroplane(dst *perf.Aeroplane) {
	if len(p.x) == 0 {
		*dst = perf.Aeroplane{}
		return
	}
	p.l.assemble(p.x, dst, nil, nil)
}

// Index is the place of the parameter of that contract name, or -1.
func (p *Posterior) Index(name string) int {
	for i := range p.Parameters {
		if p.Parameters[i].Name == name {
			return i
		}
	}
	return -1
}

// DragArea is the estimated drag area, m^2, of the propeller in a state; 0 where no glide of that state is among the runs.
func (p *Posterior) DragArea(s PropellerState) float64 {
	for i := range p.Parameters {
		if q := &p.Parameters[i]; q.Kind == PropellerDragArea && q.Index == int(s) {
			return q.Estimate
		}
	}
	return 0
}
