// Package num holds the numerical methods of the model: bracketed roots, minima and monotone interpolation.
// It knows no aviation words.
//
// The iterations work by reverse communication: the caller asks for the next abscissa, evaluates its own
// function there and puts the value back. No function value or interface is called inside a loop, so nothing
// allocates and the caller's formula is compiled in place.
//
//	var r num.Root
//	r.Start(a, fa, b, fb, tol)
//	for r.Next() {
//		r.Put(f(r.X))
//	}
package num
