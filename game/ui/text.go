package ui

import (
	"strings"
	"unicode/utf8"

	"levelspan/game/scene"
)

// Wrap breaks text into lines of at most width at spaces and line feeds; a word that is longer than a line is broken
// within. The lines are pieces of text. A width of nothing gives one character a line.
func Wrap(style scene.Style, text string, width float64) []string {
	return AppendWrap(nil, style, text, width)
}

// AppendWrap appends the lines of Wrap to dst.
func AppendWrap(dst []string, style scene.Style, text string, width float64) []string {
	for {
		line, rest, more := strings.Cut(text, "\n")
		dst = wrapLine(dst, style, line, width)
		if !more {
			return dst
		}
		text = rest
	}
}

func wrapLine(dst []string, style scene.Style, text string, width float64) []string {
	for {
		text = strings.TrimLeft(text, " ")
		n := fits(style, text, width)
		if n >= len(text) {
			return append(dst, strings.TrimRight(text, " "))
		}
		cut := strings.LastIndexByte(text[:n+1], ' ') // the space may be the first that does not fit
		if cut <= 0 {
			cut = n
		}
		dst = append(dst, strings.TrimRight(text[:cut], " "))
		text = text[cut:]
	}
}

// fits is how many bytes of text, at least one character's, fit into width.
func fits(style scene.Style, text string, width float64) int {
	if scene.Measure(style, text) <= width {
		return len(text)
	}
	_, first := utf8.DecodeRuneInString(text)
	lo, hi := first, len(text) // lo fits (or is the least), hi does not
	for lo < hi {
		mid := (lo + hi + 1) / 2
		for mid < len(text) && !utf8.RuneStart(text[mid]) {
			mid++
		}
		if mid >= hi {
			mid = hi
			for mid--; mid > lo && !utf8.RuneStart(text[mid]); mid-- {
			}
			if mid <= lo {
				break
			}
		}
		if scene.Measure(style, text[:mid]) <= width {
			lo = mid
		} else {
			hi = mid
		}
	}
	return lo
}

// Ellipsis is text, or as much of it as fits into width with an ellipsis after it.
func Ellipsis(style scene.Style, text string, width float64) string {
	if scene.Measure(style, text) <= width {
		return text
	}
	n := fits(style, text, width-scene.Measure(style, "…"))
	return strings.TrimRight(text[:n], " ") + "…"
}

// widthCache remembers shortened texts, so that a frame that is drawn again makes no new strings.
type widthCache struct {
	short map[shortKey]string
}

type shortKey struct {
	style scene.Style
	text  string
	width int
}

func (f *Frame) fit(style scene.Style, text string, width float64) string {
	if scene.Measure(style, text) <= width+0.5 {
		return text
	}
	key := shortKey{style, text, int(width)}
	if s, ok := f.widths.short[key]; ok {
		return s
	}
	if f.widths.short == nil || len(f.widths.short) > 256 {
		f.widths.short = make(map[shortKey]string)
	}
	s := Ellipsis(style, text, width)
	f.widths.short[key] = s
	return s
}

// Paragraph draws wrapped text from the top of r and returns its height. Nothing is drawn beyond r's lower edge.
func (f *Frame) Paragraph(style scene.Style, r scene.Rect, text string, c scene.Color) float64 {
	f.lines = AppendWrap(f.lines[:0], style, text, r.W)
	lh := scene.LineHeight(style)
	h := 0.0
	for _, line := range f.lines {
		if h+lh > r.H+0.5 {
			break
		}
		f.Scene.Label(style, r.X, r.Y+h+(lh+scene.CapHeight(style))/2, scene.Left, line, c)
		h += lh
	}
	return h
}

// ParagraphHeight is the height of wrapped text.
func (f *Frame) ParagraphHeight(style scene.Style, width float64, text string) float64 {
	f.lines = AppendWrap(f.lines[:0], style, text, width)
	return float64(len(f.lines)) * scene.LineHeight(style)
}
