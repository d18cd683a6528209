package perf

import (
	"math"

	"levelspan/perf/num"
)

// cruiseCells is into how many parts the search for the speed of best range divides the band where the fuel flow may have several
// minima a distance; kinkCells into how many it divides a part that holds a corner of the consumption table.
const (
	cruiseCells = 16
	kinkCells   = 8
)

// levelAt is the shaft power of level flight at v, W, with its slope, and the rpm.
func (f *flight) levelAt(v float64) (p, dp, n float64) {
	return f.level(v, f.drag.at(v), f.drag.slope(v))
}

// cost is fuel flow over ground speed; its slope has the sign of the second figure, flow' (V - wind) - flow.
func (z *Solver) cost(f *flight, v, wind float64) (cost, sign float64, piece int) {
	p, dp, _ := f.levelAt(v)
	flow, slope, piece := z.a.Engine.flow(p)
	if slope == 0 && piece == 0 { // consumption not known: any constant one has the same best speed
		flow, slope = p, 1
	}
	return flow / (v - wind), slope*dp*(v-wind) - flow, piece
}

// bestRange is the speed in s of least flow over ground speed in today's headwind, and what sets it; false where no speed in s makes headway.
func (z *Solver) bestRange(s span) (v float64, by SetBy, ok bool) {
	f := &z.now
	wind := z.c.Headwind
	lo, hi := max(s.slow, wind), s.fast
	if hi <= wind {
		return 0, 0, false
	}
	if f.kind != Tabulated && len(z.a.Engine.ConsumptionTable) == 0 {
		// One minimum: the sign of the slope changes once.
		return z.rangeCell(s, lo, hi)
	}
	best := math.Inf(1)
	a := lo
	_, sa, ka := z.rangeSign(a)
	if sa >= 0 {
		best, v, by = z.rangeCost(lo), lo, s.bySlow
	}
	for i := 1; i <= cruiseCells; i++ {
		b := lo + (hi-lo)*float64(i)/cruiseCells
		_, sb, kb := z.rangeSign(b)
		if ka != kb {
			// A corner of the table lies inside: look closer.
			c, sc := a, sa
			for k := 1; k <= kinkCells; k++ {
				d := a + (b-a)*float64(k)/kinkCells
				_, sd, _ := z.rangeSign(d)
				if sc < 0 && sd >= 0 {
					x := z.rangeRoot(c, sc, d, sd)
					if m := z.rangeCost(x); m < best {
						best, v, by = m, x, SetByOptimum
					}
				}
				c, sc = d, sd
			}
		} else if sa < 0 && sb >= 0 {
			x := z.rangeRoot(a, sa, b, sb)
			if m := z.rangeCost(x); m < best {
				best, v, by = m, x, SetByOptimum
			}
		}
		a, sa, ka = b, sb, kb
	}
	if sa < 0 {
		if m := z.rangeCost(hi); m < best {
			v, by = hi, s.byFast
		}
	}
	return v, by, v > wind
}

func (z *Solver) rangeCell(s span, lo, hi float64) (v float64, by SetBy, ok bool) {
	_, slo, _ := z.rangeSign(lo)
	if slo >= 0 {
		return lo, s.bySlow, true
	}
	_, shi, _ := z.rangeSign(hi)
	if shi <= 0 {
		return hi, s.byFast, true
	}
	return z.rangeRoot(lo, slo, hi, shi), SetByOptimum, true
}

// rangeSign is the sign of the slope of the cost; where there is no headway the cost still falls.
func (z *Solver) rangeSign(v float64) (cost, sign float64, piece int) {
	cost, sign, piece = z.cost(&z.now, v, z.c.Headwind)
	if v <= z.c.Headwind {
		return math.Inf(1), min(sign, -math.SmallestNonzeroFloat64), piece
	}
	return cost, sign, piece
}

func (z *Solver) rangeCost(v float64) float64 {
	c, _, _ := z.rangeSign(v)
	return c
}

func (z *Solver) rangeRoot(a, fa, b, fb float64) float64 {
	var r num.Root
	r.Start(a, fa, b, fb, 0)
	for r.Next() {
		_, s, _ := z.rangeSign(r.X)
		r.Put(s)
	}
	return r.X
}
