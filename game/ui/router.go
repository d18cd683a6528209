package ui

import "time"

// Router turns events into actions: it owns gestures (slop, capture, double tap, cancel, inertia), focus and the
// keyboard's way through the controls. The zero value is ready.
type Router struct {
	Focus        string // ID of the focused control, "" none
	FocusVisible bool   // focus came by keyboard: draw the ring
}

// Route appends to dst the actions that events mean on the controls of the last frame.
func (r *Router) Route(dst []Action, events []Event, controls []Control, now time.Duration) []Action {
	return dst
}

// Pressed is the ID of the control under a pressed pointer, "" none: draw it pressed.
func (r *Router) Pressed() string { return "" }

// Animating reports whether Route wants to be called again without an event (inertia, a long press that ripens).
func (r *Router) Animating() bool { return false }
