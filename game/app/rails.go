package app

import (
	"math"
	"strconv"
	"time"

	"levelspan/game/scene"
	"levelspan/game/ui"
	"levelspan/perf"
	"levelspan/perf/casefile"
	"levelspan/perf/casefile/figure"
)

// The two handles.
const (
	handleAltitude = "handle/density-altitude"
	handleMass     = "handle/mass"
)

// railDrag is what a handle's drag started from; a cancel goes back to it.
type railDrag struct {
	active bool
	value  float64  // in the unit shown
	air    perf.Air // altitude
	mass   float64  // kg
	dew    *float64 // °C
	pa     float64  // m
	oat    float64  // °C
}

// slideRun gathers the key steps of one handle into one step of the history.
type slideRun struct {
	id    string
	until time.Duration
	n     int // counts the runs
}

// altitudeRail is the density-altitude rail over its column.
func (a *App) altitudeRail(t *ui.Theme) ui.Rail {
	c, air := a.doc.current, a.solved.cond.Air
	u := &a.units
	step, fine := 1000.0, 100.0
	if u.Altitude.Name == "m" {
		step, fine = 500, 50
	}
	r := a.ranges.altitude
	rail := ui.Rail{ID: handleAltitude, Title: "Density altitude, " + u.Altitude.Name, Label: "Density altitude", Vertical: true,
		Min: shown(u.Altitude, r.lo), Max: shown(u.Altitude, r.hi), Value: shown(u.Altitude, air.DensityAltitude), Step: fine, Page: step, SI: u.Altitude.SI,
		ValueText: u.AltitudeCoarse(air.DensityAltitude).Number,
		Spoken: u.AltitudeCoarse(air.DensityAltitude).String() + ", pressure altitude " + u.AltitudeWhole(air.PressureAltitude).String() + ", " +
			figure.Celsius(air.Temperature).String(),
		Notes:  []string{"PA " + u.AltitudeWhole(air.PressureAltitude).Number, figure.Celsius(air.Temperature).String()},
		Filled: true}
	rail.Ticks = a.chart.altitudeTicks.For(rail.Min, rail.Max, a.layout.altitude.H, 34)
	if a.layout.compact { // no room for zeros
		rail.Title = "DA, 1000 " + u.Altitude.Name
		rail.Ticks = a.chart.altitudeTicks.scaled(rail.Min, rail.Max, a.layout.altitude.H, 34, 1000)
	}
	if at, ok := fieldAir(c, air); ok {
		rail.Marks = append(rail.Marks, ui.RailMark{At: shown(u.Altitude, at.DensityAltitude), Text: "field"})
	}
	if s := a.solved.answer.Service; s.Applies {
		rail.Marks = append(rail.Marks, ui.RailMark{At: math.Min(shown(u.Altitude, s.DensityAltitude), rail.Max),
			Text: "service" + above(s.DensityAltitude, r.hi), Color: t.Ink})
	}
	if s := a.solved.answer.Absolute; s.Applies {
		at := shown(u.Altitude, s.DensityAltitude)
		rail.Marks = append(rail.Marks, ui.RailMark{At: math.Min(at, rail.Max), Text: "absolute" + above(s.DensityAltitude, r.hi), Color: t.Bad})
		rail.Zones = append(rail.Zones, ui.RailZone{From: at, To: rail.Max, Color: ui.Fade(t.Bad, 0.75), FadeLow: math.Min(shown(u.Altitude, 400*perf.Foot), (rail.Max-at)/2)})
		rail.Warn = air.DensityAltitude > s.DensityAltitude
	}
	rail.Ink = t.Ink
	return rail
}

// above is the sign of a ceiling that lies beyond the rail.
func above(height, top float64) string {
	if height > top {
		return " ↑"
	}
	return ""
}

// massRail is the weight rail over its block.
func (a *App) massRail(t *ui.Theme) ui.Rail {
	c := a.doc.current
	u := &a.units
	r := a.ranges.mass
	mass := c.Today.MassKg
	rail := ui.Rail{ID: handleMass, Title: "Weight", Label: "Weight", Min: shown(u.Mass, r.lo), Max: shown(u.Mass, r.hi), Value: shown(u.Mass, mass),
		Step: 1, Page: 10, SI: u.Mass.SI, ValueText: u.MassWhole(mass).String(), Filled: true}
	empty, most := c.Aeroplane.EmptyMassKg, c.Aeroplane.MaximumMassKg
	rail.Marks = append(rail.Marks, ui.RailMark{At: shown(u.Mass, empty), Text: "empty " + u.MassWhole(empty).Number},
		ui.RailMark{At: shown(u.Mass, most), Text: "max " + u.MassWhole(most).Number})
	if fuel := c.Today.FuelKg; fuel > 0 && c.Aeroplane.Engine.Kind != casefile.Electric {
		rail.Marks = append(rail.Marks, ui.RailMark{At: shown(u.Mass, mass-fuel), Text: "zero fuel"})
	}
	rail.Zones = append(rail.Zones, ui.RailZone{From: shown(u.Mass, most), To: rail.Max, Color: ui.Fade(t.Caution, 0.4)})
	if rail.Min < shown(u.Mass, empty) {
		rail.Zones = append(rail.Zones, ui.RailZone{From: rail.Min, To: shown(u.Mass, empty), Color: ui.Fade(t.Caution, 0.4)})
	}
	const crumb = 1e-6
	switch {
	case mass > most+crumb:
		rail.Warn, rail.Notes = true, []string{"above maximum"}
	case mass < empty-crumb:
		rail.Warn, rail.Notes = true, []string{"below empty"}
	}
	return rail
}

// snap is a dragged value in whole steps of what is shown, so that the figure beside the handle is the figure used.
func snap(v, step float64) float64 { return math.Round(v/step) * step }

func (a *App) altitudeSnap() float64 {
	if a.units.Altitude.Name == "m" {
		return 50
	}
	return 100
}

// dragHandle carries out the drag of a handle.
func (a *App) dragHandle(act *ui.Action) {
	i := 0
	if act.ID == handleMass {
		i = 1
	}
	g := &a.drags[i]
	switch act.Kind {
	case ui.DragStart:
		t := &a.doc.current.Today
		air, err := airOf(a.doc.current)
		if err != nil {
			return
		}
		*g = railDrag{active: true, air: air, mass: t.MassKg, pa: t.PressureAltitudeM, oat: t.OutsideAirTemperatureC, dew: t.DewPointC}
		g.value = shown(a.units.Altitude, air.DensityAltitude)
		if i == 1 {
			g.value = shown(a.units.Mass, t.MassKg)
		}
		a.follow(g, act)
	case ui.DragMove:
		a.follow(g, act)
	case ui.DragEnd:
		a.follow(g, act)
		a.release(g, false)
	case ui.DragCancel:
		a.release(g, true)
	}
	a.dirty = true
}

// follow moves the dragged quantity to where the finger is.
func (a *App) follow(g *railDrag, act *ui.Action) {
	if !g.active {
		return
	}
	if act.ID == handleMass {
		v := a.chart.mass.Dragged(a.layout.mass, g.value, *act)
		a.moveMass(inSI(a.units.Mass, snap(v, 1)))
		return
	}
	v := a.chart.altitude.Dragged(a.layout.altitude, g.value, *act)
	a.moveAltitude(g.air, inSI(a.units.Altitude, snap(v, a.altitudeSnap())))
}

func (a *App) moveMass(mass float64) {
	q := perf.QuantityMass.Domain()
	mass = math.Min(math.Max(mass, q.Min), q.Max)
	c := a.doc.work()
	if c.Today.MassKg != mass {
		c.Today.MassKg = mass
		a.doc.moved()
	}
}

// moveAltitude goes to a density altitude of the day that start belongs to; where the day has none such, nothing moves.
func (a *App) moveAltitude(start perf.Air, densityAltitude float64) {
	if moveToDensityAltitude(a.doc.work(), start, densityAltitude) == nil {
		a.doc.moved()
	}
}

// release ends a drag. A cancelled one goes back to where it started. The step is committed when no other handle is held.
func (a *App) release(g *railDrag, cancelled bool) {
	if !g.active {
		return
	}
	g.active = false
	if cancelled && a.doc.current != a.doc.committed {
		t := &a.doc.current.Today
		if g == &a.drags[1] {
			t.MassKg = g.mass
		} else {
			t.PressureAltitudeM, t.OutsideAirTemperatureC, t.DewPointC = g.pa, g.oat, g.dew
		}
		a.doc.moved()
	}
	if !a.drags[0].active && !a.drags[1].active {
		what := "density altitude"
		if g == &a.drags[1] {
			what = "weight"
		}
		a.doc.settle(what)
	}
}

// cancelDrags gives up every drag, as before another case is opened.
func (a *App) cancelDrags() {
	for i := range a.drags {
		a.release(&a.drags[i], true)
	}
}

// slideTime is how long after a key step the next one still belongs to the same step of the history.
const slideTime = 1500 * time.Millisecond

// slideHandle moves a handle by keys or assistive technology. Value is in SI.
func (a *App) slideHandle(act *ui.Action) {
	a.cancelDrags()
	what := "density altitude"
	if act.ID == handleMass {
		what = "weight"
	}
	if a.slide.id != act.ID || a.now >= a.slide.until {
		a.slide.n++
	}
	a.slide.id, a.slide.until = act.ID, a.now+slideTime
	if act.ID == handleMass {
		u := a.units.Mass
		a.moveMass(inSI(u, snap(shown(u, act.Value), 1)))
	} else {
		u := a.units.Altitude
		if air, err := airOf(a.doc.current); err == nil {
			a.moveAltitude(air, inSI(u, snap(shown(u, act.Value), a.altitudeSnap())))
		}
	}
	a.doc.settleRun(what, "slide/"+strconv.Itoa(a.slide.n))
	a.dirty = true
}

// drawRails draws both handles' rails and keeps them for the next drag.
func (a *App) drawRails(f *ui.Frame) {
	a.chart.altitude = a.altitudeRail(f.Theme)
	a.chart.mass = a.massRail(f.Theme)
	if a.layout.altitude.W > 0 {
		a.chart.altitude.Draw(f, a.layout.altitude)
	}
	a.chart.mass.Draw(f, a.layout.mass)
}

// bandRail is the speed rail under the chart: where level flight is possible, and what sets its ends.
func (a *App) bandRail(t *ui.Theme) ui.Rail {
	kind := a.speedKind()
	m := a.units.Speed
	r := a.ranges.speed
	rail := ui.Rail{Min: shown(m, r.lo), Max: shown(m, r.hi)}
	rail.Ticks = a.chart.speedTicks.For(rail.Min, rail.Max, a.layout.band.W, 56)
	ans := &a.solved.answer
	slow, fast, never := &ans.Limits[perf.SlowestLevel], &ans.Limits[perf.FastestLevel], &ans.Limits[perf.NeverExceed]
	if slow.Applies && fast.Applies && ans.Outcome == perf.LevelFlight {
		lo, hi := shown(m, inKind(slow, kind)), shown(m, inKind(fast, kind))
		rail.Zones = append(rail.Zones, ui.RailZone{From: lo, To: hi, Color: t.Good})
		rail.Marks = append(rail.Marks, ui.RailMark{At: lo, Text: a.report.SetBy(perf.SlowestLevel), Color: t.Ink, Bold: true},
			ui.RailMark{At: hi, Text: a.report.SetBy(perf.FastestLevel), Color: t.Ink, Bold: true})
	} else if s := &ans.Limits[perf.Stall]; s.Applies {
		rail.Marks = append(rail.Marks, ui.RailMark{At: shown(m, inKind(s, kind)), Text: "stall", Color: t.Ink, Bold: true})
	}
	if never.Applies {
		at := shown(m, inKind(never, kind))
		rail.Zones = append(rail.Zones, ui.RailZone{From: at, To: rail.Max, Color: ui.Fade(t.Bad, 0.8)})
		rail.Marks = append(rail.Marks, ui.RailMark{At: at, Text: "VNE", Color: t.Bad, Bold: true})
	}
	scale := rail.Scale(a.layout.band)
	ends := a.endRoom(&rail, scale)
	if ends.lo > ends.hi && len(rail.Marks) > 2 { // the red stretch alone must do
		rail.Marks = rail.Marks[:2]
		ends = a.endRoom(&rail, scale)
	}
	for _, k := range [...]perf.Key{perf.FastestClimb, perf.SteepestClimb} {
		l := &ans.Limits[k]
		if !l.Applies {
			continue
		}
		at := shown(m, inKind(l, kind))
		if x := scale.Pos(at); x > ends.lo && x < ends.hi {
			rail.Marks = append(rail.Marks, ui.RailMark{At: at, Text: a.report.Symbol(k), Color: t.Ink, Bold: true})
		}
	}
	return rail
}

// endRoom is the stretch of the speed rail, in pixels, that the names of the band's ends leave to other marks: what sets the
// ends is always said. A name stands inside the band where it has no room outside.
func (a *App) endRoom(rail *ui.Rail, scale ui.Scale) span {
	room := span{math.Inf(-1), math.Inf(1)}
	if len(rail.Zones) == 0 || len(rail.Marks) < 2 || rail.Zones[0].From != rail.Marks[0].At {
		return room
	}
	lo, hi := &rail.Marks[0], &rail.Marks[1]
	const gap = 8
	w := scene.Measure(scene.SmallBold, lo.Text) + gap
	if x := scale.Pos(lo.At); x-w < scale.P0 {
		room.lo = x + w
	}
	w = scene.Measure(scene.SmallBold, hi.Text) + gap
	x := scale.Pos(hi.At)
	beyond := scale.P1
	if len(rail.Marks) > 2 { // the never-exceed speed
		beyond = math.Min(beyond, scale.Pos(rail.Marks[2].At))
	}
	if x+w > beyond {
		room.hi = x - w
	}
	return room
}
