package ui

import (
	"math"

	"levelspan/game/scene"
)

// Sheet is a card over the screen with a title, a target that closes it and a content that scrolls. The app keeps it
// between frames. Its background is ID + "/outside" and its target ID + "/close"; Escape reaches the app as Press.
type Sheet struct {
	ID     string
	Title  string
	Scroll Scroller
}

const (
	sheetHead = 60.0
	sheetPad  = 16.0
)

// SheetWidth is the width of the content of a sheet that would be so wide, in area.
func SheetWidth(area scene.Rect, width float64) float64 {
	return math.Max(0, math.Min(width, area.W-16)-2*sheetPad)
}

// height is the height of the card.
func (s *Sheet) height(area scene.Rect, content float64) float64 {
	return math.Min(sheetHead+content+sheetPad, area.H-16)
}

// Show scrolls so that lo..hi of a content that has changed is seen when it is drawn next.
func (s *Sheet) Show(area scene.Rect, content, lo, hi float64) {
	s.Scroll.Fit(content+sheetPad-2, s.height(area, content)-sheetHead-2)
	s.Scroll.Reveal(lo, hi)
}

// Draw draws the sheet in the layer above, in the middle of area; all is the whole window. The content is drawn by draw
// from the top of the rectangle that it is given, as high as content.
func (s *Sheet) Draw(f *Frame, all, area scene.Rect, width, content float64, draw func(r scene.Rect)) {
	f.Modal++
	defer func() { f.Modal-- }()
	t := f.Theme
	f.Scene.FillRect(all, 0, t.Shade)
	f.Add(Control{ID: s.ID + "/outside", Role: RoleRegion, Label: s.Title, Bounds: all, Hit: all})
	w := math.Min(width, area.W-16)
	h := s.height(area, content)
	r := Snap(Centered(area, w, h))
	f.Box(r, 14, t.Panel, t.Edge)
	head, body := CutTop(r, sheetHead)
	f.Label(scene.Title, Trim(head, 4, MinTarget+12, 0, sheetPad+4), scene.Left, s.Title, t.Ink)
	view := Trim(body, 0, 2, 2, 2)
	top := f.BeginScroll(s.ID, s.Title, "", view, &s.Scroll, content+sheetPad-2)
	draw(scene.Rect{X: r.X + sheetPad, Y: top, W: w - 2*sheetPad, H: content})
	f.EndScroll(view, &s.Scroll, t.Panel)
	// After the content: the focus of a sheet that opens is on its first item.
	Button{ID: s.ID + "/close", Icon: IconClose, Label: "Close"}.Draw(f, scene.Rect{X: r.X + w - MinTarget - 8, Y: r.Y + 6, W: MinTarget, H: MinTarget})
}

// TextBox draws free text that can be edited in a box over r, which should be MinTarget high, with its control; hint is
// shown where it is empty. Edit is nil while it is not edited.
func TextBox(f *Frame, r scene.Rect, id, label, value, hint string, edit *TextEdit, refusal string) {
	d := FormField{ID: id, Label: label, Text: true, Value: value, Edit: edit, Error: refusal}
	d.box(f, r)
	in := Trim(r, 0, 12, 0, 12)
	if value == "" && (edit == nil || edit.Text == "") {
		f.Label(scene.Body, in, scene.Left, hint, f.Theme.Muted)
	}
	f.drawText(scene.Body, in, value, edit, f.Theme.Ink)
	c := d.control(r)
	c.LiveText = true
	if edit != nil {
		c.ValueText = edit.Text
	}
	f.Add(c)
}
