package ui

import (
	"strings"
	"unicode"
	"unicode/utf8"

	"levelspan/game/scene"
)

// TextEdit is one line of free text being edited with a keyboard. On the page a native field does the same and sends
// Type instead.
type TextEdit struct {
	ID    string
	Text  string
	Caret int // bytes before the caret, at a character's edge
	Max   int // most characters; 0 means 80
}

// TextResult is what an action did to a text.
type TextResult uint8

// The results.
const (
	TextSame      TextResult = iota // not meant for it, or nothing to do
	TextMoved                       // the caret moved
	TextChanged                     // the text is another
	TextDone                        // Enter
	TextCancelled                   // Escape: the app brings the old text back
)

func (e *TextEdit) most() int {
	if e.Max > 0 {
		return e.Max
	}
	return 80
}

// Set replaces the text, made one clean line of at most Max characters, the caret at its end.
func (e *TextEdit) Set(text string) {
	e.Text = CleanText(text, e.most())
	e.Caret = len(e.Text)
}

// CleanText is text as one line of at most most characters: control characters and broken UTF-8 are dropped, line
// feeds and tabs become spaces.
func CleanText(text string, most int) string {
	var b strings.Builder
	n := 0
	for _, r := range text {
		if n == most {
			break
		}
		if r == '\n' || r == '\t' {
			r = ' '
		}
		if !printable(r) {
			continue
		}
		b.WriteRune(r)
		n++
	}
	return b.String()
}

func printable(r rune) bool { return r != utf8.RuneError && unicode.IsPrint(r) || r == ' ' }

// Handle applies a Press or Type action of its field.
func (e *TextEdit) Handle(a Action) TextResult {
	if a.ID != e.ID {
		return TextSame
	}
	e.Caret = min(max(0, e.Caret), len(e.Text))
	for e.Caret > 0 && e.Caret < len(e.Text) && !utf8.RuneStart(e.Text[e.Caret]) {
		e.Caret--
	}
	switch a.Kind {
	case Type:
		old := e.Text
		e.Set(a.Text)
		if e.Text == old {
			return TextSame
		}
		return TextChanged
	case Press:
		return e.press(a)
	}
	return TextSame
}

func (e *TextEdit) press(a Action) TextResult {
	before, after := e.Text[:e.Caret], e.Text[e.Caret:]
	_, back := utf8.DecodeLastRuneInString(before)
	_, fore := utf8.DecodeRuneInString(after)
	at := e.Caret
	switch a.Key {
	case KeyEnter:
		return TextDone
	case KeyEscape:
		return TextCancelled
	case KeyBackspace:
		if back == 0 {
			return TextSame
		}
		e.Text, e.Caret = before[:len(before)-back]+after, e.Caret-back
		return TextChanged
	case KeyDelete:
		if fore == 0 {
			return TextSame
		}
		e.Text = before + after[fore:]
		return TextChanged
	case KeyLeft:
		e.Caret -= back
	case KeyRight:
		e.Caret += fore
	case KeyHome:
		e.Caret = 0
	case KeyEnd:
		e.Caret = len(e.Text)
	case KeyNone, KeySpace:
		r := a.Rune
		if r == 0 || !printable(r) || utf8.RuneCountInString(e.Text) >= e.most() {
			return TextSame
		}
		s := string(r)
		e.Text, e.Caret = before+s+after, e.Caret+len(s)
		return TextChanged
	}
	if e.Caret != at {
		return TextMoved
	}
	return TextSame
}

// CaretAt puts the caret where a tap at x means, the text beginning at x0.
func (e *TextEdit) CaretAt(style scene.Style, x0, x float64) {
	e.Caret = len(e.Text)
	last := 0.0
	for i, r := range e.Text {
		w := scene.Measure(style, e.Text[:i+utf8.RuneLen(r)])
		if x-x0 < (last+w)/2 {
			e.Caret = i
			return
		}
		last = w
	}
}

// drawText draws the text of a field in r, with the caret if it is edited; the end or the caret stays in sight.
func (f *Frame) drawText(style scene.Style, r scene.Rect, text string, e *TextEdit, ink scene.Color) {
	if e == nil {
		f.Label(style, r, scene.Left, text, ink)
		return
	}
	caret := scene.Measure(style, e.Text[:min(max(0, e.Caret), len(e.Text))])
	x := r.X
	if caret > r.W-4 {
		x -= caret - r.W + 4
	}
	f.Scene.PushClip(r)
	f.Scene.Label(style, x, Baseline(style, r), scene.Left, e.Text, ink)
	f.Scene.FillRect(scene.Rect{X: x + caret, Y: r.Y + r.H/2 - 12, W: 2, H: 24}, 0, f.Theme.Accent)
	f.Scene.PopClip()
}
