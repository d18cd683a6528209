package main

import (
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
)

// The shaders made beforehand are, byte for byte, those that the library's own code makes.
func TestShadersAreTheLibrarysOwn(t *testing.T) {
	found, err := exec.Command("go", "list", "-m", "-f", "{{.Dir}}", drawing).Output()
	if err != nil {
		t.Fatal(err)
	}
	original, err := os.ReadFile(filepath.Join(strings.TrimSpace(string(found)), shaderFile))
	if err != nil {
		t.Fatal(err)
	}
	slim, err := withoutTemplate(original)
	if err != nil {
		t.Fatal(err)
	}
	if strings.Contains(string(slim), "text/template") {
		t.Error("the template is still there")
	}
	dir := t.TempDir()
	for name, text := range map[string]string{
		"go.mod": "module compare\n\ngo 1.26\n", "before/shader.go": string(original), "after/shader.go": string(slim),
		"main.go": `package main

import (
	"compare/after"
	"compare/before"
	"os"
)

func main() {
	if after.FilterCount != before.FilterCount || after.AddressCount != before.AddressCount ||
		string(after.ScreenShaderSource) != string(before.ScreenShaderSource) || string(after.ClearShaderSource) != string(before.ClearShaderSource) {
		os.Exit(3)
	}
	for f := range before.FilterCount {
		for a := range before.AddressCount {
			for _, m := range []bool{false, true} {
				x, y := before.ShaderSource(before.Filter(f), before.Address(a), m), after.ShaderSource(after.Filter(f), after.Address(a), m)
				if len(x) < 100 || string(x) != string(y) {
					println(f, a, m, string(x), string(y))
					os.Exit(4)
				}
			}
		}
	}
}
`} {
		for _, p := range []string{"before", "after"} {
			if strings.HasPrefix(name, p) {
				text = strings.Replace(text, "package builtinshader", "package "+p, 1)
			}
		}
		if err := copyFile(filepath.Join(dir, name), os.DevNull, func([]byte) ([]byte, error) { return []byte(text), nil }); err != nil {
			t.Fatal(err)
		}
	}
	run := exec.Command("go", "run", ".")
	run.Dir = dir
	if said, err := run.CombinedOutput(); err != nil {
		t.Errorf("the shaders differ: %v\n%s", err, said)
	}
}

// A library that is not the one known is refused, not half rewritten.
func TestAnotherLibraryIsRefused(t *testing.T) {
	for _, text := range []string{
		"", "package builtinshader", "package builtinshader\nfunc ShaderSource() {}",
		"package p\nimport \"fmt\"\nvar shaders, shadersM int\nfunc ShaderSource() {}\nvar tmpl = 1",
		"package p\nimport \"fmt\"\nvar shaders, shadersM int\nfunc ShaderSource() {}\nvar tmpl = `{{.Nothing}}`",
		"package p\nimport \"fmt\"\nvar shaders, shadersM int\nfunc ShaderSource() {}\nvar tmpl = `{{if}}`",
	} {
		if out, err := withoutTemplate([]byte(text)); err == nil {
			t.Errorf("%q was rewritten to %q", text, out)
		}
	}
}
