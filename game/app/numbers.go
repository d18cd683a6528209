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

// allowanceText is the inverse answer in words: "912 kg, or below 17 400 ft density altitude"; "" where there is none.
func allowanceText(u *figure.Units, a *perf.Allowance) string {
	s := ""
	if a.MassApplies {
		s = u.MassWhole(a.Mass).String()
	}
	if a.AltitudeApplies {
		if s != "" {
			s += ", or below "
		}
		s += u.AltitudeCoarse(a.DensityAltitude).String() + " density altitude"
	}
	return s
}

// plainTicks is the ticks with their figures written as everywhere else on the screen.
type plainTicks struct {
	ui.Ticks
	from *ui.Tick
	list []ui.Tick
}

// For is the ticks for lo..hi on length pixels, about spacing or more apart.
func (t *plainTicks) For(lo, hi, length, spacing float64) []ui.Tick {
	ticks := t.Ticks.For(lo, hi, length, spacing)
	if len(ticks) == 0 {
		return nil
	}
	if t.from == &ticks[0] && len(t.list) == len(ticks) && t.list[0].Value == ticks[0].Value && t.list[len(ticks)-1].Value == ticks[len(ticks)-1].Value {
		return t.list
	}
	t.from, t.list = &ticks[0], t.list[:0]
	for _, k := range ticks {
		if k.Value == float64(int64(k.Value)) {
			k.Text = figure.Number(k.Value, 0)
		}
		t.list = append(t.list, k)
	}
	return t.list
}

// measure is how a number of the case file is shown and typed.
type measure struct {
	figure.Entry
	unit string
	k    float64 // shown = Entry's figure * k
}

func (m measure) shown(file float64) float64 { return m.FromFile(file) * m.k }
func (m measure) file(shown float64) float64 { return m.ToFile(shown / m.k) }

// text is a number of the file as shown, without its unit.
func (m measure) text(file float64) string { return significant(m.shown(file)) }

// withUnit is text with the unit.
func (m measure) withUnit(file float64) string {
	return figure.Figure{Number: m.text(file), Unit: m.unit}.String()
}

// allowed is the range of the field as typed; its ends are rounded inwards.
func (m measure) allowed() string {
	return significant(m.Min*m.k) + " to " + figure.Figure{Number: significant(m.Max * m.k), Unit: m.unit}.String()
}

// significant writes x with at most 6 significant digits and no needless zeros.
func significant(x float64) string {
	if math.IsNaN(x) || math.IsInf(x, 0) {
		return figure.None
	}
	y, err := strconv.ParseFloat(strconv.FormatFloat(x, 'g', 6, 64), 64)
	if err != nil || y == 0 {
		return "0"
	}
	return strings.Replace(strconv.FormatFloat(y, 'f', -1, 64), "-", figure.Minus, 1)
}

func isDiameter(path string) bool { return strings.HasSuffix(path, "diameter_m") }

func isPercent(path string) bool {
	return strings.HasSuffix(path, "power_fraction") || strings.HasSuffix(path, "climb_gradient")
}

// measureOf chooses the unit for a field. Who measures wings in feet measures propellers in inches; power settings and
// gradients are in per cent (common practice).
func measureOf(f *casefile.Field, u figure.Units) measure {
	e := u.Entry(*f)
	m := measure{e, e.Unit, 1}
	switch {
	case f.Dimension == casefile.Length && u.Length.Name == "ft" && isDiameter(f.Path):
		m.unit, m.k = "in", 12
	case isPercent(f.Path):
		m.unit, m.k = "%", 100
	}
	return m
}
