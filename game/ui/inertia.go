package ui

import (
	"math"
	"time"
)

// The coasting of a scrolled list.
const (
	flingDecay  = 0.325                 // s, time constant of the speed
	flingMin    = 60.0                  // px/s, below it a release does not coast
	flingStop   = 12.0                  // px/s, below it coasting ends
	flingMax    = 6000.0                // px/s
	flingWindow = 90 * time.Millisecond // movement that counts for the speed at release
)

// velocity keeps the last movements of a pointer.
type velocity struct {
	x, y [8]float64
	t    [8]time.Duration
	n    int // samples ever taken
}

func (v *velocity) reset(x, y float64, t time.Duration) { v.n = 0; v.add(x, y, t) }

func (v *velocity) add(x, y float64, t time.Duration) {
	i := v.n % len(v.x)
	v.x[i], v.y[i], v.t[i] = x, y, t
	v.n++
}

// fling is the coasting that a release at a moment starts, its id empty when it is too slow.
func (v *velocity) fling(id string, now time.Duration) fling {
	last := (v.n - 1) % len(v.x)
	old := last
	for k := 1; k < min(v.n, len(v.x)); k++ {
		i := (v.n - 1 - k) % len(v.x)
		if age := now - v.t[i]; age < 0 || age > flingWindow {
			break
		}
		old = i
	}
	dt := (v.t[last] - v.t[old]).Seconds()
	if dt <= 0.001 || now-v.t[last] > flingWindow {
		return fling{}
	}
	f := fling{id: id, vx: -(v.x[last] - v.x[old]) / dt, vy: -(v.y[last] - v.y[old]) / dt, at: now}
	speed := math.Hypot(f.vx, f.vy)
	if !(speed >= flingMin) {
		return fling{}
	}
	if speed > flingMax {
		f.vx, f.vy = f.vx*flingMax/speed, f.vy*flingMax/speed
	}
	return f
}

// fling is a list that coasts.
type fling struct {
	id     string
	vx, vy float64 // of the scroll offset, px/s
	at     time.Duration
}

func (f *fling) confine(a Axis) {
	f.vx, f.vy = reach(a, f.vx, f.vy)
	if math.Hypot(f.vx, f.vy) < flingMin {
		*f = fling{}
	}
}

// coast moves the coasting list on to now.
func (r *Router) coast(dst []Action, controls []Control, top int, now time.Duration) []Action {
	f := &r.fling
	if f.id == "" {
		return dst
	}
	g := find(controls, f.id)
	if !usable(g, top) {
		*f = fling{}
		return dst
	}
	dt := (now - f.at).Seconds()
	if dt <= 0 {
		return dst
	}
	left := math.Exp(-dt / flingDecay)
	dx, dy := f.vx*flingDecay*(1-left), f.vy*flingDecay*(1-left)
	f.vx, f.vy, f.at = f.vx*left, f.vy*left, now
	dst = append(dst, Action{Kind: Scroll, ID: g.ID, DX: dx, DY: dy, Time: now})
	if math.Hypot(f.vx, f.vy) < flingStop {
		*f = fling{}
	}
	return dst
}

// wheel scrolls the innermost region under the pointer that can go that way.
func (r *Router) wheel(dst []Action, e *Event, controls []Control, top int) []Action {
	if !placed(e.X, e.Y) || !placed(e.DX, e.DY) {
		return dst
	}
	dx, dy := e.DX, e.DY
	if e.Shift && dx == 0 {
		dx, dy = dy, 0
	}
	along := AxisY
	if math.Abs(dx) > math.Abs(dy) {
		along = AxisX
	}
	g := scroller(controls, top, e.X, e.Y, along)
	if g == nil || dx == 0 && dy == 0 {
		return dst
	}
	r.fling = fling{}
	return r.scroll(dst, g, dx, dy, e)
}

// scroll appends or merges a scroll action.
func (r *Router) scroll(dst []Action, g *Control, dx, dy float64, e *Event) []Action {
	dx, dy = reach(g.Drag, dx, dy)
	if n := len(dst) - 1; n >= r.base && dst[n].Kind == Scroll && dst[n].ID == g.ID {
		a := &dst[n]
		a.X, a.Y, a.DX, a.DY, a.Time = e.X, e.Y, a.DX+dx, a.DY+dy, e.Time
		return dst
	}
	return append(dst, Action{Kind: Scroll, ID: g.ID, X: e.X, Y: e.Y, DX: dx, DY: dy, Time: e.Time})
}

// scroller is the smallest scrolling region at a point that can go along an axis; AxisBoth: any.
func scroller(controls []Control, top int, x, y float64, along Axis) *Control {
	var best *Control
	for i := range controls {
		c := &controls[i]
		if !c.Scrolls || c.Drag == AxisNone || !usable(c, top) || !Contains(c.Hit, x, y) {
			continue
		}
		if along != AxisBoth && !takes(c.Drag, along) {
			continue
		}
		if best == nil || c.Hit.W*c.Hit.H <= best.Hit.W*best.Hit.H {
			best = c
		}
	}
	return best
}
