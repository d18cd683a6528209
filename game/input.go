//go:build !js

package game

import (
	"io"
	"io/fs"
	"strings"
	"time"

	"github.com/hajimehoshi/ebiten/v2"

	"levelspan/game/app"
	"levelspan/game/ui"
)

// Keys held down repeat: after repeatFirst, then every repeatNext.
const (
	repeatFirst = 400 * time.Millisecond
	repeatNext  = 50 * time.Millisecond
)

// largestFile bounds what a dropped file may hold; a case is a few kilobytes.
const largestFile = 4 << 20

// wheelStep is how far one notch of the wheel scrolls, logical pixels.
const wheelStep = 60

var keyTable = []struct {
	key  ebiten.Key
	is   ui.Key
	also ebiten.Key // the keypad's twin, or the same
}{
	{ebiten.KeyArrowLeft, ui.KeyLeft, ebiten.KeyArrowLeft},
	{ebiten.KeyArrowRight, ui.KeyRight, ebiten.KeyArrowRight},
	{ebiten.KeyArrowUp, ui.KeyUp, ebiten.KeyArrowUp},
	{ebiten.KeyArrowDown, ui.KeyDownArrow, ebiten.KeyArrowDown},
	{ebiten.KeyPageUp, ui.KeyPageUp, ebiten.KeyPageUp},
	{ebiten.KeyPageDown, ui.KeyPageDown, ebiten.KeyPageDown},
	{ebiten.KeyHome, ui.KeyHome, ebiten.KeyHome},
	{ebiten.KeyEnd, ui.KeyEnd, ebiten.KeyEnd},
	{ebiten.KeyEnter, ui.KeyEnter, ebiten.KeyNumpadEnter},
	{ebiten.KeySpace, ui.KeySpace, ebiten.KeySpace},
	{ebiten.KeyEscape, ui.KeyEscape, ebiten.KeyEscape},
	{ebiten.KeyBackspace, ui.KeyBackspace, ebiten.KeyBackspace},
	{ebiten.KeyDelete, ui.KeyDelete, ebiten.KeyDelete},
	{ebiten.KeyTab, ui.KeyTab, ebiten.KeyTab},
}

var commandTable = map[string]ui.Key{"z": ui.KeyUndo, "y": ui.KeyRedo, "o": ui.KeyOpen, "s": ui.KeySave}

// mousePointer numbers the mouse apart from every touch.
const mousePointer = -1

// Reader turns the window's input into events: once a tick, what changed since the last. The zero value is ready.
type Reader struct {
	mouse   bool
	x, y    float64
	touches map[ebiten.TouchID]ui.Event
	ids     []ebiten.TouchID
	runes   []rune
	held    map[ebiten.Key]time.Duration // when it repeats next
}

// Read appends to in what happened, at a scale of device pixels a logical pixel. It reports whether a key is held
// that will repeat, so that the caller keeps frames coming.
func (r *Reader) Read(in *app.Input, scale float64, now time.Duration) (repeating bool) {
	if r.touches == nil {
		r.touches, r.held = map[ebiten.TouchID]ui.Event{}, map[ebiten.Key]time.Duration{}
	}
	if !ebiten.IsFocused() {
		r.cancel(in, now)
	}
	r.readMouse(in, scale, now)
	r.readTouches(in, scale, now)
	repeating = r.readKeys(in, now)
	r.readDrop(in)
	return repeating
}

// cancel ends what is pressed: the window lost the focus and will not hear of its end.
func (r *Reader) cancel(in *app.Input, now time.Duration) {
	if r.mouse {
		r.mouse = false
		in.Events = append(in.Events, ui.Event{Kind: ui.PointerCancel, Pointer: mousePointer, X: r.x, Y: r.y, Time: now})
	}
	clear(r.held)
}

func (r *Reader) readMouse(in *app.Input, scale float64, now time.Duration) {
	px, py := ebiten.CursorPosition()
	x, y := float64(px)/scale, float64(py)/scale
	down := ebiten.IsMouseButtonPressed(ebiten.MouseButtonLeft)
	e := ui.Event{Pointer: mousePointer, X: x, Y: y, Time: now}
	switch {
	case down && !r.mouse:
		e.Kind = ui.PointerDown
		in.Events = append(in.Events, e)
	case down && (x != r.x || y != r.y):
		e.Kind = ui.PointerMove
		in.Events = append(in.Events, e)
	case !down && r.mouse:
		e.Kind = ui.PointerUp
		in.Events = append(in.Events, e)
	}
	r.mouse, r.x, r.y = down, x, y
	if dx, dy := ebiten.Wheel(); dx != 0 || dy != 0 {
		if !ebiten.IsKeyPressed(ebiten.KeyControl) {
			e.Kind, e.DX, e.DY = ui.Wheel, -dx*wheelStep, -dy*wheelStep
			in.Events = append(in.Events, e)
		}
	}
}

func (r *Reader) readTouches(in *app.Input, scale float64, now time.Duration) {
	r.ids = ebiten.AppendTouchIDs(r.ids[:0])
	for _, id := range r.ids {
		px, py := ebiten.TouchPosition(id)
		e := ui.Event{Kind: ui.PointerMove, Pointer: int(id), Touch: true, X: float64(px) / scale, Y: float64(py) / scale, Time: now}
		was, known := r.touches[id]
		if !known {
			e.Kind = ui.PointerDown
		}
		if !known || was.X != e.X || was.Y != e.Y {
			in.Events = append(in.Events, e)
		}
		r.touches[id] = e
	}
	for id, e := range r.touches {
		gone := true
		for _, still := range r.ids {
			gone = gone && still != id
		}
		if gone {
			delete(r.touches, id)
			e.Kind, e.Time = ui.PointerUp, now
			in.Events = append(in.Events, e)
		}
	}
}

func (r *Reader) readKeys(in *app.Input, now time.Duration) (repeating bool) {
	shift := ebiten.IsKeyPressed(ebiten.KeyShift)
	command := ebiten.IsKeyPressed(ebiten.KeyControl) || ebiten.IsKeyPressed(ebiten.KeyMeta)
	e := ui.Event{Kind: ui.KeyDown, Shift: shift, Time: now}
	for _, k := range keyTable {
		if !r.struck(k.key, ebiten.IsKeyPressed(k.key) || ebiten.IsKeyPressed(k.also), now) {
			continue
		}
		e.Key, e.Rune = k.is, 0
		if k.is == ui.KeySpace {
			e.Rune = ' '
		}
		in.Events = append(in.Events, e)
	}
	repeating = len(r.held) > 0
	r.runes = ebiten.AppendInputChars(r.runes[:0])
	if command {
		for k := ebiten.KeyA; k <= ebiten.KeyZ; k++ {
			if !r.struck(k, ebiten.IsKeyPressed(k), now) {
				continue
			}
			key, known := commandTable[strings.ToLower(ebiten.KeyName(k))]
			if !known {
				continue
			}
			if key == ui.KeyUndo && shift {
				key = ui.KeyRedo
			}
			e.Key, e.Rune = key, 0
			in.Events = append(in.Events, e)
		}
		return repeating
	}
	for k := ebiten.KeyA; k <= ebiten.KeyZ; k++ {
		delete(r.held, k)
	}
	for _, c := range r.runes {
		if c != ' ' {
			e.Key, e.Rune = ui.KeyNone, c
			in.Events = append(in.Events, e)
		}
	}
	return repeating
}

// struck reports whether a key went down, or is held and repeats now.
func (r *Reader) struck(k ebiten.Key, down bool, now time.Duration) bool {
	next, held := r.held[k]
	switch {
	case !down:
		delete(r.held, k)
		return false
	case !held:
		r.held[k] = now + repeatFirst
		return true
	case now >= next:
		r.held[k] = now + repeatNext
		return true
	}
	return false
}

func (r *Reader) readDrop(in *app.Input) {
	files := ebiten.DroppedFiles()
	if files == nil {
		return
	}
	entries, err := fs.ReadDir(files, ".")
	if err != nil || len(entries) == 0 {
		return
	}
	in.Opened = append(in.Opened, readDropped(files, entries[0].Name()))
}

// readDropped reads one file whole, or says why not.
func readDropped(files fs.FS, name string) app.Opened {
	opened := app.Opened{Name: name}
	f, err := files.Open(name)
	if err != nil {
		opened.Err = err.Error()
		return opened
	}
	defer f.Close()
	data, err := io.ReadAll(io.LimitReader(f, largestFile+1))
	switch {
	case err != nil:
		opened.Err = err.Error()
	case len(data) > largestFile:
		opened.Err = "larger than 4 MB: not a case file"
	default:
		opened.Data = data
	}
	return opened
}
