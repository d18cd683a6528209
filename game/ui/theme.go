package ui

import (
	"math"

	"levelspan/game/scene"
)

// Theme is a palette as data. A colour means the same in every theme, and none means anything by itself: a word, a
// sign or a place always says it too.
type Theme struct {
	Night      bool
	Background scene.Color // behind the chart
	Panel      scene.Color // behind lists and tables
	Bar        scene.Color // behind the header and the foot
	Key        scene.Color // face of keys, buttons and fields
	KeyDown    scene.Color // the same, pressed
	Chosen     scene.Color // behind what is selected
	Shade      scene.Color // over what a dialog covers, translucent

	Ink    scene.Color // figures and names
	Muted  scene.Color // second figures, units, ticks
	Faint  scene.Color // disabled text; not read for its meaning
	Line   scene.Color // grid and dividers
	Edge   scene.Color // outline of fields, buttons and handles
	Track  scene.Color // unfilled part of a rail
	Accent scene.Color // selection, links, focus ring
	OnBold scene.Color // text on Accent, Good and Bad as a background

	Required    scene.Color // power or thrust required
	Available   scene.Color // power or thrust available
	Good        scene.Color // level flight, room to climb
	Bad         scene.Color // never exceed, refusals
	Caution     scene.Color // warnings
	CautionBack scene.Color // behind a warning
	BadBack     scene.Color // behind a refusal
	Handle      scene.Color // face of a handle
}

func rgb(v uint32) scene.Color {
	return scene.Color{R: uint8(v >> 16), G: uint8(v >> 8), B: uint8(v), A: 255}
}

// Day is for sunlight: dark ink on warm white.
func Day() *Theme {
	return &Theme{
		Background: rgb(0xFCFBF7), Panel: rgb(0xF5F3EA), Bar: rgb(0xF0EEE4),
		Key: rgb(0xFFFFFF), KeyDown: rgb(0xD9D5C6), Chosen: rgb(0xE2EBF5), Shade: scene.Color{R: 0x15, G: 0x1E, B: 0x29, A: 0x80},
		Ink: rgb(0x151E29), Muted: rgb(0x535C66), Faint: rgb(0x9A9A92), Line: rgb(0xE2DED2), Edge: rgb(0x857F70), Track: rgb(0xDAD5C7),
		Accent: rgb(0x0D57A8), OnBold: rgb(0xFFFFFF),
		Required: rgb(0x0D57A8), Available: rgb(0xAD4508), Good: rgb(0x0B6E4C), Bad: rgb(0xB0201B),
		Caution: rgb(0x7F4C00), CautionBack: rgb(0xFBE9C3), BadBack: rgb(0xF9E1DD), Handle: rgb(0xFFFFFF),
	}
}

// Night is for eyes that are used to the dark: dim, without pure white, the meanings of the colours as by day.
func Night() *Theme {
	return &Theme{
		Night:      true,
		Background: rgb(0x0E1318), Panel: rgb(0x141A21), Bar: rgb(0x181F27),
		Key: rgb(0x202934), KeyDown: rgb(0x394654), Chosen: rgb(0x1C2C3D), Shade: scene.Color{R: 0, G: 0, B: 0, A: 0xA0},
		Ink: rgb(0xD3CFC4), Muted: rgb(0x949CA3), Faint: rgb(0x5A636B), Line: rgb(0x27303A), Edge: rgb(0x727B84), Track: rgb(0x333E49),
		Accent: rgb(0x7FB2E0), OnBold: rgb(0x0E1318),
		Required: rgb(0x6FA8DC), Available: rgb(0xDB8A4E), Good: rgb(0x5DB58C), Bad: rgb(0xE8776C),
		Caution: rgb(0xD6A648), CautionBack: rgb(0x33290F), BadBack: rgb(0x381B19), Handle: rgb(0x202934),
	}
}

// Fade is a colour with its opacity multiplied by a (0 to 1).
func Fade(c scene.Color, a float64) scene.Color {
	c.A = uint8(math.Round(float64(c.A) * math.Max(0, math.Min(1, a))))
	return c
}

// Mix is the colour a part t (0 to 1) of the way from a to b.
func Mix(a, b scene.Color, t float64) scene.Color {
	t = math.Max(0, math.Min(1, t))
	m := func(x, y uint8) uint8 { return uint8(math.Round(float64(x) + (float64(y)-float64(x))*t)) }
	return scene.Color{R: m(a.R, b.R), G: m(a.G, b.G), B: m(a.B, b.B), A: m(a.A, b.A)}
}

// Over is an opaque backdrop seen through a translucent colour.
func Over(top, under scene.Color) scene.Color {
	a := float64(top.A) / 255
	top.A = 255
	return Mix(under, top, a)
}

// Contrast is the contrast ratio of two opaque colours, 1 to 21, as WCAG 2.2 defines it: (L1 + 0.05)/(L2 + 0.05)
// with L the relative luminance.
func Contrast(a, b scene.Color) float64 {
	x, y := luminance(a), luminance(b)
	return (math.Max(x, y) + 0.05) / (math.Min(x, y) + 0.05)
}

func luminance(c scene.Color) float64 {
	lin := func(v uint8) float64 {
		s := float64(v) / 255
		if s <= 0.04045 {
			return s / 12.92
		}
		return math.Pow((s+0.055)/1.055, 2.4)
	}
	return 0.2126*lin(c.R) + 0.7152*lin(c.G) + 0.0722*lin(c.B)
}
