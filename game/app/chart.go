package app

import (
	"math"

	"levelspan/game/scene"
	"levelspan/game/ui"
	"levelspan/perf"
)

// chart is what the Chart screen keeps between frames.
type chart struct {
	altitude, mass                        ui.Rail
	speedTicks, powerTicks, altitudeTicks plainTicks
	x, y                                  ui.Scale // speed (m/s in the chosen kind) and power (W) to pixels
	upper, lower                          []scene.Point
	line                                  []scene.Point
	labels                                []scene.Rect // taken by words in the plot
	boxPlace                              int          // of the message of no level flight, 0 none yet
}

// drawChart draws the Chart screen.
func (a *App) drawChart(f *ui.Frame) {
	a.solved.sampleCurves(a.speedKind(), a.ranges.speed)
	p := a.layout.plot
	ch := &a.chart
	ch.x = ui.Scale{V0: a.ranges.speed.lo, V1: a.ranges.speed.hi, P0: p.X, P1: p.X + p.W}
	ch.y = ui.Scale{V0: a.ranges.power.lo, V1: a.ranges.power.hi, P0: p.Y + p.H, P1: p.Y}
	ch.labels = ch.labels[:0]
	a.drawGrid(f)
	f.PushView(p)
	a.drawExcess(f)
	a.drawCurves(f)
	f.PopView()
	f.Add(ui.Control{ID: "chart", Role: ui.RoleRegion, Label: "Power against speed", Bounds: p, Hit: p})
	if a.solved.answer.Outcome == perf.LevelFlight {
		a.drawMarked(f)
		a.drawClimb(f)
	} else {
		a.drawMarked(f)
	}
	rail := a.bandRail(f.Theme)
	rail.Draw(f, a.layout.band)
	if a.solved.answer.Outcome != perf.LevelFlight {
		a.drawShortfall(f)
	}
	a.drawCurveNames(f)
	a.drawSpeedName(f)
	a.drawRails(f)
	a.drawStrip(f)
	a.drawPanel(f)
}

// drawGrid draws the ruled ground, the ticks of power and the axis's name.
func (a *App) drawGrid(f *ui.Frame) {
	t, p, ch := f.Theme, a.layout.plot, &a.chart
	pm, sm := a.units.Power, a.units.Speed
	yTicks := ch.powerTicks.For(shown(pm, a.ranges.power.lo), shown(pm, a.ranges.power.hi), p.H, 56)
	xTicks := ch.speedTicks.For(shown(sm, a.ranges.speed.lo), shown(sm, a.ranges.speed.hi), a.layout.band.W, 56)
	for i := range yTicks {
		y := math.Round(ch.y.Pos(inSI(pm, yTicks[i].Value)))
		f.Scene.Line(p.X, y, p.X+p.W, y, 1, t.Line)
		if y > p.Y+4 {
			f.Scene.Label(scene.Small, p.X-10, y+scene.CapHeight(scene.Small)/2, scene.Right, yTicks[i].Text, t.Muted)
		}
	}
	for i := range xTicks {
		x := math.Round(ch.x.Pos(inSI(sm, xTicks[i].Value)))
		f.Scene.Line(x, p.Y, x, p.Y+p.H, 1, t.Line)
	}
	f.Scene.Label(scene.Small, p.X, p.Y-12, scene.Left, "Power, "+pm.Name, t.Muted)
}

// drawExcess fills where more power is at hand than level flight takes, inside the band of level flight.
func (a *App) drawExcess(f *ui.Frame) {
	s, ch := &a.solved, &a.chart
	if s.answer.Outcome != perf.LevelFlight {
		return
	}
	kind := a.speedKind()
	lo, hi := inKind(&s.answer.Limits[perf.SlowestLevel], kind), inKind(&s.answer.Limits[perf.FastestLevel], kind)
	ch.upper, ch.lower = ch.upper[:0], ch.lower[:0]
	add := func(v float64) {
		tas := s.tasFromKind(v, kind)
		required, available := s.solver.PowerRequired(tas), s.solver.PowerAvailable(tas)
		if math.IsNaN(required + available) {
			return
		}
		x := ch.x.Pos(v)
		ch.upper = append(ch.upper, scene.Point{X: x, Y: ch.y.Pos(math.Max(required, available))})
		ch.lower = append(ch.lower, scene.Point{X: x, Y: ch.y.Pos(required)})
	}
	add(lo)
	for _, v := range s.speed {
		if v > lo && v < hi {
			add(v)
		}
	}
	add(hi)
	if len(ch.upper) > 1 {
		f.Scene.Band(ch.upper, ch.lower, ui.Fade(f.Theme.Good, 0.11))
	}
}

// drawCurves draws both curves; where the wing cannot carry the weight the curve of power required is faint.
func (a *App) drawCurves(f *ui.Frame) {
	t := f.Theme
	kind := a.speedKind()
	stall := 0.0
	if l := &a.solved.answer.Limits[perf.Stall]; l.Applies {
		stall = inKind(l, kind)
	}
	a.drawCurve(f, &a.solved.available, a.ranges.speed, 2.5, t.Available)
	a.drawCurve(f, &a.solved.required, span{0, stall}, 2, ui.Fade(t.Required, 0.35))
	a.drawCurve(f, &a.solved.required, span{stall, math.Inf(1)}, 2.5, t.Required)
}

// drawCurve strokes a sampled curve over the speeds within over, its ends interpolated.
func (a *App) drawCurve(f *ui.Frame, power *[curvePoints]float64, over span, width float64, c scene.Color) {
	ch, s := &a.chart, &a.solved
	ch.line = ch.line[:0]
	bottom := ch.y.P0 + 4000 // far outside the plot; the clip cuts
	point := func(v, w float64) {
		if math.IsNaN(w) {
			return
		}
		ch.line = append(ch.line, scene.Point{X: ch.x.Pos(v), Y: math.Max(math.Min(ch.y.Pos(w), bottom), ch.y.P1-4000)})
	}
	for i := range s.speed {
		v := s.speed[i]
		if i > 0 {
			for _, edge := range [...]float64{over.lo, over.hi} {
				if s.speed[i-1] < edge && edge < v {
					k := (edge - s.speed[i-1]) / (v - s.speed[i-1])
					point(edge, power[i-1]+k*(power[i]-power[i-1]))
				}
			}
		}
		if v >= over.lo && v <= over.hi {
			point(v, power[i])
		}
	}
	if len(ch.line) > 1 {
		f.Scene.Stroke(ch.line, width, c)
	}
}

// powerAt is a curve's value at a speed in the chosen kind, linear between the samples.
func (s *solved) powerAt(power *[curvePoints]float64, v float64) float64 {
	k := (v - s.curveRange.lo) / s.curveRange.width() * (curvePoints - 1)
	if math.IsNaN(k) || k < 0 || k > curvePoints-1 {
		return math.NaN()
	}
	i := min(int(k), curvePoints-2)
	return power[i] + (k-float64(i))*(power[i+1]-power[i])
}

// drawClimb draws the stroke of the fastest climb with its rate, and the point of least power.
func (a *App) drawClimb(f *ui.Frame) {
	t, ch, s := f.Theme, &a.chart, &a.solved
	kind, p := a.speedKind(), a.layout.plot
	if l := &s.answer.Limits[perf.LeastPower]; l.Applies {
		a.dot(f, inKind(l, kind), t.Required)
	}
	l := &s.answer.Limits[perf.FastestClimb]
	if !l.Applies || l.Rate <= 0 {
		return
	}
	v := inKind(l, kind)
	x := ch.x.Pos(v)
	y0, y1 := ch.y.Pos(s.powerAt(&s.required, v)), ch.y.Pos(s.powerAt(&s.available, v))
	if math.IsNaN(y0 + y1) {
		return
	}
	y0, y1 = clamp(y0, p.Y, p.Y+p.H), clamp(y1, p.Y, p.Y+p.H)
	f.Scene.Line(x, y0, x, y1, 2.5, t.Good)
	a.dot(f, v, t.Required)
	text := a.units.Rate(l.Rate).String()
	w := scene.Measure(scene.BodyBold, text)
	at, free := a.freePlace(x, (y0+y1)/2, w, 22)
	if !free {
		f.Scene.FillRect(ui.Inset(at, -3), 4, ui.Fade(t.Background, 0.85))
	}
	f.Label(scene.BodyBold, at, scene.Left, text, t.Good)
	ch.labels = append(ch.labels, at, scene.Rect{X: x - 1, Y: math.Min(y0, y1), W: 2, H: math.Abs(y1 - y0)})
}

// freePlace finds room for words of w by h beside a vertical stroke at x, as near to height y as the curves and other words
// allow; not free: there is none, and the words would cross something.
func (a *App) freePlace(x, y, w, h float64) (place scene.Rect, free bool) {
	p, s := a.layout.plot, &a.solved
	for d := 0.0; d < 80; d += 4 { // to the right first
		if r := (scene.Rect{X: x + 9, Y: y - h/2 - d, W: w, H: h}); r.X+w <= p.X+p.W-2 && r.Y >= p.Y+2 && !a.covered(r, &s.required, &s.available) {
			return r, true
		}
	}
	best := scene.Rect{X: clamp(x+9, p.X, p.X+p.W-w), Y: clamp(y-h/2, p.Y, p.Y+p.H-h), W: w, H: h}
	for d := 0.0; d < p.H; d += 4 {
		for _, r := range [...]scene.Rect{{X: x + 9, Y: y - h/2 - d}, {X: x - 9 - w, Y: y - h/2 - d}, {X: x + 9, Y: y - h/2 + d}, {X: x - 9 - w, Y: y - h/2 + d}} {
			r.W, r.H = w, h
			if r.X >= p.X+2 && r.X+w <= p.X+p.W-2 && r.Y >= p.Y+2 && r.Y+h <= p.Y+p.H-2 && !a.covered(r, &s.required, &s.available) {
				return r, true
			}
		}
	}
	return best, false
}

// dot marks a speed on the curve of power required.
func (a *App) dot(f *ui.Frame, v float64, c scene.Color) {
	y := a.chart.y.Pos(a.solved.powerAt(&a.solved.required, v))
	x, p := a.chart.x.Pos(v), a.layout.plot
	if math.IsNaN(y) || !ui.Contains(p, x, y) {
		return
	}
	f.Scene.Circle(x, y, 5.5, c)
	f.Scene.Circle(x, y, 3.2, f.Theme.Background)
}

// drawMarked marks the selected limit: a line at its speed through the plot, its name and value at the top.
func (a *App) drawMarked(f *ui.Frame) {
	if !a.view.marked {
		return
	}
	k := a.view.selected
	l := &a.solved.answer.Limits[k]
	if !l.Applies {
		return
	}
	t, p := f.Theme, a.layout.plot
	v := inKind(l, a.speedKind())
	x := a.chart.x.Pos(v)
	if x < p.X-0.5 || x > p.X+p.W+0.5 {
		return
	}
	line := [2]scene.Point{{X: x, Y: p.Y}, {X: x, Y: a.layout.band.Y + 20}}
	f.Scene.StrokeDashed(line[:], 1.5, 5, 4, t.Accent)
	a.dot(f, v, t.Accent)
	text := a.report.Symbol(k)
	if text == "" {
		text = a.report.Name(k)
	}
	text += " " + a.units.SpeedWhole(v).Number
	w := scene.Measure(scene.SmallBold, text) + 14
	r := scene.Rect{X: clamp(x-w/2, p.X, p.X+p.W-w), Y: p.Y + 2, W: w, H: 24}
	f.Scene.FillRect(r, 5, t.Accent)
	f.Label(scene.SmallBold, r, scene.Center, text, t.OnBold)
	a.chart.labels = append(a.chart.labels, r, scene.Rect{X: x - 1, Y: p.Y, W: 2, H: p.H})
}

// drawCurveNames writes the curves' names beside them, where nothing else stands.
func (a *App) drawCurveNames(f *ui.Frame) {
	t := f.Theme
	a.nameCurve(f, "available", &a.solved.available, &a.solved.required, t.Available, true)
	a.nameCurve(f, "required", &a.solved.required, &a.solved.available, t.Required, false)
}

// drawSpeedName writes the unit and kind of the speeds at the foot of the plot.
func (a *App) drawSpeedName(f *ui.Frame) {
	p, text := a.layout.plot, a.units.SpeedLabel()
	w := scene.Measure(scene.Small, text)
	r := scene.Rect{X: p.X + p.W - w - 4, Y: p.Y + p.H - 22, W: w, H: 20}
	if left := (scene.Rect{X: p.X + 6, Y: r.Y, W: w, H: r.H}); a.covered(r, &a.solved.required, &a.solved.available) {
		if r = left; a.covered(r) {
			return
		}
	}
	f.Label(scene.Small, r, scene.Left, text, f.Theme.Muted)
}

// nameCurve finds a free place above a curve for its name: from the left for the curve of power available, from the
// right for the other.
func (a *App) nameCurve(f *ui.Frame, name string, curve, other *[curvePoints]float64, c scene.Color, fromLeft bool) {
	ch, s, p := &a.chart, &a.solved, a.layout.plot
	w, h := scene.Measure(scene.BodyBold, name), 22.0
	for n := 6; n < curvePoints-6; n += 2 {
		i := n
		if !fromLeft {
			i = curvePoints - 1 - n
		}
		x, y := ch.x.Pos(s.speed[i]), ch.y.Pos(curve[i])
		if math.IsNaN(y) || y < p.Y+8 || y > p.Y+p.H-4 {
			continue
		}
		for _, r := range [...]scene.Rect{{X: x - w - 8, Y: y - h - 6, W: w, H: h}, {X: x - w/2, Y: y + 10, W: w, H: h},
			{X: x + 8, Y: y - h - 6, W: w, H: h}, {X: x - w - 8, Y: y + 6, W: w, H: h}} {
			if r.Y < p.Y+2 || r.X < p.X+4 || r.X+w > p.X+p.W-4 || r.Y+h > p.Y+p.H-2 || a.covered(r, curve, other) {
				continue
			}
			f.Label(scene.BodyBold, r, scene.Left, name, c)
			ch.labels = append(ch.labels, r)
			return
		}
	}
}

// covered reports whether a place in the plot is crossed by a curve or taken by other words.
func (a *App) covered(r scene.Rect, curves ...*[curvePoints]float64) bool {
	for _, l := range a.chart.labels {
		if ui.Overlaps(r, ui.Inset(l, -4)) {
			return true
		}
	}
	ch, s := &a.chart, &a.solved
	for _, c := range curves {
		for i := range s.speed {
			if x := ch.x.Pos(s.speed[i]); x < r.X-2 || x > r.X+r.W+2 {
				continue
			}
			if y := ch.y.Pos(c[i]); y > r.Y-3 && y < r.Y+r.H+3 {
				return true
			}
		}
	}
	return false
}

// drawShortfall says in plain words that level flight is not possible, what is missing, and what would make it possible.
func (a *App) drawShortfall(f *ui.Frame) {
	t, p := f.Theme, a.layout.plot
	head, lines := a.shortfallWords()
	title, body := scene.Title, scene.Body
	width := math.Min(p.W-16, 460)
	if a.layout.compact {
		title, body, width = scene.BodyBold, scene.Small, p.W
	}
	const pad = 12.0
	in := width - 2*pad
	h := 2*pad + scene.LineHeight(title)
	for _, l := range lines {
		h += f.ParagraphHeight(body, in, l) + 2
	}
	// In a low window the box covers the rail of speeds too: there is no band on it to be seen.
	r := a.leastCovering(width, math.Min(h, a.layout.mass.Y-p.Y-12))
	f.Box(r, 8, t.BadBack, t.Bad)
	f.PushView(r)
	y := r.Y + pad - 2
	f.Label(title, scene.Rect{X: r.X + pad, Y: y, W: in, H: scene.LineHeight(title)}, scene.Left, head, t.Bad)
	y += scene.LineHeight(title) + 2
	for _, l := range lines {
		y += f.Paragraph(body, scene.Rect{X: r.X + pad, Y: y, W: in, H: r.Y + r.H - y}, l, t.Ink) + 2
	}
	f.PopView()
	a.chart.labels = append(a.chart.labels, r)
}

// leastCovering is where in the plot a box hides least of the curves; it begins in the plot, and may reach below it.
func (a *App) leastCovering(w, h float64) scene.Rect {
	p, s, ch := a.layout.plot, &a.solved, &a.chart
	best, least, at, place := scene.Rect{}, math.MaxInt, 0, 0
	for _, ky := range [...]float64{0, 1, 0.5} {
		for _, kx := range [...]float64{0.5, 1, 0} {
			place++
			r := scene.Rect{X: p.X + kx*(p.W-w), Y: p.Y + 8 + ky*math.Max(0, p.H-h-16), W: w, H: h}
			n := 0
			for _, curve := range [...]*[curvePoints]float64{&s.required, &s.available} {
				for i := range curve {
					if ui.Contains(ui.Inset(r, -6), ch.x.Pos(s.speed[i]), ch.y.Pos(curve[i])) {
						n++
					}
				}
			}
			if place == ch.boxPlace { // it does not hop about under a drag for a little gain
				n -= 10
			}
			if n < least {
				best, least, at = r, n, place
			}
		}
	}
	ch.boxPlace = at
	return best
}

// shortfallWords is the answer where there is no level flight.
func (a *App) shortfallWords() (head string, lines []string) {
	ans, u := &a.solved.answer, &a.units
	head = "No level flight"
	switch ans.Outcome {
	case perf.PlacardTooSlow:
		lines = append(lines, "The never-exceed speed lies below the slowest speed of level flight.")
	default:
		kind := a.speedKind()
		v := a.solved.kindFromTAS(ans.ShortfallTAS, kind)
		lines = append(lines, u.PowerFine(ans.Shortfall).String()+" short at the best speed, "+u.SpeedWhole(v).String()+" "+kind+".")
	}
	if text := a.allowanceText(&ans.Level, a.layout.compact); text != "" {
		lines = append(lines, "Possible below "+text+".")
	} else {
		lines = append(lines, "No weight and no height in the model's range makes it possible.")
	}
	return head, lines
}
