//go:build js

// Command empty is the least that the drawing library can be asked for in a page: one window of one colour. It is what
// the time to the first chart is held against (wasm/start_test.go). pagebuild -program puts it into the same page as the
// real program, and it says in the same way that its first picture is there.
package main

import (
	"image/color"
	"log"
	"syscall/js"

	"github.com/hajimehoshi/ebiten/v2"
)

type empty struct{ drawn bool }

func (*empty) Update() error                                { return nil }
func (*empty) Layout(width, height int) (w, h int)          { return width, height }
func (*empty) LayoutF(width, height float64) (w, h float64) { return width, height }

func (e *empty) Draw(screen *ebiten.Image) {
	screen.Fill(color.RGBA{R: 0xfc, G: 0xfb, B: 0xf7, A: 0xff})
	if !e.drawn {
		e.drawn = true
		js.Global().Get("levelspan").Call("ready", "webgl")
	}
}

func main() {
	if err := ebiten.RunGame(&empty{}); err != nil {
		log.Fatal(err)
	}
}
