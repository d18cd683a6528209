package ui

import (
	"math"

	"levelspan/game/scene"
)

// maxLabels bounds the labels that are kept apart on one rail.
const maxLabels = 24

// spans are stretches that are taken by labels.
type spans struct {
	lo, hi [3 * maxLabels]float64
	n      int
}

func (s *spans) free(lo, hi float64) bool {
	for i := 0; i < s.n; i++ {
		if lo < s.hi[i] && s.lo[i] < hi {
			return false
		}
	}
	return true
}

func (s *spans) take(lo, hi float64) {
	if s.n < len(s.lo) {
		s.lo[s.n], s.hi[s.n] = lo, hi
		s.n++
	}
}

func (rl *Rail) inRange(v float64) bool {
	lo, hi := rl.ends()
	return v >= lo && v <= hi
}

func (m *RailMark) look(t *Theme) (scene.Style, scene.Color) {
	style, ink := scene.Small, t.Muted
	if m.Bold {
		style, ink = scene.SmallBold, t.Ink
	}
	if m.Color.A != 0 {
		ink = m.Color
	}
	return style, ink
}

// drawHorizontal draws title and value above the track, ticks and marks below; on a rail without a handle the marks
// stand above. Marks come before ticks where both have no room.
func (rl *Rail) drawHorizontal(f *Frame, area scene.Rect) {
	t, s, m := f.Theme, rl.Scale(area), rl.Middle(area)
	lh := scene.LineHeight(scene.Small)
	left, right := math.Min(area.X, s.P0), math.Max(area.X+area.W, s.P1)
	if rl.ID != "" {
		rl.heading(f, area, s, m)
	} else if rl.Title != "" {
		f.Scene.Label(scene.Small, s.P0, m-zoneWidth/2-8, scene.Left, rl.Title, t.Muted)
	}
	half := railWidth / 2
	if rl.ID == "" {
		half = zoneWidth / 2
	}
	var first, second spans // two rows below, or the row above and the row below
	row1 := m + half + 8 + scene.CapHeight(scene.Small) + 4
	if rl.ID != "" {
		row1 = m + handleRadius + 4 + scene.CapHeight(scene.Small)
	}
	for i := 0; i < len(rl.Marks) && i < maxLabels; i++ {
		k := &rl.Marks[i]
		if !rl.inRange(k.At) {
			continue
		}
		style, ink := k.look(t)
		x, w := s.Pos(k.At), scene.Measure(style, k.Text)
		if rl.ID == "" {
			rl.markAbove(f, &first, k, style, ink, x, w, m, s, right)
			continue
		}
		f.Scene.Line(x, m+half+3, x, m+half+12, 1.5, ink)
		lo := math.Max(left, math.Min(right-w, x-w/2))
		switch {
		case first.free(lo-6, lo+w+6):
			first.take(lo, lo+w)
			f.Scene.Label(style, lo, row1, scene.Left, k.Text, ink)
		case second.free(lo-6, lo+w+6) && row1+lh <= area.Y+area.H:
			second.take(lo, lo+w)
			f.Scene.Label(style, lo, row1+lh, scene.Left, k.Text, ink)
		}
	}
	ticks := &first
	if rl.ID == "" {
		ticks = &second
	} else if len(rl.Marks) > 0 && len(rl.Ticks) > 0 && rl.RailHeight() <= area.H+0.5 {
		ticks, row1 = &second, row1+lh
	}
	k := Thin(rl.Ticks, s, scene.Small, 10, false)
	for i := range rl.Ticks {
		tick := &rl.Ticks[i]
		if !rl.inRange(tick.Value) {
			continue
		}
		x, w := s.Pos(tick.Value), scene.Measure(scene.Small, tick.Text)
		f.Scene.Line(x, m+half+3, x, m+half+8, 1, t.Edge)
		lo := math.Max(left, math.Min(right-w, x-w/2))
		if !Kept(rl.Ticks, i, k) || tick.Text == "" || !ticks.free(lo-6, lo+w+6) {
			continue
		}
		ticks.take(lo, lo+w)
		f.Scene.Label(scene.Small, lo, row1, scene.Left, tick.Text, t.Muted)
	}
}

// markAbove draws a mark across a rail without a handle, its name above to the right, or to the left where there is no
// room; a name that has none on either side is left out.
func (rl *Rail) markAbove(f *Frame, row *spans, k *RailMark, style scene.Style, ink scene.Color, x, w, m float64, s Scale, right float64) {
	y := m - zoneWidth/2
	f.Scene.Line(x, y-14, x, y+zoneWidth, 2, ink)
	if rl.Title != "" && row.n == 0 {
		row.take(s.P0, s.P0+scene.Measure(scene.Small, rl.Title)+6)
	}
	for _, lo := range [2]float64{x + 5, x - 5 - w} {
		if lo >= s.P0-4 && lo+w <= right && row.free(lo-3, lo+w+3) && !rl.crossed(s, k, lo-3, lo+w+3) {
			row.take(math.Min(x, lo), math.Max(x, lo+w))
			f.Scene.Label(style, lo, y-6, scene.Left, k.Text, ink)
			return
		}
	}
}

// crossed reports whether the line of another mark runs through a stretch.
func (rl *Rail) crossed(s Scale, k *RailMark, lo, hi float64) bool {
	for i := range rl.Marks {
		if o := &rl.Marks[i]; o != k && rl.inRange(o.At) {
			if x := s.Pos(o.At); x > lo && x < hi {
				return true
			}
		}
	}
	return false
}

// heading draws the value over the handle and the title where the value is not.
func (rl *Rail) heading(f *Frame, area scene.Rect, s Scale, m float64) {
	t := f.Theme
	y := m - handleRadius - 8
	x, _ := rl.At(area)
	w := scene.Measure(scene.Title, rl.ValueText)
	lo := math.Max(area.X, math.Min(area.X+area.W-w, x-w/2))
	f.Scene.Label(scene.Title, lo, y, scene.Left, rl.ValueText, rl.valueInk(t))
	tw := scene.Measure(scene.Small, rl.Title)
	if s.P0+tw+12 < lo {
		f.Scene.Label(scene.Small, s.P0, y, scene.Left, rl.Title, t.Muted)
	} else if lo+w+12 < s.P1-tw {
		f.Scene.Label(scene.Small, s.P1, y, scene.Right, rl.Title, t.Muted)
	}
	if len(rl.Notes) > 0 {
		nx := lo + w + 10
		for _, n := range rl.Notes {
			nw := scene.Measure(scene.Small, n)
			if nx+nw > area.X+area.W || nx < s.P1 && nx+nw > s.P1-tw-12 && s.P0+tw+12 >= lo {
				break
			}
			f.Scene.Label(scene.Small, nx, y, scene.Left, n, t.Muted)
			nx += nw + 12
		}
	}
}

// drawVertical draws ticks left of the track, value, notes and marks right of it. The labels of ticks give way to the
// handle, those of marks move aside for the value.
func (rl *Rail) drawVertical(f *Frame, area scene.Rect) {
	t, s, m := f.Theme, rl.Scale(area), rl.Middle(area)
	lh, up := scene.LineHeight(scene.Small), scene.CapHeight(scene.Small)/2
	if rl.Title != "" {
		f.Label(scene.Small, scene.Rect{X: area.X, Y: area.Y, W: area.W, H: scene.LineHeight(scene.Small)}, scene.Left, rl.Title, t.Muted)
	}
	_, hy := rl.At(area)
	held := func(y float64) bool { return rl.ID != "" && math.Abs(y-hy) < handleRadius+lh/2-2 }
	k := Thin(rl.Ticks, s, scene.Small, 6, true)
	for i := range rl.Ticks {
		y := s.Pos(rl.Ticks[i].Value)
		if !rl.inRange(rl.Ticks[i].Value) || held(y) {
			continue
		}
		f.Scene.Line(m-railWidth/2-8, y, m-railWidth/2-3, y, 1, t.Edge)
		if Kept(rl.Ticks, i, k) {
			f.Scene.Label(scene.Small, m-railWidth/2-11, y+up, scene.Right, rl.Ticks[i].Text, t.Muted)
		}
	}
	x := m + handleRadius + 8
	blockLo, blockHi := math.Inf(1), math.Inf(-1)
	if rl.ID != "" {
		blockLo, blockHi = rl.valueBlock(f, area, x, hy)
	}
	rl.marksBeside(f, area, s, m, hy, blockLo, blockHi)
}

// valueBlock draws the value and its notes beside the handle and returns their upper and lower edge.
func (rl *Rail) valueBlock(f *Frame, area scene.Rect, x, hy float64) (lo, hi float64) {
	t := f.Theme
	lh, big := scene.LineHeight(scene.Small), scene.LineHeight(scene.Title)
	h := big + lh*float64(len(rl.Notes))
	lo = math.Max(area.Y+rl.titleHeight(), math.Min(area.Y+area.H-h, hy-big/2))
	style := scene.Title
	if x+scene.Measure(style, rl.ValueText) > area.X+area.W {
		style = scene.BodyBold
	}
	base := lo + (big+scene.CapHeight(scene.Title))/2
	f.Scene.Label(style, x, base, scene.Left, rl.ValueText, rl.valueInk(t))
	for i, n := range rl.Notes {
		f.Scene.Label(scene.Small, x, lo+big+lh*float64(i)+(lh+scene.CapHeight(scene.Small))/2, scene.Left, n, t.Muted)
	}
	return lo - 2, lo + h + 2
}

// marksBeside places the names of marks right of a vertical track, apart from each other and from the value.
func (rl *Rail) marksBeside(f *Frame, area scene.Rect, s Scale, m, hy, blockLo, blockHi float64) {
	var order [maxLabels]int
	n := 0
	for i := range rl.Marks {
		if !rl.inRange(rl.Marks[i].At) || n == maxLabels {
			continue
		}
		j := n
		for j > 0 && rl.Marks[order[j-1]].At < rl.Marks[i].At { // highest first: from the top of the screen
			order[j] = order[j-1]
			j--
		}
		order[j] = i
		n++
	}
	lh := scene.LineHeight(scene.Small)
	split := 0 // what lies above the handle is named above the value, what lies below it below
	for split < n && (rl.ID == "" || s.Pos(rl.Marks[order[split]].At) <= hy) {
		split++
	}
	limit := math.Min(blockLo, area.Y+area.H+lh/2)
	for j := split - 1; j >= 0; j-- { // above the value, upwards
		y := s.Pos(rl.Marks[order[j]].At)
		at := math.Min(y, limit-lh/2)
		limit = at - lh/2
		rl.beside(f, area, m, &rl.Marks[order[j]], y, at)
	}
	limit = math.Max(blockHi, area.Y+rl.titleHeight()-lh/2)
	for j := split; j < n; j++ { // below the value, downwards
		y := s.Pos(rl.Marks[order[j]].At)
		at := math.Max(y, limit+lh/2)
		limit = at + lh/2
		rl.beside(f, area, m, &rl.Marks[order[j]], y, at)
	}
}

// beside draws one mark with its leader from y on the track to its name at height at; a name out of the area is left out.
func (rl *Rail) beside(f *Frame, area scene.Rect, m float64, k *RailMark, y, at float64) {
	style, ink := k.look(f.Theme)
	x := m + railWidth/2 + 3
	lh := scene.LineHeight(style)
	if at-lh/2 < area.Y+rl.titleHeight()-lh || at+lh/2 > area.Y+area.H+lh {
		f.Scene.Line(x, y, x+10, y, 1.5, ink)
		return
	}
	leader := [3]scene.Point{{X: x, Y: y}, {X: x + 6, Y: y}, {X: x + 14, Y: at}}
	if math.Abs(at-y) < 0.5 {
		f.Scene.Line(x, y, x+14, y, 1.5, ink)
	} else {
		f.Scene.Stroke(leader[:], 1.5, ink)
	}
	r := scene.Rect{X: x + 18, Y: at - lh/2, W: area.X + area.W - x - 18, H: lh}
	f.Label(style, r, scene.Left, k.Text, ink)
}
