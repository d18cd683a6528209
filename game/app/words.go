package app

import (
	"strings"

	"levelspan/perf"
	"levelspan/perf/casefile"
)

// keyNamed is the limit that the case file and the mirror call by that name.
func keyNamed(name string) (perf.Key, bool) {
	for k := perf.Key(0); k < perf.KeyCount; k++ {
		if k.String() == name {
			return k, true
		}
	}
	return 0, false
}

// limitName is what a limit is called on the screen.
func limitName(k perf.Key, c *casefile.Case) string {
	switch k {
	case perf.Stall:
		return "Stall, " + c.Today.Configuration
	case perf.SlowestLevel:
		return "Slowest level"
	case perf.LeastPower:
		return "Least power"
	case perf.SteepestClimb:
		return "Steepest climb"
	case perf.FastestClimb:
		return "Fastest climb"
	case perf.BestGlide:
		return "Best glide"
	case perf.BestRange:
		return "Best range"
	case perf.Carson:
		return "Carson"
	case perf.Manoeuvring:
		return "Manoeuvring"
	case perf.FastestLevel:
		return "Fastest level"
	case perf.NeverExceed:
		return "Never exceed"
	}
	return ""
}

// limitSymbol is the trade's symbol of a limit, "" where it has none.
func limitSymbol(k perf.Key, c *casefile.Case) string {
	if k != perf.Stall {
		return k.Symbol()
	}
	if strings.EqualFold(c.Today.Configuration, "landing") {
		return k.Symbol() + "0"
	}
	return k.Symbol() + "1"
}

// setByName is what sets a limit, in a word; "" where nothing but the aeroplane's own curves does.
func setByName(s perf.SetBy) string {
	if s == perf.SetByLift {
		return "stall"
	}
	return s.String()
}

// The advisory line stands on every screen.
const (
	advisory      = "Advisory. Handbook, placards and local rules govern."
	advisoryShort = "Advisory only: the handbook governs."
	advisoryLeast = "Advisory only."
)
