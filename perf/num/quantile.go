package num

import "math"

// Quantile is the value below which a share p of x lies, interpolated between the order statistics at (i + 1/2)/n (Hazen's
// rule). It changes the order of x. Without values it is 0; values must be finite.
func Quantile(x []float64, p float64) float64 {
	n := len(x)
	if n == 0 {
		return 0
	}
	pos := p*float64(n) - 0.5
	if !(pos > 0) {
		pos = 0
	}
	pos = math.Min(pos, float64(n-1))
	k := int(pos)
	low := nth(x, k)
	t := pos - float64(k)
	if t == 0 || k+1 >= n {
		return low
	}
	high := x[k+1]
	for _, y := range x[k+2:] {
		if y < high {
			high = y
		}
	}
	return low + t*(high-low)
}

// nth puts the k-th smallest (from 0) in its place, the smaller before it and the greater behind, and returns it: Hoare's selection with the
// median of three as pivot.
func nth(x []float64, k int) float64 {
	lo, hi := 0, len(x)-1
	for lo < hi {
		m := lo + (hi-lo)/2
		if x[m] < x[lo] {
			x[m], x[lo] = x[lo], x[m]
		}
		if x[hi] < x[lo] {
			x[hi], x[lo] = x[lo], x[hi]
		}
		if x[hi] < x[m] {
			x[hi], x[m] = x[m], x[hi]
		}
		pivot := x[m]
		i, j := lo, hi
		for i <= j {
			for x[i] < pivot {
				i++
			}
			for pivot < x[j] {
				j--
			}
			if i <= j {
				x[i], x[j] = x[j], x[i]
				i++
				j--
			}
		}
		switch {
		case k <= j:
			hi = j
		case k >= i:
			lo = i
		default:
			return x[k]
		}
	}
	return x[k]
}
