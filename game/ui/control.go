// Package ui holds widgets without a window: gestures, rails, ticks, keypad, lists, layout. It knows no aeroplane.
//
// A screen is built anew whenever something changed: it draws into a scene.Scene and appends a Control for
// everything that can be touched, focused or read. The Router turns the next input events into Actions on those
// controls. The page mirrors the controls as DOM elements, so ID, Role, Label and values must say all that is drawn.
package ui

import "levelspan/game/scene"

// Role is what a control is, in the words of WAI-ARIA.
type Role uint8

// The roles.
const (
	RoleButton Role = iota
	RoleTab
	RoleSlider
	RoleSwitch
	RoleRadio
	RoleField  // a value that opens the keypad or a text field; spoken as a button with a value
	RoleRow    // a row of a table that can be selected
	RoleRegion // takes drags or scrolls, not focusable
)

// Axis is which drags a control takes.
type Axis uint8

// The axes.
const (
	AxisNone Axis = iota
	AxisX
	AxisY
	AxisBoth
)

// Control is one thing on the screen that can be touched, focused or read.
type Control struct {
	ID         string // stable between frames, unique on a screen: "handle/mass", "tab/chart", "field/aeroplane.wing_area_m2"
	Role       Role
	Label      string // accessible name
	ValueText  string // value as shown, "760 kg"
	Value      float64
	Min, Max   float64    // sliders and fields, SI
	Step, Page float64    // arrow keys and Page Up/Down, SI
	Bounds     scene.Rect // as drawn
	Hit        scene.Rect // as touched: at least 48 logical px each way where room allows
	Drag       Axis       // drags it takes; AxisNone: taps only
	Scrolls    bool       // a region that scrolls by drag and wheel along Drag
	Selected   bool       // tab, radio, row, switch
	Disabled   bool
	Error      string // refusal shown beside it
	Modal      int    // layer: while controls of a higher layer exist, lower ones take no input
	LiveText   bool   // RoleField with free text: the outside may lay a native text field over it
}
