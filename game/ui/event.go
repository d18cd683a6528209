package ui

import "time"

// EventKind is what happened outside.
type EventKind uint8

// The events. Positions in logical pixels.
const (
	PointerDown EventKind = iota
	PointerMove
	PointerUp
	PointerCancel
	Wheel    // DX, DY in logical pixels, positive towards the end of the content; Ctrl means zoom and is ignored
	KeyDown  // Key or Rune; ID is the focused control where the outside keeps the focus (the page), else ""
	FocusOn  // the outside moved the focus to control ID ("" none)
	Activate // the outside activated control ID (a click on its mirror element)
	SetValue // the outside set slider ID to Value
	SetText  // the outside changed free text of field ID to Text
)

// Key is a key that has a meaning here; printable ones come as Rune. The space bar has both, in one event: KeySpace
// with the Rune ' '.
type Key uint8

// The keys.
const (
	KeyNone Key = iota
	KeyLeft
	KeyRight
	KeyUp
	KeyDownArrow
	KeyPageUp
	KeyPageDown
	KeyHome
	KeyEnd
	KeyEnter
	KeySpace
	KeyEscape
	KeyBackspace
	KeyDelete
	KeyTab
	KeyUndo // Ctrl/Cmd+Z
	KeyRedo // Ctrl/Cmd+Shift+Z, Ctrl+Y
	KeyOpen // Ctrl/Cmd+O
	KeySave // Ctrl/Cmd+S
)

// Event is one thing that happened outside, copied once a tick.
type Event struct {
	Kind    EventKind
	Pointer int // one number per finger or mouse
	Touch   bool
	X, Y    float64
	DX, DY  float64
	Key     Key
	Rune    rune
	Shift   bool
	ID      string
	Value   float64
	Text    string
	Time    time.Duration // since any fixed moment, rising
}

// ActionKind is what an event means to a control.
type ActionKind uint8

// The actions.
const (
	Tap        ActionKind = iota // released inside; by keyboard (Key is set) or from the outside, at the middle of Bounds
	DoubleTap                    // follows the second Tap; on a slider also Enter, Space or Activate: asks for an exact value
	DragStart                    // the slop is passed; X - X0 is what lies beyond it, so that nothing jumps
	DragMove                     // moves of one pointer that follow one another in a batch are merged into one
	DragEnd                      // the last move and the release
	DragCancel                   // cancelled, by Escape too, or its control vanished: the value of the drag's start comes back
	Scroll                       // region ID: its scroll offset grows by DX, DY; the app clamps
	Press                        // key on the focused control ID ("" none): Key, Rune
	Focus                        // ID ("" none) has the focus now
	Slide                        // slider ID asked to go to Value, already within Min..Max (keys, assistive technology)
	Type                         // free text of ID is now Text
)

// Action is an intent on one control.
type Action struct {
	Kind   ActionKind
	ID     string
	X, Y   float64 // where the pointer is
	X0, Y0 float64 // where it went down; in drags moved on by the slop, towards where it went
	DX, DY float64 // since the last action of this gesture
	Key    Key
	Rune   rune
	Shift  bool
	Value  float64
	Text   string
	Time   time.Duration
}
