package scene

import (
	"math"
	"sync"
	"unicode/utf8"

	"levelspan/assets/font"
)

// styles is the one table of what a style is.
var styles = [StyleCount]struct {
	weight font.Weight
	size   float64 // logical pixels to the em
}{
	Small:     {font.Regular, 13},
	SmallBold: {font.Bold, 13},
	Body:      {font.Regular, 16},
	BodyBold:  {font.Bold, 16},
	Title:     {font.Bold, 20},
	Figure:    {font.Bold, 26},
	FigureBig: {font.Bold, 34},
}

// known is style, or Body when it is not one of the set.
func known(style Style) Style {
	if style >= StyleCount {
		return Body
	}
	return style
}

// Weight is the weight of a style.
func (s Style) Weight() font.Weight { return styles[known(s)].weight }

// Size is the size of a style, logical pixels to the em.
func (s Style) Size() float64 { return styles[known(s)].size }

// advances holds, for each style and index of the repertoire, the advance in whole logical pixels. Whole, so that at
// scales 1, 2 and 3 each pen position is a device pixel: digits stay evenly spaced and never jitter when a figure or
// its place changes. B612 is spaced generously enough to bear the rounding (at most half a pixel a letter).
var advances = sync.OnceValue(func() *[StyleCount][]uint8 {
	var all [StyleCount][]uint8
	for s := range all {
		st := styles[s]
		all[s] = make([]uint8, font.Count())
		for i := range all[s] {
			all[s][i] = uint8(math.Round(float64(font.Advance(st.weight, i)) * st.size / font.UnitsPerEm))
		}
	}
	return &all
})

// Advance is the advance width in a style of the character with this index in the font's repertoire, in logical
// pixels (whole). It does not depend on the scale.
func Advance(style Style, index int) float64 {
	a := advances()[known(style)]
	if uint(index) >= uint(len(a)) {
		index = font.Missing
	}
	return float64(a[index])
}

// Measure is the advance width of text in a style, in logical pixels. It does not depend on the scale.
func Measure(style Style, text string) float64 {
	a := advances()[known(style)]
	sum := 0
	for _, r := range text {
		sum += int(a[font.Index(r)])
	}
	return float64(sum)
}

// MeasureBytes is Measure of UTF-8 bytes.
func MeasureBytes(style Style, text []byte) float64 {
	a := advances()[known(style)]
	sum := 0
	for len(text) > 0 {
		r, n := utf8.DecodeRune(text)
		sum += int(a[font.Index(r)])
		text = text[n:]
	}
	return float64(sum)
}

// Fit is the longest beginning of text, cut between characters, whose width is at most width logical pixels.
func Fit(style Style, text string, width float64) string {
	a := advances()[known(style)]
	sum := 0
	for i, r := range text {
		sum += int(a[font.Index(r)])
		if float64(sum) > width {
			return text[:i]
		}
	}
	return text
}

// LineHeight is the distance between baselines of a style, logical pixels (whole).
func LineHeight(style Style) float64 { return math.Round(1.3 * style.Size()) }

// Ascent is the height of the tallest letters (accented capitals) above the baseline, logical pixels.
func Ascent(style Style) float64 { return style.Size() * font.Ascender / font.UnitsPerEm }

// Descent is the depth of the deepest letters below the baseline, logical pixels.
func Descent(style Style) float64 { return style.Size() * font.Descender / font.UnitsPerEm }

// CapHeight is the height of capitals and digits above the baseline, logical pixels.
func CapHeight(style Style) float64 { return style.Size() * font.CapHeight / font.UnitsPerEm }
