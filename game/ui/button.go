package ui

import (
	"math"

	"levelspan/game/scene"
)

// ButtonKind is how much a button asks for attention.
type ButtonKind uint8

// The kinds.
const (
	Quiet   ButtonKind = iota // text or icon alone
	Framed                    // with an edge
	Primary                   // filled with the accent: the one thing to do
	Danger                    // filled with red: it cannot be taken back
)

// Button is something to tap.
type Button struct {
	ID       string
	Text     string // as drawn, "" with an icon alone
	Label    string // accessible name, Text if ""
	Icon     Icon   // before the text
	Kind     ButtonKind
	Selected bool
	Disabled bool
	Bold     bool
}

func (b Button) style() scene.Style {
	if b.Bold || b.Kind == Primary || b.Kind == Danger {
		return scene.BodyBold
	}
	return scene.Body
}

// Width is what the button takes to show all of itself, at least MinTarget.
func (b Button) Width() float64 {
	w := 0.0
	if b.Text != "" {
		w = scene.Measure(b.style(), b.Text) + 24
		if b.Icon != IconNone {
			w += 32
		}
	}
	return math.Max(MinTarget, math.Ceil(w))
}

// Draw draws the button over r and adds its control.
func (b Button) Draw(f *Frame, r scene.Rect) {
	t := f.Theme
	ink, face, edge := t.Ink, scene.Color{}, scene.Color{}
	switch b.Kind {
	case Quiet:
		if b.Bold {
			ink = t.Accent
		}
	case Framed:
		face, edge = t.Key, t.Edge
	case Primary:
		face, edge, ink = t.Accent, t.Accent, t.OnBold
	case Danger:
		face, edge, ink = t.Bad, t.Bad, t.OnBold
	}
	if b.Selected {
		face, edge, ink = t.Chosen, t.Accent, t.Accent
	}
	if f.Pressed(b.ID) && !b.Disabled {
		if b.Kind >= Primary {
			face = Mix(face, t.Ink, 0.25)
			edge = face
		} else {
			face = t.KeyDown
		}
	}
	if b.Disabled {
		ink = t.Faint
		if b.Kind != Quiet {
			face, edge = t.Panel, t.Line
		}
	}
	if edge.A != 0 {
		f.Box(r, 8, face, edge)
	} else if face.A != 0 {
		f.Scene.FillRect(r, 8, face)
	}
	b.content(f, r, ink)
	label := b.Label
	if label == "" {
		label = b.Text
	}
	f.Add(Control{ID: b.ID, Role: RoleButton, Label: label, Bounds: r, Selected: b.Selected, Disabled: b.Disabled})
}

func (b Button) content(f *Frame, r scene.Rect, ink scene.Color) {
	if b.Icon == IconNone {
		f.Label(b.style(), Trim(r, 0, 4, 0, 4), scene.Center, b.Text, ink)
		return
	}
	if b.Text == "" {
		f.Icon(b.Icon, r, 24, ink)
		return
	}
	w := math.Min(r.W-8, scene.Measure(b.style(), b.Text)+32)
	in := Centered(r, w, r.H)
	sign, rest := CutLeft(in, 24)
	f.Icon(b.Icon, sign, 24, ink)
	f.Label(b.style(), Trim(rest, 0, 0, 0, 8), scene.Left, b.Text, ink)
}

// Choice is one of several, of which one is selected.
type Choice struct {
	ID       string
	Text     string
	Label    string // accessible name, Text if ""
	Selected bool
	Disabled bool
}

func (c Choice) control(role Role, r scene.Rect) Control {
	label := c.Label
	if label == "" {
		label = c.Text
	}
	return Control{ID: c.ID, Role: role, Label: label, Bounds: r, Selected: c.Selected, Disabled: c.Disabled}
}

// TabBar draws tabs side by side from the left of r, and returns the width that they took. They shrink together when r
// is too narrow; with fill they share all of r.
func TabBar(f *Frame, r scene.Rect, tabs []Choice, fill bool) float64 {
	t := f.Theme
	total := 0.0
	for i := range tabs {
		total += tabWidth(tabs[i])
	}
	k := 1.0
	if total > r.W && total > 0 {
		k = r.W / total
	}
	x := r.X
	for i := range tabs {
		w := tabWidth(tabs[i]) * k
		if fill {
			w = r.W / float64(len(tabs))
		}
		b := scene.Rect{X: x, Y: r.Y, W: w, H: r.H}
		style, ink := scene.Body, t.Muted
		switch {
		case tabs[i].Selected:
			style, ink = scene.BodyBold, t.Ink
			f.Scene.FillRect(b, 0, t.Background)
			f.Scene.FillRect(scene.Rect{X: b.X, Y: b.Y + b.H - 3, W: b.W, H: 3}, 0, t.Accent)
		case f.Pressed(tabs[i].ID):
			f.Scene.FillRect(b, 0, t.KeyDown)
		}
		f.Label(style, Trim(b, 0, 4, 0, 4), scene.Center, tabs[i].Text, ink)
		f.Add(tabs[i].control(RoleTab, b))
		x += w
	}
	return x - r.X
}

func tabWidth(c Choice) float64 {
	return math.Max(MinTarget, math.Ceil(scene.Measure(scene.BodyBold, c.Text)+42))
}

// Segments draws a switch of several positions over r, of which one is selected. Each position can be touched over at
// least MinTarget of height, also where r is lower.
func Segments(f *Frame, r scene.Rect, choices []Choice) {
	t := f.Theme
	f.Box(r, 8, t.Key, t.Edge)
	n := len(choices)
	for i := range choices {
		c := choices[i]
		b := Cell(r, n, 1, i, 0, 0)
		style, ink := scene.Body, t.Ink
		switch {
		case c.Disabled:
			ink = t.Faint
		case c.Selected:
			style, ink = scene.BodyBold, t.OnBold
			f.Scene.FillRect(Inset(b, 3), 6, t.Accent)
		case f.Pressed(c.ID):
			f.Scene.FillRect(Inset(b, 3), 6, t.KeyDown)
		}
		if i > 0 && !c.Selected && !choices[i-1].Selected {
			f.Scene.Line(b.X, b.Y+10, b.X, b.Y+b.H-10, 1, t.Line)
		}
		f.Label(style, Inset(b, 3), scene.Center, c.Text, ink)
		ctl := c.control(RoleRadio, b)
		ctl.Hit = Grow(b, b.W, MinTarget)
		f.Add(ctl)
	}
}

// SegmentsWidth is the least width at which every position shows its text.
func SegmentsWidth(choices []Choice) float64 {
	w := 0.0
	for i := range choices {
		w = math.Max(w, scene.Measure(scene.BodyBold, choices[i].Text)+24)
	}
	return math.Ceil(math.Max(w, MinTarget)) * float64(len(choices))
}
