package desktop

import (
	"errors"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"levelspan/game/app"
)

// quiet is a host whose clipboard is clip and that wakes nobody.
func quiet(path string, clip func(string) error) (*Host, chan struct{}) {
	said := make(chan struct{}, 8)
	h := New(path, "test", func() { said <- struct{}{} })
	h.clip = clip
	return h, said
}

// result waits for what the host has to say.
func result(t *testing.T, h *Host, said chan struct{}) (in app.Input) {
	t.Helper()
	select {
	case <-said:
	case <-time.After(20 * time.Second):
		t.Fatal("the host says nothing")
	}
	h.Take(&in)
	return in
}

func TestSaveGoesBackToItsFile(t *testing.T) {
	t.Chdir(t.TempDir())
	path := filepath.Join(t.TempDir(), "mine.json")
	if err := os.WriteFile(path, []byte("old"), 0o640); err != nil {
		t.Fatal(err)
	}
	h, said := quiet(path, nil)
	h.SaveFile("suggested.json", "application/json", []byte("new"))
	in := result(t, h, said)
	if len(in.Notices) != 1 || !strings.Contains(in.Notices[0], path) || len(in.Failures) != 0 {
		t.Errorf("said %q, failures %q", in.Notices, in.Failures)
	}
	if data, _ := os.ReadFile(path); string(data) != "new" {
		t.Errorf("the file holds %q", data)
	}
	if info, err := os.Stat(path); err != nil || info.Mode().Perm() != 0o640 {
		t.Error("the file's permissions changed")
	}
	if left, _ := filepath.Glob(filepath.Join(filepath.Dir(path), ".levelspan-*")); len(left) != 0 {
		t.Errorf("left behind: %v", left)
	}
}

func TestSaveNeverOverwritesAnother(t *testing.T) {
	t.Chdir(t.TempDir())
	if err := os.WriteFile("marram.json", []byte("another"), 0o600); err != nil {
		t.Fatal(err)
	}
	h, said := quiet("", nil)
	h.SaveFile("marram.json", "application/json", []byte("one"))
	result(t, h, said)
	if data, _ := os.ReadFile("marram.json"); string(data) != "another" {
		t.Error("a file of the same name was overwritten")
	}
	if data, _ := os.ReadFile("marram-2.json"); string(data) != "one" {
		t.Errorf("marram-2.json holds %q", data)
	}
	// From then on it is the file of this case.
	h.SaveFile("marram.json", "application/json", []byte("two"))
	result(t, h, said)
	if data, _ := os.ReadFile("marram-2.json"); string(data) != "two" {
		t.Errorf("marram-2.json holds %q", data)
	}
	// A file dropped on the window is another case.
	in := app.Input{Opened: []app.Opened{{Name: "other.json"}}}
	h.Take(&in)
	h.SaveFile("other.json", "application/json", []byte("three"))
	result(t, h, said)
	if data, _ := os.ReadFile("marram-2.json"); string(data) != "two" {
		t.Error("another case was saved over this one")
	}
}

func TestSaveFails(t *testing.T) {
	h, said := quiet(filepath.Join(t.TempDir(), "gone", "mine.json"), nil)
	h.SaveFile("mine.json", "application/json", []byte("x"))
	if in := result(t, h, said); len(in.Failures) != 1 || !strings.Contains(in.Failures[0], "not saved") {
		t.Errorf("failures %q, notices %q", in.Failures, in.Notices)
	}
}

func TestCopy(t *testing.T) {
	t.Chdir(t.TempDir())
	var got string
	h, said := quiet("", func(text string) error { got = text; return nil })
	h.Copy("Link", "#case=x")
	if in := result(t, h, said); got != "#case=x" || len(in.Notices) != 1 || in.Notices[0] != "Link copied" {
		t.Errorf("copied %q, said %q", got, in.Notices)
	}
	h, said = quiet("", func(string) error { return errors.New("no clipboard command") })
	h.Copy("Link", "#case=y")
	in := result(t, h, said)
	if data, _ := os.ReadFile("levelspan-copied.txt"); strings.TrimSpace(string(data)) != "#case=y" || len(in.Notices) != 1 || !strings.Contains(in.Notices[0], "levelspan-copied.txt") {
		t.Errorf("said %q", in.Notices)
	}
}
