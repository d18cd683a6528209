package app

import "levelspan/perf"

// describe brings the mirror up to date with what was drawn.
func (a *App) describe() {
	m := &a.mirror
	m.Title = a.doc.current.Aeroplane.Name
	m.Screen = "chart"
	if a.view.screen == screenAeroplane {
		m.Screen = "aeroplane"
	}
	m.Status = a.view.status
	rows := m.Rows[:0]
	for i := range a.rows {
		r := &a.rows[i]
		l := &a.solved.answer.Limits[r.key]
		i, sure := a.solved.estimated.interval(r.key, "CAS")
		rows = append(rows, MirrorRow{HasInterval: sure, LowCASMps: i.lo, HighCASMps: i.hi,
			Key: r.key.String(), Name: r.name, Symbol: r.symbol, SetBy: r.setBy, ValueText: r.value, SecondText: r.spoken(),
			TASMps: float64(l.TAS), CASMps: float64(l.CAS), IASMps: float64(l.IAS), Selected: a.view.marked && a.view.selected == r.key})
	}
	m.Rows = rows
	m.Facts = a.facts()
}

// summary is the day in one sentence.
func (a *App) summary() string {
	if a.solved.fault != "" {
		return "No figures for this case: " + a.solved.fault
	}
	ans, u := &a.solved.answer, &a.units
	where := " at " + u.MassWhole(a.solved.cond.Mass).String() + " and a density altitude of " + u.AltitudeCoarse(a.solved.cond.Air.DensityAltitude).String() + "."
	slow, fast := &ans.Limits[perf.SlowestLevel], &ans.Limits[perf.FastestLevel]
	if ans.Outcome != perf.LevelFlight || !slow.Applies || !fast.Applies {
		_, lines := a.shortfallWords()
		s := "No level flight" + where
		for _, l := range lines {
			s += " " + l
		}
		return s
	}
	kind := a.speedKind()
	return "Level flight from " + u.SpeedWhole(inKind(slow, kind)).Number + " (" + a.report.SetBy(perf.SlowestLevel) + ") to " +
		u.SpeedWhole(inKind(fast, kind)).String() + " " + kind + " (" + a.report.SetBy(perf.FastestLevel) + ")" + where + " " + a.solved.estimated.basis
}
