// Package desktop is the program's outside on a desktop: clipboard, files, and what comes back from them. It knows no
// window, so that it is tested without a display.
package desktop

import (
	"errors"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"runtime"
	"strings"
	"sync"
	"time"

	"levelspan/game/app"
)

// Host is an app.Host. What comes back waits here until Take. Make it with New.
type Host struct {
	version string
	clip    func(text string) error
	wake    func()

	mu       sync.Mutex
	path     string // the file that the case came from, "" none
	opened   []app.Opened
	notices  []string
	failures []string
}

// New makes a host for a case that came from the file path ("" for none). It calls wake, from any goroutine, when
// there is something to Take.
func New(path, version string, wake func()) *Host {
	return &Host{path: path, version: version, clip: clip, wake: wake}
}

// Arrived queues a file for the next frame.
func (h *Host) Arrived(o app.Opened) {
	h.mu.Lock()
	defer h.mu.Unlock()
	h.opened = append(h.opened, o)
}

// Take moves what waits into the input. A file dropped on the window becomes the one that a save does not touch: only
// its name is known, not its folder.
func (h *Host) Take(in *app.Input) {
	h.mu.Lock()
	defer h.mu.Unlock()
	if len(in.Opened) > 0 {
		h.path = ""
	}
	in.Opened = append(in.Opened, h.opened...)
	in.Notices = append(in.Notices, h.notices...)
	in.Failures = append(in.Failures, h.failures...)
	h.opened, h.notices, h.failures = nil, nil, nil
}

func (h *Host) say(notice string, err error) {
	h.mu.Lock()
	if err != nil {
		h.failures = append(h.failures, err.Error())
	} else {
		h.notices = append(h.notices, notice)
	}
	h.mu.Unlock()
	h.wake()
}

// Copy puts text on the clipboard by the desktop's own command, or into a file where there is none.
func (h *Host) Copy(what, text string) {
	go func() {
		err := h.clip(text)
		if err == nil {
			h.say(what+" copied", nil)
			return
		}
		name := "levelspan-copied.txt"
		if werr := os.WriteFile(name, []byte(text+"\n"), 0o644); werr != nil {
			h.say("", fmt.Errorf("%s not copied: %w; %w", what, err, werr))
			return
		}
		h.say(fmt.Sprintf("%s written to %s: %v", what, absolute(name), err), nil)
	}()
}

// OpenFile tells how a file is opened: there is no dialog without a toolkit.
func (h *Host) OpenFile() {
	h.say("Drop a case file on this window, or start levelspan-window CASE.json", nil)
}

// SaveFile writes to the file that the case was opened from, or to name in the current folder, under a new name if
// there is one of that name already. The old content stays whole until the new is.
func (h *Host) SaveFile(name, mime string, data []byte) {
	data = append([]byte(nil), data...)
	h.mu.Lock()
	path := h.path
	h.mu.Unlock()
	go func() {
		isCase := mime == "application/json"
		if !isCase || path == "" {
			path = free(filepath.Base(name))
		}
		if err := replace(path, data); err != nil {
			h.say("", fmt.Errorf("not saved: %w", err))
			return
		}
		if isCase {
			h.mu.Lock()
			h.path = path
			h.mu.Unlock()
		}
		h.say("Saved to "+absolute(path), nil)
	}()
}

// LinkBase is empty: a window has no address, so a link is its fragment alone.
func (h *Host) LinkBase() string { return "" }

// Version is the program's version.
func (h *Host) Version() string { return h.version }

// free is name, or name with the first number that is not taken.
func free(name string) string {
	if name == "" || name == "." || name == string(filepath.Separator) {
		name = "case.json"
	}
	ext := filepath.Ext(name)
	stem, try := strings.TrimSuffix(name, ext), name
	for i := 2; i < 1000; i++ {
		if _, err := os.Lstat(try); errors.Is(err, os.ErrNotExist) {
			break
		}
		try = fmt.Sprintf("%s-%d%s", stem, i, ext)
	}
	return try
}

// replace writes a file whole or not at all.
func replace(path string, data []byte) error {
	f, err := os.CreateTemp(filepath.Dir(path), ".levelspan-*")
	if err != nil {
		return err
	}
	defer os.Remove(f.Name())
	mode := os.FileMode(0o644)
	if info, err := os.Stat(path); err == nil {
		mode = info.Mode().Perm()
	}
	_, err = f.Write(data)
	err = errors.Join(err, f.Chmod(mode), f.Sync(), f.Close())
	if err != nil {
		return err
	}
	return os.Rename(f.Name(), path)
}

func absolute(path string) string {
	if full, err := filepath.Abs(path); err == nil {
		return full
	}
	return path
}

// clipboards are the commands that take the clipboard's text on standard input.
func clipboards() [][]string {
	switch runtime.GOOS {
	case "windows":
		return [][]string{{"clip.exe"}}
	case "darwin":
		return [][]string{{"pbcopy"}}
	}
	x11 := [][]string{{"xclip", "-selection", "clipboard"}, {"xsel", "--clipboard", "--input"}}
	if os.Getenv("WAYLAND_DISPLAY") != "" {
		return append([][]string{{"wl-copy"}}, x11...)
	}
	return x11
}

// clip hands text to the first of the clipboard commands that is there.
func clip(text string) error {
	var names []string
	for _, c := range clipboards() {
		names = append(names, c[0])
		path, err := exec.LookPath(c[0])
		if err != nil {
			continue
		}
		cmd := exec.Command(path, c[1:]...)
		cmd.Stdin = strings.NewReader(text)
		cmd.WaitDelay = 2 * time.Second
		return cmd.Run()
	}
	return fmt.Errorf("no clipboard command (%s)", strings.Join(names, ", "))
}
