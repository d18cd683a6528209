package perf_test

import (
	"go/parser"
	"go/token"
	"io/fs"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"
)

// The walls between packages, one line each: a folder, and the imports from outside the standard library that the
// non-test files in it may have. "levelspan/x" allows that package only, "levelspan/x/..." those below it too. A folder
// takes the line of its longest matching prefix.
var walls = []struct {
	folder  string
	allowed []string
}{
	{"perf/num", nil},
	{"perf", []string{"levelspan/perf/num"}},
	{"perf/estimate", []string{"levelspan/perf", "levelspan/perf/num"}},
	{"perf/trip", []string{"levelspan/perf", "levelspan/perf/num"}},
	{"perf/casefile", []string{"levelspan/perf/..."}},
	{"assets", []string{"golang.org/x/image/...", "levelspan/assets/..."}},
	{"game/scene", []string{"golang.org/x/image/...", "levelspan/assets/...", "levelspan/game/scene/..."}},
	{"game/ui", []string{"levelspan/game/scene", "levelspan/game/ui/..."}},
	{"game/keep", nil},
	{"game/app", []string{"levelspan/perf/...", "levelspan/game/scene", "levelspan/game/ui/...", "levelspan/game/keep", "levelspan/assets/...", "rsc.io/qr/..."}},
	{"game", []string{"github.com/hajimehoshi/ebiten/v2", "levelspan/game/..."}},
	{"wasm", []string{"levelspan/game/...", "levelspan/assets/...", "levelspan/perf/...", "github.com/hajimehoshi/ebiten/v2"}},
	{"cmd/levelspan", []string{"levelspan/perf/...", "levelspan/assets/..."}},
	{"cmd/levelspan-window", []string{"levelspan/game/...", "levelspan/perf/...", "levelspan/assets/...", "github.com/hajimehoshi/ebiten/v2"}},
	{"cmd/pagebuild", []string{"levelspan/perf/...", "levelspan/assets/...", "levelspan/game/scene/...", "levelspan/cmd/pagebuild/..."}},
}

// Standard-library packages that the computation may not import: it has no files, clock, goroutines or screen.
var deniedToPerf = []string{"os", "io", "time", "sync", "net", "syscall", "syscall/js", "log", "runtime", "unsafe"}

func TestWalls(t *testing.T) {
	files := 0
	err := filepath.WalkDir("..", func(path string, d fs.DirEntry, err error) error {
		if err != nil {
			return err
		}
		name := d.Name()
		if d.IsDir() && path != ".." && (strings.HasPrefix(name, ".") || name == "testdata" || name == "dist" || name == "node_modules") {
			return filepath.SkipDir
		}
		if d.IsDir() || !strings.HasSuffix(name, ".go") || strings.HasSuffix(name, "_test.go") {
			return nil
		}
		files++
		folder := filepath.ToSlash(filepath.Dir(strings.TrimPrefix(filepath.ToSlash(path), "../")))
		wall, found := -1, ""
		for i, w := range walls {
			if (folder == w.folder || strings.HasPrefix(folder, w.folder+"/")) && len(w.folder) > len(found) {
				wall, found = i, w.folder
			}
		}
		if wall < 0 {
			t.Errorf("%s: no wall is written for its folder", path)
			return nil
		}
		parsed, err := parser.ParseFile(token.NewFileSet(), path, nil, parser.ImportsOnly)
		if err != nil {
			return err
		}
		for _, spec := range parsed.Imports {
			imported, _ := strconv.Unquote(spec.Path.Value)
			if first, _, _ := strings.Cut(imported, "/"); !strings.Contains(first, ".") && first != "levelspan" {
				if (folder == "perf" || folder == "perf/num") && slices.Contains(deniedToPerf, imported) {
					t.Errorf("%s imports %s: the computation has no outside", path, imported)
				}
				if imported == "syscall/js" && folder != "wasm" {
					t.Errorf("%s imports syscall/js: only wasm may", path)
				}
				continue
			}
			if !slices.ContainsFunc(walls[wall].allowed, func(a string) bool {
				base, below := strings.CutSuffix(a, "/...")
				return imported == base || below && strings.HasPrefix(imported, base+"/")
			}) {
				t.Errorf("%s imports %s: the wall around %s does not let it", path, imported, found)
			}
		}
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	if files < 15 {
		t.Errorf("only %d files were read", files)
	}
}
