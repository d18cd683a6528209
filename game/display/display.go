// Package display finds out, before anything else has a chance to fail, whether there is a display to open a window
// on. The windowing library panics while it is being initialised where there is none, before main runs, so this
// check has to come earlier still.
//
// It does, by the language's rule for the order of initialisation: packages are initialised in the order of their
// import paths as soon as all that they import has been. This package imports syscall only, and the windowing library
// needs packages such as text/template, whose paths come after this one's. A test of cmd/levelspan-window runs the
// binary without a display to prove it.
//
// A program asks for the check by importing the package.
package display
