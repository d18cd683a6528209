package ui

import (
	"math"

	"levelspan/game/scene"
)

// Icon is a sign drawn in strokes.
type Icon uint8

// The icons.
const (
	IconNone Icon = iota
	IconUndo
	IconRedo
	IconShare
	IconMenu
	IconClose
	IconBackspace
	IconLeft
	IconRight
	IconUp
	IconDown
	IconSun
	IconMoon
	IconKeyboard
	IconWarning
	IconCheck
	IconPlus
	IconMinus
	IconHelp
	IconOpen
	IconSave
	IconEdit
	IconRemove
	IconCases
	IconPaste
	IconCode
	IconText
	IconMore
	IconCopy
	IconSend
	IconCount
)

// stroke is one polyline of an icon on a square of 24 by 24.
type stroke struct {
	closed bool
	pts    []scene.Point
}

// icons holds the strokes; nothing writes to it.
var icons = [IconCount][]stroke{
	IconShare: {{pts: pts(8, 8, 12, 4, 16, 8)}, {pts: pts(12, 4.5, 12, 14)},
		{pts: pts(8, 11, 5.5, 11, 5.5, 20, 18.5, 20, 18.5, 11, 16, 11)}},
	IconMenu:  {{pts: pts(4, 6.5, 20, 6.5)}, {pts: pts(4, 12, 20, 12)}, {pts: pts(4, 17.5, 20, 17.5)}},
	IconClose: {{pts: pts(6, 6, 18, 18)}, {pts: pts(18, 6, 6, 18)}},
	IconBackspace: {{closed: true, pts: pts(9, 5.5, 21, 5.5, 21, 18.5, 9, 18.5, 3, 12)},
		{pts: pts(12, 9, 18, 15)}, {pts: pts(18, 9, 12, 15)}},
	IconLeft:  {{pts: pts(14.5, 5, 8, 12, 14.5, 19)}},
	IconRight: {{pts: pts(9.5, 5, 16, 12, 9.5, 19)}},
	IconUp:    {{pts: pts(5, 15, 12, 8.5, 19, 15)}},
	IconDown:  {{pts: pts(5, 9.5, 12, 16, 19, 9.5)}},
	IconKeyboard: {{closed: true, pts: pts(2.5, 6, 21.5, 6, 21.5, 18, 2.5, 18)}, {pts: pts(8, 15, 16, 15)},
		{pts: pts(6, 9.5, 7, 9.5)}, {pts: pts(9.7, 9.5, 10.7, 9.5)}, {pts: pts(13.3, 9.5, 14.3, 9.5)}, {pts: pts(17, 9.5, 18, 9.5)},
		{pts: pts(7.8, 12.2, 8.8, 12.2)}, {pts: pts(11.5, 12.2, 12.5, 12.2)}, {pts: pts(15.2, 12.2, 16.2, 12.2)}},
	IconWarning: {{closed: true, pts: pts(12, 3.5, 22, 20.5, 2, 20.5)}, {pts: pts(12, 9.5, 12, 14.5)}, {pts: pts(12, 16.6, 12, 18.2)}},
	IconCheck:   {{pts: pts(4.5, 12.5, 9.5, 17.5, 19.5, 6.5)}},
	IconPlus:    {{pts: pts(12, 5, 12, 19)}, {pts: pts(5, 12, 19, 12)}},
	IconMinus:   {{pts: pts(5, 12, 19, 12)}},
	IconOpen:    {{pts: pts(3, 19, 3, 5.5, 9, 5.5, 11, 8, 19, 8, 19, 11)}, {closed: true, pts: pts(3, 19, 6, 11, 22, 11, 19, 19)}},
	IconSave: {{pts: pts(12, 4, 12, 14.5)}, {pts: pts(7.5, 10.5, 12, 15, 16.5, 10.5)},
		{pts: pts(4.5, 15, 4.5, 20, 19.5, 20, 19.5, 15)}},
	IconEdit:   {{closed: true, pts: pts(4, 20, 5, 15.5, 16, 4.5, 19.5, 8, 8.5, 19)}, {pts: pts(13.5, 7, 17, 10.5)}},
	IconRemove: {{pts: pts(4, 6.5, 20, 6.5)}, {pts: pts(9, 6.5, 9, 4, 15, 4, 15, 6.5)}, {pts: pts(6, 6.5, 7, 20, 17, 20, 18, 6.5)}},
	IconCases:  {{closed: true, pts: pts(4, 9, 20, 9, 20, 20, 4, 20)}, {pts: pts(6, 5.8, 18, 5.8)}, {pts: pts(8, 2.8, 16, 2.8)}},
	IconPaste:  {{pts: pts(8, 5, 5, 5, 5, 20.5, 19, 20.5, 19, 5, 16, 5)}, {closed: true, pts: pts(8.5, 3, 15.5, 3, 15.5, 7, 8.5, 7)}},
	IconCode: {{closed: true, pts: pts(4, 4, 10, 4, 10, 10, 4, 10)}, {closed: true, pts: pts(14, 4, 20, 4, 20, 10, 14, 10)},
		{closed: true, pts: pts(4, 14, 10, 14, 10, 20, 4, 20)}, {pts: pts(14, 14, 16, 14)}, {pts: pts(18, 14, 20.5, 14)}, {pts: pts(16, 17, 18, 17)},
		{pts: pts(14, 20, 16, 20)}, {pts: pts(18.5, 20, 20.5, 20)}},
	IconText: {{closed: true, pts: pts(5, 3.5, 19, 3.5, 19, 20.5, 5, 20.5)}, {pts: pts(8.5, 8.5, 15.5, 8.5)}, {pts: pts(8.5, 12, 15.5, 12)}, {pts: pts(8.5, 15.5, 13, 15.5)}},
	IconMore: {{pts: pts(10.9, 5, 13.1, 5)}, {pts: pts(10.9, 12, 13.1, 12)}, {pts: pts(10.9, 19, 13.1, 19)}},
	IconCopy: {{closed: true, pts: pts(9, 8, 20, 8, 20, 20.5, 9, 20.5)}, {pts: pts(15, 8, 15, 3.5, 4, 3.5, 4, 16, 9, 16)}},
	IconSend: {{pts: pts(4, 12, 19, 12)}, {pts: pts(13, 6, 19, 12, 13, 18)}},
	IconUndo: {{pts: arc(12.5, 13, 7, -150, 130)}, {pts: pts(5.2, 3.8, 6.2, 9.8, 12, 8.4)}},
	IconRedo: {{pts: arc(11.5, 13, 7, -30, -310)}, {pts: pts(18.8, 3.8, 17.8, 9.8, 12, 8.4)}},
	IconSun:  sun(),
	IconMoon: {{closed: true, pts: moon()}},
	IconHelp: {{pts: append(arc(12, 9, 4, -180, 60), scene.Point{X: 12, Y: 13.6}, scene.Point{X: 12, Y: 15.4})}, {pts: pts(12, 18.2, 12, 20)}},
}

func pts(v ...float64) []scene.Point {
	p := make([]scene.Point, len(v)/2)
	for i := range p {
		p[i] = scene.Point{X: v[2*i], Y: v[2*i+1]}
	}
	return p
}

// arc is a polyline on a circle from one angle to another, degrees clockwise from the right.
func arc(x, y, radius, from, to float64) []scene.Point {
	const n = 18
	p := make([]scene.Point, n+1)
	for i := range p {
		sin, cos := math.Sincos((from + (to-from)*float64(i)/n) * math.Pi / 180)
		p[i] = scene.Point{X: x + radius*cos, Y: y + radius*sin}
	}
	return p
}

func sun() []stroke {
	s := []stroke{{closed: true, pts: arc(12, 12, 4.2, 0, 340)}}
	for k := 0; k < 8; k++ {
		sin, cos := math.Sincos(float64(k) * math.Pi / 4)
		s = append(s, stroke{pts: pts(12+7*cos, 12+7*sin, 12+9.8*cos, 12+9.8*sin)})
	}
	return s
}

// moon is a crescent: an outer arc and an inner one back.
func moon() []scene.Point {
	p := arc(11.5, 12.5, 8, -60, -330)
	return append(p, arc(16.2, 7.6, 8.4, 69, 174)...)
}

// Icon draws an icon centred in r, size px wide.
func (f *Frame) Icon(icon Icon, r scene.Rect, size float64, c scene.Color) {
	if icon >= IconCount {
		return
	}
	x, y, k := r.X+(r.W-size)/2, r.Y+(r.H-size)/2, size/24
	width := math.Max(1.5, 2*k)
	var buf [64]scene.Point
	for _, s := range icons[icon] {
		p := buf[:0]
		for _, q := range s.pts {
			if len(p) < cap(p) {
				p = append(p, scene.Point{X: x + q.X*k, Y: y + q.Y*k})
			}
		}
		if s.closed {
			f.Scene.StrokeClosed(p, width, c)
		} else {
			f.Scene.Stroke(p, width, c)
		}
	}
}
