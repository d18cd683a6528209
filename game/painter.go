package game

import (
	"github.com/hajimehoshi/ebiten/v2"

	"levelspan/game/scene"
	"levelspan/game/scene/glyph"
	"levelspan/game/scene/mesh"
)

// painter draws scenes as triangles. Its stores are kept between scenes. The zero value is ready.
type painter struct {
	mesh     mesh.Mesh
	vertices []ebiten.Vertex
	atlas    *glyph.Atlas // that texture was made from
	texture  *ebiten.Image
	options  ebiten.DrawTrianglesOptions
}

// paint replaces what is on dst by the scene.
func (p *painter) paint(dst *ebiten.Image, s *scene.Scene) {
	p.mesh.Build(s)
	p.upload(p.mesh.Atlas())
	p.options.ColorScaleMode = ebiten.ColorScaleModePremultipliedAlpha
	for _, b := range p.mesh.Batches {
		target := dst
		if clip := b.Clip.Intersect(dst.Bounds()); clip != dst.Bounds() {
			if clip.Empty() {
				continue
			}
			target = dst.SubImage(clip).(*ebiten.Image)
		}
		p.vertices = convert(p.vertices[:0], p.mesh.Vertices[b.V0:b.V1])
		target.DrawTriangles(p.vertices, p.mesh.Indices[b.I0:b.I1], p.texture, &p.options)
	}
}

// upload makes the texture of an atlas, once for each: its image never changes.
func (p *painter) upload(a *glyph.Atlas) {
	if p.atlas == a {
		return
	}
	if p.texture != nil {
		p.texture.Deallocate()
	}
	p.atlas = a
	size := a.Image.Bounds().Size()
	p.texture = ebiten.NewImageWithOptions(a.Image.Bounds().Sub(a.Image.Bounds().Min), &ebiten.NewImageOptions{Unmanaged: true})
	pixels := make([]byte, 4*size.X*size.Y)
	for y := range size.Y {
		row := a.Image.Pix[y*a.Image.Stride:][:size.X]
		for x, cover := range row {
			at := 4 * (y*size.X + x)
			pixels[at], pixels[at+1], pixels[at+2], pixels[at+3] = cover, cover, cover, cover
		}
	}
	p.texture.WritePixels(pixels)
}

// convert appends vertices in the form that ebiten wants.
func convert(dst []ebiten.Vertex, src []mesh.Vertex) []ebiten.Vertex {
	for i := range src {
		v := &src[i]
		dst = append(dst, ebiten.Vertex{DstX: v.DstX, DstY: v.DstY, SrcX: v.SrcX, SrcY: v.SrcY, ColorR: v.R, ColorG: v.G, ColorB: v.B, ColorA: v.A})
	}
	return dst
}
