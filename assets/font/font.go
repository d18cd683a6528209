// Package font embeds the typeface of every screen, sheet and picture: B612 in two weights, cut down to the
// characters listed in repertoire.txt, with advances and metrics ready without parsing a file twice.
//
// B612 was drawn for the displays of a flight deck: open shapes, tabular digits, legible at arm's length. Its licences
// are in LICENCE.txt. The files are subsets of version 1.008 made with fonttools, once for each weight W of Regular
// and Bold:
//
//	pyftsubset B612-W.otf --unicodes-file=repertoire.txt --layout-features= --no-hinting --desubroutinize \
//	  --notdef-outline --drop-tables+=GPOS,GSUB,GlyphOrder --name-IDs=0,1,2,3,4,5,6,7,13,14 \
//	  --no-recalc-timestamp --output-file=B612-W.otf
//
// The typeface has no Greek rho, no letters of Latin Extended-A beyond those of Latin-1, OE, s caron and Y diaeresis,
// and no narrow spaces; the narrow spaces are added here as advances without ink.
package font

import (
	_ "embed"
	"sync"

	"golang.org/x/image/font/sfnt"
	"golang.org/x/image/math/fixed"
)

//go:embed B612-Regular.otf
var regularOTF []byte

//go:embed B612-Bold.otf
var boldOTF []byte

// Weight is one of the two weights.
type Weight uint8

// The weights.
const (
	Regular Weight = iota
	Bold
	WeightCount
)

// Design metrics, in font units; the same in both weights.
const (
	UnitsPerEm = 2000 // font units to the em
	Ascender   = 1930 // above the baseline: top of accented capitals
	Descender  = 500  // below the baseline
	CapHeight  = 1500 // capitals and digits
	XHeight    = 1100 // lower-case letters without ascender
)

// Family is the name of the typeface, for formats that refer to it by name.
const Family = "B612"

// Data is the font file of a weight (OpenType with CFF outlines). The caller must not change it.
func Data(w Weight) []byte {
	if w == Bold {
		return boldOTF
	}
	return regularOTF
}

// face is a weight with what layout and the glyph atlas ask of it, by index in the repertoire.
type face struct {
	sfnt    *sfnt.Font
	glyph   []sfnt.GlyphIndex
	advance []uint16 // font units
}

var faces = sync.OnceValue(func() *[WeightCount]face {
	var all [WeightCount]face
	for w := range all {
		all[w] = load(Data(Weight(w)))
	}
	return &all
})

// load panics when an embedded file is damaged: nothing can be shown without it, and the tests read both files.
func load(data []byte) face {
	parsed, err := sfnt.Parse(data)
	if err != nil {
		panic("font: embedded file: " + err.Error())
	}
	var buf sfnt.Buffer
	f := face{sfnt: parsed, glyph: make([]sfnt.GlyphIndex, Count()), advance: make([]uint16, Count())}
	for i := range f.glyph {
		if units, ok := blank(Rune(i)); ok {
			f.advance[i] = units
			continue
		}
		if i != Missing {
			g, err := parsed.GlyphIndex(&buf, Rune(i))
			if err != nil || g == 0 {
				panic("font: embedded file lacks a character of the repertoire")
			}
			f.glyph[i] = g
		}
		a, err := parsed.GlyphAdvance(&buf, f.glyph[i], fixed.I(UnitsPerEm), 0)
		if err != nil {
			panic("font: embedded file: " + err.Error())
		}
		f.advance[i] = uint16(a.Round())
	}
	return f
}

// Advance is the advance width, in font units, of the character with this index in the repertoire.
// An index outside 0..Count()-1 counts as Missing.
func Advance(w Weight, index int) int {
	f := &faces()[w&1]
	if uint(index) >= uint(len(f.advance)) {
		index = Missing
	}
	return int(f.advance[index])
}
