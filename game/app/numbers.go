package app

import (
	"math"
	"strconv"
	"strings"

	"levelspan/game/ui"
	"levelspan/perf"
	"levelspan/perf/casefile"
	"levelspan/perf/casefile/figure"
)

// shown is an SI figure in a unit.
func shown(u figure.Unit, x float64) float64 { return x / u.SI }

// inSI is the inverse of shown.
func inSI(u figure.Unit, x float64) float64 { return x * u.SI }

// fuelText is what is on board, as fuel or charge.
func (a *App) fuelText() string {
	c := a.doc.current
	if !a.units.Electric {
		return a.units.FuelWhole(c.Today.FuelKg).String()
	}
	switch {
	case c.Today.ChargeKWh != nil:
		return a.units.FuelWhole(*c.Today.ChargeKWh * perf.KilowattHour).String()
	case c.Aeroplane.Battery != nil:
		return a.units.FuelWhole(c.Aeroplane.Battery.UsableKWh * perf.KilowattHour).String()
	}
	return "all of the charge"
}

// allowanceText is the inverse answer in words: "912 kg, or below 17 400 ft density altitude"; "" where there is none. A
// mass above the maximum is said to be one.
func (a *App) allowanceText(w *perf.Allowance, short bool) string {
	u, s := &a.units, ""
	if w.MassApplies {
		s = u.MassWhole(w.Mass).String() + a.aboveMaximum(w.Mass)
	}
	if w.AltitudeApplies {
		switch {
		case short && s != "":
			s += " or "
		case s != "":
			s += ", or below "
		}
		s += u.AltitudeCoarse(w.DensityAltitude).String()
		if !short {
			s += " density altitude"
		}
	}
	return s
}

// plainTicks keeps the ticks of an axis, their figures written as everywhere else on the screen.
type plainTicks struct {
	lo, hi, length, spacing, factor float64
	list                            []ui.Tick
}

// For is the ticks for lo..hi on length pixels, about spacing or more apart.
func (t *plainTicks) For(lo, hi, length, spacing float64) []ui.Tick {
	return t.scaled(lo, hi, length, spacing, 1)
}

// scaled is For with the figures written in units of factor.
func (t *plainTicks) scaled(lo, hi, length, spacing, factor float64) []ui.Tick {
	if t.list != nil && t.lo == lo && t.hi == hi && t.length == length && t.spacing == spacing && t.factor == factor {
		return t.list
	}
	t.lo, t.hi, t.length, t.spacing, t.factor = lo, hi, length, spacing, factor
	step := ui.NiceStep(hi-lo, math.Max(1, length/math.Max(1, spacing)))
	t.list = ui.AppendTicks(t.list[:0], lo, hi, step)
	for i := range t.list {
		decimals := 0
		for v := step / factor; decimals < 6 && v != math.Trunc(v); decimals++ {
			v *= 10
		}
		t.list[i].Text = figure.Number(t.list[i].Value/factor, decimals)
	}
	return t.list
}

// measure is how a number of the case file is shown and typed.
type measure struct {
	figure.Entry
	unit     string
	k        float64 // shown = Entry's figure * k
	decimals int     // at most
}

func (m measure) shown(file float64) float64 { return m.FromFile(file) * m.k }
func (m measure) file(shown float64) float64 { return m.ToFile(shown / m.k) }

// text is a number of the file as shown, without its unit.
func (m measure) text(file float64) string { return plain(m.shown(file), m.decimals) }

// withUnit is text with the unit.
func (m measure) withUnit(file float64) string {
	return figure.Figure{Number: m.text(file), Unit: m.unit}.String()
}

// allowed is the range of the field as typed; its ends are rounded inwards.
func (m measure) allowed() string {
	return plain(m.Min*m.k, m.decimals) + " to " + figure.Figure{Number: plain(m.Max*m.k, m.decimals), Unit: m.unit}.String()
}

// plain writes x with at most so many decimals, 6 significant digits, and no needless zeros.
func plain(x float64, decimals int) string {
	y, err := strconv.ParseFloat(strconv.FormatFloat(x, 'g', 6, 64), 64)
	if err != nil || math.IsNaN(y) || math.IsInf(y, 0) {
		return figure.None
	}
	s := figure.Number(y, decimals)
	if strings.Contains(s, ".") {
		s = strings.TrimRight(strings.TrimRight(s, "0"), ".")
	}
	if s == figure.Minus+"0" {
		return "0"
	}
	return s
}

func isDiameter(path string) bool { return strings.HasSuffix(path, "diameter_m") }

func isPercent(path string) bool {
	return strings.HasSuffix(path, "power_fraction") || strings.HasSuffix(path, "climb_gradient")
}

// measureOf chooses the unit for a field. Who measures wings in feet measures propellers in inches; power settings and
// gradients are in per cent (common practice).
func measureOf(f *casefile.Field, u figure.Units) measure {
	e := u.Entry(*f)
	m := measure{e, e.Unit, 1, 6}
	switch f.Dimension {
	case casefile.Altitude, casefile.Revolutions:
		m.decimals = 0
	case casefile.Mass, casefile.FuelMass, casefile.Speed, casefile.Temperature, casefile.Angle, casefile.Time, casefile.Power, casefile.Energy:
		m.decimals = 1
	case casefile.Correction, casefile.Pressure, casefile.Rate:
		m.decimals = 2
	case casefile.Length, casefile.Area:
		m.decimals = 3
	}
	switch {
	case f.Dimension == casefile.Length && u.Length.Name == "ft" && isDiameter(f.Path):
		m.unit, m.k, m.decimals = "in", 12, 2
	case isPercent(f.Path):
		m.unit, m.k, m.decimals = "%", 100, 2
	}
	return m
}
