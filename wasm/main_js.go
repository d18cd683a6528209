package main

import (
	"os"
	"syscall/js"
	"time"

	"levelspan/game"
	"levelspan/game/app"
	"levelspan/game/scene"
)

func main() {
	version := "dev"
	if len(os.Args) > 1 {
		version = os.Args[1]
	}
	b := newBridge()
	p := &page{bridge: b, mirror: newMirror()}
	p.app = app.New(&host{bridge: b, version: version}, nil)
	b.call("adopt")
	var show surface = &webgl{}
	if err := show.run(p.frame, p.shown, b.fail); err != nil {
		b.call("unavailable", err.Error())
		select {} // the page says why; ending would say it a second time
	}
}

// page is what does not depend on the surface: the queue in, the program, the mirror out.
type page struct {
	bridge *bridge
	app    *app.App
	mirror *mirror
	input  app.Input
	focus  string
	ready  bool
	timer  *time.Timer
}

// frame takes the queue in and gives the scene to show, nil if the one shown still holds.
func (p *page) frame(width, height, scale float64) *scene.Scene {
	p.bridge.drain(&p.input)
	p.input.Width, p.input.Height, p.input.Scale = width, height, scale
	changed := p.app.Step(p.input)
	p.sleep(p.app.Wake())
	if !changed {
		return nil
	}
	show := p.app.Scene()
	if patch := p.mirror.update(p.app.Controls(), p.app.Mirror(), show.Background); patch != "" {
		p.bridge.call("patch", patch)
	}
	if focus := p.app.FocusID(); focus != p.focus {
		p.focus = focus
		p.bridge.call("focus", focus)
	}
	return show
}

// shown is called by the surface when a scene has been drawn.
func (p *page) shown(surface string) {
	if !p.ready {
		p.ready = true
		p.bridge.call("ready", surface)
	}
}

// sleep sees to it that the next frame comes no later than after d, if d is not negative.
func (p *page) sleep(d time.Duration) {
	if p.timer != nil {
		p.timer.Stop()
	}
	switch {
	case d == 0:
		p.bridge.wake()
	case d > 0:
		p.timer = time.AfterFunc(d, p.bridge.wake)
	}
}

// surface shows scenes until the page ends. Frames are asked of frame at the browser's pace, but only after the
// bridge's wake; shown is told after each scene that has been drawn; failed is told of a panic.
type surface interface {
	run(frame game.Frame, shown func(name string), failed func(why string)) error
}

// webgl is ebiten's surface.
type webgl struct{}

func (*webgl) run(frame game.Frame, shown func(string), failed func(string)) error {
	onWake(game.Wake)
	s := game.NewSurface(frame, failed)
	s.AfterDraw = func() { shown("webgl") }
	return s.Run("levelspan")
}

// onWake makes the page's wake call f.
func onWake(f func()) {
	js.Global().Get("levelspan").Call("onwake", js.FuncOf(func(js.Value, []js.Value) any {
		f()
		return nil
	}))
}
