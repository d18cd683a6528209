// Package app is the program minus the window: state, intents, screens, formatting. Feed it input with Step, show its
// Scene, mirror its Controls. It imports no ebiten and nothing of the operating system.
package app

import (
	"time"

	"levelspan/game/ui"
)

// Host does what only the outside can do. All calls return at once; results come back in Input.
type Host interface {
	// Copy puts text on the clipboard; the result comes as Input.Notices.
	Copy(what, text string)
	// OpenFile asks the person for a case file; it comes as Input.Opened.
	OpenFile()
	// SaveFile offers data to the person under a suggested name.
	SaveFile(name, mime string, data []byte)
	// LinkBase is the address that a share link begins with ("" where there is none: the fragment alone is copied).
	LinkBase() string
	// Version is the program's version and build, as shown.
	Version() string
}

// Opened is a file or link that arrived.
type Opened struct {
	Name string
	Data []byte
	Link string // a fragment instead of Data
	Err  string // or why it could not be read
}

// Input is all that happened since the last Step.
type Input struct {
	Width, Height, Scale     float64 // window in logical pixels; device pixels a logical pixel
	Top, Right, Bottom, Left float64 // safe-area insets, logical pixels
	PrefersDark              bool    // first frame only decides the palette
	Now                      time.Duration
	Events                   []ui.Event
	Opened                   []Opened
	Notices                  []string // "copied", "saved" ... shown for a moment
	Failures                 []string // shown until dismissed
}

// MirrorRow is one row of the table of limits beside the canvas, SI and as shown.
type MirrorRow struct {
	Key                    string // "stall"
	Name, Symbol, SetBy    string
	ValueText, SecondText  string
	TASMps, CASMps, IASMps float64
	HasInterval            bool
	LowCASMps, HighCASMps  float64
	Selected               bool
}

// Mirror is what the drawing says, for screen readers, tests and copying.
type Mirror struct {
	Title    string
	Screen   string
	Summary  string // one sentence: level flight possible, from .. to ..; or the shortfall
	Rows     []MirrorRow
	Facts    []Fact // ceilings, turn, allowances, air
	Warnings []string
	Status   string // the last notice, for the live region
}

// Fact is a named value outside the table.
type Fact struct {
	Key, Name, ValueText string
	Value                float64 // SI
}
