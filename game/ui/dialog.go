package ui

import (
	"math"
	"strings"

	"levelspan/game/scene"
)

// Dialog asks or tells something that comes before everything else. The app keeps it between frames.
type Dialog struct {
	ID      string
	Title   string
	Text    string // paragraphs, with line feeds between them
	Icon    Icon
	Buttons []Button // the harmless one first: it has the focus
	Scroll  Scroller
}

// Draw draws the dialog in the layer above, in the middle of area; all is the whole window.
func (d *Dialog) Draw(f *Frame, all, area scene.Rect) {
	f.Modal++
	defer func() { f.Modal-- }()
	t := f.Theme
	f.Scene.FillRect(all, 0, t.Shade)
	f.Add(Control{ID: d.ID + "/outside", Role: RoleRegion, Label: d.Title, Bounds: all, Hit: all})
	const pad = 24
	w := math.Min(520, area.W-24)
	in := w - 2*pad
	indent := 0.0
	if d.Icon != IconNone {
		indent = 40
	}
	title := math.Max(32, f.ParagraphHeight(scene.Title, in-indent, d.Title))
	text := f.ParagraphHeight(scene.Body, in-8, d.Text)
	buttons := dialogRow(d.Buttons, in)
	h := math.Min(area.H-24, pad+title+12+text+20+buttons+pad)
	r := Centered(area, w, h)
	r.X, r.Y = math.Round(r.X), math.Round(r.Y)
	f.Box(r, 14, t.Panel, t.Edge)
	body := Inset(r, pad)
	head, body := CutTop(body, title)
	if d.Icon != IconNone {
		f.Icon(d.Icon, scene.Rect{X: head.X, Y: head.Y, W: 30, H: 30}, 28, t.Caution)
	}
	f.Paragraph(scene.Title, Trim(head, 0, 0, 0, indent), d.Title, t.Ink)
	foot, body := CutBottom(body, buttons)
	d.buttons(f, foot)
	view := Trim(body, 12, 0, 20, 0)
	y := f.BeginScroll(d.ID+"/text", d.Title, d.Text, view, &d.Scroll, text)
	f.Paragraph(scene.Body, scene.Rect{X: view.X, Y: y, W: view.W - 8, H: text + 1}, d.Text, t.Ink)
	f.EndScroll(view, &d.Scroll, t.Panel)
}

// dialogRow is the height of the buttons: side by side, or under each other where there is no room.
func dialogRow(buttons []Button, w float64) float64 {
	if dialogWidth(buttons) <= w {
		return MinTarget
	}
	return float64(len(buttons))*(MinTarget+8) - 8
}

func dialogWidth(buttons []Button) float64 {
	w := -8.0
	for _, b := range buttons {
		w += math.Max(96, b.Width()) + 8
	}
	return w
}

func (d *Dialog) buttons(f *Frame, r scene.Rect) {
	if dialogWidth(d.Buttons) > r.W {
		for i, b := range d.Buttons {
			b.Draw(f, scene.Rect{X: r.X, Y: r.Y + float64(i)*(MinTarget+8), W: r.W, H: MinTarget})
		}
		return
	}
	x := r.X + r.W - dialogWidth(d.Buttons)
	for _, b := range d.Buttons {
		w := math.Max(96, b.Width())
		b.Draw(f, scene.Rect{X: x, Y: r.Y, W: w, H: MinTarget})
		x += w + 8
	}
}

// Toast draws a notice for a moment over the lower part of area: it takes no input, and does not hide the foot.
func Toast(f *Frame, area scene.Rect, text string) {
	if text == "" {
		return
	}
	w := math.Min(area.W-32, scene.Measure(scene.Body, text)+48)
	h := f.ParagraphHeight(scene.Body, w-48, text) + 24
	r := scene.Rect{X: math.Round(area.X + (area.W-w)/2), Y: math.Round(area.Y + area.H - h - 24), W: w, H: h}
	f.Scene.FillRect(r, 12, f.Theme.Ink)
	f.Paragraph(scene.Body, Trim(r, 12, 24, 0, 24), text, f.Theme.Background)
}

// BannerKind is what a banner says.
type BannerKind uint8

// The kinds.
const (
	BannerCaution BannerKind = iota
	BannerBad
)

// Banner is a warning in plain sight, with as many sentences as there are; with an ID it has a target that closes it.
type Banner struct {
	ID    string
	Kind  BannerKind
	Texts []string
}

// Text is all sentences, one a line.
func (b Banner) Text() string { return strings.Join(b.Texts, "\n") }

func (b Banner) inner(w float64) float64 {
	w -= 12 + 32 + 12
	if b.ID != "" {
		w -= MinTarget
	}
	return w
}

// Height is the height that the banner takes in a width, 0 without text.
func (b Banner) Height(f *Frame, w float64) float64 {
	if len(b.Texts) == 0 {
		return 0
	}
	h := 16.0
	for _, s := range b.Texts {
		h += f.ParagraphHeight(scene.Body, b.inner(w), s)
	}
	if b.ID != "" {
		h = math.Max(h, MinTarget)
	}
	return math.Ceil(h)
}

// Draw draws the banner over r. Sentences that have no room are not drawn: give it its Height.
func (b Banner) Draw(f *Frame, r scene.Rect) {
	if len(b.Texts) == 0 {
		return
	}
	t := f.Theme
	back, ink := t.CautionBack, t.Caution
	if b.Kind == BannerBad {
		back, ink = t.BadBack, t.Bad
	}
	f.Scene.FillRect(r, 8, back)
	f.Scene.FillRect(scene.Rect{X: r.X, Y: r.Y, W: 4, H: r.H}, 0, ink)
	f.Icon(IconWarning, scene.Rect{X: r.X + 12, Y: r.Y + 8, W: 24, H: scene.LineHeight(scene.Body)}, 22, ink)
	y := r.Y + 8
	for _, s := range b.Texts {
		y += f.Paragraph(scene.Body, scene.Rect{X: r.X + 44, Y: y, W: b.inner(r.W), H: r.Y + r.H - y}, s, t.Ink)
	}
	if b.ID != "" {
		Button{ID: b.ID, Icon: IconClose, Label: "Dismiss"}.Draw(f, scene.Rect{X: r.X + r.W - MinTarget, Y: r.Y + (r.H-MinTarget)/2, W: MinTarget, H: MinTarget})
	}
}
