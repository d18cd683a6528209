package glyph

import (
	"math"
	"slices"
	"strings"

	"levelspan/assets/font"
)

// signs are the characters made of level bars. A minus that falls between two rows of pixels is two faint rows, and a
// faint minus may be overlooked: so each bar of these is put on whole rows and is whole rows thick, at least one.
const signs = "+-±=−–—÷×≤≥←→"

// bars is a map of heights that moves up to maxBars bars to whole pixels and stretches what lies between.
type bars struct {
	n    int                  // pairs of edges
	from [2 * maxBars]float64 // lower and upper edge of each bar, font units, rising
	to   [2 * maxBars]float64 // the same in device pixels
}

const maxBars = 3

// take prepares the fit for one character.
func (f *fit) take(index int, segs []font.Segment) {
	f.bars.n = 0
	if !strings.ContainsRune(signs, font.Rune(index)) {
		return
	}
	levels := levels(segs)
	if len(levels)%2 != 0 || len(levels) > 2*maxBars {
		return
	}
	f.bars.n = len(levels) / 2
	free := math.Inf(-1) // the lowest row that the next bar may take
	for i := 0; i < len(levels); i += 2 {
		lo, hi := levels[i]*f.scale, levels[i+1]*f.scale
		thick := max(math.Round(hi-lo), 1)
		at := max(math.Round((lo+hi-thick)/2), free)
		f.bars.from[i], f.bars.from[i+1] = levels[i], levels[i+1]
		f.bars.to[i], f.bars.to[i+1] = at, at+thick
		free = at + thick + 1
	}
}

// levels is the heights of an outline's long level edges, rising, each once.
func levels(segs []font.Segment) []float64 {
	const long, level = 240, 8 // font units
	var found []float64
	var at, start font.Segment
	edge := func(to font.Segment) {
		if math.Abs(to.Y-at.Y) <= level && math.Abs(to.X-at.X) >= long {
			found = append(found, at.Y)
		}
	}
	for _, s := range segs {
		switch s.Verb {
		case font.MoveTo:
			edge(start)
			start = s
		case font.LineTo:
			edge(s)
		case font.CurveTo:
			if s.Y1 == s.Y && s.Y2 == s.Y { // straight all the same
				edge(s)
			}
		}
		at = s
	}
	edge(start)
	slices.Sort(found)
	return slices.CompactFunc(found, func(a, b float64) bool { return math.Abs(a-b) <= level })
}

// y is a height in device pixels, upwards.
func (b *bars) y(u, scale float64) float64 {
	last := 2*b.n - 1
	if u <= b.from[0] {
		return b.to[0] - (b.from[0]-u)*scale
	}
	if u >= b.from[last] {
		return b.to[last] + (u-b.from[last])*scale
	}
	i := 1
	for u > b.from[i] {
		i++
	}
	return b.to[i-1] + (u-b.from[i-1])/(b.from[i]-b.from[i-1])*(b.to[i]-b.to[i-1])
}
