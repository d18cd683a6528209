package device

import (
	"image"
	"math"

	"levelspan/game/scene"
)

// Extent is the pixels that a shape with these points, and this margin around them, can touch.
func Extent(q []scene.Point, margin float64) image.Rectangle {
	if len(q) == 0 {
		return image.Rectangle{}
	}
	x0, y0, x1, y1 := q[0].X, q[0].Y, q[0].X, q[0].Y
	for _, p := range q[1:] {
		x0, x1 = min(x0, p.X), max(x1, p.X)
		y0, y1 = min(y0, p.Y), max(y1, p.Y)
	}
	return image.Rect(int(math.Floor(x0-margin)), int(math.Floor(y0-margin)), int(math.Ceil(x1+margin)), int(math.Ceil(y1+margin)))
}

// Sides is the number of sides of a circle: its corners leave the true line by less than a twentieth of a pixel.
func Sides(radius float64) int {
	if radius < 0.5 {
		return 8
	}
	n := int(math.Ceil(math.Pi / math.Acos(1-0.05/max(radius, 1))))
	return min(max((n+3)&^3, 8), 256)
}

// Circle appends the corners of a circle, clockwise on the screen.
func Circle(dst []scene.Point, c scene.Point, radius float64) []scene.Point {
	return Corners(dst, c, radius, Sides(radius))
}

// Corners appends the n corners of a regular polygon.
func Corners(dst []scene.Point, c scene.Point, radius float64, n int) []scene.Point {
	for i := range n {
		dst = append(dst, on(c, radius, i, n))
	}
	return dst
}

func on(c scene.Point, radius float64, i, n int) scene.Point {
	sin, cos := math.Sincos(2 * math.Pi * float64(i) / float64(n))
	return scene.Point{X: c.X + radius*cos, Y: c.Y + radius*sin}
}

// Radius is a corner radius, device pixels, that fits a rectangle: at most half its short side, and 0 for none.
func Radius(radius float64, box image.Rectangle) float64 {
	if box.Empty() || !(radius > 0) {
		return 0
	}
	return min(radius, float64(min(box.Dx(), box.Dy()))/2)
}

// RoundRect appends the outline of a rectangle with this corner radius, clockwise on the screen.
func RoundRect(dst []scene.Point, box image.Rectangle, radius float64) []scene.Point {
	x0, y0, x1, y1 := float64(box.Min.X)+radius, float64(box.Min.Y)+radius, float64(box.Max.X)-radius, float64(box.Max.Y)-radius
	n := Sides(radius)
	for k, c := range [4]scene.Point{{X: x1, Y: y1}, {X: x0, Y: y1}, {X: x0, Y: y0}, {X: x1, Y: y0}} {
		for i := k * n / 4; i <= (k+1)*n/4; i++ {
			dst = append(dst, on(c, radius, i, n))
		}
	}
	return dst
}
