package app

import (
	"math"
	"strings"

	"levelspan/perf"
	"levelspan/perf/casefile/figure"
	"levelspan/perf/casefile/report"
)

// limitRow is one limit as the panel and the mirror say it.
type limitRow struct {
	key    perf.Key
	name   string
	symbol string
	setBy  string // in a word, "" where nothing but the aeroplane's own curves does
	value  string // whole units of the chosen kind
	span   string // 95 % interval of the value, "" none
	within string // the same short: no farther than that from the value
	second string
	aside  string // beside the name: the wind of best range
}

// spoken is the second line in words.
func (r *limitRow) spoken() string {
	if r.span == "" {
		return r.second
	}
	return "between " + strings.Replace(r.span, "–", " and ", 1) + "; " + r.second
}

// limitRows is every limit that applies, in order of speed.
func (a *App) limitRows() []limitRow {
	ans, kind := &a.solved.answer, a.speedKind()
	a.rows = a.rows[:0]
	for _, k := range report.Order(ans) {
		l := &ans.Limits[k]
		row := limitRow{key: k, name: a.report.Name(k), symbol: a.report.Symbol(k), setBy: a.report.SetBy(k),
			value: a.units.SpeedWhole(inKind(l, kind)).Number}
		row.second, row.aside = a.secondFigure(k, l)
		if i, ok := a.solved.estimated.interval(k, kind); ok {
			row.span = a.units.SpeedWhole(i.lo).Number + "–" + a.units.SpeedWhole(i.hi).Number
			v, unit := inKind(l, kind)/a.units.Speed.SI, a.units.Speed.SI
			row.within = "±" + figure.Number(math.Max(math.Round(i.hi/unit)-math.Round(v), math.Round(v)-math.Round(i.lo/unit)), 0)
		}
		a.rows = append(a.rows, row)
	}
	return a.rows
}

// secondFigure is what stands under a limit's name, and beside it.
func (a *App) secondFigure(k perf.Key, l *perf.Limit) (second, aside string) {
	u, c := &a.units, a.doc.current
	switch k {
	case perf.Stall:
		bank := 45 * perf.Degree
		if a.solved.cond.Bank > 44*perf.Degree {
			bank = 60 * perf.Degree
		}
		if a.solved.cond.Bank > 0 {
			aside = "in " + figure.Degrees(a.solved.cond.Bank).String() + " bank"
		}
		if l, ok := a.report.StallAtBank(bank); ok {
			second = figure.Degrees(bank).String() + " bank " + u.SpeedWhole(inKind(&l, a.speedKind())).Number
		}
	case perf.SlowestLevel, perf.FastestLevel:
		second = "set by " + a.report.SetBy(k)
	case perf.LeastPower:
		aside = "endurance"
		second = u.PowerFine(l.PowerRequired).String()
		if l.Endurance > 0 {
			second = figure.Hours(l.Endurance).String() + " on " + a.fuelText() + ", no reserve"
		}
	case perf.SteepestClimb:
		second = u.Gradient(l.Gradient).String()
	case perf.FastestClimb:
		second = u.Rate(l.Rate).String()
	case perf.BestGlide:
		second = figure.GlideRatio(l.Ratio)
	case perf.BestRange:
		switch wind := a.solved.cond.Headwind; {
		case wind > 0.2:
			aside = u.SpeedWhole(wind).String() + " head"
		case wind < -0.2:
			aside = u.SpeedWhole(-wind).String() + " tail"
		}
		if l.Distance > 0 {
			second = u.DistanceWhole(l.Distance).String() + " on " + a.fuelText() + ", no reserve"
		} else if l.FuelFlow > 0 {
			second = u.FuelFlow(l.FuelFlow).String()
		}
	case perf.Carson:
		aside = "cruise"
		second = u.FuelFlow(l.FuelFlow).String()
	case perf.Manoeuvring:
		second = "at " + u.MassWhole(c.Today.MassKg).String()
	case perf.NeverExceed:
		second = "placard"
		if a.solved.answer.Cautions[perf.CautionPlacardTAS] {
			second = "placard, true airspeed"
		}
	}
	if l.SetBy != perf.SetByOptimum {
		switch k {
		case perf.LeastPower, perf.SteepestClimb, perf.FastestClimb, perf.BestGlide, perf.BestRange, perf.Carson:
			second += ", at the " + a.report.SetBy(k)
		}
	}
	return second, aside
}

// aboveMaximum says of an allowed mass that the aeroplane's papers do not allow it.
func (a *App) aboveMaximum(mass float64) string {
	if most := a.solved.aero.MaximumMass; mass > most {
		return " (above the maximum, " + a.units.MassWhole(most).String() + ")"
	}
	return ""
}

// facts are the figures beside the limits: ceilings, turn, allowances and the air.
func (a *App) facts() []Fact {
	ans, u := &a.solved.answer, &a.units
	facts := a.mirror.Facts[:0]
	add := func(key, name, text string, value float64) {
		facts = append(facts, Fact{Key: key, Name: name, ValueText: text, Value: value})
	}
	if s := ans.Service; s.Applies {
		add("service_ceiling", "Service ceiling, density altitude", u.AltitudeCoarse(s.DensityAltitude).String(), s.DensityAltitude)
	}
	if s := ans.Absolute; s.Applies {
		add("absolute_ceiling", "Absolute ceiling, density altitude", u.AltitudeCoarse(s.DensityAltitude).String(), s.DensityAltitude)
	}
	if t := ans.Turn; t.Applies {
		add("turn_bank", "Tightest sustained turn, bank", figure.Degrees(t.Bank).String(), t.Bank)
		add("turn_radius", "Tightest sustained turn, radius", u.Metres(t.Radius).String(), t.Radius)
	}
	allowance := func(key, name string, w *perf.Allowance) {
		if w.MassApplies {
			add(key+"_mass", name+" possible below", u.MassWhole(w.Mass).String()+a.aboveMaximum(w.Mass), w.Mass)
		}
		if w.AltitudeApplies {
			add(key+"_density_altitude", name+" possible below, density altitude", u.AltitudeCoarse(w.DensityAltitude).String(), w.DensityAltitude)
		}
	}
	allowance("level_flight", "Level flight", &ans.Level)
	if g := a.solved.cond.ClimbGradient; g > 0 {
		allowance("climb", "Climb of "+u.Gradient(g).String(), &ans.Climb)
	}
	air := &a.solved.cond.Air
	add("density_altitude", "Density altitude", u.AltitudeCoarse(air.DensityAltitude).String(), air.DensityAltitude)
	add("pressure_altitude", "Pressure altitude", u.AltitudeWhole(air.PressureAltitude).String(), air.PressureAltitude)
	add("temperature", "Outside air temperature", figure.Celsius(air.Temperature).String(), air.Temperature)
	add("mass", "Weight", u.MassWhole(a.solved.cond.Mass).String(), a.solved.cond.Mass)
	return facts
}
