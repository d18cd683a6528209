package app

import "levelspan/perf"

// keyNamed is the limit that the case file and the mirror call by that name.
func keyNamed(name string) (perf.Key, bool) {
	for k := perf.Key(0); k < perf.KeyCount; k++ {
		if k.String() == name {
			return k, true
		}
	}
	return 0, false
}

// The advisory line stands on every screen.
const (
	advisory      = "Advisory. Handbook, placards and local rules govern."
	advisoryShort = "Advisory only: the handbook governs."
	advisoryLeast = "Advisory only."
)
