package ui

import (
	"math"
	"time"
)

// focusable reports whether the keyboard can come to a control.
func focusable(c *Control, top int) bool { return usable(c, top) && c.Role != RoleRegion }

// relayer keeps the focus in the highest modal layer: it goes in with a layer that opens and comes back when it closes.
func (r *Router) relayer(controls []Control, top int) {
	if top == r.layer {
		return
	}
	if top > r.layer {
		if r.layer < maxLayers {
			r.saved[max(0, r.layer)] = r.Focus
		}
		r.Focus = ""
		for i := range controls {
			if focusable(&controls[i], top) {
				r.Focus = controls[i].ID
				break
			}
		}
	} else {
		r.Focus = ""
		if top >= 0 && top < maxLayers && find(controls, r.saved[top]) != nil {
			r.Focus = r.saved[top]
		}
	}
	r.layer = top
}

func (r *Router) setFocus(dst []Action, id string, visible bool, at time.Duration) []Action {
	r.FocusVisible = visible
	if r.Focus == id {
		return dst
	}
	r.Focus = id
	return append(dst, Action{Kind: Focus, ID: id, Time: at})
}

// focused is the focused control if it takes input now.
func (r *Router) focused(controls []Control, top int) *Control {
	c := find(controls, r.Focus)
	if c == nil || !focusable(c, top) {
		return nil
	}
	return c
}

func (r *Router) focusOn(dst []Action, e *Event, controls []Control, top int) []Action {
	c := find(controls, e.ID)
	if e.ID != "" && (c == nil || !focusable(c, top)) {
		return dst
	}
	recent := r.anyPointer && e.Time-r.lastPointer < 500*time.Millisecond
	return r.setFocus(dst, e.ID, !recent && e.ID != "", e.Time)
}

func (r *Router) activate(dst []Action, e *Event, controls []Control, top int) []Action {
	c := find(controls, e.ID)
	if c == nil || !focusable(c, top) {
		return dst
	}
	dst = r.take(dst, c, e.Time)
	return fire(dst, c, KeyNone, e)
}

// fire is what Enter means on a control: a tap, on a slider the wish for an exact value.
func fire(dst []Action, c *Control, key Key, e *Event) []Action {
	x, y := c.Bounds.X+c.Bounds.W/2, c.Bounds.Y+c.Bounds.H/2
	kind := Tap
	if c.Role == RoleSlider {
		kind = DoubleTap
	}
	return append(dst, Action{Kind: kind, ID: c.ID, X: x, Y: y, X0: x, Y0: y, Key: key, Shift: e.Shift, Time: e.Time})
}

func (r *Router) key(dst []Action, e *Event, controls []Control, top int) []Action {
	if e.ID != "" && e.ID != r.Focus {
		if c := find(controls, e.ID); c != nil && focusable(c, top) {
			dst = r.setFocus(dst, e.ID, true, e.Time)
		}
	}
	if e.Key == KeyTab {
		return r.walk(dst, e, controls, top)
	}
	if e.Key == KeyEscape {
		if d, ok := r.escape(dst, e.Time); ok {
			return d
		}
	}
	c := r.focused(controls, top)
	id := ""
	if c != nil {
		id = c.ID
	}
	press := Action{Kind: Press, ID: id, Key: e.Key, Rune: e.Rune, Shift: e.Shift, Time: e.Time}
	if c == nil || c.LiveText {
		if d, ok := r.pageKey(dst, e, controls, top, c); ok {
			return d
		}
		return append(dst, press)
	}
	switch e.Key {
	case KeyEnter, KeySpace:
		r.FocusVisible = true
		return fire(dst, c, e.Key, e)
	case KeyLeft, KeyRight, KeyUp, KeyDownArrow, KeyPageUp, KeyPageDown, KeyHome, KeyEnd:
		r.FocusVisible = true
		switch c.Role {
		case RoleSlider:
			if v, ok := r.stepped(c, e.Key); ok {
				return r.slide(dst, c, v, e.Time)
			}
		case RoleTab, RoleRadio, RoleRow:
			if n := neighbour(controls, top, c, e.Key); n != nil {
				dst = r.setFocus(dst, n.ID, true, e.Time)
				if n.Role == RoleRow {
					return dst
				}
				return fire(dst, n, e.Key, e)
			}
		}
		if d, ok := r.pageKey(dst, e, controls, top, c); ok {
			return d
		}
	}
	return append(dst, press)
}

// stepped is where a key sends a slider.
func (r *Router) stepped(c *Control, k Key) (float64, bool) {
	v := c.Value
	if r.slideID == c.ID {
		v = r.slideTo
	}
	switch k {
	case KeyLeft, KeyDownArrow:
		v -= c.Step
	case KeyRight, KeyUp:
		v += c.Step
	case KeyPageDown:
		v -= c.Page
	case KeyPageUp:
		v += c.Page
	case KeyHome:
		v = c.Min
	case KeyEnd:
		v = c.Max
	default:
		return 0, false
	}
	return v, true
}

func (r *Router) slide(dst []Action, c *Control, v float64, at time.Duration) []Action {
	if math.IsNaN(v) || !(c.Min <= c.Max) {
		return dst
	}
	v = math.Max(c.Min, math.Min(c.Max, v))
	r.slideID, r.slideTo = c.ID, v
	return append(dst, Action{Kind: Slide, ID: c.ID, Value: v, Time: at})
}

// pageKey scrolls the region that holds the focus, or the first one, by Page Up, Page Down, Home and End.
func (r *Router) pageKey(dst []Action, e *Event, controls []Control, top int, c *Control) ([]Action, bool) {
	if c != nil && c.LiveText && (e.Key == KeyHome || e.Key == KeyEnd) {
		return dst, false
	}
	var g *Control
	if c != nil {
		g = scroller(controls, top, c.Bounds.X+c.Bounds.W/2, c.Bounds.Y+c.Bounds.H/2, AxisY)
	}
	for i := 0; g == nil && i < len(controls); i++ {
		if k := &controls[i]; k.Scrolls && takes(k.Drag, AxisY) && usable(k, top) {
			g = k
		}
	}
	if g == nil {
		return dst, false
	}
	d := 0.0
	switch e.Key {
	case KeyPageDown:
		d = 0.85 * g.Hit.H
	case KeyPageUp:
		d = -0.85 * g.Hit.H
	case KeyEnd:
		d = 1e6
	case KeyHome:
		d = -1e6
	default:
		return dst, false
	}
	r.fling = fling{}
	return append(dst, Action{Kind: Scroll, ID: g.ID, DY: d, Time: e.Time}), true
}

// walk moves the focus by Tab or Shift+Tab, round and round within the highest layer. A group of tabs or radios is
// one stop: its selected member.
func (r *Router) walk(dst []Action, e *Event, controls []Control, top int) []Action {
	n := len(controls)
	at, step := -1, 1
	if e.Shift {
		at, step = n, -1
	}
	var from *Control
	for i := range controls {
		if controls[i].ID == r.Focus && r.Focus != "" && focusable(&controls[i], top) {
			at, from = i, &controls[i]
			break
		}
	}
	for k := 0; k < n; k++ {
		at += step
		if at < 0 {
			at = n - 1
		}
		if at >= n {
			at = 0
		}
		c := &controls[at]
		if !focusable(c, top) || from != nil && grouped(c, from) || !stop(controls, c, top) {
			continue
		}
		return r.setFocus(dst, c.ID, true, e.Time)
	}
	r.FocusVisible = r.Focus != ""
	return dst
}

// stop reports whether Tab halts at a control: in a group only at the selected member, or the first if none is.
func stop(controls []Control, c *Control, top int) bool {
	if c.Role != RoleTab && c.Role != RoleRadio || c.Selected {
		return true
	}
	var first *Control
	for i := range controls {
		o := &controls[i]
		if !focusable(o, top) || !grouped(o, c) {
			continue
		}
		if o.Selected {
			return false
		}
		if first == nil {
			first = o
		}
	}
	return first == c
}

// neighbour is the next member of a control's group the way an arrow points, nil if the key says nothing.
func neighbour(controls []Control, top int, c *Control, k Key) *Control {
	var first, last, before, after *Control
	seen := false
	for i := range controls {
		o := &controls[i]
		if !focusable(o, top) || !sameGroup(o, c) {
			continue
		}
		if first == nil {
			first = o
		}
		last = o
		switch {
		case o.ID == c.ID:
			seen = true
		case !seen:
			before = o
		case after == nil:
			after = o
		}
	}
	row := c.Role == RoleRow
	switch k {
	case KeyRight, KeyDownArrow:
		if row && k == KeyRight {
			return nil
		}
		if after == nil && !row {
			after = first
		}
		return after
	case KeyLeft, KeyUp:
		if row && k == KeyLeft {
			return nil
		}
		if before == nil && !row {
			before = last
		}
		return before
	case KeyHome:
		return first
	case KeyEnd:
		return last
	}
	return nil
}

// grouped reports whether two controls are one stop of the Tab key.
func grouped(a, b *Control) bool {
	return (a.Role == RoleTab || a.Role == RoleRadio) && sameGroup(a, b)
}

// sameGroup reports whether two controls have a role, layer and the ID up to its last slash in common.
func sameGroup(a, b *Control) bool {
	return a.Role == b.Role && a.Modal == b.Modal && prefix(a.ID) == prefix(b.ID)
}

func prefix(id string) string {
	for i := len(id) - 1; i >= 0; i-- {
		if id[i] == '/' {
			return id[:i]
		}
	}
	return ""
}
