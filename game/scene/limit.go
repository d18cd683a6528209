package scene

import "math"

// Bounds of what a scene can ask of a back end.
const (
	MinScale = 0.25
	MaxScale = 3
	MaxSide  = 8192 // device pixels of a picture's side
)

// CleanScale brings a scale into MinScale..MaxScale; what is no number, or not positive, counts as 1.
func CleanScale(scale float64) float64 {
	if !(scale > 0) || math.IsInf(scale, 0) {
		return 1
	}
	return min(max(scale, MinScale), MaxScale)
}

// DeviceSize is the size of the picture in device pixels: 0..MaxSide each.
func (s *Scene) DeviceSize() (w, h int) {
	k := CleanScale(s.Scale)
	return side(s.Width * k), side(s.Height * k)
}

// side rounds up, so that the last logical pixel is whole, but forgives the rounding of a product.
func side(v float64) int {
	if !(v > 0) {
		return 0
	}
	return int(min(math.Ceil(v-1e-6), MaxSide))
}
