package main

import (
	"go/parser"
	"go/token"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
)

// The library's files take the changes, and a file that is not as it was is refused.
func TestLateShaders(t *testing.T) {
	found, err := exec.Command("go", "list", "-m", "-f", "{{.Dir}}", drawing).Output()
	if err != nil {
		t.Fatal(err)
	}
	for name, changes := range map[string][][2]string{shadersFile: lateShaders, contextFile: lateContext} {
		original, err := os.ReadFile(filepath.Join(strings.TrimSpace(string(found)), name))
		if err != nil {
			t.Fatal(err)
		}
		text, err := replaced(name, changes)(original)
		if err != nil {
			t.Fatal(err)
		}
		if _, err := parser.ParseFile(token.NewFileSet(), name, text, 0); err != nil {
			t.Error(err)
		}
		for _, c := range changes {
			if strings.Count(string(text), c[1]) != 1 {
				t.Errorf("%s lacks %q", name, c[1])
			}
			for _, other := range []string{"", c[0] + c[0]} {
				if _, err := replaced(name, changes)([]byte(strings.Replace(string(original), c[0], other, 1))); err == nil {
					t.Errorf("%s with %q for %q was accepted", name, other, c[0])
				}
			}
		}
	}
}
