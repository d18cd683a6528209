package ui

import (
	"math"

	"levelspan/game/scene"
)

// Scroller is how far a region is scrolled. The app keeps it between frames.
type Scroller struct {
	Y       float64 // offset of the content, from 0
	content float64 // height of the content when last drawn
	view    float64 // height of the region
}

// By scrolls by dy within the content and reports whether it could go anywhere.
func (s *Scroller) By(dy float64) bool {
	old := s.Y
	if finite(dy) {
		s.Y = math.Max(0, math.Min(s.most(), s.Y+dy))
	}
	return s.Y != old
}

func (s *Scroller) most() float64 { return math.Max(0, s.content-s.view) }

// Fit takes in the height of the content and of the region.
func (s *Scroller) Fit(content, view float64) {
	s.content, s.view = content, view
	s.By(0)
}

// Reveal scrolls as little as needed to show lo..hi of the content, lo first.
func (s *Scroller) Reveal(lo, hi float64) {
	if hi > s.Y+s.view {
		s.Y = hi - s.view
	}
	if lo < s.Y {
		s.Y = lo
	}
	s.By(0)
}

// BeginScroll starts a region of a screen that scrolls up and down; what is drawn until EndScroll is confined to view.
// The content is drawn from the returned y on. Text is what it says, where no control in it does; else "".
func (f *Frame) BeginScroll(id, label, text string, view scene.Rect, s *Scroller, content float64) (top float64) {
	s.Fit(content, view.H)
	f.Add(Control{ID: id, Role: RoleRegion, Label: label, ValueText: text, Bounds: view, Hit: view, Drag: AxisY, Scrolls: true})
	f.PushView(view)
	return math.Round(view.Y - s.Y)
}

// EndScroll ends the region and draws its bar where there is more than is seen; what lies beyond an edge fades.
func (f *Frame) EndScroll(view scene.Rect, s *Scroller, back scene.Color) {
	const fade = 20
	if s.Y > 0.5 {
		f.Scene.Gradient(scene.Rect{X: view.X, Y: view.Y, W: view.W, H: fade}, back, Fade(back, 0), true)
	}
	if s.Y < s.most()-0.5 {
		f.Scene.Gradient(scene.Rect{X: view.X, Y: view.Y + view.H - fade, W: view.W, H: fade}, Fade(back, 0), back, true)
	}
	if s.most() > 0 && view.H > 40 {
		h := math.Max(32, view.H*view.H/s.content)
		y := view.Y + 4 + (view.H-8-h)*s.Y/s.most()
		f.Scene.FillRect(scene.Rect{X: view.X + view.W - 7, Y: y, W: 5, H: h}, 2.5, f.Theme.Edge)
	}
	f.PopView()
}
