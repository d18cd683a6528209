package main

import (
	"bytes"
	"fmt"
)

// The drawing library compiles three shaders while the program starts, before it is known whether anything will be drawn
// with them. Where the software surface shows the scenes, that is a fifth of the time to the first chart for nothing: they
// are compiled when the library gets its graphics context instead. Others have the shaders' addresses by then, so the
// places are there from the start, empty.
const (
	shadersFile = "internal/restorable/shader.go"
	contextFile = "internal/restorable/images.go"
)

var lateShaders = [][2]string{
	{"func init() {", "func init() {\n\tNearestFilterShader, LinearFilterShader, clearShader = new(Shader), new(Shader), new(Shader)\n}\n\n" +
		"func fillShader(s *Shader, ir *shaderir.Program, name string) {\n\t*s = Shader{shader: graphicscommand.NewShader(ir, name), ir: ir, name: name}\n\ttheImages.addShader(s)\n}\n\n" +
		"func compileShaders() {"},
	{`NearestFilterShader = NewShader(nearestIR, "nearest")`, `fillShader(NearestFilterShader, nearestIR, "nearest")`},
	{`LinearFilterShader = NewShader(linearIR, "linear")`, `fillShader(LinearFilterShader, linearIR, "linear")`},
	{`clearShader = NewShader(clearIR, "clear")`, `fillShader(clearShader, clearIR, "clear")`},
}

var lateContext = [][2]string{
	{"\n\tgraphicsDriverInitialized = true\n", "\n\tcompileShaders()\n\tgraphicsDriverInitialized = true\n"},
}

// replaced gives the function that makes the replacements in a file of the library, each of which must be there once.
func replaced(name string, changes [][2]string) func([]byte) ([]byte, error) {
	return func(text []byte) ([]byte, error) {
		for _, c := range changes {
			if n := bytes.Count(text, []byte(c[0])); n != 1 {
				return nil, fmt.Errorf("%s of %s is not as it was: %q is there %d times", name, drawing, c[0], n)
			}
			text = bytes.Replace(text, []byte(c[0]), []byte(c[1]), 1)
		}
		return text, nil
	}
}
