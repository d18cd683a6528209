package game

import (
	"image/color"

	"github.com/hajimehoshi/ebiten/v2"

	"levelspan/game/scene"
)

// painter copies a scene's triangles to an image.
type painter struct{}

func (p *painter) paint(dst *ebiten.Image, s *scene.Scene) {
	dst.Fill(color.NRGBA{s.Background.R, s.Background.G, s.Background.B, s.Background.A})
}
