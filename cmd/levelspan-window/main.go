// Command levelspan-window is the program in a window of its own. It opens the case file named as its argument, or
// one dropped on the window, and saves to the file that it opened. Without a display it says so in one line and ends
// with 2: see game/display/need.
package main

import (
	"fmt"
	"io"
	"os"
	"time"

	"levelspan/game"
	"levelspan/game/app"
	"levelspan/game/desktop"
	_ "levelspan/game/display/need" // ends the program before the window can panic
	"levelspan/game/keep"
	"levelspan/game/scene"
)

// version is set by the build: -ldflags "-X main.version=...".
var version = "dev"

const usage = "usage: levelspan-window [CASE.json]\n"

func main() { os.Exit(doMain(os.Args[1:], os.Stdout, os.Stderr)) }

// doMain opens the window and waits until it is closed; it gives the exit code: 0 closed, 1 failed, 2 bad usage or
// a file that cannot be read.
func doMain(args []string, out, errs io.Writer) int {
	path, code, done := parse(args, out, errs)
	if done {
		return code
	}
	h := desktop.New(path, version, game.Wake)
	if path != "" {
		data, err := os.ReadFile(path)
		if err != nil {
			fmt.Fprintln(errs, "levelspan-window:", err)
			return 2
		}
		h.Arrived(app.Opened{Name: path, Data: data})
	}
	w := &window{host: h, app: app.NewWith(app.Options{Host: h, Store: store(errs)}), start: time.Now()}
	surface := game.NewSurface(w.frame, func(why string) { fmt.Fprintln(errs, "levelspan-window: stopped:", why) })
	if err := surface.Run("levelspan"); err != nil {
		fmt.Fprintf(errs, "levelspan-window: the window did not open: %v; the command without a window is: levelspan limits CASE.json\n", err)
		return 1
	}
	return 0
}

// store is where cases are kept, nil (in memory) where the person has no folder for it.
func store(errs io.Writer) keep.Store {
	folder, err := keep.Folder()
	if err != nil {
		fmt.Fprintln(errs, "levelspan-window: cases are not kept:", err)
		return nil
	}
	return keep.NewFiles(folder)
}

// parse reads the command line; done means that there is nothing left to do but end with code.
func parse(args []string, out, errs io.Writer) (path string, code int, done bool) {
	switch {
	case len(args) == 0:
		return "", 0, false
	case args[0] == "-h" || args[0] == "-help" || args[0] == "--help":
		fmt.Fprint(out, usage)
		return "", 0, true
	case args[0] == "-version" || args[0] == "--version":
		fmt.Fprintln(out, "levelspan-window", version)
		return "", 0, true
	case len(args) > 1 || args[0] != "-" && len(args[0]) > 0 && args[0][0] == '-':
		fmt.Fprint(errs, usage)
		return "", 2, true
	}
	return args[0], 0, false
}

// window is what lies between the surface and the program.
type window struct {
	host   *desktop.Host
	app    *app.App
	reader game.Reader
	input  app.Input
	start  time.Time
	timer  *time.Timer
}

// keyPace is how often a held key is looked at.
const keyPace = 25 * time.Millisecond

// frame is the game.Frame of this window.
func (w *window) frame(width, height, scale float64) *scene.Scene {
	in := &w.input
	in.Width, in.Height, in.Scale, in.Now = width, height, scale, time.Since(w.start)
	in.Events, in.Opened, in.Notices, in.Failures = in.Events[:0], in.Opened[:0], in.Notices[:0], in.Failures[:0]
	held := w.reader.Read(in, scale, in.Now)
	w.host.Take(in)
	changed := w.app.Step(*in)
	pause := w.app.Wake()
	if held && (pause < 0 || pause > keyPace) {
		pause = keyPace
	}
	w.sleep(pause)
	if !changed {
		return nil
	}
	return w.app.Scene()
}

// sleep sees to it that the next frame comes no later than after d, if d is not negative.
func (w *window) sleep(d time.Duration) {
	if w.timer != nil {
		w.timer.Stop()
	}
	if d >= 0 {
		w.timer = time.AfterFunc(d, game.Wake)
	}
}
