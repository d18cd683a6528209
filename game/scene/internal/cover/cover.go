// Package cover turns closed outlines into exact area coverage of pixels.
//
// It is the accumulation method of scan conversion: each line adds, to the pixels it crosses, the signed area between
// itself and the right edge of the row; a running sum along a row is then the coverage. Pixels that no line crosses
// are not visited: a bit for each pixel tells where the sum changes, so a large shape costs its outline and its fill,
// not its bounding box. Overlapping contours of the same direction add up and are cut off at full coverage, which
// makes the union of a stroke's pieces one shape.
package cover

import (
	"image"
	"math"
	"math/bits"
)

// Rasterizer accumulates one shape. The zero value is ready; stores are kept from shape to shape.
type Rasterizer struct {
	x0, y0, w, h int
	stride       int // of acc, floats a row: w+1, since a line at the right edge spills one pixel
	words        int // of touched, words a row
	acc          []float32
	touched      []uint64
	lo, hi       int // rows with something in them: lo <= y < hi
}

// Begin starts a shape confined to clip. The last shape must have been filled or discarded.
func (z *Rasterizer) Begin(clip image.Rectangle) {
	z.x0, z.y0, z.w, z.h = clip.Min.X, clip.Min.Y, max(clip.Dx(), 0), max(clip.Dy(), 0)
	z.stride = z.w + 1
	z.words = (z.stride + 63) / 64
	if n := z.stride * z.h; n > len(z.acc) {
		z.acc = make([]float32, n)
	}
	if n := z.words * z.h; n > len(z.touched) {
		z.touched = make([]uint64, n)
	}
	z.lo, z.hi = z.h, 0
}

// Line adds the line from a to b, device pixels. Outlines must be closed by the caller. Coordinates must be finite.
func (z *Rasterizer) Line(ax, ay, bx, by float64) {
	if ay == by {
		return
	}
	ax, ay, bx, by = ax-float64(z.x0), ay-float64(z.y0), bx-float64(z.x0), by-float64(z.y0)
	dir := float32(1)
	if ay > by {
		ax, ay, bx, by = bx, by, ax, ay
		dir = -1
	}
	h := float64(z.h)
	if by <= 0 || ay >= h || z.w == 0 {
		return
	}
	slope := (bx - ax) / (by - ay)
	if ay < 0 {
		ax, ay = ax-ay*slope, 0
	}
	if by > h {
		bx, by = bx-(by-h)*slope, h
	}
	// What lies left of the clip counts as on its edge; what lies right of it has no effect.
	z.edge(ax, ay, bx, by, slope, dir)
}

// edge splits at the left and right limits.
func (z *Rasterizer) edge(ax, ay, bx, by, slope float64, dir float32) {
	w := float64(z.w)
	if ax >= w && bx >= w {
		return
	}
	if ax <= 0 && bx <= 0 {
		z.inside(0, ay, 0, by, 0, dir)
		return
	}
	if lo := min(ax, bx); lo < 0 {
		y := min(max(ay-ax/slope, ay), by)
		if ax < 0 {
			z.inside(0, ay, 0, y, 0, dir)
			ax, ay = 0, y
		} else {
			z.inside(0, y, 0, by, 0, dir)
			bx, by = 0, y
		}
	}
	if hi := max(ax, bx); hi > w {
		y := min(max(ay+(w-ax)/slope, ay), by)
		if ax > w {
			ax, ay = w, y
		} else {
			bx, by = w, y
		}
	}
	z.inside(ax, ay, bx, by, slope, dir)
}

// inside accumulates a line with ay <= by that lies within 0..w, 0..h.
func (z *Rasterizer) inside(ax, ay, bx, by, slope float64, dir float32) {
	if ay >= by {
		return
	}
	w := float64(z.w)
	first, last := int(ay), min(int(math.Ceil(by)), z.h)
	z.lo, z.hi = min(z.lo, first), max(z.hi, last)
	x := ax
	for row := first; row < last; row++ {
		// Comparisons in place of min and max: as WebAssembly those are calls, for the sake of NaN, and there is none here.
		y0, y1 := float64(row), float64(row+1)
		if y0 < ay {
			y0 = ay
		}
		next := bx
		if y1 >= by {
			y1 = by
		} else if next = ax + (y1-ay)*slope; next < 0 {
			next = 0
		} else if next > w {
			next = w
		}
		z.row(row, x, next, float32(y1-y0)*dir)
		x = next
	}
}

// row accumulates the part of a line within one row, that covers the height d (signed) from x to next.
func (z *Rasterizer) row(row int, x, next float64, d float32) {
	if next < x {
		x, next = next, x
	}
	acc := z.acc[row*z.stride : (row+1)*z.stride]
	tch := z.touched[row*z.words : (row+1)*z.words]
	i, j := int(x), int(next)
	if i >= z.w {
		return
	}
	if j == i || next == float64(i+1) { // within one pixel
		m := float32((x+next)/2 - float64(i))
		acc[i] += d * (1 - m)
		acc[i+1] += d * m
		tch[i>>6] |= 1 << (i & 63)
		tch[(i+1)>>6] |= 1 << ((i + 1) & 63)
		return
	}
	each := float64(d) / (next - x) // height for a pixel's width
	spill := 0.0                    // what the pixel before hands to this one
	for ; i < z.w; i++ {
		right := float64(i + 1)
		if right > next {
			right = next
		}
		part := (right - x) * each
		m := (x+right)/2 - float64(i)
		acc[i] += float32(spill + part*(1-m))
		tch[i>>6] |= 1 << (i & 63)
		spill = part * m
		x = right
		if right >= next {
			i++
			break
		}
	}
	acc[i] += float32(spill)
	tch[i>>6] |= 1 << (i & 63)
}

// Spans calls emit for each run of pixels of equal coverage (1..255) in row order, and empties the shape.
func (z *Rasterizer) Spans(emit func(y, x0, x1 int, alpha uint8)) {
	for row := z.lo; row < z.hi; row++ {
		acc := z.acc[row*z.stride : (row+1)*z.stride]
		tch := z.touched[row*z.words : (row+1)*z.words]
		var sum float32
		x, alpha := 0, uint8(0)
		for k, word := range tch {
			tch[k] = 0
			for word != 0 {
				i := k<<6 + bits.TrailingZeros64(word)
				word &= word - 1
				if alpha != 0 && i > x {
					emit(z.y0+row, z.x0+x, z.x0+i, alpha)
				}
				sum += acc[i]
				acc[i] = 0
				x, alpha = i, level(sum)
			}
		}
		if alpha != 0 && x < z.w {
			emit(z.y0+row, z.x0+x, z.x0+z.w, alpha)
		}
	}
	z.lo, z.hi = z.h, 0
}

func level(sum float32) uint8 {
	if sum < 0 {
		sum = -sum
	}
	if sum >= 1 {
		return 255
	}
	return uint8(sum*255 + 0.5)
}
