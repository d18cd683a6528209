package estimate

import "levelspan/perf"

// Bands solves a condition for every draw. It owns all working store, allocates nothing once it has seen that many draws and speeds, and is not safe
// for concurrent use. The zero value is ready.
//
// Solve does it at once. Start and Step do the same in slices, for a page that must paint in between:
//
//	err := b.Start(&draws, &condition)
//	for !b.Step(64) {
//		// paint
//	}
//	b.Intervals(&intervals)
type Bands struct {
	z       perf.Solver
	answer  perf.Answer
	row     [figures]figure
	d       *Draws
	c       perf.Condition
	columns []float64 // one column a figure, as long as there are draws
	count   [figures]int
	length  int
	done    int
	level   int
	slow    []float64 // TAS, ends of the band of level flight, a draw that has one
	fast    []float64

	speeds    []perf.TAS
	required  []float64 // one stretch a speed
	available []float64
	err       error
}

// Solve fills dst for the condition: Start, Step to the end, Intervals. The error is that of perf.Solver.Solve, and dst is zero then.
func (b *Bands) Solve(d *Draws, c *perf.Condition, dst *Intervals) error {
	*dst = Intervals{}
	if err := b.Start(d, c); err != nil {
		return err
	}
	for !b.Step(d.Len()) {
	}
	if b.err != nil {
		return b.err
	}
	b.expand(dst)
	return nil
}

// Ribbons asks for the curves at these speeds too, from the next Start on; none asks for none. The speeds are copied.
func (b *Bands) Ribbons(speeds []perf.TAS) {
	b.speeds = append(b.speeds[:0], speeds...)
}

// Start begins a condition. The draws must stay as they are until the last Step.
func (b *Bands) Start(d *Draws, c *perf.Condition) error {
	n := d.Len()
	b.d, b.c = d, *c
	b.done, b.level, b.err = 0, 0, nil
	if b.length != n {
		b.length = n
		b.columns = resize(b.columns, figures*n)
	}
	clear(b.count[:])
	b.slow, b.fast = resize(b.slow, n)[:0], resize(b.fast, n)[:0]
	b.required, b.available = resize(b.required, n*len(b.speeds)), resize(b.available, n*len(b.speeds))
	if n == 0 {
		return nil
	}
	if err := c.Validate(d.Aeroplane(0)); err != nil {
		b.length = 0
		b.d = nil
		return err
	}
	return nil
}

// Step solves for at most that many further draws (at least one) and reports whether all are done.
func (b *Bands) Step(most int) bool {
	if b.d == nil {
		return true
	}
	n := b.length
	for range max(most, 1) {
		if b.done >= n {
			break
		}
		if err := b.z.Solve(b.d.Aeroplane(b.done), &b.c, &b.answer); err != nil {
			b.err = err // a draw is always one that perf takes: TestDrawsAreAeroplanes
			b.done, b.length = 0, 0
			return true
		}
		flatten(&b.answer, &b.row)
		for i := range b.row {
			if b.row[i].ok {
				b.columns[i*n+b.count[i]] = b.row[i].x
				b.count[i]++
			}
		}
		if b.answer.Outcome == perf.LevelFlight {
			b.level++
			b.slow = append(b.slow, float64(b.answer.Limits[perf.SlowestLevel].TAS))
			b.fast = append(b.fast, float64(b.answer.Limits[perf.FastestLevel].TAS))
		}
		for i, v := range b.speeds {
			b.required[i*n+b.done] = b.z.PowerRequired(v)
			b.available[i*n+b.done] = b.z.PowerAvailable(v)
		}
		b.done++
	}
	return b.done >= n
}

// Done is for how many draws the condition is solved.
func (b *Bands) Done() int { return b.done }

// Intervals fills dst from the draws solved so far.
func (b *Bands) Intervals(dst *Intervals) error {
	*dst = Intervals{}
	if b.err != nil {
		return b.err
	}
	b.expand(dst)
	return nil
}

// column is figure i in the draws where it applies.
func (b *Bands) column(i int) []float64 {
	if b.length == 0 {
		return nil
	}
	return b.columns[i*b.length : i*b.length+b.count[i]]
}

// ProbabilityAt is the share of the draws, of those solved so far, in which level flight holds at v.
func (b *Bands) ProbabilityAt(v perf.TAS) float64 {
	if b.done == 0 {
		return 0
	}
	n := 0
	for i := range b.slow {
		if float64(v) >= b.slow[i] && float64(v) <= b.fast[i] {
			n++
		}
	}
	return float64(n) / float64(b.done)
}

// Ribbon is the interval of power required and of power available (thrust powers, W) at speed i of those given to Ribbons.
func (b *Bands) Ribbon(i int) (required, available Interval) {
	if i < 0 || i >= len(b.speeds) || b.done == 0 || len(b.required) < (i+1)*b.length {
		return Interval{}, Interval{}
	}
	at := i * b.length
	return interval(b.required[at : at+b.done]), interval(b.available[at : at+b.done])
}
