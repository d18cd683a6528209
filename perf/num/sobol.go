package num

import "math"

// sobolDimensions is how many dimensions of Sobol's sequence the table holds.
const sobolDimensions = 21

// direction is one row: the degree of a primitive polynomial, its inner coefficients as bits, and the first direction numbers.
type direction struct {
	degree uint
	inner  uint32
	m      [7]uint32
}

// The direction numbers of S. Joe and F. Y. Kuo, Constructing Sobol sequences with better two-dimensional projections, SIAM J. Sci. Comput.
// 30 (2008) 2635, dimensions 2 to 21 (from memory). A test holds that each polynomial is primitive and each dimension a permutation; a slip
// beyond that would cost evenness, not correctness.
var directions = [sobolDimensions - 1]direction{
	{1, 0, [7]uint32{1}},
	{2, 1, [7]uint32{1, 3}},
	{3, 1, [7]uint32{1, 3, 1}},
	{3, 2, [7]uint32{1, 1, 1}},
	{4, 1, [7]uint32{1, 1, 3, 3}},
	{4, 4, [7]uint32{1, 3, 5, 13}},
	{5, 2, [7]uint32{1, 1, 5, 5, 17}},
	{5, 4, [7]uint32{1, 1, 5, 5, 5}},
	{5, 7, [7]uint32{1, 1, 7, 11, 19}},
	{5, 11, [7]uint32{1, 1, 5, 1, 1}},
	{5, 13, [7]uint32{1, 1, 1, 3, 11}},
	{5, 14, [7]uint32{1, 3, 5, 5, 31}},
	{6, 1, [7]uint32{1, 3, 3, 9, 7, 49}},
	{6, 13, [7]uint32{1, 1, 1, 15, 21, 21}},
	{6, 16, [7]uint32{1, 3, 1, 13, 27, 49}},
	{6, 19, [7]uint32{1, 1, 1, 15, 7, 5}},
	{6, 22, [7]uint32{1, 3, 1, 15, 13, 25}},
	{6, 25, [7]uint32{1, 1, 5, 5, 19, 61}},
	{7, 1, [7]uint32{1, 3, 7, 11, 23, 15, 103}},
	{7, 4, [7]uint32{1, 3, 7, 13, 13, 15, 69}},
}

// sobolBits is the length of the sequence as a power of 2.
const sobolBits = 32

// Uniform is coordinate d (from 0) of point i of a fixed quasi-random sequence, inside 0..1 and never at its ends: Sobol's with a digital shift
// that is a function of the dimension alone, so that any 2^k points from 0 on fill each dimension's 2^k equal cells once. Beyond 21
// dimensions it is i times the square root of a prime, modulo 1.
func Uniform(i uint32, d int) float64 {
	if d < 0 {
		d = 0
	}
	if d >= sobolDimensions {
		x := (float64(i) + 0.5) * math.Sqrt(float64(primeAfter(d)))
		x -= math.Floor(x)
		return min(max(x, 1e-9), 1-1e-9)
	}
	var v [sobolBits]uint32
	fillDirections(d, &v)
	x := shift(uint32(d))
	for k := 0; i != 0; k++ {
		if i&1 != 0 {
			x ^= v[k]
		}
		i >>= 1
	}
	return (float64(x) + 0.5) / (1 << sobolBits)
}

// fillDirections fills the direction numbers of dimension d, scaled to 32 bits.
func fillDirections(d int, v *[sobolBits]uint32) {
	if d == 0 {
		for k := range v {
			v[k] = 1 << (sobolBits - 1 - k)
		}
		return
	}
	row := &directions[d-1]
	s := int(row.degree)
	for k := range v {
		if k < s {
			v[k] = row.m[k] << (sobolBits - 1 - k)
			continue
		}
		x := v[k-s] ^ v[k-s]>>row.degree
		for j := 1; j < s; j++ {
			if row.inner>>(s-1-j)&1 != 0 {
				x ^= v[k-j]
			}
		}
		v[k] = x
	}
}

// shift is a fixed well-mixed word for a dimension (the finaliser of a 32-bit multiplicative hash).
func shift(d uint32) uint32 {
	x := (d + 1) * 0x9e3779b9
	x ^= x >> 16
	x *= 0x85ebca6b
	x ^= x >> 13
	x *= 0xc2b2ae35
	return x ^ x>>16
}

// primeAfter is the prime number n after the first, small n.
func primeAfter(n int) int {
	p := 2
	for ; n > 0; n-- {
		for p++; !prime(p); p++ {
		}
	}
	return p
}

func prime(p int) bool {
	for q := 2; q*q <= p; q++ {
		if p%q == 0 {
			return false
		}
	}
	return p > 1
}

// Normal is the standard normal variate below which a share p of all lies, for p inside 0..1; beyond it is held at about 8 standard
// deviations.
func Normal(p float64) float64 {
	if math.IsNaN(p) {
		return 0
	}
	const edge = 1e-15
	return -math.Sqrt2 * math.Erfcinv(2*min(max(p, edge), 1-edge))
}
