package glyph

import (
	"bytes"
	"math/rand/v2"
	"testing"

	"levelspan/assets/font"
	"levelspan/game/scene"
)

// pixels are one glyph's.
func pixels(a *Atlas, g Glyph) (p []uint8) {
	for y := range int(g.H) {
		at := a.Image.PixOffset(int(g.X), int(g.Y)+y)
		p = append(p, a.Image.Pix[at:at+int(g.W)]...)
	}
	return p
}

// Whatever the order in which characters are asked for, each looks as in the atlas made at once, has a place of its own
// and keeps it.
func TestOnDemandIsTheSame(t *testing.T) {
	random := rand.New(rand.NewPCG(1, 2))
	for _, scale := range scales {
		want, got := New(scale), OnDemand(scale)
		type char struct {
			style scene.Style
			index int
		}
		var all []char
		for s := range scene.StyleCount {
			for i := range font.Count() {
				all = append(all, char{s, i})
			}
		}
		random.Shuffle(len(all), func(i, j int) { all[i], all[j] = all[j], all[i] })
		places := map[char]Glyph{}
		for _, c := range all {
			g, w := got.At(c.style, c.index), want.At(c.style, c.index)
			places[c] = g
			if g.W != w.W || g.H != w.H || g.Left != w.Left || g.Top != w.Top {
				t.Fatalf("scale %g style %d %q: %+v, made at once %+v", scale, c.style, font.Rune(c.index), g, w)
			}
		}
		ink := make([]bool, len(got.Image.Pix))
		for _, c := range all {
			g := got.At(c.style, c.index)
			if g != places[c] {
				t.Fatalf("scale %g style %d %q has moved", scale, c.style, font.Rune(c.index))
			}
			if !bytes.Equal(pixels(got, g), pixels(want, want.At(c.style, c.index))) {
				t.Fatalf("scale %g style %d %q looks otherwise than made at once", scale, c.style, font.Rune(c.index))
			}
			for y := range int(g.H) {
				for x := range int(g.W) {
					at := got.Image.PixOffset(int(g.X)+x, int(g.Y)+y)
					if ink[at] {
						t.Fatalf("scale %g style %d %q shares a pixel", scale, c.style, font.Rune(c.index))
					}
					ink[at] = true
				}
			}
		}
		for y := range white {
			for x := range white {
				if at := got.Image.PixOffset(x, y); got.Image.Pix[at] != 255 || ink[at] {
					t.Errorf("scale %g: the white corner is written over", scale)
				}
			}
		}
	}
}

// A character that has been drawn costs nothing more, and another does not draw the rest.
func TestOnDemandDrawsOnce(t *testing.T) {
	a := OnDemand(2)
	size := func() int { return len(a.Image.Pix) }
	empty := size()
	a.Lookup(scene.Body, 'k')
	one := size()
	if one == empty || one*8 > len(New(2).Image.Pix) {
		t.Errorf("%d pixels before a character, %d after", empty, one)
	}
	if n := testing.AllocsPerRun(100, func() { a.Lookup(scene.Body, 'k') }); n != 0 || size() != one {
		t.Errorf("again: %g allocations, %d pixels", n, size())
	}
}
