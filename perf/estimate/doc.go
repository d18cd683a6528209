// Package estimate turns test runs into an aeroplane's numbers, with what they leave uncertain.
//
// One posterior takes every kind of run together. The unknowns and what is believed of them before flight are listed by parameters.go;
// residual.go says what each run says of them. The file that a person keeps holds prior and runs; the estimate is always derived.
//
//	var e estimate.Estimator
//	var p estimate.Posterior
//	err := e.Fit(&c, &p)            // parameters, covariance, each run's residual
//	p.Aeroplane(&aeroplane)         // the estimated aeroplane
//	var d estimate.Draws
//	d.Set(&p, estimate.DefaultDraws) // the same draws each time
//	var b estimate.Bands
//	err = b.Solve(&d, &condition, &intervals)
//
// # The model of the errors
//
// A parameter that is positive is believed log-normal about the prior's value, with the relative standard deviation of Beliefs; the position
// error's two and the propeller's drag areas are normal. Each reading has the standard deviation of Instruments, independent of the others. A run's residual is
// weighed by the spread that its own readings give it through the partial derivatives of the model (the effective variance of J. Orear,
// Am. J. Phys. 50 (1982) 912, from memory), taken anew with each step of the fit and held while the fit weighs that step.
//
// The likelihood of a run is Student's with nuRobust degrees of freedom, scaled to the same curvature at its centre as the normal one,
// so that one bad run cannot drag the fit and no run is dropped; what it costs in precision where all runs are good is carried into the
// covariance. The posterior is taken as normal in the logarithms of the positive parameters; limits of the aeroplane are then
// solved for draws of it (JCGM 101:2008, propagation of distributions).
package estimate
