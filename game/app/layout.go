package app

import (
	"math"

	"levelspan/game/scene"
	"levelspan/game/ui"
)

// format is how the window is divided.
type format uint8

const (
	landscape format = iota // chart left, panel right
	portrait                // chart on top, panel in two columns below
	phone                   // the same, compact, with the tabs in a row of their own
)

// layout is where everything stands, in logical pixels.
type layout struct {
	format  format
	compact bool // narrow or low: small margins, icons for words
	low     bool // no height to spare: the tabs take the place of the name

	window scene.Rect // all of it
	safe   scene.Rect // without the insets
	header scene.Rect
	tabs   scene.Rect // a row of its own on the phone, else inside the header
	body   scene.Rect // what a screen other than the chart has for itself

	plot       scene.Rect // curves
	altitude   scene.Rect // column of the density-altitude rail with its labels
	band       scene.Rect // block of the speed rail
	mass       scene.Rect // block of the weight rail
	strip      scene.Rect // cautions or the summary
	panel      scene.Rect // limits
	columns    int        // of the panel
	smallNames bool       // of the limits: not all fit in the larger style
	row        float64    // height of a limit's row
	margin     float64
}

// layoutFor divides a window of w by h with the insets given.
func layoutFor(w, h, top, right, bottom, left float64) layout {
	l := layout{window: scene.Rect{W: w, H: h}}
	l.safe = scene.Rect{X: left, Y: top, W: math.Max(w-left-right, 1), H: math.Max(h-top-bottom, 1)}
	switch {
	case l.safe.W >= 600 && l.safe.W >= 1.1*l.safe.H:
		l.format = landscape
	case l.safe.W >= 600:
		l.format = portrait
	default:
		l.format = phone
	}
	l.low = l.safe.H < 560
	l.compact = l.format == phone || l.safe.W < 700 || l.low
	l.margin = 20
	if l.compact {
		l.margin = 12
	}
	rest := l.safe
	l.header, rest = ui.CutTop(rest, 52)
	l.tabs = l.header
	if l.format == phone && !l.low {
		l.tabs, rest = ui.CutTop(rest, 48)
	}
	l.body, l.row = rest, leastRow
	switch l.format {
	case landscape:
		l.wide(rest)
	default:
		l.tall(rest)
	}
	return l
}

// wide places the chart beside the panel.
func (l *layout) wide(r scene.Rect) {
	l.columns = 1
	l.panel, r = ui.CutRight(r, clamp(0.266*r.W, 252, 460))
	strip := 76.0
	if l.low {
		strip = 44
	}
	l.strip, r = ui.CutBottom(r, strip)
	l.chart(r, 116)
}

// tall places the chart above the panel.
func (l *layout) tall(r scene.Rect) {
	l.columns = 2
	if l.safe.W < 360 {
		l.columns = 1
	}
	need := 456.0 // panel with everything in it, two columns
	chart := r.H - need - 60
	if l.format == phone {
		chart = clamp(0.56*r.H, 258, 470)
	} else {
		chart = math.Max(chart, 0.5*r.H)
	}
	strip := 60.0
	if l.low {
		strip = 38
	}
	c, rest := ui.CutTop(r, math.Min(chart, r.H-strip-124))
	l.strip, l.panel = ui.CutTop(rest, strip)
	l.chart(c, 108)
}

// chart places the plot and its three rails in r.
func (l *layout) chart(r scene.Rect, massHeight float64) {
	head, left, altitude, band := 36.0, 64.0, 192.0, 80.0
	if l.compact {
		head, left, altitude, band = 28, 38, 138, 66
		massHeight = 94
	}
	if l.low {
		head, band = 26, 58
	}
	l.mass, r = ui.CutBottom(r, massHeight)
	var plotRow scene.Rect
	l.band, plotRow = ui.CutBottom(r, band)
	l.altitude, plotRow = ui.CutRight(plotRow, altitude)
	if l.compact { // the rail uses the height beside the speed and weight rails too
		l.altitude.H += band + massHeight
	}
	l.plot = scene.Rect{X: plotRow.X + left, Y: plotRow.Y + head, W: math.Max(plotRow.W-left-4, 40), H: math.Max(plotRow.H-head, 40)}
	l.band.X, l.band.W = l.plot.X, l.plot.W
	// The tracks of the rails, which keep room for half a handle at their ends, end where the plot does.
	l.mass.X, l.mass.W = l.plot.X-railPad, l.plot.W+2*railPad
	if l.compact {
		l.mass.W -= railPad // clear of the other rail
	} else {
		l.altitude.X, l.altitude.W = l.altitude.X+altitudeGap, l.altitude.W-altitudeGap
	}
	bottom := l.altitude.Y + l.altitude.H + railPad
	if l.compact {
		bottom = l.altitude.Y + l.altitude.H
	}
	l.altitude.Y = l.plot.Y - 25
	l.altitude.H = bottom - l.altitude.Y
}

// railPad is the room that a rail keeps beyond each end of its track.
const (
	railPad     = 20.0
	altitudeGap = 8.0
)

// clamp is x confined to lo..hi, lo where the range is empty.
func clamp(x, lo, hi float64) float64 {
	if hi < lo {
		hi = lo
	}
	return math.Min(math.Max(x, lo), hi)
}
