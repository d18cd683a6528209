package ui

import (
	"testing"

	"levelspan/game/scene"
)

func drawnForm(fm *Form, w, h float64, sections []FormSection) *Frame {
	var s scene.Scene
	s.Reset(w, h, 1, scene.Color{})
	f := new(Frame)
	f.Begin(&s, Day(), nil)
	fm.Draw(f, scene.Rect{W: w, H: h}, "form", "Form", sections)
	return f
}

func TestFormReveals(t *testing.T) {
	for _, w := range []float64{320, 390, 800, 1280} {
		for _, s := range formSections() {
			for _, d := range s.Fields {
				var fm Form
				fm.Reveal(d.ID)
				f := drawnForm(&fm, w, 400, formSections())
				c := find(f.Controls, d.ID)
				if d.Choices != nil {
					c = find(f.Controls, d.Choices[0].ID)
				}
				if c.Bounds.Y < 0 || c.Bounds.Y+min(c.Bounds.H, 200) > 400 {
					t.Errorf("width %v: %s at %v is not in sight", w, d.ID, c.Bounds)
				}
			}
		}
	}
}

// Opening help or refusing a value moves rows down, never into another column.
func TestFormColumnsStay(t *testing.T) {
	for _, w := range []float64{900, 1280, 2560} {
		var plain, open Form
		a := drawnForm(&plain, w, 5000, formSections())
		changed := formSections()
		for i := range changed {
			for j := range changed[i].Fields {
				changed[i].Fields[j].HelpOpen = true
				changed[i].Fields[j].Error = "refused for a reason that takes a line"
			}
		}
		b := drawnForm(&open, w, 5000, changed)
		for i := range a.Controls {
			if a.Controls[i].ID != b.Controls[i].ID || a.Controls[i].Bounds.X != b.Controls[i].Bounds.X {
				t.Errorf("width %v: %s moved from x %v to %v", w, a.Controls[i].ID, a.Controls[i].Bounds.X, b.Controls[i].Bounds.X)
			}
		}
	}
}

func TestFormScrolls(t *testing.T) {
	var fm Form
	drawnForm(&fm, 390, 400, formSections())
	if !fm.Scroll.By(100) || fm.Scroll.Y != 100 {
		t.Errorf("at %v", fm.Scroll.Y)
	}
	fm.Scroll.By(1e6)
	end := fm.Scroll.Y
	if fm.Scroll.By(1) || end <= 400 {
		t.Errorf("end at %v", end)
	}
	fm.Scroll.By(-1e9)
	if fm.Scroll.Y != 0 {
		t.Errorf("beginning at %v", fm.Scroll.Y)
	}
	// All controls are there for the keyboard and the mirror, those out of sight cannot be touched.
	f := drawnForm(&fm, 390, 400, formSections())
	c := find(f.Controls, "field/diameter")
	if c == nil || c.Hit.W*c.Hit.H != 0 {
		t.Errorf("out of sight: %+v", c)
	}
	// A larger window leaves no emptiness under the content.
	fm.Scroll.By(1e6)
	drawnForm(&fm, 390, 5000, formSections())
	if fm.Scroll.Y != 0 {
		t.Errorf("scrolled to %v though all is seen", fm.Scroll.Y)
	}
}

// Narrow, low and empty forms, menus and dialogs neither panic nor draw what is not a number.
func TestNoRoom(t *testing.T) {
	for _, size := range [][2]float64{{0, 0}, {1, 1}, {60, 40}, {320, 100}, {100, 900}} {
		r := scene.Rect{W: size[0], H: size[1]}
		var s scene.Scene
		s.Reset(r.W, r.H, 1, scene.Color{})
		var f Frame
		f.Begin(&s, Day(), nil)
		for _, draw := range []func(*Frame, scene.Rect){drawForm, drawOver, drawDialog, drawKeypad, drawKit, drawRails} {
			draw(&f, r)
		}
		for _, p := range s.Points {
			if !finite(p.X, p.Y) {
				t.Fatalf("%v: a point at %v", size, p)
			}
		}
		for _, op := range s.Ops {
			if !finite(op.Rect.X, op.Rect.Y, op.Rect.W, op.Rect.H, op.W) {
				t.Fatalf("%v: %+v", size, op)
			}
		}
	}
}

func TestDialogFocusIsHarmless(t *testing.T) {
	var s scene.Scene
	s.Reset(800, 600, 1, scene.Color{})
	var f Frame
	var r Router
	f.Begin(&s, Day(), &r)
	Button{ID: "under", Text: "Under"}.Draw(&f, scene.Rect{W: 100, H: 48})
	drawDialog(&f, scene.Rect{W: 800, H: 600})
	got := r.Route(nil, []Event{key(KeyEnter), down(1, 50, 20, 0), up(1, 50, 20, 0)}, f.Controls, 0)
	if brief(got, false) != "tap:dialog/keep tap:dialog/outside" {
		t.Errorf("%q", brief(got, false))
	}
}

func BenchmarkForm(b *testing.B) {
	var fm Form
	var s scene.Scene
	var f Frame
	t := Day()
	sections := append(append(formSections(), formSections()...), formSections()...)
	b.ReportAllocs()
	for b.Loop() {
		s.Reset(1280, 800, 1, t.Background)
		f.Begin(&s, t, nil)
		fm.Draw(&f, scene.Rect{W: 1280, H: 800}, "form", "Form", sections)
	}
}
