//go:build linux

package display_test

import (
	"bufio"
	"bytes"
	"encoding/json"
	"fmt"
	"image"
	"image/color"
	_ "image/png"
	"math"
	"os"
	"os/exec"
	"path/filepath"
	"strconv"
	"strings"
	"testing"
	"time"

	"levelspan/game/app"
	"levelspan/game/scene/raster"
	"levelspan/game/ui"
)

// The window's own tests are here and not beside it: a test binary that holds the window does not start without a
// display.

// binary builds the window's program.
func binary(t *testing.T) string {
	t.Helper()
	path := filepath.Join(t.TempDir(), "levelspan-window")
	if said, err := exec.Command("go", "build", "-o", path, "levelspan/cmd/levelspan-window").CombinedOutput(); err != nil {
		t.Fatalf("%v\n%s", err, said)
	}
	return path
}

// environment is this process's without a display, and with what is given.
func environment(with ...string) []string {
	var env []string
	for _, e := range os.Environ() {
		if name, _, _ := strings.Cut(e, "="); name != "DISPLAY" && name != "WAYLAND_DISPLAY" {
			env = append(env, e)
		}
	}
	return append(env, with...)
}

// Without a display: one line, which names the command, and exit 2.
func TestNoDisplay(t *testing.T) {
	path := binary(t)
	for _, env := range [][]string{nil, {"DISPLAY=:7777"}, {"DISPLAY=", "WAYLAND_DISPLAY=wayland-0"}} {
		for _, args := range [][]string{nil, {"case.json"}} {
			cmd := exec.Command(path, args...)
			cmd.Env = environment(env...)
			var out, errs bytes.Buffer
			cmd.Stdout, cmd.Stderr = &out, &errs
			cmd.Run()
			if code := cmd.ProcessState.ExitCode(); code != 2 || out.Len() != 0 {
				t.Errorf("%v %v: exit %d, output %q", env, args, code, out.String())
			}
			if s := errs.String(); strings.Count(s, "\n") != 1 || !strings.Contains(s, "levelspan limits CASE.json") || strings.Contains(s, "panic") {
				t.Errorf("%v %v: said %q", env, args, s)
			}
		}
	}
}

// xvfb starts a display for the test and gives its name.
func xvfb(t *testing.T) string {
	t.Helper()
	for _, tool := range []string{"Xvfb", "xdotool", "import"} {
		if _, err := exec.LookPath(tool); err != nil {
			if os.Getenv("LEVELSPAN_OUTSIDE") == "required" {
				t.Fatalf("%s is not here, and LEVELSPAN_OUTSIDE=required", tool)
			}
			t.Skipf("%s is not here (make test installs it)", tool)
		}
	}
	read, write, err := os.Pipe()
	if err != nil {
		t.Fatal(err)
	}
	// Without -noreset the display begins anew whenever its last client leaves, which xdotool does before the window comes.
	cmd := exec.Command("Xvfb", "-displayfd", "3", "-screen", "0", "1400x900x24", "-nolisten", "tcp", "-noreset")
	cmd.ExtraFiles = []*os.File{write}
	if err := cmd.Start(); err != nil {
		t.Fatal(err)
	}
	write.Close()
	t.Cleanup(func() { cmd.Process.Kill(); cmd.Wait() })
	number, err := bufio.NewReader(read).ReadString('\n')
	if err != nil {
		t.Fatal(err)
	}
	return ":" + strings.TrimSpace(number)
}

// desk is a display with the window on it.
type desk struct {
	t      *testing.T
	env    []string
	dir    string
	window string
	cmd    *exec.Cmd
	errs   *bytes.Buffer
}

// start opens the window in a folder of its own and waits for it.
func start(t *testing.T, display string, args ...string) *desk {
	t.Helper()
	d := &desk{t: t, env: environment("DISPLAY="+display, "LIBGL_ALWAYS_SOFTWARE=1"), dir: t.TempDir(), errs: new(bytes.Buffer)}
	d.cmd = exec.Command(binary(t), args...)
	d.cmd.Env, d.cmd.Dir, d.cmd.Stderr = append(d.env[:len(d.env):len(d.env)], "XDG_CONFIG_HOME="+d.dir), d.dir, d.errs
	if err := d.cmd.Start(); err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { d.cmd.Process.Kill(); d.cmd.Wait() })
	for end := time.Now().Add(60 * time.Second); d.window == ""; time.Sleep(100 * time.Millisecond) {
		if time.Now().After(end) {
			t.Fatalf("no window\n%s", d.errs.String())
		}
		out, _ := d.tool("xdotool", "search", "--onlyvisible", "--pid", strconv.Itoa(d.cmd.Process.Pid)).Output()
		d.window, _, _ = strings.Cut(strings.TrimSpace(string(out)), "\n")
	}
	return d
}

func (d *desk) tool(name string, args ...string) *exec.Cmd {
	cmd := exec.Command(name, args...)
	cmd.Env = d.env
	return cmd
}

func (d *desk) xdotool(args ...string) string {
	d.t.Helper()
	out, err := d.tool("xdotool", args...).CombinedOutput()
	if err != nil {
		d.t.Fatalf("xdotool %v: %v\n%s", args, err, out)
	}
	return string(out)
}

// picture is the window's part of the screen.
func (d *desk) picture() image.Image {
	d.t.Helper()
	data, err := d.tool("import", "-window", d.window, "png:-").Output()
	if err != nil {
		d.t.Fatal(err)
	}
	img, _, err := image.Decode(bytes.NewReader(data))
	if err != nil {
		d.t.Fatal(err)
	}
	return img
}

// settles waits until the window looks like want, and gives how much it differs when it does not.
func (d *desk) settles(want image.Image) (mean, far float64, ok bool) {
	d.t.Helper()
	for end := time.Now().Add(30 * time.Second); ; time.Sleep(200 * time.Millisecond) {
		mean, far = difference(d.picture(), want)
		if mean < 0.6 && far < 0.002 {
			return mean, far, true
		}
		if time.Now().After(end) {
			return mean, far, false
		}
	}
}

func difference(a, b image.Image) (mean, far float64) {
	size := a.Bounds().Size()
	if size != b.Bounds().Size() {
		return 255, 1
	}
	sum, n := 0.0, 0
	for y := range size.Y {
		for x := range size.X {
			p := color.RGBAModel.Convert(a.At(a.Bounds().Min.X+x, a.Bounds().Min.Y+y)).(color.RGBA)
			q := color.RGBAModel.Convert(b.At(x, y)).(color.RGBA)
			d := math.Max(math.Abs(float64(p.R)-float64(q.R)), math.Max(math.Abs(float64(p.G)-float64(q.G)), math.Abs(float64(p.B)-float64(q.B))))
			sum += d
			if d > 64 {
				n++
			}
		}
	}
	return sum / float64(size.X*size.Y), float64(n) / float64(size.X*size.Y)
}

// noHost is a program's outside that does nothing.
type noHost struct{}

func (noHost) Copy(string, string)             {}
func (noHost) OpenFile()                       {}
func (noHost) SaveFile(string, string, []byte) {}
func (noHost) LinkBase() string                { return "" }
func (noHost) Version() string                 { return "dev" }

func control(t *testing.T, a *app.App, id string) ui.Control {
	t.Helper()
	for _, c := range a.Controls() {
		if c.ID == id {
			return c
		}
	}
	t.Fatalf("no control %s", id)
	return ui.Control{}
}

// The window shows the program's scene, follows a drag, opens the file named and saves back to it.
func TestWindow(t *testing.T) {
	display := xvfb(t)
	demo, err := os.ReadFile(filepath.Join("..", "..", "assets", "case", "marram.json"))
	if err != nil {
		t.Fatal(err)
	}
	file := filepath.Join(t.TempDir(), "mine.json")
	if err := os.WriteFile(file, demo, 0o600); err != nil {
		t.Fatal(err)
	}
	d := start(t, display, file)

	// A second program without a window, given the same input, says what the window must look like.
	size := d.picture().Bounds().Size()
	twin := app.New(noHost{}, nil)
	in := app.Input{Width: float64(size.X), Height: float64(size.Y), Scale: 1, Opened: []app.Opened{{Name: file, Data: demo}}}
	twin.Step(in)
	in.Opened = nil
	in.Now = time.Hour // whatever was said for a moment is gone
	twin.Step(in)
	if mean, far, ok := d.settles(raster.Render(twin.Scene())); !ok {
		t.Errorf("the window at start: mean difference %.2f, %.2f %% far off\n%s", mean, 100*far, d.errs.String())
	}

	handle := control(t, twin, "handle/mass")
	x, y := int(handle.Bounds.X+handle.Bounds.W/2), int(handle.Bounds.Y+handle.Bounds.H/2)
	d.xdotool("mousemove", "--window", d.window, strconv.Itoa(x), strconv.Itoa(y), "sleep", "0.2", "mousedown", "1")
	for i := 1; i <= 10; i++ {
		d.xdotool("mousemove", "--window", d.window, strconv.Itoa(x-10*i), strconv.Itoa(y), "sleep", "0.05")
	}
	d.xdotool("sleep", "0.2", "mouseup", "1")
	in.Events = []ui.Event{{Kind: ui.PointerDown, X: float64(x), Y: float64(y), Time: time.Hour},
		{Kind: ui.PointerMove, X: float64(x - 50), Y: float64(y), Time: time.Hour}, {Kind: ui.PointerMove, X: float64(x - 100), Y: float64(y), Time: time.Hour},
		{Kind: ui.PointerUp, X: float64(x - 100), Y: float64(y), Time: time.Hour + time.Second}}
	twin.Step(in)
	want := control(t, twin, "handle/mass").Value
	if want >= handle.Value {
		t.Fatalf("the twin's weight went from %v to %v", handle.Value, want)
	}
	if mean, far, ok := d.settles(raster.Render(twin.Scene())); !ok {
		t.Errorf("the window after the drag: mean difference %.2f, %.2f %% far off\n%s", mean, 100*far, d.errs.String())
	}

	// The window looks at the keys once a frame, so they are held as a person holds them, and longer on a slow machine.
	var saved struct {
		Today struct {
			Mass float64 `json:"mass_kg"`
		}
	}
	for _, hold := range []string{"0.3", "1", "3"} {
		d.xdotool("keydown", "--window", d.window, "ctrl", "sleep", "0.2", "keydown", "--window", d.window, "s", "sleep", hold,
			"keyup", "--window", d.window, "s", "keyup", "--window", d.window, "ctrl")
		for end := time.Now().Add(10 * time.Second); saved.Today.Mass != want && time.Now().Before(end); time.Sleep(100 * time.Millisecond) {
			data, _ := os.ReadFile(file)
			json.Unmarshal(data, &saved)
		}
		if saved.Today.Mass == want {
			break
		}
	}
	if saved.Today.Mass != want {
		t.Errorf("the file saved has a weight of %v, the window %v\n%s", saved.Today.Mass, want, d.errs.String())
	}
	if out := fmt.Sprint(d.cmd.ProcessState); out != "<nil>" {
		t.Errorf("the window ended: %s\n%s", out, d.errs.String())
	}
}
