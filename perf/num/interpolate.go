package num

// MonotoneSlopes fills d with the slopes at the nodes of a cubic Hermite interpolant that rises and falls only where
// the data do: the weighted harmonic mean of the neighbouring secants inside, a three-point formula held to the
// data's direction at the ends. x must rise strictly; x, y and d have the same length of at least 2.
//
// Source: F. N. Fritsch and J. Butland, A method for constructing local monotone piecewise cubic interpolants,
// SIAM J. Sci. Stat. Comput. 5 (1984) 300 (from memory).
func MonotoneSlopes(x, y, d []float64) {
	n := len(x)
	if n == 2 {
		s := (y[1] - y[0]) / (x[1] - x[0])
		d[0], d[1] = s, s
		return
	}
	for i := 1; i < n-1; i++ {
		h0, h1 := x[i]-x[i-1], x[i+1]-x[i]
		s0, s1 := (y[i]-y[i-1])/h0, (y[i+1]-y[i])/h1
		if s0*s1 <= 0 {
			d[i] = 0
			continue
		}
		w0, w1 := 2*h1+h0, h1+2*h0
		d[i] = (w0 + w1) / (w0/s0 + w1/s1)
	}
	d[0] = endSlope(x[1]-x[0], x[2]-x[1], (y[1]-y[0])/(x[1]-x[0]), (y[2]-y[1])/(x[2]-x[1]))
	d[n-1] = endSlope(x[n-1]-x[n-2], x[n-2]-x[n-3], (y[n-1]-y[n-2])/(x[n-1]-x[n-2]), (y[n-2]-y[n-3])/(x[n-2]-x[n-3]))
}

// endSlope is the one-sided slope at the end next to an interval h0 of secant s0, with h1 and s1 behind it.
func endSlope(h0, h1, s0, s1 float64) float64 {
	d := ((2*h0+h1)*s0 - h0*s1) / (h0 + h1)
	switch {
	case d*s0 <= 0:
		return 0
	case s0*s1 <= 0 && d*d > 9*s0*s0:
		return 3 * s0
	}
	return d
}

// Cubic is a + b t + c t^2 + d t^3.
type Cubic struct{ A, B, C, D float64 }

// Hermite is the cubic in t = x - x0 over an interval of width h with values y0, y1 and slopes d0, d1 at its ends.
func Hermite(h, y0, y1, d0, d1 float64) Cubic {
	s := (y1 - y0) / h
	return Cubic{y0, d0, (3*s - 2*d0 - d1) / h, (d0 + d1 - 2*s) / (h * h)}
}

// At is the value and the slope at t.
func (c Cubic) At(t float64) (y, slope float64) {
	return c.A + t*(c.B+t*(c.C+t*c.D)), c.B + t*(2*c.C+3*t*c.D)
}
