package estimate

import "math"

// nuRobust are the degrees of freedom of the Student likelihood, and huberBound the residual, in standard deviations, from which the first
// stage of the fit weighs a run by its magnitude rather than its square. The start must be convex: from the prior all residuals
// may be great, and a Student likelihood would call every run bad.
const (
	nuRobust   = 8.0
	huberBound = 1.5
)

// efficiency is what a good run is worth under Student weights: the information of the weighted estimate about its mean, over the mean weight,
// for normal residuals: E[psi']^2/(E[psi^2] E[w]) with psi = z w(z), w = 1/(1 + z^2/nu) (P. J. Huber, Robust Statistics, 1981, from memory).
// TestEfficiency integrates it.
const efficiency = 1.0683

// stage is which loss the fit minimises.
type stage uint8

const (
	huber stage = iota
	student
)

// loss is the loss of a run whose whitened residual has the square d2; near 0 it is d2/2.
func (s stage) loss(d2 float64) float64 {
	if s == huber {
		if d2 <= huberBound*huberBound {
			return 0.5 * d2
		}
		return huberBound*math.Sqrt(d2) - 0.5*huberBound*huberBound
	}
	return 0.5 * nuRobust * math.Log1p(d2/nuRobust)
}

// weight is the weight of such a run: the loss's slope against d2/2.
func (s stage) weight(d2 float64) float64 {
	if s == huber {
		if d2 <= huberBound*huberBound {
			return 1
		}
		return huberBound / math.Sqrt(d2)
	}
	return 1 / (1 + d2/nuRobust)
}

// information is what a fitted run of that weight counts in the covariance.
func information(weight float64) float64 { return math.Min(1, efficiency*weight) }
