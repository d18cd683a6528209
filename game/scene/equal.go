package scene

import (
	"bytes"
	"math"
)

// Hash is a 64-bit digest of everything that the scene draws: equal scenes have equal hashes, on every machine whose
// coordinates are equal. It tells whether a frame changed; it is no protection against forgery.
func (s *Scene) Hash() uint64 {
	h := digest(14695981039346656037)
	h.float(s.Width)
	h.float(s.Height)
	h.float(s.Scale)
	h.word(uint64(s.Background.bits()))
	h.word(uint64(len(s.Ops)))
	for i := range s.Ops {
		for _, w := range s.Ops[i].words() {
			h.word(w)
		}
	}
	h.word(uint64(len(s.Points)))
	other := h // two chains side by side take half the time
	for _, p := range s.Points {
		h.float(p.X)
		other.float(p.Y)
	}
	h.word(uint64(other))
	h.word(uint64(len(s.Text)))
	for _, b := range s.Text {
		h.word(uint64(b))
	}
	return uint64(h)
}

// Equal tells whether two scenes are the same in every number; a NaN equals itself.
func (s *Scene) Equal(t *Scene) bool {
	if !same(s.Width, t.Width) || !same(s.Height, t.Height) || !same(s.Scale, t.Scale) || s.Background != t.Background ||
		len(s.Ops) != len(t.Ops) || len(s.Points) != len(t.Points) || !bytes.Equal(s.Text, t.Text) {
		return false
	}
	for i := range s.Ops {
		if s.Ops[i].words() != t.Ops[i].words() {
			return false
		}
	}
	for i, p := range s.Points {
		if q := t.Points[i]; !same(p.X, q.X) || !same(p.Y, q.Y) {
			return false
		}
	}
	return true
}

// SameOp tells whether operation i of s draws the same as operation j of t, wherever in the store its points and text
// are. Ranges that do not lie within their scene are the same only in the same place.
func SameOp(s *Scene, i int, t *Scene, j int) bool {
	a, b := s.Ops[i], t.Ops[j]
	p, q := span(s.Points, a.P0, a.P1), span(t.Points, b.P0, b.P1)
	x, y := span(s.Text, a.T0, a.T1), span(t.Text, b.T0, b.T1)
	if len(p) != len(q) || !bytes.Equal(x, y) {
		return false
	}
	for k := range p {
		if !same(p[k].X, q[k].X) || !same(p[k].Y, q[k].Y) {
			return false
		}
	}
	if len(p) > 0 {
		a.P0, a.P1, b.P0, b.P1 = 0, 0, 0, 0
	}
	if len(x) > 0 {
		a.T0, a.T1, b.T0, b.T1 = 0, 0, 0, 0
	}
	return a.words() == b.words()
}

func span[T any](all []T, from, to int) []T {
	if from < 0 || to > len(all) || from >= to {
		return nil
	}
	return all[from:to]
}

// CopyFrom makes s an equal scene with a store of its own, which is kept from call to call.
func (s *Scene) CopyFrom(t *Scene) {
	s.Width, s.Height, s.Scale, s.Background = t.Width, t.Height, t.Scale, t.Background
	s.Ops = append(s.Ops[:0], t.Ops...)
	s.Points = append(s.Points[:0], t.Points...)
	s.Text = append(s.Text[:0], t.Text...)
}

func same(a, b float64) bool { return math.Float64bits(a) == math.Float64bits(b) }

// words is the operation as plain words.
func (op *Op) words() [13]uint64 {
	flags := uint64(op.Kind) | uint64(op.Style)<<8 | uint64(op.Align)<<16
	if op.Closed {
		flags |= 1 << 24
	}
	if op.Vertical {
		flags |= 1 << 25
	}
	return [13]uint64{flags, uint64(op.Color.bits())<<32 | uint64(op.Color2.bits()),
		math.Float64bits(op.Rect.X), math.Float64bits(op.Rect.Y), math.Float64bits(op.Rect.W), math.Float64bits(op.Rect.H),
		math.Float64bits(op.W), math.Float64bits(op.Dash), math.Float64bits(op.Gap),
		uint64(op.P0), uint64(op.P1), uint64(op.T0), uint64(op.T1)}
}

func (c Color) bits() uint32 {
	return uint32(c.R)<<24 | uint32(c.G)<<16 | uint32(c.B)<<8 | uint32(c.A)
}

// digest is an FNV-like mix of whole words, with the high half folded down so that each bit of a word counts.
type digest uint64

func (h *digest) word(w uint64) {
	v := (uint64(*h) ^ w) * 0x9E3779B97F4A7C15
	*h = digest(v ^ v>>29)
}

func (h *digest) float(f float64) { h.word(math.Float64bits(f)) }
