// Package game shows a scene in a window: the ebiten surface, the painter behind it and, on the desktop, the input.
// It is the only package that imports ebiten, and it is thin: all that is worth testing lies above it in game/app.
package game

import (
	"fmt"
	"runtime/debug"

	"github.com/hajimehoshi/ebiten/v2"

	"levelspan/game/scene"
)

// Frame takes in what happened since it was last called and gives the scene to show, nil if the one shown still
// holds. Width and height are in logical pixels, scale is device pixels a logical pixel.
type Frame func(width, height, scale float64) *scene.Scene

// Surface is a window, or the page's WebGL canvas, that shows scenes. A frame is asked for only after Wake, an event
// of the window, or a change of its size. Make it with NewSurface.
type Surface struct {
	// AfterDraw, if set, is called after each scene that has been drawn.
	AfterDraw func()

	frame   Frame
	failed  func(why string)
	painter painter
	shown   *scene.Scene // what is on the screen, nil before the first
	canvas  *ebiten.Image
	dirty   bool
	dead    bool
	left    bool

	width, height, scale float64
}

// NewSurface shows what frame gives. If frame or the drawing panics, failed is told once, and the surface shows a
// plain statement that its figures are void from then on.
func NewSurface(frame Frame, failed func(why string)) *Surface {
	return &Surface{frame: frame, failed: failed}
}

// Run shows the window until it is closed. It must be called from main, once. The error is what kept it from
// starting, such as a browser without WebGL2.
func (s *Surface) Run(title string) error {
	ebiten.SetWindowTitle(title)
	ebiten.SetWindowResizingMode(ebiten.WindowResizingModeEnabled)
	ebiten.SetScreenClearedEveryFrame(false)
	ebiten.SetFPSMode(ebiten.FPSModeVsyncOffMinimum)
	ebiten.SetTPS(ebiten.SyncWithFPS)
	return ebiten.RunGameWithOptions(s, &ebiten.RunGameOptions{InitUnfocused: inBrowser, X11ClassName: "levelspan", X11InstanceName: "levelspan"})
}

// Wake asks for a frame. It may be called from any goroutine.
func Wake() { ebiten.ScheduleFrame() }

// Leave makes the surface ask for no more frames and draw no more: another shows the scenes from now on.
func (s *Surface) Leave() { s.left = true }

// Update is ebiten's tick: one a frame.
func (s *Surface) Update() (err error) {
	defer s.guard()
	if s.dead || s.left || s.width <= 0 || s.height <= 0 {
		return nil
	}
	if next := s.frame(s.width, s.height, s.scale); next != nil {
		s.shown, s.dirty = next, true
	}
	return nil
}

// Draw paints the scene if it is new or the screen is. (Painting onto the final screen itself would spare a copy, but
// ebiten turns that upside down and not the clips with it, and under SwiftShader the copy made no measurable difference.)
func (s *Surface) Draw(screen *ebiten.Image) {
	defer s.guard()
	if s.left || s.shown == nil || !s.dirty && s.canvas == screen {
		return
	}
	s.canvas, s.dirty = screen, false
	s.painter.paint(screen, s.shown)
	if s.AfterDraw != nil {
		s.AfterDraw()
	}
}

// LayoutF gives the size of the drawing in device pixels: exactly the window's, so that it is copied, not scaled.
func (s *Surface) LayoutF(width, height float64) (float64, float64) {
	scale := ebiten.Monitor().DeviceScaleFactor()
	if !(scale > 0) {
		scale = 1
	}
	s.width, s.height, s.scale = width, height, scale
	return width * scale, height * scale
}

// Layout is never called, because LayoutF is there; ebiten's interface wants it.
func (s *Surface) Layout(width, height int) (int, int) { return width, height }

// guard turns a panic into a screen that says that no figure holds.
func (s *Surface) guard() {
	r := recover()
	if r == nil {
		return
	}
	why := fmt.Sprintf("%v\n%s", r, debug.Stack())
	first := !s.dead
	s.dead = true
	if first && s.failed != nil {
		s.failed(why)
	}
	s.shown = deadScene(s.width, s.height, s.scale, fmt.Sprint(r))
	s.dirty = true
	Wake()
}

// deadScene is what is shown after a panic: no figure of the chart stays readable.
func deadScene(width, height, scale float64, why string) *scene.Scene {
	dead := &scene.Scene{}
	ground, ink, bad := scene.Color{R: 252, G: 251, B: 247, A: 255}, scene.Color{R: 23, G: 32, B: 43, A: 255}, scene.Color{R: 179, G: 38, B: 30, A: 255}
	dead.Reset(width, height, scale, ground)
	dead.Label(scene.Title, 24, 64, scene.Left, "The program has stopped", bad)
	dead.Label(scene.Body, 24, 100, scene.Left, "No figure that was on this screen may be used.", ink)
	dead.Label(scene.Body, 24, 126, scene.Left, "Close the window and start again.", ink)
	const most = 160
	if len(why) > most {
		why = why[:most]
	}
	dead.Label(scene.Small, 24, 160, scene.Left, why, ink)
	return dead
}
