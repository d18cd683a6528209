package ui

import (
	"math"
	"time"
)

// The thresholds of gestures, in logical pixels and time.
const (
	slopMouse     = 3
	slopTouch     = 8
	doubleTapTime = 350 * time.Millisecond
	doubleTapNear = 40
	maxPointers   = 10
	maxLayers     = 8
)

// Router turns events into actions: it owns gestures (slop, capture, double tap, cancel, inertia), focus and the
// keyboard's way through the controls. The zero value is ready.
type Router struct {
	Focus        string // ID of the focused control, "" none
	FocusVisible bool   // focus came by keyboard: draw the ring
	NoInertia    bool   // reduced motion is wanted: scrolling stops with the finger

	pointers [maxPointers]pointer
	tap      lastTap
	fling    fling

	layer       int               // highest modal layer of the last Route
	saved       [maxLayers]string // the focus in a layer before a higher one covered it
	lastPointer time.Duration     // when a pointer was last seen
	anyPointer  bool              // a pointer was ever seen

	slideID string // slider moved by keys in this batch, and to where: controls are older than that
	slideTo float64
	base    int // length of dst at the start of Route: what lies before belongs to the caller
}

// Route appends to dst the actions that events mean on the controls of the last frame. It allocates nothing when dst
// has room. Events with positions that no screen has are dropped; such a release counts as a cancel.
func (r *Router) Route(dst []Action, events []Event, controls []Control, now time.Duration) []Action {
	r.base, r.slideID = len(dst), ""
	top := topLayer(controls)
	r.relayer(controls, top)
	dst = r.dropVanished(dst, controls, top)
	for i := range events {
		e := &events[i]
		switch e.Kind {
		case PointerDown, PointerMove, PointerUp, PointerCancel:
			r.lastPointer, r.anyPointer = e.Time, true
			dst = r.pointer(dst, e, controls, top)
		case Wheel:
			dst = r.wheel(dst, e, controls, top)
		case KeyDown:
			dst = r.key(dst, e, controls, top)
		case FocusOn:
			dst = r.focusOn(dst, e, controls, top)
		case Activate:
			dst = r.activate(dst, e, controls, top)
		case SetValue:
			if c := find(controls, e.ID); usable(c, top) && c.Role == RoleSlider {
				dst = r.slide(dst, c, e.Value, e.Time)
			}
		case SetText:
			if c := find(controls, e.ID); usable(c, top) && c.LiveText {
				dst = append(dst, Action{Kind: Type, ID: c.ID, Text: e.Text, Time: e.Time})
			}
		}
	}
	return r.coast(dst, controls, top, now)
}

// Settle brings the focus into the layer that the controls of a new frame have on top, or back out of one that closed. It
// reports whether a visible focus moved, so that the frame is to be drawn again.
func (r *Router) Settle(controls []Control) bool {
	old := r.Focus
	r.relayer(controls, topLayer(controls))
	return r.Focus != old && r.FocusVisible
}

// Pressed is the ID of the control under a pressed pointer, "" none: draw it pressed. With several fingers it is one
// of them; IsPressed knows each.
func (r *Router) Pressed() string {
	for i := range r.pointers {
		if p := &r.pointers[i]; p.shows() {
			return p.id
		}
	}
	return ""
}

// IsPressed reports whether a pointer presses or drags the control.
func (r *Router) IsPressed(id string) bool {
	if id == "" {
		return false
	}
	for i := range r.pointers {
		if p := &r.pointers[i]; p.id == id && p.shows() {
			return true
		}
	}
	return false
}

// Dragging reports whether a pointer drags the control.
func (r *Router) Dragging(id string) bool {
	for i := range r.pointers {
		if p := &r.pointers[i]; p.state == dragging && p.id == id {
			return true
		}
	}
	return false
}

// Animating reports whether Route wants to be called again without an event (a list that coasts).
func (r *Router) Animating() bool { return r.fling.id != "" }

// StopScroll ends the coasting of a list, as when it reached its end.
func (r *Router) StopScroll() { r.fling = fling{} }

// Cancel ends every gesture, as when the window loses the pointer: drags are cancelled, presses forgotten.
func (r *Router) Cancel(dst []Action) []Action {
	for i := range r.pointers {
		dst = r.pointers[i].cancel(dst, 0)
		r.pointers[i] = pointer{}
	}
	r.fling = fling{}
	return dst
}

// escape cancels the drags under way, as Escape does; it reports whether there were any.
func (r *Router) escape(dst []Action, at time.Duration) ([]Action, bool) {
	n := len(dst)
	for i := range r.pointers {
		if p := &r.pointers[i]; p.state == dragging {
			dst = p.cancel(dst, at)
		}
	}
	return dst, len(dst) > n
}

// find is the control with that ID, nil if there is none.
func find(controls []Control, id string) *Control {
	if id == "" {
		return nil
	}
	for i := range controls {
		if controls[i].ID == id {
			return &controls[i]
		}
	}
	return nil
}

// usable reports whether a control takes input now.
func usable(c *Control, top int) bool { return c != nil && !c.Disabled && c.Modal >= top }

func topLayer(controls []Control) int {
	top := 0
	for i := range controls {
		top = max(top, controls[i].Modal)
	}
	return top
}

// placed reports whether a position, or a way, is one that a screen can have.
func placed(x, y float64) bool { return math.Abs(x) < 1e7 && math.Abs(y) < 1e7 }

func finite(vs ...float64) bool {
	for _, v := range vs {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return false
		}
	}
	return true
}
