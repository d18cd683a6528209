package ui

import (
	"math"

	"levelspan/game/scene"
)

// valueWidth is the room for value and unit at the right of a row, given the widest unit of the form.
func valueWidth(unit float64) float64 { return 10 + 76 + 6 + unit + 10 }

// body is the width of a row without the column of "?" targets.
func body(w float64) float64 { return w - helpWidth }

// stacked reports whether the choices have no room in one switch and stand under each other.
func (d *FormField) stacked(w float64) bool { return SegmentsWidth(d.Choices) > body(w) }

// under is the width of label and small text.
func (d *FormField) under(w, unit float64) float64 {
	if d.Choices != nil || d.Text {
		return body(w)
	}
	return body(w) - valueWidth(unit) - 12
}

// small is the text under the label: range and note.
func (d *FormField) small() string {
	if d.Range != "" && d.Note != "" {
		return d.Range + " · " + d.Note
	}
	return d.Range + d.Note
}

const errorIndent = 24 // of a refusal, for its sign

// height is the height of a row in a width; open: with its help and refusal.
func (d *FormField) height(f *Frame, w, unit float64, open bool) float64 {
	h := d.mainHeight(f, w, unit)
	if open {
		h += d.errorHeight(f, w) + d.helpHeight(f, w)
	}
	return h
}

func (d *FormField) mainHeight(f *Frame, w, unit float64) float64 {
	caption := d.captionHeight(f, d.under(w, unit))
	switch {
	case d.Choices != nil && d.stacked(w):
		return math.Ceil(10 + caption + 6 + boxHigh*float64(len(d.Choices)) + 10)
	case d.Choices != nil, d.Text:
		return math.Ceil(10 + caption + 6 + boxHigh + 10)
	}
	return math.Ceil(math.Max(rowHigh, caption+14))
}

func (d *FormField) errorHeight(f *Frame, w float64) float64 {
	if d.Error == "" {
		return 0
	}
	return math.Ceil(f.ParagraphHeight(scene.Small, w-errorIndent, d.Error) + 8)
}

func (d *FormField) helpHeight(f *Frame, w float64) float64 {
	if !d.HelpOpen || d.Help == "" {
		return 0
	}
	return math.Ceil(f.ParagraphHeight(scene.Small, w-24, d.Help) + 24)
}

func (d *FormField) draw(f *Frame, r scene.Rect, unit float64) {
	t := f.Theme
	row := r
	if h := d.helpHeight(f, r.W); h > 0 {
		var help scene.Rect
		help, row = CutBottom(row, h)
		help, _ = CutTop(help, h-8)
		f.Scene.FillRect(help, 8, t.Chosen)
		f.Paragraph(scene.Small, Trim(help, 8, 12, 0, 12), d.Help, t.Ink)
	}
	if h := d.errorHeight(f, r.W); h > 0 {
		var why scene.Rect
		why, row = CutBottom(row, h)
		f.Icon(IconWarning, scene.Rect{X: why.X, Y: why.Y, W: 18, H: scene.LineHeight(scene.Small)}, 17, t.Bad)
		f.Paragraph(scene.Small, Trim(why, 0, 0, 0, errorIndent), d.Error, t.Bad)
	}
	main := row
	main.W = body(row.W)
	switch {
	case d.Choices != nil:
		d.choices(f, main)
	case d.Text:
		d.text(f, main)
	default:
		d.number(f, main, unit)
	}
	if d.Help != "" {
		q := scene.Rect{X: row.X + row.W - helpWidth + 4, Y: row.Y + 6, W: helpWidth - 4, H: MinTarget}
		if d.Choices == nil && !d.Text {
			q.Y = row.Y + (row.H-MinTarget)/2
		}
		ink := t.Muted
		if d.HelpOpen {
			ink = t.Accent
		}
		if f.Pressed("help/" + d.ID) {
			f.Scene.Circle(q.X+q.W/2, q.Y+q.H/2, 18, t.KeyDown)
		}
		f.questionMark(q, ink)
		f.Add(Control{ID: "help/" + d.ID, Role: RoleButton, Label: "Help: " + d.Label, Bounds: q, Selected: d.HelpOpen})
	}
	f.Scene.Line(r.X, r.Y+r.H-0.5, r.X+r.W, r.Y+r.H-0.5, 1, t.Line)
}

// questionMark is the sign of the target that opens help.
func (f *Frame) questionMark(r scene.Rect, ink scene.Color) {
	const radius = 11
	c := scene.Rect{X: r.X + r.W/2 - radius, Y: r.Y + r.H/2 - radius, W: 2 * radius, H: 2 * radius}
	f.Outline(c, radius, 1.5, ink)
	f.Label(scene.SmallBold, c, scene.Center, "?", ink)
}

// caption draws label and small text from the top of r, and returns the height taken.
func (d *FormField) caption(f *Frame, r scene.Rect) float64 {
	t := f.Theme
	ink := t.Ink
	if d.Disabled {
		ink = t.Faint
	}
	h := f.Paragraph(scene.Body, r, d.Label, ink)
	if text := d.small(); text != "" {
		h += f.Paragraph(scene.Small, Trim(r, h, 0, 0, 0), text, t.Muted)
	}
	return h
}

// captionHeight is what caption takes.
func (d *FormField) captionHeight(f *Frame, w float64) float64 {
	h := f.ParagraphHeight(scene.Body, w, d.Label)
	if text := d.small(); text != "" {
		h += f.ParagraphHeight(scene.Small, w, text)
	}
	return h
}

func (d *FormField) control(r scene.Rect) Control {
	value := d.Value
	if value != "" && d.Unit != "" {
		value += " " + d.Unit
	}
	return Control{ID: d.ID, Role: RoleField, Label: d.Label, ValueText: value, Value: d.Number, Min: d.Min, Max: d.Max,
		Bounds: r, Disabled: d.Disabled, Error: d.Error}
}

// edge is the colour of the box around a value.
func (d *FormField) edge(t *Theme) scene.Color {
	switch {
	case d.Error != "":
		return t.Bad
	case d.Active || d.Edit != nil:
		return t.Accent
	case d.Disabled:
		return t.Line
	}
	return t.Edge
}

func (d *FormField) number(f *Frame, r scene.Rect, unit float64) {
	t := f.Theme
	touch := Trim(r, 0, -4, 0, -8) // text keeps off the edge of what is touched
	if f.Pressed(d.ID) && !d.Disabled {
		f.Scene.FillRect(touch, 8, t.KeyDown)
	}
	vw := valueWidth(unit)
	if f.Seen(r) {
		left := Trim(r, 0, vw+12, 0, 0)
		h := d.captionHeight(f, left.W)
		d.caption(f, Trim(left, math.Max(0, (r.H-h)/2), 0, 0, 0))
		box := scene.Rect{X: r.X + r.W - vw, Y: r.Y + (r.H-boxHigh)/2, W: vw, H: boxHigh}
		d.box(f, box)
		in := Trim(box, 0, 10, 0, 10)
		ink, value := t.Ink, d.Value
		if d.Disabled {
			ink = t.Faint
		}
		if value == "" {
			value, ink = "–", t.Muted
		}
		cell := Trim(in, 0, unit+6, 0, 0)
		style := scene.Title
		if scene.Measure(style, value) > cell.W {
			style = scene.BodyBold
		}
		if scene.Measure(style, value) > cell.W {
			style = scene.SmallBold
		}
		f.Label(style, cell, scene.Right, value, ink)
		f.Scene.Label(scene.Small, in.X+in.W-unit, Baseline(style, cell), scene.Left, d.Unit, t.Muted)
	}
	f.Add(d.control(touch))
}

// box draws the frame of a value, heavier where it says something.
func (d *FormField) box(f *Frame, r scene.Rect) {
	t := f.Theme
	face := t.Key
	if d.Disabled {
		face = t.Panel
	}
	if d.Error != "" || d.Active || d.Edit != nil {
		f.boxed(r, 8, 2, face, d.edge(t))
		return
	}
	f.Box(r, 8, face, d.edge(t))
}

func (d *FormField) choices(f *Frame, r scene.Rect) {
	h := 10 + d.caption(f, Trim(r, 10, 0, 0, 0)) + 6
	w := SegmentsWidth(d.Choices)
	if w <= r.W {
		Segments(f, scene.Rect{X: r.X, Y: r.Y + h, W: math.Min(r.W, w*1.25), H: boxHigh}, d.Choices)
		return
	}
	for i := range d.Choices {
		RadioRow(f, scene.Rect{X: r.X, Y: r.Y + h + boxHigh*float64(i), W: r.W, H: boxHigh}, d.Choices[i])
	}
}

// RadioRow draws one choice of a list as a row with a round mark.
func RadioRow(f *Frame, r scene.Rect, c Choice) {
	t := f.Theme
	style, ink := scene.Body, t.Ink
	switch {
	case c.Disabled:
		ink = t.Faint
	case c.Selected:
		style = scene.BodyBold
		f.Scene.FillRect(r, 6, t.Chosen)
	}
	if f.Pressed(c.ID) && !c.Disabled {
		f.Scene.FillRect(r, 6, t.KeyDown)
	}
	x, y := r.X+22, r.Y+r.H/2
	ring := t.Edge
	if c.Selected {
		ring = t.Accent
	}
	f.Scene.Circle(x, y, 10, ring)
	f.Scene.Circle(x, y, 8, t.Key)
	if c.Selected {
		f.Scene.Circle(x, y, 5, t.Accent)
	}
	f.Label(style, Trim(r, 0, 8, 0, 44), scene.Left, c.Text, ink)
	f.Add(c.control(RoleRadio, r))
}

func (d *FormField) text(f *Frame, r scene.Rect) {
	t := f.Theme
	h := 10 + d.caption(f, Trim(r, 10, 0, 0, 0)) + 6
	box := scene.Rect{X: r.X, Y: r.Y + h, W: r.W, H: boxHigh}
	d.box(f, box)
	ink := t.Ink
	if d.Disabled {
		ink = t.Faint
	}
	f.drawText(scene.Body, Trim(box, 0, 12, 0, 12), d.Value, d.Edit, ink)
	c := d.control(box)
	c.LiveText = true
	if d.Edit != nil {
		c.ValueText = d.Edit.Text
	}
	f.Add(c)
}

// TextStart is where the text of a field begins, given its control's Bounds, for TextEdit.CaretAt.
func TextStart(bounds scene.Rect) float64 { return bounds.X + 12 }
