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
	Wheel    // DX, DY in logical pixels; Ctrl means zoom and is ignored
	KeyDown  // Key or Rune; ID is the focused control where the outside keeps the focus (the page), else ""
	FocusOn  // the outside moved the focus to control ID ("" none)
	Activate // the outside activated control ID (a click on its mirror element)
	SetValue // the outside set slider ID to Value
	SetText  // the outside changed free text of field ID to Text
)

// Key is a key that has a meaning here; printable ones come as Rune.
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
	Tap       ActionKind = iota // released inside, without having moved more than the slop
	DoubleTap                   // follows the second Tap
	DragStart
	DragMove
	DragEnd
	DragCancel // pointer cancelled: the value of the drag's start comes back
	Scroll     // region ID scrolls by DX, DY
	Press      // key on the focused control ID ("" none): Key, Rune
	Focus
	Slide // slider ID asked to go to Value (keys, assistive technology)
	Type  // free text of ID is now Text
)

// Action is an intent on one control.
type Action struct {
	Kind   ActionKind
	ID     string
	X, Y   float64 // where the pointer is
	X0, Y0 float64 // where it went down
	DX, DY float64 // since the last action of this gesture
	Key    Key
	Rune   rune
	Shift  bool
	Value  float64
	Text   string
	Time   time.Duration
}
