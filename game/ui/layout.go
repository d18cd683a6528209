package ui

import (
	"math"

	"levelspan/game/scene"
)

// MinTarget is the least width and height of anything that can be touched, in logical pixels.
const MinTarget = 48

// Contains reports whether a point lies in a rectangle; its left and top edges belong to it.
func Contains(r scene.Rect, x, y float64) bool {
	return x >= r.X && y >= r.Y && x < r.X+r.W && y < r.Y+r.H
}

// Inset is r made smaller on all sides by d; never of negative size.
func Inset(r scene.Rect, d float64) scene.Rect { return Trim(r, d, d, d, d) }

// Trim is r made smaller by top, right, bottom and left, as the safe area of a tablet asks for.
func Trim(r scene.Rect, top, right, bottom, left float64) scene.Rect {
	return scene.Rect{X: r.X + left, Y: r.Y + top, W: math.Max(0, r.W-left-right), H: math.Max(0, r.H-top-bottom)}
}

// CutTop takes a strip of height d off r: the strip and the rest. Both stay within r.
func CutTop(r scene.Rect, d float64) (strip, rest scene.Rect) {
	d = math.Max(0, math.Min(d, r.H))
	return scene.Rect{X: r.X, Y: r.Y, W: r.W, H: d}, scene.Rect{X: r.X, Y: r.Y + d, W: r.W, H: r.H - d}
}

// CutBottom takes a strip of height d off the lower end of r.
func CutBottom(r scene.Rect, d float64) (strip, rest scene.Rect) {
	rest, strip = CutTop(r, r.H-d)
	return strip, rest
}

// CutLeft takes a strip of width d off the left of r.
func CutLeft(r scene.Rect, d float64) (strip, rest scene.Rect) {
	d = math.Max(0, math.Min(d, r.W))
	return scene.Rect{X: r.X, Y: r.Y, W: d, H: r.H}, scene.Rect{X: r.X + d, Y: r.Y, W: r.W - d, H: r.H}
}

// CutRight takes a strip of width d off the right of r.
func CutRight(r scene.Rect, d float64) (strip, rest scene.Rect) {
	rest, strip = CutLeft(r, r.W-d)
	return strip, rest
}

// Cell is one cell of a grid over r with gaps between columns and rows; column and row count from 0. Its edges are
// whole pixels if r's are, so that all cells look alike; their sizes may differ by one.
func Cell(r scene.Rect, columns, rows, column, row int, gap float64) scene.Rect {
	x0, x1 := share(r.W, columns, column, gap)
	y0, y1 := share(r.H, rows, row, gap)
	return scene.Rect{X: r.X + x0, Y: r.Y + y0, W: x1 - x0, H: y1 - y0}
}

// share is the i-th of n parts of a length with gaps between them.
func share(length float64, n, i int, gap float64) (from, to float64) {
	step := (length + gap) / float64(max(1, n))
	from = math.Round(float64(i) * step)
	to = math.Round(float64(i+1)*step - gap)
	return from, math.Max(from, to)
}

// Snap is r with its edges on whole pixels.
func Snap(r scene.Rect) scene.Rect {
	x, y := math.Round(r.X), math.Round(r.Y)
	return scene.Rect{X: x, Y: y, W: math.Round(r.X+r.W) - x, H: math.Round(r.Y+r.H) - y}
}

// Centered is a rectangle of at most w by h in the middle of r.
func Centered(r scene.Rect, w, h float64) scene.Rect {
	w, h = math.Min(w, r.W), math.Min(h, r.H)
	return scene.Rect{X: math.Round(r.X + (r.W-w)/2), Y: math.Round(r.Y + (r.H-h)/2), W: w, H: h}
}

// Grow is r made larger about its middle until it is at least w by h: how a target becomes touchable.
func Grow(r scene.Rect, w, h float64) scene.Rect {
	w, h = math.Max(w, r.W), math.Max(h, r.H)
	return scene.Rect{X: r.X + (r.W-w)/2, Y: r.Y + (r.H-h)/2, W: w, H: h}
}

// Intersect is the common part of two rectangles, of zero size where there is none.
func Intersect(a, b scene.Rect) scene.Rect {
	x0, y0 := math.Max(a.X, b.X), math.Max(a.Y, b.Y)
	x1, y1 := math.Min(a.X+a.W, b.X+b.W), math.Min(a.Y+a.H, b.Y+b.H)
	return scene.Rect{X: x0, Y: y0, W: math.Max(0, x1-x0), H: math.Max(0, y1-y0)}
}

// Overlaps reports whether two rectangles share more than an edge.
func Overlaps(a, b scene.Rect) bool {
	return a.X < b.X+b.W && b.X < a.X+a.W && a.Y < b.Y+b.H && b.Y < a.Y+a.H
}
