package ui

import (
	"math"

	"levelspan/game/scene"
)

// The measures of a rail, logical pixels.
const (
	handleRadius = 20.0 // as drawn
	handleHit    = 64.0 // as touched: gloves
	railWidth    = 6.0  // of the track
	zoneWidth    = 16.0 // of zones, and of the track of a rail without a handle
)

// RailMark is a named place on a rail.
type RailMark struct {
	At    float64
	Text  string
	Color scene.Color // zero: muted
	Bold  bool
}

// RailZone is a coloured stretch of a rail.
type RailZone struct {
	From, To         float64
	FadeLow, FadeTop float64 // lengths over which it fades at its lower and upper end, in values
	Color            scene.Color
}

// Rail is a scale with a handle to drag, or without an ID one to read. Values are in the unit shown.
type Rail struct {
	ID        string
	Title     string // drawn at the beginning
	Label     string // accessible name, Title if ""
	ValueText string // as shown at the handle, "760 kg"
	Spoken    string // value for assistive technology, ValueText if ""
	Notes     []string
	Vertical  bool
	Min, Max  float64
	Value     float64
	Step      float64 // arrow keys
	Page      float64 // Page Up, Page Down
	SI        float64 // SI units in one unit shown; 0 means 1. The control's values are SI
	Offset    float64 // SI value of zero shown
	Ticks     []Tick
	Marks     []RailMark
	Zones     []RailZone
	Filled    bool        // Min..Value is drawn strong
	Warn      bool        // the value is drawn in the colour of caution
	Wide      bool        // a drag may begin anywhere along the rail
	Pad       float64     // room before the track's ends; 0 means the radius of the handle (or 0 without one)
	Ink       scene.Color // of the value; zero: ink
	Disabled  bool
	Error     string
}

func (rl *Rail) pad() float64 {
	if rl.Pad != 0 || rl.ID == "" {
		return rl.Pad
	}
	return handleRadius
}

// RailHeight is the height that a horizontal rail needs.
func (rl *Rail) RailHeight() float64 {
	if rl.ID == "" {
		return rl.above() + zoneWidth/2 + 10 + scene.LineHeight(scene.Small)
	}
	h := rl.above() + handleRadius + 6 + scene.LineHeight(scene.Small)
	if len(rl.Marks) > 0 && len(rl.Ticks) > 0 {
		h += scene.LineHeight(scene.Small)
	}
	return h
}

// above is the room over the middle of a horizontal track.
func (rl *Rail) above() float64 {
	if rl.ID == "" {
		return scene.LineHeight(scene.Small) + zoneWidth/2 + 4
	}
	return scene.LineHeight(scene.Title) + handleRadius + 4
}

// TitleHeight is what a vertical rail's title takes at the top of its area.
func (rl *Rail) titleHeight() float64 {
	if rl.Title == "" {
		return 0
	}
	return scene.LineHeight(scene.Small) + 6
}

// tickRoom is the width of the tick labels left of a vertical track.
func (rl *Rail) tickRoom() float64 {
	w := 0.0
	for i := range rl.Ticks {
		w = math.Max(w, scene.Measure(scene.Small, rl.Ticks[i].Text))
	}
	return math.Max(w+16, rl.pad()+2)
}

// Scale is where values lie when the rail is drawn over area: x or, vertical, y. A rail whose ends are no numbers, or
// not in order, goes from 0 to 1.
func (rl *Rail) Scale(area scene.Rect) Scale {
	var s Scale
	s.V0, s.V1 = rl.ends()
	if rl.Vertical {
		s.P0, s.P1 = area.Y+area.H-rl.pad(), area.Y+rl.titleHeight()+rl.pad()
		if s.P1 > s.P0 {
			s.P1 = s.P0
		}
		return s
	}
	s.P0, s.P1 = area.X+rl.pad(), math.Max(area.X+rl.pad(), area.X+area.W-rl.pad())
	return s
}

func (rl *Rail) ends() (lo, hi float64) {
	if !finite(rl.Min, rl.Max) || rl.Min > rl.Max {
		return 0, 1
	}
	return rl.Min, rl.Max
}

// Middle is the centre line of the track: y or, vertical, x.
func (rl *Rail) Middle(area scene.Rect) float64 {
	if rl.Vertical {
		return math.Round(area.X + rl.tickRoom())
	}
	return math.Round(area.Y + rl.above())
}

// At is where the handle's centre lies.
func (rl *Rail) At(area scene.Rect) (x, y float64) {
	s := rl.Scale(area)
	p := s.Pos(s.Clamp(rl.Value))
	if rl.Vertical {
		return rl.Middle(area), p
	}
	return p, rl.Middle(area)
}

// Dragged is the value that a drag's action means, given the value at its start.
func (rl *Rail) Dragged(area scene.Rect, start float64, a Action) float64 {
	if rl.Vertical {
		return rl.Scale(area).Moved(start, a.Y-a.Y0)
	}
	return rl.Scale(area).Moved(start, a.X-a.X0)
}

func (rl *Rail) si(v float64) float64 {
	if rl.SI == 0 {
		return v + rl.Offset
	}
	return v*rl.SI + rl.Offset
}

// Draw draws the rail over area and adds its slider.
func (rl *Rail) Draw(f *Frame, area scene.Rect) {
	rl.track(f, area)
	if rl.Vertical {
		rl.drawVertical(f, area)
	} else {
		rl.drawHorizontal(f, area)
	}
	if rl.ID == "" {
		return
	}
	x, y := rl.At(area)
	rl.handle(f, x, y)
	b := scene.Rect{X: x - handleRadius, Y: y - handleRadius, W: 2 * handleRadius, H: 2 * handleRadius}
	s := rl.Scale(area)
	c := Control{ID: rl.ID, Role: RoleSlider, Label: rl.Label, ValueText: rl.Spoken, Value: rl.si(s.Clamp(rl.Value)),
		Min: rl.si(s.V0), Max: rl.si(s.V1), Step: rl.si(rl.Step) - rl.Offset, Page: rl.si(rl.Page) - rl.Offset,
		Bounds: b, Hit: Grow(b, handleHit, handleHit), Drag: AxisX, Disabled: rl.Disabled, Error: rl.Error}
	if rl.Vertical {
		c.Drag = AxisY
	}
	if c.Label == "" {
		c.Label = rl.Title
	}
	if c.ValueText == "" {
		c.ValueText = rl.ValueText
	}
	if rl.Wide {
		c.Hit = rl.reach(area, c.Hit)
	}
	f.Add(c)
}

// reach is the touchable length of the whole track.
func (rl *Rail) reach(area, handle scene.Rect) scene.Rect {
	s, m := rl.Scale(area), rl.Middle(area)
	if rl.Vertical {
		return scene.Rect{X: m - handleHit/2, Y: s.P1 - handleHit/2, W: handleHit, H: s.P0 - s.P1 + handleHit}
	}
	return scene.Rect{X: s.P0 - handleHit/2, Y: m - handleHit/2, W: s.P1 - s.P0 + handleHit, H: handleHit}
}

// span is the rectangle of a stretch of the track, width px across.
func (rl *Rail) span(area scene.Rect, from, to, width float64) scene.Rect {
	s, m := rl.Scale(area), rl.Middle(area)
	a, b := s.Pos(s.Clamp(from)), s.Pos(s.Clamp(to))
	a, b = math.Min(a, b), math.Max(a, b)
	if rl.Vertical {
		return scene.Rect{X: m - width/2, Y: a, W: width, H: b - a}
	}
	return scene.Rect{X: a, Y: m - width/2, W: b - a, H: width}
}

func (rl *Rail) track(f *Frame, area scene.Rect) {
	width := railWidth
	if rl.ID == "" {
		width = zoneWidth
	}
	t := f.Theme
	f.Scene.FillRect(rl.span(area, rl.Min, rl.Max, width), width/2, t.Track)
	for i := range rl.Zones {
		rl.zone(f, area, &rl.Zones[i])
	}
	if rl.Filled {
		ink := t.Ink
		if rl.Warn {
			ink = t.Caution
		}
		f.Scene.FillRect(rl.span(area, rl.Min, rl.Value, width), width/2, ink)
	}
}

// zone draws a stretch with its fading ends.
func (rl *Rail) zone(f *Frame, area scene.Rect, z *RailZone) {
	if !(z.To > z.From) || !finite(z.From, z.To, z.FadeLow, z.FadeTop) {
		return
	}
	low := math.Min(math.Max(0, z.FadeLow), z.To-z.From)
	top := math.Min(math.Max(0, z.FadeTop), z.To-z.From-low)
	color := Over(z.Color, f.Theme.Background) // opaque, so that the track does not show through as a stripe
	clear := Fade(color, 0)
	if low > 0 {
		r := rl.span(area, z.From, z.From+low, zoneWidth)
		if rl.Vertical {
			f.Scene.Gradient(r, color, clear, true)
		} else {
			f.Scene.Gradient(r, clear, color, false)
		}
	}
	if z.To-z.From > low+top {
		f.Scene.FillRect(rl.span(area, z.From+low, z.To-top, zoneWidth), 0, color)
	}
	if top > 0 {
		r := rl.span(area, z.To-top, z.To, zoneWidth)
		if rl.Vertical {
			f.Scene.Gradient(r, clear, color, true)
		} else {
			f.Scene.Gradient(r, color, clear, false)
		}
	}
}

// handle draws the round handle with its grip lines, larger while it is held.
func (rl *Rail) handle(f *Frame, x, y float64) {
	t := f.Theme
	edge, radius := t.Ink, handleRadius
	if rl.Warn {
		edge = t.Caution
	}
	if rl.Disabled {
		edge = t.Faint
	}
	if f.Pressed(rl.ID) {
		f.Scene.Circle(x, y, radius+6, Fade(t.Accent, 0.3))
		edge = t.Accent
	}
	f.Scene.Circle(x, y, radius, edge)
	f.Scene.Circle(x, y, radius-2.5, t.Handle)
	for _, d := range [2]float64{-4, 4} {
		if rl.Vertical {
			f.Scene.Line(x-6, y+d, x+6, y+d, 2, edge)
		} else {
			f.Scene.Line(x+d, y-6, x+d, y+6, 2, edge)
		}
	}
}

func (rl *Rail) valueInk(t *Theme) scene.Color {
	switch {
	case rl.Disabled:
		return t.Faint
	case rl.Warn:
		return t.Caution
	case rl.Ink.A != 0:
		return rl.Ink
	}
	return t.Ink
}
