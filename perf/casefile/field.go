package casefile

import (
	"math"
	"strconv"

	"levelspan/perf"
)

// Kind is what a field holds.
type Kind uint8

// The kinds of field.
const (
	KindNumber  Kind = iota // a number that is always set
	KindMaybe               // a number or nothing (null)
	KindText                // free text
	KindChoice              // one of Choices
	KindNumbers             // a list of numbers; path + "[i]" is one of them
)

// Dimension is what a number measures, so that a screen can show it in the person's unit.
type Dimension uint8

// The dimensions. The unit in the file is Field.Unit.
const (
	Ratio Dimension = iota
	Area
	Length
	Mass
	FuelMass
	FuelDensity
	Power
	Energy
	Consumption
	Revolutions
	Speed      // along the flight path
	Correction // a small difference of speeds
	Rate       // of climb
	Altitude
	Temperature
	TemperatureSpread
	Pressure
	Angle
	Time
)

// Field is one entry of the case file: the single statement of what a key holds, that reading, checking, the
// schema and the Aeroplane screen share.
type Field struct {
	Path      string // "aeroplane.configurations[].cl_max"; [] stands for an index
	Kind      Kind
	Dimension Dimension
	Name      string  // in words, "wing area"
	Unit      string  // of the file, "m²"; "" for a ratio
	Min, Max  float64 // inclusive, in Unit; for text the length in characters; for a list the range of each number
	Required  bool    // no default: the key must be there (for the Kinds, where there are any)
	Default   float64 // in Unit, where not Required
	Typical   float64 // a class average to begin with, 0 where there is none
	Choices   []string
	Text      string   // default of a text or choice
	Otherwise string   // the default in words, where it depends on other keys or is "not known"
	Kinds     []string // values of the "kind" beside it that use this field; nil: all
	Help      string   // where a builder finds the number

	quantity    perf.Quantity // valid with hasQuantity
	hasQuantity bool
	scale, zero float64 // SI = file * scale + zero
	omit        bool    // not written when it is absent
	dynamic     func(*Case) float64
	dynamicText func(*Case) string
}

// Quantity is the input of the model that the field fills, if it fills one.
func (f *Field) Quantity() (perf.Quantity, bool) { return f.quantity, f.hasQuantity }

// ToSI converts a number of the file's unit.
func (f *Field) ToSI(x float64) float64 { return x*f.scale + f.zero }

// FromSI converts back.
func (f *Field) FromSI(x float64) float64 { return (x - f.zero) / f.scale }

// Applies reports whether the field counts where the "kind" beside it is kind.
func (f *Field) Applies(kind string) bool {
	if len(f.Kinds) == 0 {
		return true
	}
	for _, k := range f.Kinds {
		if k == kind {
			return true
		}
	}
	return false
}

// holds reports whether x is allowed.
func (f *Field) holds(x float64) bool { return x >= f.Min && x <= f.Max }

// Allowed is the range in words, in the file's unit.
func (f *Field) Allowed() string {
	switch f.Kind {
	case KindChoice:
		return oneOf(f.Choices)
	case KindText:
		if f.Min > 0 {
			return strconv.Itoa(int(f.Min)) + " to " + strconv.Itoa(int(f.Max)) + " printable characters"
		}
		return "at most " + strconv.Itoa(int(f.Max)) + " printable characters"
	}
	s := formatNumber(f.Min) + " to " + formatNumber(f.Max)
	if f.Unit != "" {
		s += " " + f.Unit
	}
	if f.Kind == KindMaybe {
		s += ", or null"
	}
	return s
}

func oneOf(names []string) string {
	s := ""
	for i, n := range names {
		if i > 0 {
			s += ", "
			if i == len(names)-1 {
				s = s[:len(s)-2] + " or "
			}
		}
		s += quote(n)
	}
	return s
}

// tidy rounds to 12 significant digits, so that a range converted from SI reads as it was meant.
func tidy(x float64) float64 {
	y, err := strconv.ParseFloat(strconv.FormatFloat(x, 'g', 12, 64), 64)
	if err != nil {
		return x
	}
	return y
}

// formatNumber writes x as JSON does: the shortest digits that give x back.
func formatNumber(x float64) string {
	if math.IsNaN(x) || math.IsInf(x, 0) {
		return "null"
	}
	return string(appendNumber(nil, x))
}

func appendNumber(b []byte, x float64) []byte {
	if x == 0 { // also -0
		return append(b, '0')
	}
	format := byte('f')
	if a := math.Abs(x); a < 1e-6 || a >= 1e21 {
		format = 'e'
	}
	return strconv.AppendFloat(b, x, format, -1, 64)
}
