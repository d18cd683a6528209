package main

import (
	"fmt"
	"image"
	"runtime/debug"
	"syscall/js"

	"levelspan/game"
	"levelspan/game/scene"
	"levelspan/game/scene/raster"
)

// webgl is ebiten's surface. It is over when the browser takes the graphics context away.
type webgl struct{ bridge *bridge }

// run shows scenes until the context is lost: then it is nil. An error is what kept it from starting.
func (w *webgl) run(frame game.Frame, shown func(string)) error {
	s := game.NewSurface(frame, w.bridge.fail)
	s.AfterDraw = func() { shown("webgl") }
	lost := make(chan error, 2)
	w.bridge.listen("onwake", game.Wake)
	w.bridge.listen("onlost", func() {
		s.Leave()
		select {
		case lost <- nil:
		default:
		}
	})
	go func() { lost <- s.Run("levelspan") }()
	return <-lost
}

// software is a 2D canvas: the scene is painted on the processor, and only what differs is handed to the canvas.
type software struct {
	bridge  *bridge
	painter raster.Painter
	picture *image.RGBA
	scale   float64 // of the last scene
	packed  []byte
	buffer  js.Value // a Uint8ClampedArray as large as packed can become
	dead    bool
}

// run shows scenes until the page ends.
func (w *software) run(frame game.Frame, shown func(string)) {
	w.bridge.object.Set("onpaint", js.FuncOf(func(_ js.Value, args []js.Value) any {
		if len(args) == 3 && !w.dead {
			w.paint(frame, shown, args[0].Float(), args[1].Float(), args[2].Float())
		}
		return nil
	}))
	w.bridge.call("software")
	select {}
}

// paint is one frame. A panic covers the page.
func (w *software) paint(frame game.Frame, shown func(string), width, height, scale float64) {
	defer func() {
		if r := recover(); r != nil {
			w.dead = true
			w.bridge.fail(fmt.Sprintf("%v\n%s", r, debug.Stack()))
		}
	}()
	s := frame(width, height, scale)
	if s == nil {
		return
	}
	w.show(s)
	shown("software")
}

func (w *software) show(s *scene.Scene) {
	var size image.Point
	size.X, size.Y = s.DeviceSize()
	if w.picture == nil || w.picture.Rect.Size() != size || w.scale != s.Scale {
		w.scale = s.Scale
		w.picture = image.NewRGBA(image.Rectangle{Max: size})
		w.packed = make([]byte, len(w.picture.Pix))
		w.buffer = w.bridge.call("picture", size.X, size.Y)
	}
	for _, r := range w.painter.Update(s, w.picture) {
		if r = r.Intersect(w.picture.Rect); r.Empty() {
			continue
		}
		line := 4 * r.Dx()
		for y := r.Min.Y; y < r.Max.Y; y++ {
			from := w.picture.PixOffset(r.Min.X, y)
			copy(w.packed[(y-r.Min.Y)*line:][:line], w.picture.Pix[from:from+line])
		}
		js.CopyBytesToJS(w.buffer, w.packed[:line*r.Dy()])
		w.bridge.call("blit", r.Min.X, r.Min.Y, r.Dx(), r.Dy())
	}
}
