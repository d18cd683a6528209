// Package glyph makes the glyph atlas: every character of the embedded font in every text style, drawn once for one
// scale into one image that never changes afterwards. A back end uploads it once; no character is ever drawn from a
// place that held another one before. A back end that reads the pixels itself may take an atlas that is filled on demand.
package glyph

import (
	"image"
	"slices"

	"levelspan/assets/font"
	"levelspan/game/scene"
	"levelspan/game/scene/internal/cover"
)

// Glyph is one character in the atlas, in device pixels. Its pixels are Atlas.Image at X, Y, W, H, and belong on the
// screen with their top left corner at (pen + Left, baseline + Top). A space has W == 0.
type Glyph struct {
	X, Y, W, H uint16
	Left, Top  int16
}

// Atlas is the finished atlas for one scale.
type Atlas struct {
	Scale  float64      // device pixels per logical pixel
	Image  *image.Alpha // coverage; not to be written
	WhiteX float32      // centre of a texel (with full neighbours) of full coverage, for shapes without texture
	WhiteY float32
	glyphs [scene.StyleCount][]Glyph
	late   *late // of an atlas made by OnDemand
}

const (
	white = 3 // side of the block of full coverage in the first corner
	gap   = 1 // empty pixels around each glyph
)

// At is the glyph of the character with this index in the font's repertoire; an index or style outside the sets gives
// the box, or Body.
func (a *Atlas) At(style scene.Style, index int) Glyph {
	if style >= scene.StyleCount {
		style = scene.Body
	}
	g := a.glyphs[style]
	if uint(index) >= uint(len(g)) {
		index = font.Missing
	}
	if a.late != nil {
		a.need(style, index)
	}
	return g[index]
}

// Lookup is the glyph of a character and its advance in device pixels (whole at whole scales).
func (a *Atlas) Lookup(style scene.Style, r rune) (g Glyph, advance float64) {
	i := font.Index(r)
	return a.At(style, i), scene.Advance(style, i) * a.Scale
}

// New draws the atlas for a scale, which is first brought into scene.MinScale..scene.MaxScale.
func New(scale float64) *Atlas {
	a := &Atlas{Scale: scene.CleanScale(scale), WhiteX: white / 2.0, WhiteY: white / 2.0}
	var shapes shapes
	shapes.load()
	type job struct {
		style scene.Style
		index int
		h     uint16
	}
	jobs := make([]job, 0, int(scene.StyleCount)*font.Count())
	area := 0
	for s := range scene.StyleCount {
		a.glyphs[s] = make([]Glyph, font.Count())
		f := newFit(s, a.Scale)
		for i := range a.glyphs[s] {
			segs := shapes.of(s.Weight(), i)
			f.take(i, segs)
			g := f.bounds(segs)
			a.glyphs[s][i] = g
			if g.W > 0 {
				jobs = append(jobs, job{s, i, g.H})
				area += int(g.W+gap) * int(g.H+gap)
			}
		}
	}
	// Shelves of falling height waste little; the width is a power of two near the square's side.
	slices.SortStableFunc(jobs, func(p, q job) int { return int(q.h) - int(p.h) })
	width := 256
	for width*width < area {
		width *= 2
	}
	x, y, shelf := white+gap, 0, white+gap
	for _, j := range jobs {
		g := &a.glyphs[j.style][j.index]
		if x+int(g.W)+gap > width {
			x, y, shelf = 0, y+shelf, 0
		}
		g.X, g.Y = uint16(x), uint16(y)
		x += int(g.W) + gap
		shelf = max(shelf, int(g.H)+gap)
	}
	a.Image = image.NewAlpha(image.Rect(0, 0, width, y+shelf))
	a.fillWhite()
	var z cover.Rasterizer
	for s := range scene.StyleCount {
		f := newFit(s, a.Scale)
		for i, g := range a.glyphs[s] {
			if g.W > 0 {
				segs := shapes.of(s.Weight(), i)
				f.take(i, segs)
				f.draw(&z, segs, g, a.Image)
			}
		}
	}
	return a
}

func (a *Atlas) fillWhite() {
	for y := range white {
		for x := range white {
			a.Image.Pix[y*a.Image.Stride+x] = 255
		}
	}
}

// RGBA is the atlas as premultiplied white, for a texture of four channels.
func (a *Atlas) RGBA() *image.RGBA {
	m := image.NewRGBA(a.Image.Rect)
	for i, v := range a.Image.Pix {
		p := m.Pix[i*4 : i*4+4 : i*4+4]
		p[0], p[1], p[2], p[3] = v, v, v, v
	}
	return m
}
