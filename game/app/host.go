// Package app is the program minus the window: state, intents, screens, formatting. Feed it input with Step, show its
// Scene, mirror its Controls. It imports no ebiten and nothing of the operating system.
package app

import (
	"time"

	"levelspan/game/keep"
	"levelspan/game/ui"
)

// Options are what the program starts with.
type Options struct {
	Host  Host
	Store keep.Store       // where cases are kept; nil: in memory, until the end
	Open  *Opened          // a file or link to start with; nil: the case that was last worked on, or else the demo
	Clock func() time.Time // local time of day, for "changed today"; nil: time.Now
	// HostedBase is the address of a hosted copy of the page, for the QR code of a page that was opened from a disk;
	// "" unknown.
	HostedBase string
}

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

// Paster is a Host that can read the clipboard. Where the host is none, or cannot just now, the person pastes into the
// text field of the Open sheet.
type Paster interface {
	// Paste reads the clipboard's text; it comes as Input.Opened with Text, or with Pasted and Err.
	Paste()
}

// Shared is what the system's share sheet is offered.
type Shared struct {
	Title, Text, Link    string
	FileName, MIME, File string // the case file; hosts that cannot share files leave it out
}

// Sharer is a Host that may have a system share sheet.
type Sharer interface {
	// CanShare reports whether there is one; it is asked when the Share sheet opens.
	CanShare() bool
	// Share shows it. That the person closes it is no failure.
	Share(s Shared)
}

// Opened is a file, link or text that arrived.
type Opened struct {
	Name   string
	Data   []byte
	Link   string // a fragment instead of Data
	Text   string // pasted or scanned, a link or the text of a case file: the program finds out which
	Pasted bool   // Text comes from Paster.Paste; with Err, or with Text "", the Open sheet says so and offers its field
	Err    string // or why it could not be read
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
	StoreChanged             bool     // another window may have written to the Store: the page's storage event
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
