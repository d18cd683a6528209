package ui

import (
	"math"
	"strconv"

	"levelspan/game/scene"
)

// Scale maps values V0..V1 linearly to positions P0..P1; either may fall. It says nothing about ticks or drawing.
type Scale struct{ V0, V1, P0, P1 float64 }

// Pos is where a value lies. A scale of no extent puts everything at P0.
func (s Scale) Pos(v float64) float64 {
	if s.V1 == s.V0 {
		return s.P0
	}
	return s.P0 + (v-s.V0)/(s.V1-s.V0)*(s.P1-s.P0)
}

// Value is what lies at a position.
func (s Scale) Value(p float64) float64 {
	if s.P1 == s.P0 {
		return s.V0
	}
	return s.V0 + (p-s.P0)/(s.P1-s.P0)*(s.V1-s.V0)
}

// Clamp is v confined to V0..V1; V0 for what is not a number.
func (s Scale) Clamp(v float64) float64 {
	if math.IsNaN(v) {
		return s.V0
	}
	return math.Max(math.Min(s.V0, s.V1), math.Min(math.Max(s.V0, s.V1), v))
}

// Moved is the value d pixels away from v, confined to the scale: what a drag makes of the value at its start.
func (s Scale) Moved(v, d float64) float64 { return s.Clamp(s.Value(s.Pos(v) + d)) }

// Tick is one labelled place on a scale.
type Tick struct {
	Value float64
	Text  string // "" unlabelled
}

// NiceStep is the least of 1, 2, 5 times a power of ten that divides span into at most count steps; 0 when there is
// none (span or count not positive or not finite).
func NiceStep(span, count float64) float64 {
	if !(span > 0) || !(count >= 1) || math.IsInf(span, 0) || math.IsInf(count, 0) {
		return 0
	}
	raw := span / count
	decade := math.Pow(10, math.Floor(math.Log10(raw)))
	for _, m := range [...]float64{1, 2, 5, 10} {
		if m*decade >= raw*(1-1e-9) && !math.IsInf(m*decade, 0) {
			return m * decade
		}
	}
	return 0
}

// maxTicks bounds the ticks of an axis, whatever the step asked for.
const maxTicks = 200

// AppendTicks appends labelled ticks at the multiples of step within lo..hi.
func AppendTicks(dst []Tick, lo, hi, step float64) []Tick {
	if !(step > 0) || !(hi >= lo) || !finite(lo, hi, step) || (hi-lo)/step > maxTicks {
		return dst
	}
	decimals := 0
	if step < 1 {
		decimals = min(12, int(math.Ceil(-math.Log10(step)-1e-9)))
	}
	for k := math.Ceil(lo/step - 1e-9); k*step <= hi+step*1e-9; k++ {
		v := k * step
		dst = append(dst, Tick{Value: v, Text: FormatNumber(v, decimals)})
	}
	return dst
}

// Ticks keeps the ticks of one axis until its range, length or spacing changes, so that a drag makes no new labels.
type Ticks struct {
	lo, hi, length, spacing float64
	list                    []Tick
	made                    bool
}

// For is the ticks for lo..hi on length pixels, about spacing or more apart.
func (t *Ticks) For(lo, hi, length, spacing float64) []Tick {
	if t.made && t.lo == lo && t.hi == hi && t.length == length && t.spacing == spacing {
		return t.list
	}
	t.lo, t.hi, t.length, t.spacing, t.made = lo, hi, length, spacing, true
	t.list = AppendTicks(t.list[:0], lo, hi, NiceStep(hi-lo, math.Max(1, length/math.Max(1, spacing))))
	return t.list
}

// Thin is the least k for which the labels of every k-th tick (counted from value 0) lie at least gap apart on a
// scale; vertical says that heights count instead of widths. Unequal labels are each taken as they are.
func Thin(ticks []Tick, s Scale, style scene.Style, gap float64, vertical bool) int {
	if len(ticks) < 2 {
		return 1
	}
	step := ticks[1].Value - ticks[0].Value
	for _, k := range [...]int{1, 2, 5, 10, 20, 50, 100} {
		if apart(ticks, s, style, gap, vertical, k, step) {
			return k
		}
	}
	return maxTicks
}

// Kept reports whether tick i keeps its label when every k-th does.
func Kept(ticks []Tick, i, k int) bool {
	if k <= 1 || len(ticks) < 2 {
		return true
	}
	n := int64(math.Round(ticks[i].Value / (ticks[1].Value - ticks[0].Value)))
	return n%int64(k) == 0
}

func apart(ticks []Tick, s Scale, style scene.Style, gap float64, vertical bool, k int, step float64) bool {
	last, set := 0.0, false
	falls := s.Pos(ticks[1].Value) < s.Pos(ticks[0].Value)
	for i := range ticks {
		if ticks[i].Text == "" || !Kept(ticks, i, k) {
			continue
		}
		size := scene.LineHeight(style)
		if !vertical {
			size = scene.Measure(style, ticks[i].Text)
		}
		p := s.Pos(ticks[i].Value)
		if falls {
			p = -p
		}
		if set && p-size/2 < last+gap {
			return false
		}
		last, set = p+size/2, true
	}
	return true
}

// FormatNumber is a number with decimals places, a proper minus sign and narrow no-break spaces between thousands: "14 000".
// What is not finite is a dash.
func FormatNumber(v float64, decimals int) string {
	var buf [48]byte
	return string(AppendNumber(buf[:0], v, decimals))
}

// AppendNumber appends FormatNumber's text to dst.
func AppendNumber(dst []byte, v float64, decimals int) []byte {
	if !finite(v) {
		return append(dst, "–"...)
	}
	var buf [400]byte
	digits := strconv.AppendFloat(buf[:0], math.Abs(v), 'f', max(0, min(20, decimals)), 64)
	whole := len(digits)
	zero := true
	for i, d := range digits {
		if d == '.' {
			whole = i
		} else if d != '0' {
			zero = false
		}
	}
	if v < 0 && !zero {
		dst = append(dst, "−"...)
	}
	for i, d := range digits {
		if i > 0 && i < whole && (whole-i)%3 == 0 {
			dst = append(dst, "\u202f"...)
		}
		dst = append(dst, d)
	}
	return dst
}
