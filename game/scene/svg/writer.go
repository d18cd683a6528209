package svg

import (
	"strconv"
	"unicode/utf8"

	"levelspan/game/scene"
	"levelspan/game/scene/device"
)

// writer appends pieces of XML.
type writer struct {
	b     []byte
	s     *scene.Scene
	opt   Options
	frame device.Frame
	id    uint64 // in every id, so that two documents in one page do not share them
	count int
}

func (w *writer) str(s string) { w.b = append(w.b, s...) }

// float appends a number with at most three decimals.
func (w *writer) float(v float64) {
	n := len(w.b)
	w.b = strconv.AppendFloat(w.b, v, 'f', 3, 64)
	for w.b[len(w.b)-1] == '0' {
		w.b = w.b[:len(w.b)-1]
	}
	if w.b[len(w.b)-1] == '.' {
		w.b = w.b[:len(w.b)-1]
	}
	if string(w.b[n:]) == "-0" {
		w.b = append(w.b[:n], '0')
	}
}

func (w *writer) point(p scene.Point) {
	w.float(p.X)
	w.str(" ")
	w.float(p.Y)
}

// num appends an attribute.
func (w *writer) num(name string, v float64) {
	w.str(name)
	w.str(`="`)
	w.float(v)
	w.str(`"`)
}

// ref appends the id of the current clip or gradient, between before and a quote.
func (w *writer) ref(before, kind string) {
	w.str(before)
	w.str(kind)
	w.b = strconv.AppendUint(w.b, w.id, 36)
	w.str("-")
	w.b = strconv.AppendInt(w.b, int64(w.count), 10)
	w.str(`"`)
}

func (w *writer) fill(c scene.Color) { w.paint(" fill", c) }

// paint appends a colour attribute and, when not 1, its opacity.
func (w *writer) paint(name string, c scene.Color) {
	w.str(name)
	w.str(`="`)
	w.hex(c)
	w.str(`"`)
	if c.A != 255 {
		w.str(name)
		w.num("-opacity", float64(c.A)/255)
	}
}

func (w *writer) stop(c scene.Color) {
	w.str(` stop-color="`)
	w.hex(c)
	w.str(`"`)
	if c.A != 255 {
		w.num(" stop-opacity", float64(c.A)/255)
	}
}

func (w *writer) hex(c scene.Color) {
	const digits = "0123456789abcdef"
	w.str("#")
	for _, v := range [3]uint8{c.R, c.G, c.B} {
		w.b = append(w.b, digits[v>>4], digits[v&15])
	}
}

// text appends characters escaped; what XML cannot hold becomes U+FFFD.
func (w *writer) text(t []byte) {
	for len(t) > 0 {
		r, n := utf8.DecodeRune(t)
		t = t[n:]
		switch {
		case r == '&':
			w.str("&amp;")
		case r == '<':
			w.str("&lt;")
		case r == '>':
			w.str("&gt;")
		case r == '"':
			w.str("&quot;")
		case r < 0x20 || r == 0xFFFE || r == 0xFFFF:
			w.b = utf8.AppendRune(w.b, utf8.RuneError)
		default:
			w.b = utf8.AppendRune(w.b, r)
		}
	}
}
