package app

import (
	"fmt"
	"math"
	"testing"

	"levelspan/game/scene"
	"levelspan/game/ui"
)

// windows are the sizes in which nothing may overlap or be cut off, some with insets.
var windows = []Input{
	{Width: 1280, Height: 800}, {Width: 800, Height: 1280}, {Width: 390, Height: 844, Top: 47, Bottom: 34}, {Width: 844, Height: 390, Left: 47, Right: 47, Bottom: 21},
	{Width: 320, Height: 480}, {Width: 360, Height: 640}, {Width: 412, Height: 915}, {Width: 600, Height: 960}, {Width: 600, Height: 600}, {Width: 768, Height: 1024}, {Width: 1024, Height: 768},
	{Width: 1024, Height: 600}, {Width: 1180, Height: 820}, {Width: 1366, Height: 1024}, {Width: 1920, Height: 1080}, {Width: 2560, Height: 1600}, {Width: 700, Height: 500},
}

// written is one text of a picture: what it says, its box by capital height, and the clip that it lies in.
type written struct {
	text      string
	box, clip scene.Rect
}

// texts lists what a scene says from operation number from on.
func texts(s *scene.Scene, from int) []written {
	clips := []scene.Rect{{W: s.Width, H: s.Height}}
	var all []written
	for i := range s.Ops {
		op := &s.Ops[i]
		switch op.Kind {
		case scene.OpPushClip:
			clips = append(clips, ui.Intersect(op.Rect, clips[len(clips)-1]))
		case scene.OpPopClip:
			clips = clips[:len(clips)-1]
		case scene.OpText:
			if i < from || op.T1 == op.T0 {
				continue
			}
			text := string(s.Text[op.T0:op.T1])
			w, h := scene.Measure(op.Style, text), scene.CapHeight(op.Style)
			p := s.Points[op.P0]
			switch op.Align {
			case scene.Center:
				p.X -= w / 2
			case scene.Right:
				p.X -= w
			}
			all = append(all, written{text, scene.Rect{X: p.X, Y: p.Y - h, W: w, H: h}, clips[len(clips)-1]})
		}
	}
	return all
}

// views are the states that are looked at in every window.
var views = map[string]func(p *pilot){
	"chart":   func(p *pilot) {},
	"light":   func(p *pilot) { p.setSlider(handleMass, 500); p.setSlider(handleAltitude, -300) },
	"high":    func(p *pilot) { p.setSlider(handleAltitude, 4900) },
	"ceiling": func(p *pilot) { p.setSlider(handleAltitude, 5500) },
	"TAS":     func(p *pilot) { p.press("speed-kind/TAS"); p.setSlider(handleAltitude, 3000) },
	"aeroplane": func(p *pilot) {
		p.press("tab/aeroplane")
	},
	"today": func(p *pilot) {
		p.press("tab/aeroplane")
		if p.find("part/today") != nil {
			p.press("part/today")
		}
	},
}

func init() {
	for name, show := range sheetViews {
		views[name] = show
	}
}

func TestNothingOverlapsOrIsCutOff(t *testing.T) {
	for _, w := range windows {
		for name, show := range views {
			p := newPilotIn(t, w)
			show(p)
			p.in.Now += noticeTime // notices lie over other things
			p.step()
			at := fmt.Sprintf("%s in %gx%g", name, w.Width, w.Height)
			all := texts(p.app.Scene(), p.overlaid())
			for i, a := range all {
				if ui.Intersect(a.box, a.clip).H <= 0 {
					continue // scrolled out of sight
				}
				if a.box.X < a.clip.X-1 || a.box.X+a.box.W > a.clip.X+a.clip.W+1 {
					t.Errorf("%s: %q is cut off at the side", at, a.text)
				}
				if a.clip.W == w.Width && (a.box.Y < 0 || a.box.Y+a.box.H > w.Height) {
					t.Errorf("%s: %q is cut off above or below", at, a.text)
				}
				for _, b := range all[i+1:] {
					o := ui.Intersect(ui.Intersect(a.box, a.clip), ui.Intersect(b.box, b.clip))
					if o.W > 1 && o.H > 1 {
						t.Errorf("%s: %q and %q overlap", at, a.text, b.text)
					}
				}
			}
		}
	}
}

func TestControlsAreReachable(t *testing.T) {
	for _, w := range windows {
		for name, show := range views {
			p := newPilotIn(t, w)
			show(p)
			at := fmt.Sprintf("%s in %gx%g", name, w.Width, w.Height)
			ids := map[string]bool{}
			for _, c := range p.app.Controls() {
				if ids[c.ID] {
					t.Errorf("%s: two controls %q", at, c.ID)
				}
				ids[c.ID] = true
				if c.Label == "" && c.Role != ui.RoleRegion {
					t.Errorf("%s: %q has no name", at, c.ID)
				}
				for _, v := range [...]float64{c.Bounds.X, c.Bounds.Y, c.Bounds.W, c.Bounds.H, c.Hit.X, c.Hit.Y, c.Hit.W, c.Hit.H, c.Value, c.Min, c.Max} {
					if math.IsNaN(v) || math.IsInf(v, 0) {
						t.Fatalf("%s: %q has a figure that is none: %+v", at, c.ID, c)
					}
				}
				if c.Role == ui.RoleSlider {
					x, y := middle(c.Bounds)
					if c.Hit.W < 48 || c.Hit.H < 48 || x < 0 || y < 0 || x > w.Width || y > w.Height {
						t.Errorf("%s: handle %q cannot be held: %+v", at, c.ID, c.Hit)
					}
					if !(c.Value >= c.Min && c.Value <= c.Max) {
						t.Errorf("%s: handle %q stands at %g outside %g..%g", at, c.ID, c.Value, c.Min, c.Max)
					}
				}
				inside := ui.Intersect(c.Bounds, scene.Rect{W: w.Width, H: w.Height})
				if c.Hit.H > 0 && (inside.W < c.Bounds.W-9 || inside.H < c.Bounds.H-1) && c.Role == ui.RoleButton && c.Hit.H >= c.Bounds.H {
					t.Errorf("%s: button %q leaves the window", at, c.ID)
				}
			}
			for _, id := range []string{"tab/chart", "tab/aeroplane", "undo", "redo", "menu"} {
				if !ids[id] {
					t.Errorf("%s: no control %q", at, id)
				}
			}
			if s := string(p.app.Scene().Text); len(s) == 0 || !p.says("Advisory") {
				t.Errorf("%s: no advisory line", at)
			}
		}
	}
}

func TestHandlesReachBothEnds(t *testing.T) {
	for _, w := range windows {
		p := newPilotIn(t, w)
		for _, id := range []string{handleMass, handleAltitude} {
			c := p.control(id)
			for _, far := range []float64{-4000, 4000} {
				p.dragBy(1, id, far, -far, 3, func() {})
			}
			now := p.control(id)
			if math.Abs(now.Value-c.Max) > 0.02*(c.Max-c.Min) {
				t.Errorf("%gx%g: %s stops at %g of %g", w.Width, w.Height, id, now.Value, c.Max)
			}
		}
	}
}

func TestFocusGoesFromLeftToRight(t *testing.T) {
	p := newPilot(t, 1280, 800)
	at := map[string]int{}
	for i, c := range p.app.Controls() {
		at[c.ID] = i
	}
	order := []string{"tab/chart", "tab/aeroplane", "undo", "redo", "share", "menu", handleAltitude, handleMass, "speed-kind/IAS", "limit/stall", "limit/never_exceed"}
	for i := 1; i < len(order); i++ {
		if at[order[i-1]] >= at[order[i]] {
			t.Errorf("the focus comes to %s before %s", order[i], order[i-1])
		}
	}
}
