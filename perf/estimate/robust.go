package estimate

import "math"

// nuRobust are the degrees of freedom of the Student likelihood, and huberBound the residual, in standard deviations, from which the first
// stage of the fit weighs a run by its magnitude rather than its square. The start must be convex: from the prior all residuals
// may be great, and a Student likelihood would call every run bad.
const (
	nuRobust   = 6.0
	huberBound = 1.5
)

// A run counts with what it really pulls instead from nearBound standard deviations on by degrees, from farBound wholly.
const (
	nearBound = 2.5
	farBound  = 3.5
)

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

// curvature is the loss's second derivative against the length of the whitened residual, at least 0: what a step can count on. Of the Huber
// loss it is the weight instead, which is above the curvature everywhere and so takes the sure, slower step.
func (s stage) curvature(d2 float64) float64 {
	if s == huber {
		return s.weight(d2)
	}
	q := d2 / nuRobust
	return max((1-q)/((1+q)*(1+q)), 0)
}

// worth is what a good run counts in the covariance of the weighted estimate, A^-1 B A^-1 (P. J. Huber, Robust Statistics, 1981, section 7.6, from
// memory): a is its curvature and b the square of its pull, over the mean weight; full is what it says where one figure must do.
type worth struct{ a, b, full float64 }

// worthOf is that of a run of some leverage, the share of its own residual that the fit takes away: residuals that are normal with the standard
// deviation tau = sqrt(1 - leverage) are what the loss sees. Of a run that alone fixes an unknown nothing is left to weigh, and it counts whole.
func worthOf(leverage float64) worth {
	tau2 := min(max(1-leverage, 0), 1)
	// The means over the standard normal by the trapezoidal rule, which is all but exact for such smooth functions.
	const step, most = 0.5, 6.0
	var mass, weight, curvature, pull float64
	for x := -most; x <= most; x += step {
		q := tau2 * x * x / nuRobust
		w := 1 / (1 + q)
		m := math.Exp(-0.5 * x * x)
		mass += m
		weight += m * w
		curvature += m * (1 - q) * w * w
		pull += m * x * x * w * w
	}
	weight, curvature, pull = weight/mass, curvature/mass, pull/mass
	return worth{curvature / weight, pull / weight, curvature * curvature / (pull * weight)}
}

// of is what a run of squared residual d2 counts in A and in B.
func (o worth) of(d2 float64) (a, b float64) {
	w := student.weight(d2)
	a, b = o.a*w, o.b*w
	if d2 > nearBound*nearBound {
		t := min((math.Sqrt(d2)-nearBound)/(farBound-nearBound), 1)
		b += t * (w*w*d2 - b)
	}
	return a, b
}

// information is what it counts as one figure, at most as much as a run that is not weighed.
func (o worth) information(d2 float64) float64 { return math.Min(1, o.full*student.weight(d2)) }
