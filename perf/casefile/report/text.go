package report

import (
	"strings"
	"unicode/utf8"

	"levelspan/perf"
	"levelspan/perf/casefile/figure"
)

// Text is the answer as a table in the person's units, for a note or a terminal; lines end with a newline.
func (r *Report) Text() string {
	var b strings.Builder
	line := func(parts ...string) {
		for _, p := range parts {
			b.WriteString(p)
		}
		b.WriteByte('\n')
	}
	name := r.Case.Aeroplane.Name
	if note := r.Case.Aeroplane.Note; note != "" {
		name += " (" + strings.Join(strings.Fields(note), " ") + ")"
	}
	line(name)
	line(r.loading())
	line(r.air())
	line(r.certainty())
	line()
	if !r.LevelFlight() {
		for _, s := range r.Shortfall() {
			line(s)
		}
		line()
	}
	b.WriteString(table(r.rows(), []bool{false, false, true, true, true, true, false, false}))
	line()
	b.WriteString(table(r.facts(), []bool{false, false}))
	line()
	for _, c := range r.Cautions() {
		if c != perf.CautionAdvisory {
			line("Caution: ", c.Text())
		}
	}
	line(perf.CautionAdvisory.Text())
	return b.String()
}

// loading is today's mass, configuration, power, bank, wind and fuel in a line.
func (r *Report) loading() string {
	c, u := &r.Condition, r.Units
	parts := []string{u.MassWhole(c.Mass).String(), r.Case.Today.Configuration}
	if c.PowerFraction == 1 {
		parts = append(parts, "full throttle")
	} else {
		parts = append(parts, figure.Percent(c.PowerFraction).String()+" power")
	}
	if c.Bank > 0 {
		parts = append(parts, figure.Degrees(c.Bank).String()+" bank")
	} else {
		parts = append(parts, "wings level")
	}
	parts = append(parts, r.Wind())
	if c.Fuel > 0 {
		parts = append(parts, u.FuelWhole(c.Fuel).String()+" "+r.fuelWord()+" on board")
	}
	return strings.Join(parts, ", ")
}

func (r *Report) fuelWord() string {
	if r.Units.Electric {
		return "charge"
	}
	return "fuel"
}

// Wind is today's wind along the track in words.
func (r *Report) Wind() string {
	w, u := r.Condition.Headwind, r.Units
	switch {
	case w > 0:
		return u.SpeedWhole(w).String() + " head wind"
	case w < 0:
		return u.SpeedWhole(-w).String() + " tail wind"
	}
	return "no wind"
}

// certainty says what the figures come from, and how likely level flight is where that is not plain.
func (r *Report) certainty() string {
	s := r.Basis
	if r.Intervals == nil {
		return s
	}
	s += " Intervals hold 95 % of the probability."
	if p := r.Intervals.LevelProbability; p > 0.001 && p < 0.999 {
		s += " Level flight is possible with a probability of " + figure.Percent(p).String() + "."
	}
	return s
}

func (r *Report) air() string {
	w, u := &r.Condition.Air, r.Units
	s := "Density altitude " + u.AltitudeFine(w.DensityAltitude).String() + ", pressure altitude " + u.AltitudeFine(w.PressureAltitude).String() +
		", " + figure.Celsius(w.Temperature).String()
	if w.DewPoint > 0 {
		s += ", dew point " + figure.Celsius(w.DewPoint).String()
	}
	return s
}

// Shortfall says, where no level flight is possible, why, by how much, and what would make it possible.
func (r *Report) Shortfall() []string {
	if r.LevelFlight() {
		return nil
	}
	a, u := &r.Answer, r.Units
	lines := []string{a.Outcome.Text()}
	if a.Shortfall > 0 {
		lines = append(lines, "Least is missing at "+r.chosen(r.speeds(a.ShortfallTAS))+": "+u.PowerFine(a.Shortfall).String()+" of thrust power.")
	}
	var ways []string
	if a.Level.MassApplies {
		ways = append(ways, "below "+r.mass(&a.Level)+" in this air")
	}
	if a.Level.AltitudeApplies {
		ways = append(ways, "below "+u.AltitudeFine(a.Level.DensityAltitude).String()+" density altitude at this mass")
	}
	if ways == nil {
		return append(lines, "Neither a lower mass nor a lower height that the model knows would make it possible.")
	}
	return append(lines, "It would be possible "+strings.Join(ways, ", or ")+".")
}

// chosen is a speed of the chosen kind with its label.
func (r *Report) chosen(l perf.Limit) string {
	return figure.Figure{Number: r.Units.SpeedFine(r.Units.SpeedOf(&l)).Number, Unit: r.Units.SpeedLabel()}.String()
}

// mass is the greatest mass of an allowance in words; one above the maximum mass says so.
func (r *Report) mass(x *perf.Allowance) string {
	s := r.Units.MassWhole(x.Mass).String()
	if x.Mass > r.Aeroplane.MaximumMass {
		s += " (above the maximum mass, " + r.Units.MassWhole(r.Aeroplane.MaximumMass).String() + ")"
	}
	return s
}

func (r *Report) rows() [][]string {
	u := r.Units
	rows := [][]string{{"Speed, " + u.Speed.Name, "", "CAS", "95 %", "IAS", "TAS", "set by", ""}}
	for _, k := range Order(&r.Answer) {
		l := &r.Answer.Limits[k]
		rows = append(rows, []string{r.Name(k), r.Symbol(k), u.SpeedFine(float64(l.CAS)).Number, r.span(k), u.SpeedFine(float64(l.IAS)).Number,
			u.SpeedFine(float64(l.TAS)).Number, r.SetBy(k), r.Second(k)})
	}
	return rows
}

// span is the interval of a limit's calibrated airspeed; "" where it has none.
func (r *Report) span(k perf.Key) string {
	if r.Intervals == nil || Placarded(k) || !r.Intervals.Limits[k].CAS.Applies {
		return ""
	}
	i := &r.Intervals.Limits[k].CAS
	return r.Units.SpeedFine(i.Low).Number + " to " + r.Units.SpeedFine(i.High).Number
}

// Second is the figure that goes with a limit, in words; "" where there is none. Speeds in it are of the chosen kind.
func (r *Report) Second(k perf.Key) string {
	l, u := &r.Answer.Limits[k], r.Units
	toEmpty := " on " + u.FuelWhole(r.Condition.Fuel).String() + " to empty tanks"
	if u.Electric {
		toEmpty = " on " + u.FuelWhole(r.Condition.Fuel).String() + " to no charge"
	}
	switch k {
	case perf.Stall:
		if s, ok := r.StallAtBank(45 * perf.Degree); ok {
			return "at 45° bank " + r.chosen(s)
		}
	case perf.LeastPower:
		s := u.PowerFine(l.PowerRequired).String() + " of thrust power"
		if l.Endurance > 0 {
			s += "; " + figure.Hours(l.Endurance).String() + toEmpty
		}
		return s
	case perf.SteepestClimb:
		return u.Gradient(l.Gradient).String()
	case perf.FastestClimb:
		return u.Rate(l.Rate).String()
	case perf.BestGlide:
		return figure.GlideRatio(l.Ratio) + ", sinking " + u.Rate(l.Sink).String() + "; least sink at " + r.chosen(r.speeds(l.LeastSinkTAS))
	case perf.BestRange:
		s := r.Wind()
		if l.FuelFlow > 0 {
			s = u.FuelFlow(l.FuelFlow).String() + ", " + s
		}
		if l.Distance > 0 {
			s = u.DistanceWhole(l.Distance).String() + toEmpty + "; " + s
		}
		return s
	case perf.Carson:
		if l.FuelFlow > 0 {
			return u.FuelFlow(l.FuelFlow).String()
		}
	case perf.Manoeuvring:
		if r.Condition.Mass >= r.Aeroplane.MaximumMass {
			return "at maximum mass"
		}
		return "at " + u.MassWhole(r.Condition.Mass).String()
	case perf.FastestLevel:
		return u.PowerFine(l.ShaftPower).String() + " at the shaft"
	}
	return ""
}

// facts are what is no limit: ceilings, turn and allowances.
func (r *Report) facts() [][]string {
	a, u := &r.Answer, r.Units
	var rows [][]string
	ceiling := func(name string, c *perf.Ceiling) {
		text := "none below the top of the model's atmosphere"
		if c.Applies {
			text = u.AltitudeFine(c.DensityAltitude).String() + " density altitude (" + u.AltitudeFine(c.PressureAltitude).String() + " pressure altitude)"
		}
		rows = append(rows, []string{name, text})
	}
	ceiling("Service ceiling", &a.Service)
	ceiling("Absolute ceiling", &a.Absolute)
	if t := &a.Turn; t.Applies {
		rows = append(rows, []string{"Tightest level turn", "radius " + u.Metres(t.Radius).String() + ", " + figure.DegreesFine(t.Bank).String() + " bank, " +
			figure.Number(t.LoadFactor, 2) + " g, " + figure.DegreesFine(t.Rate).String() + "/s, at " + r.chosen(r.speeds(t.TAS))})
	}
	allowance := func(name string, x *perf.Allowance) {
		var parts []string
		if x.MassApplies {
			parts = append(parts, r.mass(x)+" in this air")
		}
		if x.AltitudeApplies {
			parts = append(parts, u.AltitudeFine(x.DensityAltitude).String()+" density altitude at this mass")
		}
		if parts == nil {
			parts = []string{"not at any mass or height that the model knows"}
		}
		rows = append(rows, []string{name, strings.Join(parts, "; ")})
	}
	allowance("Level flight up to", &a.Level)
	if g := r.Condition.ClimbGradient; g > 0 {
		allowance("Climb of "+u.Gradient(g).String()+" up to", &a.Climb)
	}
	return rows
}

// table aligns cells in columns, right-aligned where asked, with two spaces between; no line ends in spaces.
func table(rows [][]string, right []bool) string {
	width := make([]int, len(right))
	for _, row := range rows {
		for i, cell := range row {
			width[i] = max(width[i], utf8.RuneCountInString(cell))
		}
	}
	var b strings.Builder
	for _, row := range rows {
		var line strings.Builder
		for i, cell := range row {
			if i > 0 && width[i] > 0 {
				line.WriteString("  ")
			}
			pad := strings.Repeat(" ", width[i]-utf8.RuneCountInString(cell))
			if right[i] {
				line.WriteString(pad + cell)
			} else {
				line.WriteString(cell + pad)
			}
		}
		b.WriteString(strings.TrimRight(line.String(), " "))
		b.WriteByte('\n')
	}
	return b.String()
}
