// Package device brings a scene onto the grid of device pixels, once for all back ends, so that they agree: what is
// upright or level is put on whole pixels, text on whole pen positions, clips on whole rectangles, and coordinates
// that are no numbers or far away are taken out.
package device

import (
	"image"
	"math"

	"levelspan/game/scene"
)

// Limits of what leaves this package, device pixels.
const (
	Far      = 1 << 15 // no coordinate is farther from the origin
	MaxWidth = 2048    // no stroke is wider
)

// Frame is the state of one pass over a scene. The zero value is ready for Begin; stores are kept.
type Frame struct {
	Scale  float64
	Bounds image.Rectangle // the picture
	Clip   image.Rectangle // the innermost clip, within Bounds

	exact bool
	clips []image.Rectangle
	pts   []scene.Point
	dash  []scene.Point
	parts []Part
	run   run
}

// Begin starts a pass.
func (f *Frame) Begin(s *scene.Scene) {
	f.Scale = scene.CleanScale(s.Scale)
	w, h := s.DeviceSize()
	f.Bounds = image.Rect(0, 0, w, h)
	f.Clip = f.Bounds
	f.clips = f.clips[:0]
	f.exact = false
}

// Exact makes the pass one in logical pixels, with strokes neither put on whole pixels nor cut into dashes: for back
// ends that have no pixels.
func (f *Frame) Exact() { f.Scale, f.exact = 1, true }

// Push enters a clip and Pop leaves it. A Pop too many has no effect.
func (f *Frame) Push(r scene.Rect) {
	f.clips = append(f.clips, f.Clip)
	f.Clip = f.Clip.Intersect(f.Box(r))
}

// Pop leaves the innermost clip.
func (f *Frame) Pop() {
	if n := len(f.clips); n > 0 {
		f.Clip = f.clips[n-1]
		f.clips = f.clips[:n-1]
	}
}

// Box is a rectangle on whole pixels: each edge goes to the nearest, and what is at least a quarter of a pixel wide
// keeps one pixel. What has no size, or is no rectangle of numbers, is empty.
func (f *Frame) Box(r scene.Rect) image.Rectangle {
	x0, x1, okx := f.edges(r.X, r.W)
	y0, y1, oky := f.edges(r.Y, r.H)
	if !okx || !oky {
		return image.Rectangle{}
	}
	return image.Rectangle{Min: image.Pt(x0, y0), Max: image.Pt(x1, y1)}
}

func (f *Frame) edges(at, size float64) (lo, hi int, ok bool) {
	a, b := at*f.Scale, (at+size)*f.Scale
	if !(size > 0) || !finite(a) || !finite(b) || !(b-a >= 0.25) {
		return 0, 0, false
	}
	lo, hi = int(math.Round(clamp(a))), int(math.Round(clamp(b)))
	if lo == hi && b-a < 1 {
		hi++
	}
	return lo, hi, hi > lo
}

// Disc is a circle in device pixels; ok is false when there is nothing to draw.
func (f *Frame) Disc(s *scene.Scene, op *scene.Op) (centre scene.Point, radius float64, ok bool) {
	p := points(s, op)
	if len(p) == 0 {
		return
	}
	centre = scene.Point{X: p[0].X * f.Scale, Y: p[0].Y * f.Scale}
	radius = op.W * f.Scale
	if !near(centre) || !(radius > 0) {
		return centre, 0, false
	}
	return centre, min(radius, Far), true
}

// points is the operation's points, or nil when its range does not lie within the scene.
func points(s *scene.Scene, op *scene.Op) []scene.Point {
	if op.P0 < 0 || op.P1 > len(s.Points) || op.P0 >= op.P1 {
		return nil
	}
	return s.Points[op.P0:op.P1]
}

func finite(v float64) bool { return !math.IsNaN(v) && !math.IsInf(v, 0) }

func clamp(v float64) float64 { return min(max(v, -Far), Far) }

func number(p scene.Point) bool { return finite(p.X) && finite(p.Y) }

func near(p scene.Point) bool { return math.Abs(p.X) <= Far && math.Abs(p.Y) <= Far }
