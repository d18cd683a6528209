// Package mesh turns a scene into textured triangles for graphics hardware: one vertex list, 16-bit indices, few
// batches. Edges are smoothed by a fringe one device pixel wide whose coverage falls from full to none, centred on the
// true edge; an edge on a pixel boundary therefore stays hard. Text is quads from the glyph atlas. The package knows no
// graphics library.
package mesh

import (
	"image"

	"levelspan/game/scene"
	"levelspan/game/scene/device"
	"levelspan/game/scene/glyph"
)

// Vertex is a corner: place on the screen and in the atlas, both in pixels, and premultiplied colour, each 0..1. The
// colour of a pixel is colour times atlas coverage, laid over what is there.
type Vertex struct {
	DstX, DstY, SrcX, SrcY float32
	R, G, B, A             float32
}

// MaxVertices is the most vertices a batch has: below the reach of 16-bit indices, with room to spare.
const MaxVertices = 60000

// Batch is triangles that are drawn together within Clip (device pixels). Its vertices are Vertices[V0:V1]; its
// indices Indices[I0:I1], three a triangle, count from V0.
type Batch struct {
	Clip           image.Rectangle
	V0, V1, I0, I1 int
}

// Mesh builds and holds the triangles of a scene. Its stores are kept, so that building allocates nothing once warm.
// The zero value is ready; it is not for two goroutines at once.
type Mesh struct {
	Vertices []Vertex
	Indices  []uint16
	Batches  []Batch

	atlas  *glyph.Atlas
	frame  device.Frame
	colour Vertex // the operation's colour and white texel
	row    strip
	ring   []scene.Point
	ears   ears
}

// UseAtlas gives the mesh an atlas made elsewhere, so that two back ends share one.
func (m *Mesh) UseAtlas(a *glyph.Atlas) { m.atlas = a }

// Atlas is the texture that the last Build refers to. It is another one after a change of scale, and only then.
func (m *Mesh) Atlas() *glyph.Atlas { return m.atlas }

// Build replaces the mesh by that of s. The background is its first two triangles.
func (m *Mesh) Build(s *scene.Scene) {
	f := &m.frame
	f.Begin(s)
	if m.atlas == nil || m.atlas.Scale != f.Scale {
		m.atlas = glyph.New(f.Scale)
	}
	m.Vertices, m.Indices, m.Batches = m.Vertices[:0], m.Indices[:0], m.Batches[:0]
	if f.Bounds.Empty() {
		return
	}
	m.Batches = append(m.Batches, Batch{Clip: f.Bounds})
	if s.Background.A != 0 {
		m.ink(s.Background)
		m.box(f.Bounds)
	}
	for i := range s.Ops {
		m.op(s, &s.Ops[i])
	}
	last := &m.Batches[len(m.Batches)-1]
	last.V1, last.I1 = len(m.Vertices), len(m.Indices)
	if last.I0 == last.I1 {
		m.Batches = m.Batches[:len(m.Batches)-1]
	}
}

func (m *Mesh) op(s *scene.Scene, op *scene.Op) {
	f := &m.frame
	switch op.Kind {
	case scene.OpPushClip:
		f.Push(op.Rect)
		return
	case scene.OpPopClip:
		f.Pop()
		return
	}
	if f.Clip.Empty() || op.Color.A == 0 && op.Kind != scene.OpGradient {
		return
	}
	m.ink(op.Color)
	switch op.Kind {
	case scene.OpFill:
		if q := f.Polygon(s, op); q != nil && m.enter(device.Extent(q, 1)) {
			m.polygon(q)
		}
	case scene.OpBand:
		m.band(s, op)
	case scene.OpStroke:
		m.stroke(s, op)
	case scene.OpRect:
		m.rect(op)
	case scene.OpGradient:
		m.gradient(op)
	case scene.OpCircle:
		if c, r, ok := f.Disc(s, op); ok {
			m.disc(c, r)
		}
	case scene.OpText:
		m.text(s, op)
	}
}

// ink sets the colour of what follows, with the white texel.
func (m *Mesh) ink(c scene.Color) { m.colour = m.premultiplied(c) }

func (m *Mesh) premultiplied(c scene.Color) Vertex {
	a := float32(c.A) / 255
	return Vertex{SrcX: m.atlas.WhiteX, SrcY: m.atlas.WhiteY,
		R: float32(c.R) / 255 * a, G: float32(c.G) / 255 * a, B: float32(c.B) / 255 * a, A: a}
}

// enter prepares the batch for a shape that touches no pixel outside box; false when the clip leaves nothing of it.
// A shape that the clip does not cut goes into any batch whose clip does not cut it either.
func (m *Mesh) enter(box image.Rectangle) bool {
	clip := m.frame.Clip
	if !box.Overlaps(clip) {
		return false
	}
	b := &m.Batches[len(m.Batches)-1]
	whole := box.In(clip)
	if b.Clip == clip || whole && box.In(b.Clip) {
		return true
	}
	if whole {
		clip = m.frame.Bounds
	}
	m.split(clip)
	return true
}

// split starts a new batch, or changes the clip of the current one when that is still empty.
func (m *Mesh) split(clip image.Rectangle) {
	b := &m.Batches[len(m.Batches)-1]
	if b.I0 == len(m.Indices) {
		m.Vertices = m.Vertices[:b.V0]
		b.Clip = clip
		return
	}
	b.V1, b.I1 = len(m.Vertices), len(m.Indices)
	m.Batches = append(m.Batches, Batch{Clip: clip, V0: b.V1, I0: b.I1})
}

// room makes sure that n more vertices fit the batch; true when a new batch was begun.
func (m *Mesh) room(n int) bool {
	b := &m.Batches[len(m.Batches)-1]
	if len(m.Vertices)-b.V0+n <= MaxVertices {
		return false
	}
	m.split(b.Clip)
	return true
}

// base is the index, in the batch, of the next vertex.
func (m *Mesh) base() int { return len(m.Vertices) - m.Batches[len(m.Batches)-1].V0 }

// vert appends a corner in the current colour with a coverage.
func (m *Mesh) vert(x, y, cover float64) {
	m.Vertices = append(m.Vertices, m.colour.at(x, y, cover))
}

func (v Vertex) at(x, y, cover float64) Vertex {
	v.DstX, v.DstY = float32(x), float32(y)
	if cover != 1 {
		k := float32(cover)
		v.R *= k
		v.G *= k
		v.B *= k
		v.A *= k
	}
	return v
}

// tri appends a triangle of the batch's vertices.
func (m *Mesh) tri(a, b, c int) {
	m.Indices = append(m.Indices, uint16(a), uint16(b), uint16(c))
}

// quad appends the quadrilateral with these corners in order around it.
func (m *Mesh) quad(a, b, c, d int) {
	m.Indices = append(m.Indices, uint16(a), uint16(b), uint16(c), uint16(a), uint16(c), uint16(d))
}
