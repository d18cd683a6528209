package keep

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// The bounds of a name: characters, and bytes of its escaped form, which must be part of a file name (of 255 bytes at
// most on the usual systems).
const (
	MaxName    = 60
	maxEscaped = 220
)

// CheckName gives ErrName for a name that nothing is kept under: empty, too long, with spaces around it or with
// characters that are not printed.
func CheckName(name string) error {
	if name == "" || utf8.RuneCountInString(name) > MaxName || len(Escape(name)) > maxEscaped || name != strings.TrimSpace(name) {
		return ErrName
	}
	for _, r := range name {
		if r == utf8.RuneError || !unicode.IsPrint(r) {
			return ErrName
		}
	}
	return nil
}

// CleanName is the nearest name to a text that something can be kept under, room characters left for a number after it;
// "" where nothing of the text can be in a name.
func CleanName(text string, room int) string {
	var b strings.Builder
	size, count := 3*room, room
	for _, r := range strings.TrimSpace(text) {
		if r == '\t' || r == '\n' {
			r = ' '
		}
		if r == utf8.RuneError || !unicode.IsPrint(r) {
			continue
		}
		if size += len(Escape(string(r))); size > maxEscaped || count == MaxName {
			break
		}
		count++
		b.WriteRune(r)
	}
	return strings.TrimSpace(b.String())
}

// Escape is a name as a key or part of a file name on any system: lower-case letters, figures and hyphens stay, every
// other byte is _ and two hexadecimal figures.
func Escape(name string) string {
	const hex = "0123456789abcdef"
	var b strings.Builder
	for i := 0; i < len(name); i++ {
		c := name[i]
		if c >= 'a' && c <= 'z' || c >= '0' && c <= '9' || c == '-' {
			b.WriteByte(c)
			continue
		}
		b.WriteByte('_')
		b.WriteByte(hex[c>>4])
		b.WriteByte(hex[c&15])
	}
	return b.String()
}

// Unescape is the inverse of Escape; false for what no name escapes to.
func Unescape(s string) (name string, ok bool) {
	var b strings.Builder
	for i := 0; i < len(s); i++ {
		c := s[i]
		if c == '_' {
			if i+2 >= len(s) {
				return "", false
			}
			hi, lo := digit(s[i+1]), digit(s[i+2])
			if hi < 0 || lo < 0 {
				return "", false
			}
			c = byte(hi<<4 | lo)
			i += 2
		}
		b.WriteByte(c)
	}
	name = b.String()
	return name, Escape(name) == s && CheckName(name) == nil
}

func digit(c byte) int {
	switch {
	case c >= '0' && c <= '9':
		return int(c - '0')
	case c >= 'a' && c <= 'f':
		return int(c-'a') + 10
	}
	return -1
}
