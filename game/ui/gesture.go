package ui

import (
	"math"
	"time"

	"levelspan/game/scene"
)

// phase is where one pointer's gesture stands.
type phase uint8

const (
	idle      phase = iota // not down
	pressing               // down on a control, within the slop
	dragging               // drags the control
	scrolling              // scrolls the region
	spent                  // down, but means nothing until it is up
)

// pointer is one finger or mouse that is down. Its control keeps it wherever it goes.
type pointer struct {
	number int
	state  phase
	touch  bool
	inside bool // on the control's Hit, or dragging it
	noTap  bool // it stopped a coasting list or has moved too far: no tap
	id     string
	region string // scrolling region under the press, "" none

	x0, y0 float64 // where it went down; moved on by the slop in drags
	x, y   float64 // where it is
	ax, ay float64 // where it was at its last action
	track  velocity
}

// lastTap remembers a tap for the double tap.
type lastTap struct {
	id   string
	x, y float64
	at   time.Duration
	set  bool
	used bool // it was a double tap's second: no third makes another
}

func (p *pointer) shows() bool {
	return p.state == dragging || p.state == pressing && p.inside && p.id != ""
}

func (p *pointer) cancel(dst []Action, at time.Duration) []Action {
	if p.state == dragging {
		dst = append(dst, Action{Kind: DragCancel, ID: p.id, X: p.x, Y: p.y, X0: p.x0, Y0: p.y0, Time: at})
	}
	if p.state != idle {
		p.state, p.id, p.region, p.inside = spent, "", "", false
	}
	return dst
}

func (p *pointer) slop() float64 {
	if p.touch {
		return slopTouch
	}
	return slopMouse
}

// slot is the state of a pointer that is down, or a free one when number is new; nil when none is free.
func (r *Router) slot(number int, free bool) *pointer {
	for i := range r.pointers {
		if r.pointers[i].state != idle && r.pointers[i].number == number {
			return &r.pointers[i]
		}
	}
	if free {
		for i := range r.pointers {
			if r.pointers[i].state == idle {
				return &r.pointers[i]
			}
		}
	}
	return nil
}

func (r *Router) pointer(dst []Action, e *Event, controls []Control, top int) []Action {
	ok := placed(e.X, e.Y)
	switch e.Kind {
	case PointerDown:
		if ok {
			dst = r.down(dst, e, controls, top)
		}
	case PointerMove:
		if p := r.slot(e.Pointer, false); p != nil && ok {
			dst = r.move(dst, p, e, controls, top)
		}
	case PointerUp, PointerCancel:
		p := r.slot(e.Pointer, false)
		if p == nil {
			break
		}
		if e.Kind == PointerUp && ok {
			dst = r.move(dst, p, e, controls, top)
			dst = r.up(dst, p, e, controls, top)
		} else {
			dst = p.cancel(dst, e.Time)
		}
		*p = pointer{}
	}
	return dst
}

func (r *Router) down(dst []Action, e *Event, controls []Control, top int) []Action {
	p := r.slot(e.Pointer, true)
	if p == nil {
		return dst
	}
	dst = p.cancel(dst, e.Time) // its release was never seen
	*p = pointer{number: e.Pointer, state: spent, touch: e.Touch,
		x0: e.X, y0: e.Y, x: e.X, y: e.Y, ax: e.X, ay: e.Y}
	r.FocusVisible = false
	if r.tap.set && r.tap.id != "" && within(r.tap, e) && !usable(find(controls, r.tap.id), top) {
		return dst // one more tap on something that went away or was covered: not meant for what is there now
	}
	c := hit(controls, top, e.X, e.Y)
	g := scroller(controls, top, e.X, e.Y, AxisBoth)
	if c == nil && g == nil {
		return dst
	}
	if c != nil && r.held(p, c.ID) {
		return dst // a palm or a second finger on the same control
	}
	p.state = pressing
	if c != nil {
		p.id, p.inside = c.ID, true
	}
	if g != nil {
		p.region = g.ID
		p.track.reset(e.X, e.Y, e.Time)
	}
	if r.fling.id != "" && (g == nil || g.ID == r.fling.id) {
		p.noTap, p.inside = p.region == r.fling.id, p.region != r.fling.id && p.inside
		r.fling = fling{}
	}
	return dst
}

// held reports whether another pointer holds the control.
func (r *Router) held(p *pointer, id string) bool {
	for i := range r.pointers {
		if q := &r.pointers[i]; q != p && q.state != idle && q.id == id && id != "" {
			return true
		}
	}
	return false
}

// scrolled reports whether another pointer scrolls the region.
func (r *Router) scrolled(p *pointer) bool {
	for i := range r.pointers {
		if q := &r.pointers[i]; q != p && q.state == scrolling && q.region == p.region {
			return true
		}
	}
	return false
}

func (r *Router) move(dst []Action, p *pointer, e *Event, controls []Control, top int) []Action {
	p.x, p.y = e.X, e.Y
	if p.region != "" {
		p.track.add(e.X, e.Y, e.Time)
	}
	if p.state == pressing {
		dst = r.decide(dst, p, e, controls, top)
	}
	dx, dy := p.x-p.ax, p.y-p.ay
	if dx == 0 && dy == 0 {
		return dst
	}
	switch p.state {
	case dragging:
		p.ax, p.ay = p.x, p.y
		if n := len(dst) - 1; n >= r.base && dst[n].Kind == DragMove && dst[n].ID == p.id {
			a := &dst[n]
			a.X, a.Y, a.DX, a.DY, a.Time = p.x, p.y, a.DX+dx, a.DY+dy, e.Time
			return dst
		}
		dst = append(dst, Action{Kind: DragMove, ID: p.id, X: p.x, Y: p.y, X0: p.x0, Y0: p.y0,
			DX: dx, DY: dy, Time: e.Time})
	case scrolling:
		p.ax, p.ay = p.x, p.y
		if g := find(controls, p.region); g != nil {
			dst = r.scroll(dst, g, -dx, -dy, e)
		}
	}
	return dst
}

// decide turns a press that has moved beyond the slop into a drag or a scroll.
func (r *Router) decide(dst []Action, p *pointer, e *Event, controls []Control, top int) []Action {
	c, g := find(controls, p.id), find(controls, p.region)
	if c != nil && !p.noTap {
		p.inside = Contains(c.Hit, p.x, p.y)
	}
	dx, dy := p.x-p.x0, p.y-p.y0
	slop := p.slop()
	if math.Hypot(dx, dy) <= slop {
		return dst
	}
	along := AxisX
	if math.Abs(dy) > math.Abs(dx) {
		along = AxisY
	}
	switch {
	case c != nil && c.Drag != AxisNone && !c.Scrolls && (takes(c.Drag, along) || g == nil || !takes(g.Drag, along)):
		p.noTap = true
		mx, my := reach(c.Drag, dx, dy)
		if math.Hypot(mx, my) <= slop {
			return dst // across the only way that it can go: wait
		}
		d := math.Hypot(dx, dy)
		p.x0, p.y0 = p.x0+dx/d*slop, p.y0+dy/d*slop
		p.state, p.inside = dragging, true
		p.ax, p.ay = p.x, p.y
		dst = r.take(dst, c, e.Time)
		return append(dst, Action{Kind: DragStart, ID: c.ID, X: p.x, Y: p.y, X0: p.x0, Y0: p.y0, Time: e.Time})
	case g != nil && takes(g.Drag, along):
		if r.scrolled(p) {
			p.state, p.id, p.inside = spent, "", false
			return dst
		}
		d := math.Hypot(dx, dy)
		p.ax, p.ay = p.x0+dx/d*slop, p.y0+dy/d*slop
		p.state, p.id, p.inside = scrolling, "", false
	case g != nil:
		p.noTap, p.inside = true, false
	case c != nil && c.Role == RoleRegion:
		p.noTap = true
	}
	return dst
}

// take gives the focus to a control that was touched. Buttons do not take it, so that Enter goes on meaning what it did.
func (r *Router) take(dst []Action, c *Control, at time.Duration) []Action {
	if c.Role == RoleButton || c.Role == RoleRegion {
		return dst
	}
	return r.setFocus(dst, c.ID, false, at)
}

func (r *Router) up(dst []Action, p *pointer, e *Event, controls []Control, top int) []Action {
	switch p.state {
	case dragging:
		dst = append(dst, Action{Kind: DragEnd, ID: p.id, X: p.x, Y: p.y, X0: p.x0, Y0: p.y0, Time: e.Time})
	case scrolling:
		if !r.NoInertia {
			r.fling = p.track.fling(p.region, e.Time)
			if g := find(controls, p.region); g != nil {
				r.fling.confine(g.Drag)
			}
		}
	case pressing:
		c := find(controls, p.id)
		if p.noTap || !p.inside || !usable(c, top) {
			break
		}
		dst = r.take(dst, c, e.Time)
		a := Action{Kind: Tap, ID: c.ID, X: p.x, Y: p.y, X0: p.x0, Y0: p.y0, Shift: e.Shift, Time: e.Time}
		dst = append(dst, a)
		second := r.tap.set && !r.tap.used && r.tap.id == c.ID && within(r.tap, e)
		if second {
			a.Kind = DoubleTap
			dst = append(dst, a)
		}
		r.tap = lastTap{id: c.ID, x: p.x, y: p.y, at: e.Time, set: true, used: second}
	}
	return dst
}

// within reports whether a press is soon and near enough after a tap to belong to it.
func within(t lastTap, e *Event) bool {
	dt := e.Time - t.at
	return dt >= 0 && dt <= doubleTapTime && math.Hypot(e.X-t.x, e.Y-t.y) <= doubleTapNear
}

// dropVanished cancels gestures whose control is gone, disabled or covered by a higher layer.
func (r *Router) dropVanished(dst []Action, controls []Control, top int) []Action {
	for i := range r.pointers {
		p := &r.pointers[i]
		if p.state == idle || p.state == spent {
			continue
		}
		if p.id != "" && !usable(find(controls, p.id), top) || p.region != "" && !usable(find(controls, p.region), top) {
			dst = p.cancel(dst, 0)
		}
	}
	return dst
}

// hit is the control that takes a press at a point: of those whose Hit holds it, the one whose Bounds are nearest,
// then the one with the nearest centre, then the one drawn last. Regions come after everything else.
func hit(controls []Control, top int, x, y float64) *Control {
	var best *Control
	bestOut, bestMid := math.Inf(1), math.Inf(1)
	for i := range controls {
		c := &controls[i]
		if !usable(c, top) || !Contains(c.Hit, x, y) {
			continue
		}
		region := c.Role == RoleRegion
		if best != nil && region && best.Role != RoleRegion {
			continue
		}
		out, mid := outside(c.Bounds, x, y), math.Hypot(x-c.Bounds.X-c.Bounds.W/2, y-c.Bounds.Y-c.Bounds.H/2)
		better := out < bestOut || out == bestOut && mid <= bestMid
		if best == nil || best.Role == RoleRegion && !region || better {
			best, bestOut, bestMid = c, out, mid
		}
	}
	return best
}

// outside is the distance of a point from a rectangle, 0 within it.
func outside(b scene.Rect, x, y float64) float64 {
	dx := math.Max(0, math.Max(b.X-x, x-b.X-b.W))
	dy := math.Max(0, math.Max(b.Y-y, y-b.Y-b.H))
	return math.Hypot(dx, dy)
}

// takes reports whether an axis allows movement along another.
func takes(a, along Axis) bool { return a == AxisBoth || a == along && a != AxisNone }

// reach is the part of a movement that an axis allows.
func reach(a Axis, dx, dy float64) (float64, float64) {
	if a == AxisX {
		dy = 0
	}
	if a == AxisY {
		dx = 0
	}
	return dx, dy
}
