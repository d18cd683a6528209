package app

import (
	"fmt"
	"testing"

	"levelspan/game/keep"
	"levelspan/game/ui"
)

// keyboardViews are the states that are walked through by keyboard alone.
func keyboardViews() map[string]func(p *pilot) {
	all := map[string]func(p *pilot){
		"menu":   func(p *pilot) { p.press("menu") },
		"about":  func(p *pilot) { p.press("menu"); p.press("about") },
		"keypad": func(p *pilot) { p.event(ui.Event{Kind: ui.Activate, ID: handleMass}) },
		"help":   func(p *pilot) { p.press("tab/aeroplane"); p.press("help/field/aeroplane.wing_area_m2") },
	}
	for _, name := range []string{"chart", "aeroplane", "today", "share", "code", "cases", "cases-more", "rename", "delete", "deleted", "paste", "conflict", "not-kept"} {
		all[name] = views[name]
	}
	return all
}

// focusables are the controls that the keyboard must reach: those of the topmost layer.
func (p *pilot) focusables() map[string]ui.Control {
	top := 0
	for _, c := range p.app.Controls() {
		top = max(top, c.Modal)
	}
	all := map[string]ui.Control{}
	for _, c := range p.app.Controls() {
		if c.Modal == top && c.Role != ui.RoleRegion && !c.Disabled {
			all[c.ID] = c
		}
	}
	return all
}

func inGroup(c ui.Control) bool { return c.Role == ui.RoleRadio || c.Role == ui.RoleTab }

func TestTabReachesEverything(t *testing.T) {
	for _, size := range [][2]float64{{1280, 800}, {390, 844}} {
		for name, show := range keyboardViews() {
			at := fmt.Sprintf("%s in %gx%g", name, size[0], size[1])
			for _, back := range []bool{false, true} {
				p := newPilot(t, size[0], size[1])
				show(p)
				want := p.focusables()
				reached := map[string]bool{}
				for range len(want) + 2 {
					p.event(ui.Event{Kind: ui.KeyDown, Key: ui.KeyTab, Shift: back})
					id := p.app.FocusID()
					c, ok := want[id]
					if !ok {
						t.Fatalf("%s: Tab goes to %q", at, id)
					}
					reached[id] = true
					if !p.app.router.FocusVisible {
						t.Fatalf("%s: the focus on %q is not shown", at, id)
					}
					if now := p.control(id); now.Hit.H < 1 || now.Hit.W < 1 {
						t.Errorf("%s: the focus goes to %q, which is not in sight", at, id)
					}
					_ = c
				}
				for id, c := range want {
					if !reached[id] && !inGroup(c) {
						t.Errorf("%s: Tab (back %v) does not reach %q", at, back, id)
					}
				}
			}
		}
	}
}

func TestArrowsReachEveryChoice(t *testing.T) {
	for name, show := range keyboardViews() {
		p := newPilot(t, 1280, 800)
		show(p)
		for id, c := range p.focusables() {
			if !inGroup(c) || c.Selected {
				continue
			}
			q := newPilot(t, 1280, 800)
			show(q)
			for k := 0; q.app.FocusID() != id && k < 400; k++ { // the group by Tab, the choice by arrows
				key := ui.KeyTab
				if f := q.find(q.app.FocusID()); f != nil && inGroup(*f) && sameGroup(f.ID, id) {
					key = ui.KeyRight
				}
				q.event(ui.Event{Kind: ui.KeyDown, ID: q.app.FocusID(), Key: key})
			}
			if q.app.FocusID() != id {
				t.Errorf("%s: the keyboard does not come to %q", name, id)
				continue
			}
			if now := q.find(id); now != nil && !now.Selected {
				t.Errorf("%s: the arrow key that comes to %q does not choose it", name, id)
			}
		}
	}
}

func sameGroup(a, b string) bool {
	cut := func(s string) string {
		for i := len(s) - 1; i >= 0; i-- {
			if s[i] == '/' {
				return s[:i]
			}
		}
		return ""
	}
	return cut(a) == cut(b)
}

// TestEnterWorksEverythingAndEscapeReturns presses Enter on every control of every state, and leaves what that opens by
// Escape: the case stays sound, nothing stays open, and the focus is back where it was.
func TestEnterWorksEverythingAndEscapeReturns(t *testing.T) {
	for name, show := range keyboardViews() {
		p := newPilot(t, 1280, 800)
		show(p)
		based := p.app.view.overlay == overlayNone
		for id := range p.focusables() {
			q := newPilot(t, 1280, 800)
			show(q)
			overlay := q.app.view.overlay
			q.event(ui.Event{Kind: ui.FocusOn, ID: id})
			q.event(ui.Event{Kind: ui.KeyDown, ID: id, Key: ui.KeyEnter})
			if err := q.app.Case().Validate(); err != nil {
				t.Fatalf("%s: Enter on %q: %v", name, id, err)
			}
			opened := based && q.app.view.overlay != overlayNone
			if !opened && q.app.view.overlay == overlay {
				continue
			}
			for k := 0; q.app.view.overlay != overlayNone && k < 3; k++ {
				q.event(ui.Event{Kind: ui.KeyDown, ID: q.app.FocusID(), Key: ui.KeyEscape})
			}
			if q.app.view.overlay != overlayNone {
				t.Errorf("%s: what Enter on %q opens does not close by Escape", name, id)
			}
			if opened && q.app.FocusID() != id {
				t.Errorf("%s: after what Enter on %q opened the focus is on %q", name, id, q.app.FocusID())
			}
			q.sameAsSolve()
		}
	}
}

// TestACaseByKeyboardAlone renames a case and opens another with nothing but keys.
func TestACaseByKeyboardAlone(t *testing.T) {
	s := newTable()
	p := newWindow(t, 800, 1280, s)
	p.setSlider(handleMass, 700)
	to := func(id string) {
		t.Helper()
		for k := 0; p.app.FocusID() != id; k++ {
			if k > 200 {
				t.Fatalf("Tab does not come to %q", id)
			}
			p.key(ui.KeyTab)
		}
	}
	enter := func(id string) { t.Helper(); to(id); p.key(ui.KeyEnter) }
	enter("menu")
	enter("cases")
	enter("cases/new")
	if p.app.FocusID() != "menu" {
		t.Errorf("the focus returns to %q", p.app.FocusID())
	}
	p.setSlider(handleMass, 610)
	enter("menu")
	enter("cases")
	marram := keep.Escape("Marram")
	enter("case/more/" + marram)
	enter("case/rename/" + marram)
	if p.app.FocusID() != entryName {
		t.Fatalf("the focus is on %q", p.app.FocusID())
	}
	for range len("Marram") {
		p.key(ui.KeyBackspace)
	}
	for _, r := range "Tug" {
		p.event(ui.Event{Kind: ui.KeyDown, Rune: r})
	}
	p.key(ui.KeyEnter)
	enter("case/open/" + keep.Escape("Tug"))
	if p.app.doc.kept != "Tug" || p.app.Case().Today.MassKg != 700 {
		t.Errorf("on the screen: %q, %g kg; kept: %s", p.app.doc.kept, p.app.Case().Today.MassKg, s.names())
	}
}
