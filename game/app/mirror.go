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

// summary is the day in one sentence, and what its figures come from in another.
func (a *App) summary() string {
	if a.solved.fault != "" || a.solved.estimated.basis == "" {
		return a.day()
	}
	return a.day() + " " + a.solved.estimated.basis
}

// day is the day in one sentence.
func (a *App) day() string {
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
	return a.ends() + where
}

// ends are the two ends of level flight, where there is any, and what sets them.
func (a *App) ends() string {
	l, kind := &a.solved.answer.Limits, a.speedKind()
	return "Level flight from " + a.units.SpeedWhole(inKind(&l[perf.SlowestLevel], kind)).Number + " (" + a.report.SetBy(perf.SlowestLevel) + ") to " +
		a.units.SpeedWhole(inKind(&l[perf.FastestLevel], kind)).String() + " " + kind + " (" + a.report.SetBy(perf.FastestLevel) + ")"
}
