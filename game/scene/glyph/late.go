package glyph

import (
	"image"

	"levelspan/assets/font"
	"levelspan/game/scene"
	"levelspan/game/scene/internal/cover"
)

// late is what an atlas keeps that draws its characters when they are asked for.
type late struct {
	outlines font.Outliner
	cover    cover.Rasterizer
	fits     [scene.StyleCount]fit
	drawn    [scene.StyleCount][]bool
	x, shelf int // of the shelf that is being filled: its free end and its lower edge; y is its upper edge
	y        int
}

// lateWidth is the width of the image at scale 1, a few dozen characters.
const lateWidth = 512

// OnDemand gives an atlas that draws a character when At or Lookup first asks for it. Most screens show a fifth of all
// characters in all styles, and the first picture need not wait for the others. Each gets a place of its own and stays
// there; the image grows downwards, so take its pixels after At. It is not for two goroutines at once, nor for a texture.
func OnDemand(scale float64) *Atlas {
	a := &Atlas{Scale: scene.CleanScale(scale), WhiteX: white / 2.0, WhiteY: white / 2.0, late: new(late)}
	for s := range scene.StyleCount {
		a.glyphs[s] = make([]Glyph, font.Count())
		a.late.fits[s] = newFit(s, a.Scale)
		a.late.drawn[s] = make([]bool, font.Count())
	}
	a.late.x, a.late.shelf = white+gap, white+gap
	width := int(lateWidth * max(a.Scale, 1))
	a.Image = &image.Alpha{Pix: make([]uint8, width*a.late.shelf, width*width/2), Stride: width, Rect: image.Rect(0, 0, width, a.late.shelf)}
	a.fillWhite()
	return a
}

// need draws a character unless it is there. Style and index are in range.
func (a *Atlas) need(style scene.Style, index int) {
	l := a.late
	if l.drawn[style][index] {
		return
	}
	l.drawn[style][index] = true
	segs := l.outlines.Outline(style.Weight(), index)
	f := &l.fits[style]
	f.take(index, segs)
	g := f.bounds(segs)
	if g.W > 0 {
		if l.x+int(g.W)+gap > a.Image.Stride {
			l.x, l.y = 0, l.shelf
		}
		g.X, g.Y = uint16(l.x), uint16(l.y)
		l.x += int(g.W) + gap
		if below := l.y + int(g.H) + gap; below > l.shelf {
			a.Image.Pix = append(a.Image.Pix, make([]uint8, (below-l.shelf)*a.Image.Stride)...)
			l.shelf, a.Image.Rect.Max.Y = below, below
		}
		f.draw(&l.cover, segs, g, a.Image)
	}
	a.glyphs[style][index] = g
}
