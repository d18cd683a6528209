package perf

var keyNames = [KeyCount]struct{ key, symbol string }{
	Stall:         {"stall", "VS"},
	SlowestLevel:  {"slowest_level", ""},
	LeastPower:    {"least_power", ""},
	SteepestClimb: {"steepest_climb", "VX"},
	FastestClimb:  {"fastest_climb", "VY"},
	BestGlide:     {"best_glide", ""},
	BestRange:     {"best_range", ""},
	Carson:        {"carson", ""},
	Manoeuvring:   {"manoeuvring", "VA"},
	FastestLevel:  {"fastest_level", "VH"},
	NeverExceed:   {"never_exceed", "VNE"},
}

// String is the key as other programs see it, "slowest_level"; "" for no Key.
func (k Key) String() string {
	if k >= KeyCount {
		return ""
	}
	return keyNames[k].key
}

// Symbol is the trade's symbol, "VX", or "". The stall's is VS; whether VS1 or VS0 is the caller's to say.
func (k Key) Symbol() string {
	if k >= KeyCount {
		return ""
	}
	return keyNames[k].symbol
}

var setByNames = [...]string{SetByOptimum: "", SetByLift: "lift", SetByPower: "power", SetByRPM: "rpm", SetByPlacard: "placard"}

// String is "lift", "power", "rpm", "placard", or "" for SetByOptimum.
func (b SetBy) String() string {
	if int(b) >= len(setByNames) {
		return ""
	}
	return setByNames[b]
}

var outcomeNames = [outcomeCount]struct{ code, text string }{
	LevelFlight:    {"level-flight", "Level flight is possible."},
	TooLittlePower: {"too-little-power", "No level flight: at every speed at or above the stall the power available is less than the power required."},
	PlacardTooSlow: {"placard-too-slow", "No level flight: the never-exceed speed is below the slowest speed of level flight."},
	RPMTooHigh:     {"rpm-too-high", "No level flight: at every speed it takes more than the maximum rpm."},
}

// String is a short code, "too-little-power"; "" for no Outcome.
func (o Outcome) String() string {
	if o >= outcomeCount {
		return ""
	}
	return outcomeNames[o].code
}

// Text is one sentence for a person.
func (o Outcome) Text() string {
	if o >= outcomeCount {
		return ""
	}
	return outcomeNames[o].text
}
