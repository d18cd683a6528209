// Package display finds out whether there is a display to open a window on. See package need for why that has to be
// known so early; for that reason it imports syscall only.
package display
