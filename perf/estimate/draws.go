package estimate

import (
	"math"

	"levelspan/perf"
	"levelspan/perf/num"
)

// DefaultDraws is how many draws make the intervals: a power of 2, for the sequence is even over those.
const DefaultDraws = 512

// maximumDraws bounds what Set takes.
const maximumDraws = 1 << 16

// Draws are aeroplanes drawn from a posterior. They are a function of it alone: the same quasi-random points each time, so that intervals move
// smoothly while the estimate does. The zero value is ready for Set.
type Draws struct {
	planes         []perf.Aeroplane
	configurations [][]perf.Configuration
	points         [][]perf.PositionErrorPoint
	variates       []float64 // standard normal, one row a draw
	n, dimensions  int
	order          []int // the unknowns, the greatest lifts last: the sequence's first dimensions are the evenest
	chol, permuted []float64
	x              []float64
}

// Set draws n aeroplanes, at least 1; each is one that perf takes. It keeps what it can of an earlier Set's memory.
func (d *Draws) Set(p *Posterior, n int) {
	m := len(p.x)
	if m == 0 {
		d.planes = d.planes[:0]
		return
	}
	n = min(max(n, 1), maximumDraws)
	d.ready(n, m)
	d.order = d.order[:0]
	for _, lifts := range []bool{false, true} {
		for i := range p.l.list {
			if (p.l.list[i].kind == MaximumLift) == lifts {
				d.order = append(d.order, i)
			}
		}
	}
	d.chol, d.permuted, d.x = resize(d.chol, m*m), resize(d.permuted, m*m), resize(d.x, m)
	for a, i := range d.order {
		for b, j := range d.order {
			d.permuted[a*m+b] = p.cov[i*m+j]
		}
	}
	if !num.Cholesky(m, d.permuted, d.chol) {
		clear(d.chol)
	}
	for i := range n {
		v := d.variates[i*m : i*m+m]
		for a, j := range d.order {
			s := 0.0
			for b := range a + 1 {
				s += d.chol[a*m+b] * v[b]
			}
			k := &p.l.list[j]
			d.x[j] = min(max(p.x[j]+k.spread*s, k.low), k.high)
		}
		d.configurations[i], d.points[i] = p.l.assemble(d.x, &d.planes[i], d.configurations[i], d.points[i])
	}
}

// ready makes room, and the variates where they are for other numbers.
func (d *Draws) ready(n, m int) {
	d.planes, d.configurations, d.points = resize(d.planes, n), resize(d.configurations, n), resize(d.points, n)
	if d.n == n && d.dimensions == m {
		return
	}
	d.n, d.dimensions = n, m
	d.variates = resize(d.variates, n*m)
	for i := range n {
		for j := range m {
			d.variates[i*m+j] = num.Normal(num.Uniform(uint32(i), j))
		}
	}
}

// Len is how many draws there are.
func (d *Draws) Len() int { return len(d.planes) }

// Aeroplane is draw i, from 0; it is not to be changed, and holds until the next Set.
func (d *Draws) Aeroplane(i int) *perf.Aeroplane { return &d.planes[i] }

// quantiles are the ends of the 95 % coverage interval: as much is left out on either side (JCGM 101:2008, 7.7, the probabilistically
// symmetric interval).
const (
	lowQuantile  = 0.025
	highQuantile = 0.975
)

// interval is that of the values, whose order it changes.
func interval(values []float64) Interval {
	if len(values) == 0 {
		return Interval{}
	}
	i := Interval{Applies: true, Low: num.Quantile(values, lowQuantile), High: num.Quantile(values, highQuantile)}
	if math.IsNaN(i.Low) || math.IsNaN(i.High) {
		return Interval{}
	}
	return i
}
