package casefile

import (
	"unicode"
	"unicode/utf8"
)

// holdsText reports whether a text or choice is allowed. A choice that the kind beside it does not use may be empty.
func (f *Field) holdsText(s, kind string) bool {
	if f.Kind == KindChoice {
		for _, c := range f.Choices {
			if s == c {
				return true
			}
		}
		return s == "" && f.Required && len(f.Kinds) > 0 && !f.Applies(kind)
	}
	if !utf8.ValidString(s) {
		return false
	}
	if n := float64(utf8.RuneCountInString(s)); n < f.Min || n > f.Max {
		return false
	}
	blank := f.Min > 0
	for _, r := range s {
		if unicode.IsControl(r) || r == '\u2028' || r == '\u2029' {
			if r != '\n' && r != '\t' || !f.long() {
				return false
			}
		}
		blank = blank && unicode.IsSpace(r)
	}
	return !blank
}

// long reports whether a text may have several lines.
func (f *Field) long() bool { return f.Max >= 500 }
