package ui

import (
	"math"

	"levelspan/game/scene"
)

// Frame is what a screen is drawn into: the scene, the palette, the state of fingers and focus, and the controls that
// the widgets append. Keep it between frames: its store is reused.
type Frame struct {
	Scene    *scene.Scene
	Theme    *Theme
	Router   *Router // whose presses and focus are shown; nil: none
	Controls []Control
	Modal    int // layer of the controls that follow

	view   []scene.Rect // clips of scrolled regions, innermost last
	widths widthCache
	lines  []string
}

// Begin starts a screen over a scene that is Reset already.
func (f *Frame) Begin(s *scene.Scene, t *Theme, r *Router) {
	f.Scene, f.Theme, f.Router = s, t, r
	f.Controls, f.Modal, f.view = f.Controls[:0], 0, f.view[:0]
}

// Add appends a control that is drawn already: it sets the layer, makes Hit large enough where it is empty, confines it
// to the region that scrolls it, and draws the focus ring.
func (f *Frame) Add(c Control) {
	c.Modal = f.Modal
	if c.Hit.W <= 0 || c.Hit.H <= 0 {
		c.Hit = Grow(c.Bounds, MinTarget, MinTarget)
	}
	if n := len(f.view); n > 0 {
		c.Hit = Intersect(c.Hit, f.view[n-1])
	}
	f.Controls = append(f.Controls, c)
	if f.Focused(c.ID) && c.Role != RoleRegion {
		f.Ring(c.Bounds)
	}
}

// PushView confines drawing and touch to r until PopView.
func (f *Frame) PushView(r scene.Rect) {
	f.Scene.PushClip(r)
	if n := len(f.view); n > 0 {
		r = Intersect(r, f.view[n-1])
	}
	f.view = append(f.view, r)
}

// PopView ends the innermost PushView.
func (f *Frame) PopView() {
	f.Scene.PopClip()
	f.view = f.view[:len(f.view)-1]
}

// Seen reports whether any of r lies within the region that scrolls it.
func (f *Frame) Seen(r scene.Rect) bool {
	n := len(f.view)
	return n == 0 || Overlaps(r, f.view[n-1])
}

// Pressed reports whether a control is pressed, to draw it so.
func (f *Frame) Pressed(id string) bool { return f.Router != nil && f.Router.IsPressed(id) }

// Focused reports whether a control's focus is to be shown.
func (f *Frame) Focused(id string) bool {
	return f.Router != nil && f.Router.FocusVisible && id != "" && f.Router.Focus == id
}

// Ring draws the focus ring around a drawn control: two strokes, so that it shows on any background.
func (f *Frame) Ring(r scene.Rect) {
	f.Outline(Inset(r, -2), 8, 5, f.Theme.Background)
	f.Outline(Inset(r, -2), 8, 3, f.Theme.Accent)
}

// Outline strokes a rectangle with round corners, the stroke centred on its edge.
func (f *Frame) Outline(r scene.Rect, radius, width float64, c scene.Color) {
	radius = math.Max(0, math.Min(radius, math.Min(r.W, r.H)/2))
	if radius == 0 {
		pts := [4]scene.Point{{X: r.X, Y: r.Y}, {X: r.X + r.W, Y: r.Y}, {X: r.X + r.W, Y: r.Y + r.H}, {X: r.X, Y: r.Y + r.H}}
		f.Scene.StrokeClosed(pts[:], width, c)
		return
	}
	const per = 5 // points of a corner
	var pts [4 * per]scene.Point
	centres := [4]scene.Point{{X: r.X + r.W - radius, Y: r.Y + radius}, {X: r.X + r.W - radius, Y: r.Y + r.H - radius},
		{X: r.X + radius, Y: r.Y + r.H - radius}, {X: r.X + radius, Y: r.Y + radius}}
	for k, m := range centres {
		for i := 0; i < per; i++ {
			sin, cos := math.Sincos((float64(k-1) + float64(i)/(per-1)) * math.Pi / 2)
			pts[k*per+i] = scene.Point{X: m.X + radius*cos, Y: m.Y + radius*sin}
		}
	}
	f.Scene.StrokeClosed(pts[:], width, c)
}

// Box fills a rectangle with round corners and a thin edge inside it, on whole pixels.
func (f *Frame) Box(r scene.Rect, radius float64, face, edge scene.Color) {
	f.boxed(r, radius, 1, face, edge)
}

func (f *Frame) boxed(r scene.Rect, radius, width float64, face, edge scene.Color) {
	r = Snap(r)
	f.Scene.FillRect(r, radius, edge)
	f.Scene.FillRect(Inset(r, width), math.Max(0, radius-width), face)
}

// Baseline is the baseline that centres capitals and digits of a style in r.
func Baseline(style scene.Style, r scene.Rect) float64 {
	return math.Round(r.Y + (r.H+scene.CapHeight(style))/2)
}

// Label draws one line of text centred vertically in r, shortened with an ellipsis when it does not fit.
func (f *Frame) Label(style scene.Style, r scene.Rect, align scene.Align, text string, c scene.Color) {
	x := r.X
	switch align {
	case scene.Center:
		x = r.X + r.W/2
	case scene.Right:
		x = r.X + r.W
	}
	f.Scene.Label(style, x, Baseline(style, r), align, f.fit(style, text, r.W), c)
}
