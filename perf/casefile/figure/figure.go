// Package figure writes the model's SI figures as the person reads them: in the chosen units, rounded by one rule for
// each quantity. The command, the page and its mirror all print through it, so that they agree to the digit. Whole
// figures are for the panel, fine ones for the command's table.
package figure

import (
	"math"
	"strconv"
)

// The characters of numbers that are not ASCII: a no-break space between thousands and a true minus.
const (
	Group = "\u00a0"
	Minus = "\u2212"
	None  = "\u2013" // stands for a number that is not finite
)

// Figure is a number as shown and its unit.
type Figure struct{ Number, Unit string }

// String is the number, a no-break space and the unit; the degree sign of an angle follows without a space.
func (f Figure) String() string {
	switch f.Unit {
	case "":
		return f.Number
	case "°", "%":
		return f.Number + f.Unit
	}
	return f.Number + Group + f.Unit
}

// Number writes x with that many decimals, thousands grouped.
func Number(x float64, decimals int) string {
	if math.IsNaN(x) || math.IsInf(x, 0) {
		return None
	}
	s := strconv.FormatFloat(math.Abs(x), 'f', decimals, 64)
	whole, rest := s, ""
	for i := range s {
		if s[i] == '.' {
			whole, rest = s[:i], s[i:]
		}
	}
	if len(whole) > 3 {
		grouped := ""
		for len(whole) > 3 {
			grouped = Group + whole[len(whole)-3:] + grouped
			whole = whole[:len(whole)-3]
		}
		whole += grouped
	}
	s = whole + rest
	if x < 0 && hasDigit(s) {
		s = Minus + s
	}
	return s
}

// hasDigit reports whether any digit but 0 is in s, so that a rounded nothing carries no minus.
func hasDigit(s string) bool {
	for i := 0; i < len(s); i++ {
		if s[i] >= '1' && s[i] <= '9' {
			return true
		}
	}
	return false
}

// round is x to the nearest multiple of step.
func round(x, step float64) float64 { return math.Round(x/step) * step }
