package ui

import (
	"math"

	"levelspan/game/scene"
)

// MenuGroup is a titled part of a menu: things to do, or a choice of one, or both.
type MenuGroup struct {
	Title   string
	Items   []Button
	Choices []Choice
	Text    string // a sentence, as the version
}

// Menu is a list that opens over the screen, beside what opened it. The app keeps it between frames.
type Menu struct {
	ID     string // its background is ID + "/outside": a Tap there closes it, as Escape does
	Label  string
	Scroll Scroller
}

const menuWidth = 384.0

// Draw draws the menu in the layer above: under or over anchor, within area (the window without its insets); all is
// the whole window.
func (m *Menu) Draw(f *Frame, all, area, anchor scene.Rect, groups []MenuGroup) {
	f.Modal++
	defer func() { f.Modal-- }()
	t := f.Theme
	f.Scene.FillRect(all, 0, t.Shade)
	f.Add(Control{ID: m.ID + "/outside", Role: RoleRegion, Label: m.Label, Bounds: all, Hit: all})
	const pad = 8
	w := math.Min(menuWidth, area.W-16)
	content := pad * 2.0
	for i := range groups {
		content += groups[i].height(f, w-2*pad-16)
	}
	h := math.Min(content, area.H-16)
	r := scene.Rect{X: math.Max(area.X+8, math.Min(area.X+area.W-8-w, anchor.X+anchor.W-w)), Y: anchor.Y + anchor.H + 4, W: w, H: h}
	r.Y = math.Max(area.Y+8, math.Min(area.Y+area.H-8-h, r.Y))
	f.Box(r, 12, t.Panel, t.Edge)
	view := Inset(r, 2)
	y := f.BeginScroll(m.ID, m.Label, "", view, &m.Scroll, content-4) + pad
	for i := range groups {
		gh := groups[i].height(f, w-2*pad-16)
		groups[i].draw(f, scene.Rect{X: r.X + pad, Y: y, W: w - 2*pad, H: gh})
		y += gh
		if i < len(groups)-1 {
			f.Scene.Line(r.X+pad+8, y-4, r.X+w-pad-8, y-4, 1, t.Line)
		}
	}
	f.EndScroll(view, &m.Scroll, t.Panel)
}

// stacked reports whether the choices stand under each other.
func (g *MenuGroup) stacked(w float64) bool { return SegmentsWidth(g.Choices) > w }

// beside reports whether title and switch share a line.
func (g *MenuGroup) beside(w float64) bool {
	return len(g.Choices) > 0 && g.Title != "" && scene.Measure(scene.Body, g.Title)+20+SegmentsWidth(g.Choices) <= w
}

func (g *MenuGroup) height(f *Frame, w float64) float64 {
	h := 8.0
	if g.Title != "" && !g.beside(w) {
		h += 30
	}
	switch {
	case len(g.Choices) == 0:
	case g.stacked(w):
		h += MinTarget * float64(len(g.Choices))
	default:
		h += 56
	}
	h += 52 * float64(len(g.Items))
	if g.Text != "" {
		h += f.ParagraphHeight(scene.Small, w, g.Text) + 12
	}
	return h
}

func (g *MenuGroup) draw(f *Frame, r scene.Rect) {
	t := f.Theme
	in := Trim(r, 0, 8, 0, 8)
	var line scene.Rect
	beside := g.beside(in.W)
	if g.Title != "" && !beside {
		line, in = CutTop(in, 30)
		f.Label(scene.Small, line, scene.Left, g.Title, t.Muted)
	}
	switch {
	case len(g.Choices) == 0:
	case g.stacked(in.W):
		for i := range g.Choices {
			line, in = CutTop(in, MinTarget)
			RadioRow(f, line, g.Choices[i])
		}
	default:
		line, in = CutTop(in, 56)
		line = Trim(line, 4, 0, 8, 0)
		if beside {
			f.Label(scene.Body, line, scene.Left, g.Title, t.Ink)
			line, _ = CutRight(line, SegmentsWidth(g.Choices))
		}
		Segments(f, line, g.Choices)
	}
	for i := range g.Items {
		line, in = CutTop(in, 52)
		menuItem(f, scene.Rect{X: r.X, Y: line.Y, W: r.W, H: line.H}, g.Items[i])
	}
	if g.Text != "" {
		f.Paragraph(scene.Small, Trim(in, 4, 0, 0, 0), g.Text, t.Muted)
	}
}

// menuItem draws a button as a row: sign, text, a tick where it is selected.
func menuItem(f *Frame, r scene.Rect, b Button) {
	t := f.Theme
	ink := t.Ink
	if b.Disabled {
		ink = t.Faint
	} else if f.Pressed(b.ID) {
		f.Scene.FillRect(r, 8, t.KeyDown)
	}
	x := 8.0
	if b.Icon != IconNone {
		f.Icon(b.Icon, scene.Rect{X: r.X + 8, Y: r.Y, W: 28, H: r.H}, 24, ink)
		x = 48
	}
	f.Label(scene.Body, Trim(r, 0, 40, 0, x), scene.Left, b.Text, ink)
	if b.Selected {
		f.Icon(IconCheck, scene.Rect{X: r.X + r.W - 40, Y: r.Y, W: 32, H: r.H}, 22, t.Accent)
	}
	label := b.Label
	if label == "" {
		label = b.Text
	}
	f.Add(Control{ID: b.ID, Role: RoleButton, Label: label, Bounds: r, Selected: b.Selected, Disabled: b.Disabled})
}
