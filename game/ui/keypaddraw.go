package ui

import (
	"math"

	"levelspan/game/scene"
)

// The measures of the keypad, logical pixels.
const (
	cardWidth = 408.0
	cardPad   = 20.0
	keyGap    = 8.0
	keyHigh   = 68.0
)

// padKey is one drawn key.
type padKey struct {
	id, text, label string
	icon            Icon
}

// padKeys are the keys, four in a row; nothing writes to it.
var padKeys = [16]padKey{
	{"key/7", "7", "", 0}, {"key/8", "8", "", 0}, {"key/9", "9", "", 0}, {"key/backspace", "", "Backspace", IconBackspace},
	{"key/4", "4", "", 0}, {"key/5", "5", "", 0}, {"key/6", "6", "", 0}, {"key/clear", "Clear", "", 0},
	{"key/1", "1", "", 0}, {"key/2", "2", "", 0}, {"key/3", "3", "", 0}, {"key/cancel", "Cancel", "", 0},
	{"key/sign", "±", "Plus or minus", 0}, {"key/0", "0", "", 0}, {"key/point", ".", "Decimal point", 0}, {"key/ok", "OK", "", 0},
}

// Draw draws the keypad in the layer above what was drawn: a card beside anchor where there is room, else a sheet at
// the lower edge of area, which is the window without its safe-area insets; all is the whole window.
func (k *Keypad) Draw(f *Frame, all, area, anchor scene.Rect) {
	if !k.Open {
		return
	}
	f.Modal++
	defer func() { f.Modal-- }()
	f.Scene.FillRect(all, 0, f.Theme.Shade)
	f.Add(Control{ID: "key/outside", Role: RoleRegion, Label: k.Title, Bounds: all, Hit: all})
	head := k.headHeight()
	want := head + 4*keyHigh + 3*keyGap + 2*cardPad
	card := area
	switch {
	case area.W >= 680 && area.H >= want+16:
		card = beside(area, anchor, cardWidth, want)
	case area.W > area.H && area.W >= 460 && area.H < 460:
		card = Centered(area, 720, math.Min(area.H, 4*keyHigh+3*keyGap+2*cardPad))
		k.card(f, card)
		left, right := CutLeft(Inset(card, math.Min(cardPad, 12)), math.Min(300, card.W*0.42))
		k.head(f, Trim(left, 0, 12, 0, 0))
		k.keys(f, right)
		return
	default:
		w := math.Min(area.W, 560)
		card = scene.Rect{X: area.X + (area.W-w)/2, W: w, H: math.Min(area.H, head+4*keyHigh+3*keyGap+2*12)}
		card.Y = area.Y + area.H - card.H
		k.card(f, scene.Rect{X: card.X, Y: card.Y, W: card.W, H: all.Y + all.H - card.Y + 24})
		top, rest := CutTop(Inset(card, 12), head)
		k.head(f, top)
		k.keys(f, rest)
		return
	}
	k.card(f, card)
	top, rest := CutTop(Inset(card, cardPad), head)
	k.head(f, top)
	k.keys(f, rest)
}

func (k *Keypad) card(f *Frame, r scene.Rect) {
	f.Box(r, 16, f.Theme.Panel, f.Theme.Edge)
}

// beside is a card right of anchor, else left of, below or above it, else in the middle of area.
func beside(area, anchor scene.Rect, w, h float64) scene.Rect {
	const gap = 24
	r := Centered(area, w, h)
	if anchor.W <= 0 || anchor.H <= 0 {
		return r
	}
	r.Y = math.Max(area.Y+8, math.Min(area.Y+area.H-h-8, anchor.Y+anchor.H/2-h/2))
	switch {
	case anchor.X+anchor.W+gap+w <= area.X+area.W-8:
		r.X = anchor.X + anchor.W + gap
	case anchor.X-gap-w >= area.X+8:
		r.X = anchor.X - gap - w
	case anchor.Y+anchor.H+gap+h <= area.Y+area.H-8:
		r.Y = anchor.Y + anchor.H + gap
	case anchor.Y-gap-h >= area.Y+8:
		r.Y = anchor.Y - gap - h
	}
	return Snap(r)
}

const entryHigh = 64.0

func (k *Keypad) headHeight() float64 {
	h := scene.LineHeight(scene.Title) + 4 + scene.LineHeight(scene.Small) + 10 + entryHigh + 8
	h += 2*scene.LineHeight(scene.Small) + 8
	if k.None != "" {
		h += MinTarget + keyGap
	}
	return math.Ceil(h)
}

// head draws title, range, entry and refusal.
func (k *Keypad) head(f *Frame, r scene.Rect) {
	t := f.Theme
	line, r := CutTop(r, scene.LineHeight(scene.Title))
	now := ""
	if k.Now != "" {
		now = "now " + k.Now
	}
	nw := scene.Measure(scene.Small, now)
	f.Label(scene.Title, Trim(line, 0, nw+12, 0, 0), scene.Left, k.Title, t.Ink)
	f.Label(scene.Small, line, scene.Right, now, t.Muted)
	_, r = CutTop(r, 4)
	line, r = CutTop(r, scene.LineHeight(scene.Small))
	f.Label(scene.Small, line, scene.Left, k.Range, t.Muted)
	_, r = CutTop(r, 10)
	box, r := CutTop(r, entryHigh)
	refusal := k.Refusal()
	red := refusal != "" && (k.stern || !k.unfinished())
	k.entryLine(f, box, refusal, red)
	_, r = CutTop(r, 8)
	line, r = CutTop(r, 2*scene.LineHeight(scene.Small))
	switch {
	case red:
		sign, rest := CutLeft(line, 24)
		sign.H = scene.LineHeight(scene.Small)
		f.Icon(IconWarning, sign, 18, t.Bad)
		f.Paragraph(scene.SmallBold, rest, refusal, t.Bad)
	case refusal != "":
		f.Paragraph(scene.Small, line, refusal, t.Muted)
	}
	if k.None != "" {
		_, r = CutTop(r, 4)
		line, _ = CutTop(r, MinTarget)
		Button{ID: "key/none", Text: k.None, Kind: Framed}.Draw(f, line)
	}
}

func (k *Keypad) entryLine(f *Frame, box scene.Rect, refusal string, red bool) {
	t := f.Theme
	edge, ink := t.Accent, t.Ink
	if red {
		edge, ink = t.Bad, t.Bad
	}
	f.boxed(box, 10, 2, t.Key, edge)
	in := Trim(box, 0, 14, 0, 14)
	unit := scene.Measure(scene.Body, k.Unit)
	f.Label(scene.Body, in, scene.Right, k.Unit, t.Muted)
	text := k.Shown()
	room := Trim(in, 0, unit+12, 0, 0)
	style := scene.FigureBig
	if scene.Measure(style, text) > room.W {
		style = scene.Figure
	}
	if scene.Measure(style, text) > room.W {
		style = scene.Body
	}
	f.Label(style, room, scene.Right, text, ink)
	f.Scene.FillRect(scene.Rect{X: room.X + room.W + 3, Y: box.Y + 14, W: 2.5, H: box.H - 28}, 1, t.Accent)
	spoken := text
	if spoken != "" && k.Unit != "" {
		spoken += " " + k.Unit
	}
	v, _ := k.Value()
	f.Add(Control{ID: "key/entry", Role: RoleField, Label: k.Title + ", " + k.Range, ValueText: spoken, Value: v,
		Min: k.Min, Max: k.Max, Bounds: box, Error: refusal})
}

func (k *Keypad) keys(f *Frame, r scene.Rect) {
	t := f.Theme
	_, ready := k.Value()
	ready = ready && k.Refusal() == ""
	for i := range padKeys {
		key := &padKeys[i]
		b := Cell(r, 4, 4, i%4, i/4, keyGap)
		face, edge, ink, style := t.Key, t.Edge, t.Ink, scene.Figure
		disabled := key.id == "key/sign" && !k.Signed || key.id == "key/point" && k.Decimals == 0
		switch {
		case disabled:
			face, edge, ink = t.Panel, t.Line, t.Faint
		case key.id == "key/ok" && ready:
			face, edge, ink, style = t.Accent, t.Accent, t.OnBold, scene.Title
		case i%4 == 3:
			face, style = t.Bar, scene.BodyBold
			if key.id == "key/ok" {
				ink, style = t.Muted, scene.Title
			}
		}
		if f.Pressed(key.id) && !disabled {
			face = Mix(face, t.Ink, 0.2)
		}
		f.Box(b, 10, face, edge)
		if key.icon != IconNone {
			f.Icon(key.icon, b, 30, ink)
		} else {
			f.Label(style, Inset(b, 2), scene.Center, key.text, ink)
		}
		label := key.label
		if label == "" {
			label = key.text
		}
		f.Add(Control{ID: key.id, Role: RoleButton, Label: label, Bounds: b, Disabled: disabled})
	}
}
