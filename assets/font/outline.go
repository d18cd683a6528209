package font

import (
	"golang.org/x/image/font/sfnt"
	"golang.org/x/image/math/fixed"
)

// Verb is the kind of one piece of an outline.
type Verb uint8

// The pieces. Each contour starts with MoveTo and closes on its own start.
const (
	MoveTo  Verb = iota // to (X, Y)
	LineTo              // straight to (X, Y)
	CurveTo             // cubic with control points (X1, Y1), (X2, Y2) to (X, Y)
)

// Segment is one piece of an outline, in font units, y up.
type Segment struct {
	Verb                 Verb
	X1, Y1, X2, Y2, X, Y float64
}

// Outliner reads outlines. It keeps buffers, so it is not for two goroutines at once; the zero value is ready.
type Outliner struct {
	buf sfnt.Buffer
	out []Segment
}

// Outline is the outline of the character with this index in the repertoire; empty for the spaces. The result is
// valid until the next call.
func (o *Outliner) Outline(w Weight, index int) []Segment {
	f := &faces()[w&1]
	if uint(index) >= uint(len(f.glyph)) {
		index = Missing
	}
	o.out = o.out[:0]
	if _, ok := blank(Rune(index)); ok {
		return o.out
	}
	// One font unit is one unit of the 26.6 format here, so nothing is rounded.
	segs, err := f.sfnt.LoadGlyph(&o.buf, f.glyph[index], fixed.Int26_6(UnitsPerEm), nil)
	if err != nil {
		return o.out
	}
	var x0, y0 float64
	for _, s := range segs {
		a, b, c := at(s.Args[0]), at(s.Args[1]), at(s.Args[2])
		switch s.Op {
		case sfnt.SegmentOpMoveTo:
			o.out = append(o.out, Segment{Verb: MoveTo, X: a.x, Y: a.y})
			x0, y0 = a.x, a.y
		case sfnt.SegmentOpLineTo:
			o.out = append(o.out, Segment{Verb: LineTo, X: a.x, Y: a.y})
			x0, y0 = a.x, a.y
		case sfnt.SegmentOpQuadTo: // as the cubic that it is
			o.out = append(o.out, Segment{Verb: CurveTo,
				X1: x0 + (a.x-x0)*2/3, Y1: y0 + (a.y-y0)*2/3, X2: b.x + (a.x-b.x)*2/3, Y2: b.y + (a.y-b.y)*2/3, X: b.x, Y: b.y})
			x0, y0 = b.x, b.y
		case sfnt.SegmentOpCubeTo:
			o.out = append(o.out, Segment{Verb: CurveTo, X1: a.x, Y1: a.y, X2: b.x, Y2: b.y, X: c.x, Y: c.y})
			x0, y0 = c.x, c.y
		}
	}
	return o.out
}

type xy struct{ x, y float64 }

func at(p fixed.Point26_6) xy { return xy{float64(p.X), -float64(p.Y)} }
