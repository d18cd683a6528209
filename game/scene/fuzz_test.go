package scene_test

import (
	"bytes"
	"encoding/xml"
	"image"
	"io"
	"math"
	"sync"
	"testing"

	"levelspan/game/scene"
	"levelspan/game/scene/glyph"
	"levelspan/game/scene/internal/sample"
	"levelspan/game/scene/mesh"
	"levelspan/game/scene/raster"
	"levelspan/game/scene/svg"
)

var atlases = sync.OnceValue(func() [3]*glyph.Atlas { return [3]*glyph.Atlas{1: glyph.New(1), 2: glyph.New(2)} })

// FuzzScene: whatever a scene holds, each back end finishes within bounded memory; triangles have numbers within
// reach and indices within their batch; XML is well-formed.
func FuzzScene(f *testing.F) {
	f.Add([]byte{64, 0, 64, 0, 0, 255, 255})
	f.Add([]byte("\x40\x00\x40\x00\x01\xff\xff\x02\x05\x10\x00\x10\x00\x80\x00\x20\x00\xf0\xf8\x30\x00\x60\x00\x90\x00\x10\x08\x00\xff\xff"))
	f.Add([]byte("\xf1\x40\x00\x05\xff\xff\x08\x0a\x05\x20\x00\x20\x00\x01Gr\xc3\xbc\xff\x00<&>\x00\xff\xff"))
	f.Fuzz(func(t *testing.T, data []byte) {
		s := sample.Scene(data)
		a := atlases()[int(scene.CleanScale(s.Scale))%3]
		checkMesh(t, s, a)
		var p raster.Painter
		p.UseAtlas(a)
		w, h := s.DeviceSize()
		m := p.Render(s, nil)
		if m.Rect.Dx() != w || m.Rect.Dy() != h {
			t.Fatalf("picture of %v, want %d x %d", m.Rect, w, h)
		}
		for i := 0; i < len(m.Pix); i += 4 {
			if q := m.Pix[i : i+4]; q[0] > q[3] || q[1] > q[3] || q[2] > q[3] {
				t.Fatalf("pixel %d is brighter than its alpha: %v", i/4, q)
			}
		}
		checkUpdate(t, s, data, a)
		for _, opt := range []svg.Options{{}, {Outlines: true}} {
			checkXML(t, svg.Append(nil, s, opt))
		}
	})
}

// checkUpdate changes a byte of the scene's and compares the updated picture with one painted anew.
func checkUpdate(t *testing.T, s *scene.Scene, data []byte, a *glyph.Atlas) {
	if len(data) < 8 {
		return
	}
	data = bytes.Clone(data)
	data[7+len(data)%(len(data)-7)] ^= 5
	next := sample.Scene(data)
	w, h := s.DeviceSize()
	if x, y := next.DeviceSize(); x != w || y != h {
		return
	}
	var p, fresh raster.Painter
	p.UseAtlas(a)
	fresh.UseAtlas(a)
	dst := image.NewRGBA(image.Rect(0, 0, w, h))
	p.Update(s, dst)
	p.Update(next, dst)
	if d := sample.Compare(dst, fresh.Render(next, nil), 3); d.Count != 0 {
		t.Fatalf("updated picture: %+v", d)
	}
}

func checkMesh(t *testing.T, s *scene.Scene, a *glyph.Atlas) {
	var m mesh.Mesh
	m.UseAtlas(a)
	m.Build(s)
	if n := len(m.Vertices); n > 4<<20 {
		t.Fatalf("%d vertices", n)
	}
	for i, v := range m.Vertices {
		for _, f := range [...]float32{v.DstX, v.DstY, v.SrcX, v.SrcY} {
			if !(math.Abs(float64(f)) <= 1<<17) {
				t.Fatalf("vertex %d: %+v", i, v)
			}
		}
		for _, f := range [...]float32{v.R, v.G, v.B, v.A} {
			if !(f >= 0 && f <= 1) {
				t.Fatalf("vertex %d: %+v", i, v)
			}
		}
	}
	v, k := 0, 0
	for _, b := range m.Batches {
		if b.V0 != v || b.I0 != k || b.V1-b.V0 > mesh.MaxVertices || (b.I1-b.I0)%3 != 0 || b.I1 <= b.I0 {
			t.Fatalf("batch %+v after %d vertices and %d indices", b, v, k)
		}
		v, k = b.V1, b.I1
		for _, i := range m.Indices[b.I0:b.I1] {
			if int(i) >= b.V1-b.V0 {
				t.Fatalf("index %d of %d vertices", i, b.V1-b.V0)
			}
		}
	}
	if v != len(m.Vertices) || k != len(m.Indices) {
		t.Fatalf("batches end at %d, %d of %d, %d", v, k, len(m.Vertices), len(m.Indices))
	}
}

func checkXML(t *testing.T, doc []byte) {
	d := xml.NewDecoder(bytes.NewReader(doc))
	for {
		tok, err := d.Token()
		if err == io.EOF {
			return
		}
		if err != nil {
			t.Fatalf("%v in\n%s", err, doc)
		}
		if e, ok := tok.(xml.StartElement); ok {
			for _, a := range e.Attr {
				if a.Name.Local != "aria-label" && (a.Value == "NaN" || a.Value == "+Inf" || a.Value == "-Inf") {
					t.Fatalf("%s in\n%s", a.Value, doc)
				}
			}
		}
	}
}
