// Package need ends a program that opens a window, with one line and exit status 2, where there is no display to open it
// on. A program asks for that by importing the package.
//
// It has to happen before anything else: the windowing library panics while it is being initialised where there is no
// display, before main runs. It does, by the language's rule for the order of initialisation: packages are
// initialised in the order of their import paths as soon as all that they import has been. This package needs syscall
// only, and the windowing library needs packages such as text/template, whose paths come after this one's. A test of
// package display runs the program without a display to prove it.
package need
