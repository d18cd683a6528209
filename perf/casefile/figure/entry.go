package figure

import (
	"math"
	"strconv"
	"strings"

	"levelspan/perf"
	"levelspan/perf/casefile"
)

// Entry is how a person reads and types one field of the case: a unit of the trade in place of the file's.
type Entry struct {
	Unit        string
	Min, Max    float64 // as typed
	scale, zero float64 // file = typed*scale + zero
}

// Entry is the way of entering a field in these units.
func (u Units) Entry(f casefile.Field) Entry {
	e := Entry{Unit: f.Unit, scale: 1}
	si := func(unit Unit) { e.Unit, e.scale = unit.Name, unit.SI } // for files in the SI unit
	switch f.Dimension {
	case casefile.Area:
		e.scale = u.Length.SI * u.Length.SI
		e.Unit = u.Length.Name + "²"
	case casefile.Length:
		si(u.Length)
	case casefile.Mass:
		si(u.Mass)
	case casefile.FuelMass:
		si(u.Fuel)
	case casefile.Power:
		si(u.Power)
	case casefile.Speed, casefile.Correction:
		si(u.Speed)
	case casefile.Rate:
		si(u.RateUnit)
	case casefile.Altitude:
		si(u.Altitude)
	case casefile.Consumption: // kg/kWh in the file
		if u.Power.Name == "hp" && u.Mass.Name == "lb" {
			e.Unit, e.scale = "lb/hp/h", perf.Pound/(perf.Horsepower/perf.Kilowatt)
		}
	}
	e.Min, e.Max = inward(e.FromFile(f.Min), 1), inward(e.FromFile(f.Max), -1)
	return e
}

// inward rounds an end of the range to 4 significant digits, towards the inside of it, so that what is shown is allowed.
func inward(x float64, toward float64) float64 {
	if x == 0 || math.IsNaN(x) || math.IsInf(x, 0) {
		return x
	}
	if y := significant(x, 9); math.Abs(y-significant(x, 4)) <= 1e-9*math.Abs(y) {
		return significant(x, 4)
	}
	step := math.Pow(10, math.Floor(math.Log10(math.Abs(x)))-3)
	if toward > 0 {
		return significant(math.Ceil(x/step)*step, 9)
	}
	return significant(math.Floor(x/step)*step, 9)
}

func significant(x float64, digits int) float64 {
	y, err := strconv.ParseFloat(strconv.FormatFloat(x, 'g', digits, 64), 64)
	if err != nil {
		return x
	}
	return y
}

// FromFile converts a number of the file to what is typed.
func (e Entry) FromFile(x float64) float64 { return (x - e.zero) / e.scale }

// ToFile converts what is typed to the file's unit.
func (e Entry) ToFile(x float64) float64 { return x*e.scale + e.zero }

// Format writes a number of the file as it would be typed: at most 6 significant digits, no needless zeros, ASCII.
func (e Entry) Format(x float64) string {
	y := significant(e.FromFile(x), 6)
	if math.IsNaN(y) || math.IsInf(y, 0) {
		return None
	}
	if y == 0 {
		return "0"
	}
	return strconv.FormatFloat(y, 'f', -1, 64)
}

// Text is Format with the unit.
func (e Entry) Text(x float64) string { return Figure{e.Format(x), e.Unit}.String() }

// Allowed is the range as typed, with the unit.
func (e Entry) Allowed() string {
	lo, hi := strconv.FormatFloat(e.Min, 'f', -1, 64), strconv.FormatFloat(e.Max, 'f', -1, 64)
	return Figure{lo + " to " + hi, e.Unit}.String()
}

// Parse reads what was typed and gives it in the file's unit. A comma may stand for the point, spaces for grouping, and
// either minus counts. ok is false for what is no finite number.
func (e Entry) Parse(typed string) (file float64, ok bool) {
	s := strings.NewReplacer(" ", "", Group, "", "\u2009", "", Minus, "-", ",", ".").Replace(typed)
	for i := 0; i < len(s); i++ {
		if c := s[i]; (c < '0' || c > '9') && c != '.' && c != '-' && c != '+' && c != 'e' && c != 'E' {
			return 0, false
		}
	}
	x, err := strconv.ParseFloat(s, 64)
	if err != nil || math.IsInf(e.ToFile(x), 0) {
		return 0, false
	}
	return e.ToFile(x), true
}
