//go:build linux || freebsd || netbsd || openbsd

package display

import (
	"net"
	"path/filepath"
	"testing"
)

func TestSocketOf(t *testing.T) {
	for name, want := range map[string]string{
		":0": "/tmp/.X11-unix/X0", ":99.0": "/tmp/.X11-unix/X99", "unix:3": "/tmp/.X11-unix/X3", "unix:3.1": "/tmp/.X11-unix/X3",
		"host:0": "", "localhost:10.0": "", ":": "", "": "", ":x": "", ":1x": "", "unix:": "", "wayland-0": "",
	} {
		if got := socketOf(name); got != want {
			t.Errorf("%q: %q, not %q", name, got, want)
		}
	}
}

func TestReachable(t *testing.T) {
	path := filepath.Join(t.TempDir(), "X1")
	if reachable(path) {
		t.Error("a socket that is not there answers")
	}
	l, err := net.Listen("unix", path)
	if err != nil {
		t.Fatal(err)
	}
	if !reachable(path) {
		t.Error("a socket that is there does not answer")
	}
	l.Close()
	if reachable(path) {
		t.Error("a socket that was closed answers")
	}
}

func TestMissing(t *testing.T) {
	for _, c := range []struct {
		env       map[string]string
		reachable bool
		missing   bool
	}{
		{map[string]string{}, true, true},
		{map[string]string{"DISPLAY": ":1"}, true, false},
		{map[string]string{"DISPLAY": ":1"}, false, true},
		{map[string]string{"DISPLAY": "far:1"}, false, false}, // on another machine: the window finds out
		{map[string]string{"WAYLAND_DISPLAY": "wayland-0"}, true, true},
	} {
		getenv := func(name string) (string, bool) { v, ok := c.env[name]; return v, ok }
		if why := missing(getenv, func(string) bool { return c.reachable }); (why != "") != c.missing {
			t.Errorf("%v: %q", c.env, why)
		}
	}
}
