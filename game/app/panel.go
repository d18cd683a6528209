package app

import (
	"math"
	"strings"

	"levelspan/game/scene"
	"levelspan/game/ui"
	"levelspan/perf"
	"levelspan/perf/casefile/figure"
)

// The measures of the panel, logical pixels.
const (
	panelHead    = 50.0
	leastRow     = 47.0
	mostRow      = 54.0
	panelFoot    = 30.0 // the advisory line
	panelLine    = 28.0
	panelSection = 8.0
	columnGap    = 24.0
)

// drawPanel draws the limits in order of speed, ceilings, turn and allowances, and the advisory line.
func (a *App) drawPanel(f *ui.Frame) {
	t, r := f.Theme, a.layout.panel
	f.Scene.FillRect(a.toEdges(r), 0, t.Panel)
	if a.layout.format == landscape {
		f.Scene.Line(r.X, r.Y, r.X, r.Y+r.H, 1, t.Line)
	} else {
		f.Scene.Line(r.X, r.Y, r.X+r.W, r.Y, 1, t.Line)
	}
	footHeight, headHeight := panelFoot, panelHead
	if a.layout.low {
		footHeight, headHeight = 24, 46
	}
	foot, r := ui.CutBottom(r, footHeight)
	a.drawAdvisory(f, foot)
	head, r := ui.CutTop(r, headHeight)
	a.drawPanelHead(f, ui.Trim(head, 0, a.layout.margin, 0, a.layout.margin))
	in := ui.Trim(r, 0, a.layout.margin, 0, a.layout.margin)
	if per := (len(a.rows) + a.layout.columns - 1) / a.layout.columns; per > 0 { // rows use the height that there is
		a.layout.row = clamp(math.Floor((r.H-a.factsHeight())/float64(per)), leastRow, mostRow)
	}
	height := a.limitsHeight() + a.factsHeight()
	in.Y = f.BeginScroll("panel", "Speeds", "", r, &a.view.panel, height)
	a.drawLimits(f, in)
	in.Y += a.limitsHeight()
	a.drawFacts(f, in)
	f.EndScroll(r, &a.view.panel, t.Panel)
}

// drawAdvisory draws the line that stands on every screen; where it is too long it says the same shorter.
func (a *App) drawAdvisory(f *ui.Frame, r scene.Rect) {
	r = ui.Trim(r, 0, 4, 0, min(a.layout.margin, 16))
	text := advisory
	if scene.Measure(scene.Small, text) > r.W {
		text = advisoryShort
	}
	if scene.Measure(scene.Small, text) > r.W {
		text = advisoryLeast
	}
	f.Label(scene.Small, r, scene.Left, text, f.Theme.Muted)
}

// drawPanelHead draws the title and the switch of the kind of airspeed, for panel and axis together.
func (a *App) drawPanelHead(f *ui.Frame, r scene.Rect) {
	kind := a.speedKind()
	choices := []ui.Choice{}
	for _, k := range [...]string{"IAS", "CAS", "TAS"} {
		choices = append(choices, ui.Choice{ID: "speed-kind/" + k, Text: k, Label: speedKindName(k), Selected: k == kind})
	}
	w := math.Min(math.Max(ui.SegmentsWidth(choices), 3*54), r.W-8)
	unit := a.units.Speed.Name
	uw := scene.Measure(scene.Small, unit)
	seg, rest := ui.CutRight(r, w)
	seg.Y, seg.H = r.Y+5, r.H-10
	ui.Segments(f, seg, choices)
	if rest.W > uw+10 {
		f.Label(scene.Small, ui.Trim(rest, 0, 10, 0, 0), scene.Right, unit, f.Theme.Muted)
		rest.W -= uw + 18
	}
	title := "Speeds today"
	if scene.Measure(scene.BodyBold, title) > rest.W {
		title = "Speeds"
	}
	if scene.Measure(scene.BodyBold, title) <= rest.W {
		f.Label(scene.BodyBold, rest, scene.Left, title, f.Theme.Ink)
	}
}

func speedKindName(k string) string {
	switch k {
	case "IAS":
		return "Indicated airspeed"
	case "TAS":
		return "True airspeed"
	}
	return "Calibrated airspeed"
}

// limitsHeight is what the rows of limits take.
func (a *App) limitsHeight() float64 {
	return float64((len(a.rows)+a.layout.columns-1)/a.layout.columns) * a.layout.row
}

// drawLimits draws the rows in one or two columns, the slow half left.
func (a *App) drawLimits(f *ui.Frame, r scene.Rect) {
	rows := a.rows
	columns := a.layout.columns
	per := (len(rows) + columns - 1) / columns
	a.layout.smallNames = false
	width := (r.W-columnGap*float64(columns-1))/float64(columns) - scene.Measure(scene.Figure, "000") - 8
	for i := range rows {
		a.layout.smallNames = a.layout.smallNames || scene.Measure(scene.Body, rows[i].name) > width
	}
	for i := range rows {
		cell := r
		if columns > 1 {
			cell = ui.Cell(r, columns, 1, i/per, 0, columnGap)
		}
		cell.Y, cell.H = r.Y+float64(i%per)*a.layout.row, a.layout.row
		a.drawLimit(f, cell, &rows[i])
	}
}

// drawLimit draws one row: name, second figure, symbol, value.
func (a *App) drawLimit(f *ui.Frame, r scene.Rect, row *limitRow) {
	selected := a.view.marked && a.view.selected == row.key
	id := "limit/" + row.key.String()
	touch := scene.Rect{X: r.X - 8, Y: r.Y, W: r.W + 16, H: r.H}
	if f.Seen(r) {
		a.drawLimitText(f, r, touch, row, selected, f.Pressed(id))
	}
	f.Add(ui.Control{ID: id, Role: ui.RoleRow, Label: row.name, ValueText: row.value + " " + a.units.SpeedLabel() + ", " + row.spoken(),
		Value: inKind(&a.solved.answer.Limits[row.key], a.speedKind()), Bounds: touch, Hit: touch, Selected: selected})
}

// drawLimitText draws what a row says.
func (a *App) drawLimitText(f *ui.Frame, r, touch scene.Rect, row *limitRow, selected, pressed bool) {
	t := f.Theme
	switch {
	case selected:
		f.Scene.FillRect(ui.Trim(touch, 1, 0, 1, 0), 6, t.Chosen)
	case pressed:
		f.Scene.FillRect(ui.Trim(touch, 1, 0, 1, 0), 6, t.KeyDown)
	}
	f.Scene.Line(r.X, r.Y, r.X+r.W, r.Y, 1, t.Line)
	ink, style := t.Ink, scene.Body
	switch row.key {
	case perf.SlowestLevel, perf.FastestLevel:
		ink, style = t.Good, scene.BodyBold
	case perf.NeverExceed:
		ink, style = t.Bad, scene.BodyBold
	}
	if a.layout.smallNames {
		style = smaller(style)
	}
	valueWidth := math.Max(scene.Measure(scene.Figure, "000"), scene.Measure(scene.Figure, row.value))
	value, words := ui.CutRight(r, valueWidth)
	base := math.Round(r.Y + 0.44*r.H)
	words.W -= 8
	f.Scene.Label(scene.Figure, value.X+value.W, math.Round(r.Y+0.66*r.H), scene.Right, row.value, ink)
	aside := row.symbol
	if aside == "" {
		aside = row.aside
	} else if row.aside != "" {
		aside = row.aside
	}
	free := words.W - scene.Measure(style, row.name)
	inline := ""
	if w := scene.Measure(scene.Small, aside); aside != "" && w+14 <= free && words.W > 190 { // the symbols stand in a column
		x := math.Max(words.X+0.7*words.W-w/2, words.X+scene.Measure(style, row.name)+14)
		f.Scene.Label(scene.Small, math.Round(math.Min(x, words.X+words.W-w)), base, scene.Left, aside, t.Muted)
	} else {
		inline = aside
	}
	f.Label(style, scene.Rect{X: words.X, Y: base - 14, W: words.W, H: 16}, scene.Left, row.name, ink)
	line := scene.Rect{X: words.X, Y: math.Round(r.Y+0.79*r.H) - 9, W: words.W, H: 14}
	// How sure the value is stands first, shorter where that leaves room for the rest.
	text, room := fitting(row.second, inline, line.W), line.W
	span := row.span
	for _, form := range [...]string{row.span, row.within} {
		if form == "" {
			break
		}
		span, room = form, line.W-scene.Measure(scene.SmallBold, form)-8
		if text = fitting(row.second, inline, room); scene.Measure(scene.Small, text) <= room {
			break
		}
	}
	if span != "" {
		f.Label(scene.SmallBold, line, scene.Left, span, t.Muted)
		line.X, line.W = line.X+line.W-room, room
	}
	if span == "" || scene.Measure(scene.Small, text) <= room {
		f.Label(scene.Small, line, scene.Left, text, t.Muted)
	}
}

// fitting is the longest form of a second figure that fits: with what stands beside the name, without, and without what
// follows a comma or says on how much fuel.
func fitting(second, aside string, width float64) string {
	forms := []string{second}
	if aside != "" {
		forms = []string{aside + " · " + second, second}
		if second == "" {
			return aside
		}
	}
	if cut := strings.LastIndex(second, ", "); cut > 0 {
		second = second[:cut]
		if aside != "" {
			forms = append(forms, aside+" · "+second)
		}
		forms = append(forms, second)
	}
	if cut := strings.Index(second, " on "); cut > 0 {
		if aside != "" {
			forms = append(forms, second[:cut]+" · "+aside)
		}
		forms = append(forms, second[:cut])
	}
	for _, s := range forms {
		if scene.Measure(scene.Small, s) <= width {
			return s
		}
	}
	return forms[len(forms)-1]
}

// smaller is the small style of the same weight.
func smaller(s scene.Style) scene.Style {
	if s == scene.BodyBold {
		return scene.SmallBold
	}
	return scene.Small
}

// factLine is one line under the limits. The aside says what the value is, the short one where that has no room.
type factLine struct {
	name, aside, short, value string
	caution                   bool // the aside is a caution
}

// factLines writes the lines under the limits: ceilings, what is possible, the turn.
func (a *App) factLines() {
	ans, u := &a.solved.answer, &a.units
	lines := a.facted[:0]
	ceiling := func(name string, c *perf.Ceiling) {
		if c.Applies {
			lines = append(lines, factLine{name: name, aside: "density altitude", short: "DA", value: u.AltitudeCoarse(c.DensityAltitude).String()})
		} else {
			lines = append(lines, factLine{name: name, value: a.noCeiling(c)})
		}
	}
	ceiling("Service ceiling", &ans.Service)
	ceiling("Absolute ceiling", &ans.Absolute)
	allowance := func(name string, w *perf.Allowance) {
		height := ""
		if w.AltitudeApplies {
			height = u.AltitudeCoarse(w.DensityAltitude).String()
		}
		switch {
		case w.MassApplies && w.Mass <= a.solved.aero.MaximumMass && height != "":
			lines = append(lines, factLine{name: name + " up to", aside: "weight / density altitude", value: u.MassWhole(w.Mass).String() + " / " + height})
		case w.MassApplies && w.Mass <= a.solved.aero.MaximumMass:
			lines = append(lines, factLine{name: name + " up to", aside: "weight", value: u.MassWhole(w.Mass).String()})
		case height != "": // no weight that the papers allow is too much
			lines = append(lines, factLine{name: name + " up to", aside: "density altitude", short: "DA", value: height})
		}
	}
	allowance("Level", &ans.Level)
	if g := a.solved.cond.ClimbGradient; g > 0 {
		allowance(u.Gradient(g).String(), &ans.Climb)
	}
	if ans.Turn.Applies {
		turn := factLine{name: "Tightest turn", aside: "bank / radius", value: figure.Degrees(ans.Turn.Bank).String() + " / " + u.Metres(ans.Turn.Radius).String()}
		if ans.Cautions[perf.CautionTurnNearStall] {
			turn.aside, turn.short, turn.caution = "below 1.2 × its stall", "near stall", true
		}
		lines = append(lines, turn)
	}
	a.facted = lines
}

// noCeiling says why there is no ceiling: it lies above the atmosphere that the model knows, or there is none at any height.
func (a *App) noCeiling(c *perf.Ceiling) string {
	l := &a.solved.answer.Limits[perf.FastestClimb]
	if a.solved.answer.Outcome == perf.LevelFlight && l.Applies && l.Rate > c.Rate {
		return "not reached"
	}
	return "none"
}

// factColumns is in how many columns the lines stand.
func (a *App) factColumns() int {
	if a.layout.columns > 1 && a.layout.panel.W < 560 {
		return 1
	}
	return a.layout.columns
}

func (a *App) factsHeight() float64 {
	n, columns := len(a.facted), a.factColumns()
	return panelSection*2 + panelLine*float64((n+columns-1)/columns)
}

// drawFacts draws ceilings, allowances and turn.
func (a *App) drawFacts(f *ui.Frame, r scene.Rect) {
	t := f.Theme
	lines, columns := a.facted, a.factColumns()
	per := (len(lines) + columns - 1) / columns
	for i := range lines {
		l, c := &lines[i], r
		if columns > 1 {
			c = ui.Cell(r, columns, 1, i/per, 0, columnGap)
		}
		if i%per == 0 {
			f.Scene.Line(c.X, r.Y, c.X+c.W, r.Y, 1, t.Line)
		}
		row := scene.Rect{X: c.X, Y: r.Y + panelSection + float64(i%per)*panelLine, W: c.W, H: panelLine}
		style := scene.Title
		room := c.W - 12
		if l.caution {
			room -= scene.Measure(scene.Small, l.short) + 10 // a caution is never dropped for want of room
		}
		if scene.Measure(style, l.value)+scene.Measure(scene.Body, l.name) > room {
			style = scene.BodyBold
		}
		w := scene.Measure(style, l.value)
		f.Label(style, row, scene.Right, l.value, t.Ink)
		row.W -= w + 10
		name := scene.Body
		if scene.Measure(name, l.name) > row.W {
			name = scene.Small
		}
		f.Label(name, row, scene.Left, l.name, t.Ink)
		row.X += scene.Measure(name, l.name) + 10
		row.W -= scene.Measure(name, l.name) + 10
		aside := l.aside
		if scene.Measure(scene.Small, aside) > row.W {
			aside = l.short
		}
		if scene.Measure(scene.Small, aside) <= row.W {
			ink := t.Muted
			if l.caution {
				ink = t.Caution
			}
			f.Scene.Label(scene.Small, row.X, ui.Baseline(scene.Body, row), scene.Left, aside, ink)
		}
	}
}
