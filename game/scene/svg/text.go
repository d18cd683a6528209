package svg

import (
	"strconv"

	"levelspan/assets/font"
	"levelspan/game/scene"
)

// label writes a text operation.
func (w *writer) label(op *scene.Op) {
	text, at, width, ok := w.frame.Line(w.s, op)
	if !ok {
		return
	}
	if w.opt.Outlines {
		w.drawn(op, text)
		return
	}
	w.str("<text")
	w.num(" x", at.X)
	w.num(" y", at.Y)
	w.str(` font-family="` + fallback + `"`)
	w.num(" font-size", op.Style.Size())
	if op.Style.Weight() == font.Bold {
		w.str(` font-weight="bold"`)
	}
	if width > 0 {
		w.num(" textLength", width)
	}
	w.str(` xml:space="preserve"`)
	w.fill(op.Color)
	w.str(">")
	w.text(text)
	w.str("</text>\n")
}

// drawn writes a text as references to outlines.
func (w *writer) drawn(op *scene.Op, text []byte) {
	w.str(`<g role="img" aria-label="`)
	w.text(text)
	w.str(`"`)
	w.fill(op.Color)
	w.str(">")
	k := op.Style.Size() / font.UnitsPerEm
	w.frame.Text(w.s, op)
	for {
		index, x, y, ok := w.frame.NextExact()
		if !ok {
			break
		}
		w.str(`<use xlink:href="#`)
		w.glyphID(op.Style.Weight(), index)
		w.str(`" transform="translate(`)
		w.float(x)
		w.str(" ")
		w.float(y)
		w.str(") scale(")
		w.b = strconv.AppendFloat(w.b, k, 'g', 6, 64)
		w.str(`)"/>`)
	}
	w.str("</g>\n")
}

func (w *writer) glyphID(weight font.Weight, index int) {
	w.str([...]string{font.Regular: "r", font.Bold: "b"}[weight])
	w.b = strconv.AppendInt(w.b, int64(index), 10)
	w.str("-")
	w.b = strconv.AppendUint(w.b, w.id, 36)
}

// glyphs writes the outlines that the scene's texts use, in font units, y down.
func (w *writer) glyphs() {
	var used [font.WeightCount][]bool
	for i := range used {
		used[i] = make([]bool, font.Count())
	}
	for i := range w.s.Ops {
		op := &w.s.Ops[i]
		if op.Kind != scene.OpText {
			continue
		}
		w.frame.Text(w.s, op)
		for {
			index, _, _, ok := w.frame.NextExact()
			if !ok {
				break
			}
			used[op.Style.Weight()][index] = true
		}
	}
	var o font.Outliner
	w.str("<defs>\n")
	for weight := range used {
		for index, u := range used[weight] {
			if u {
				w.str(`<path id="`)
				w.glyphID(font.Weight(weight), index)
				w.str(`" d="`)
				w.outline(o.Outline(font.Weight(weight), index))
				w.str("\"/>\n")
			}
		}
	}
	w.str("</defs>\n")
}

func (w *writer) outline(segs []font.Segment) {
	for _, s := range segs {
		switch s.Verb {
		case font.MoveTo:
			w.str("M")
		case font.LineTo:
			w.str("L")
		case font.CurveTo:
			w.str("C")
			w.point(scene.Point{X: s.X1, Y: -s.Y1})
			w.str(" ")
			w.point(scene.Point{X: s.X2, Y: -s.Y2})
			w.str(" ")
		}
		w.point(scene.Point{X: s.X, Y: -s.Y})
	}
	if len(segs) > 0 {
		w.str("Z")
	}
}
