package main

import (
	"bytes"
	"context"
	"encoding/json"
	"errors"
	"fmt"
	"go/ast"
	"go/format"
	"go/parser"
	"go/token"
	"io"
	"os"
	"os/exec"
	"path/filepath"
	"strconv"
	"strings"
	"text/template"
)

// The drawing library makes its own twelve shaders at run time with text/template. That looks methods up by name, so
// the linker must keep every exported method of every type in the program: a quarter of its size, on a tablet's memory
// and on the time to its first chart. Here they are made at build time by the same package from the same text, and the
// program is linked with the library's one file that held the template replaced by one that holds them.
const (
	drawing    = "github.com/hajimehoshi/ebiten/v2"
	shaderFile = "internal/builtinshader/shader.go"
)

// shaderOptions are the data of the library's template, by the names that it uses.
type shaderOptions struct {
	Filter, FilterNearest, FilterLinear                       int
	Address, AddressUnsafe, AddressClampToZero, AddressRepeat int
	UseColorM                                                 bool
}

// withoutTemplate rewrites the library's file: ShaderSource then reads a table. It fails if the file is not the one
// that this was written for.
func withoutTemplate(source []byte) ([]byte, error) {
	files := token.NewFileSet()
	file, err := parser.ParseFile(files, "shader.go", source, parser.ParseComments)
	if err != nil {
		return nil, err
	}
	unknown := func(what string) error { return fmt.Errorf("%s of %s is not as it was: %s", shaderFile, drawing, what) }

	// What goes: the imports, the template, the cache of what it made, and the function that reads it.
	var text string
	var keep []ast.Decl
	gone := 0
	var cut []ast.Node
	for _, d := range file.Decls {
		drop := false
		switch d := d.(type) {
		case *ast.FuncDecl:
			drop = d.Name.Name == "ShaderSource"
		case *ast.GenDecl:
			drop = d.Tok == token.IMPORT
			for _, s := range d.Specs {
				v, ok := s.(*ast.ValueSpec)
				if !ok || d.Tok != token.VAR {
					continue
				}
				switch v.Names[0].Name {
				case "tmpl":
					drop = true
					ast.Inspect(v, func(n ast.Node) bool {
						if l, ok := n.(*ast.BasicLit); ok && l.Kind == token.STRING && len(l.Value) > len(text) {
							text = l.Value
						}
						return true
					})
				case "shaders", "shadersM":
					drop = true
				}
			}
		}
		if drop {
			gone++
			cut = append(cut, d)
		} else {
			keep = append(keep, d)
		}
	}
	if gone != 4 {
		return nil, unknown(fmt.Sprintf("%d declarations to replace, not 4", gone))
	}
	if text, err = strconv.Unquote(text); err != nil {
		return nil, unknown("no template")
	}
	made, err := template.New("shader").Parse(text)
	if err != nil {
		return nil, unknown(err.Error())
	}
	table := "\nvar made = [FilterCount][AddressCount][2][]byte{\n"
	for filter := range 2 {
		table += "{\n"
		for address := range 3 {
			table += "{\n"
			for _, matrix := range []bool{false, true} {
				var shader bytes.Buffer
				if err := made.Execute(&shader, shaderOptions{Filter: filter, FilterLinear: 1, Address: address,
					AddressClampToZero: 1, AddressRepeat: 2, UseColorM: matrix}); err != nil {
					return nil, unknown(err.Error())
				}
				table += "[]byte(" + strconv.Quote(shader.String()) + "),\n"
			}
			table += "},\n"
		}
		table += "},\n"
	}
	table += "}\n\n// ShaderSource gives the shader for the options.\nfunc ShaderSource(filter Filter, address Address, useColorM bool) []byte {\n" +
		"if useColorM {\nreturn made[filter][address][1]\n}\nreturn made[filter][address][0]\n}\n"

	file.Decls, file.Imports = keep, nil
	comments := file.Comments[:0]
	for _, c := range file.Comments {
		inside := false
		for _, n := range cut {
			first := n.Pos()
			if f, ok := n.(*ast.FuncDecl); ok && f.Doc != nil {
				first = f.Doc.Pos()
			}
			inside = inside || c.Pos() >= first && c.End() <= n.End()
		}
		if !inside {
			comments = append(comments, c)
		}
	}
	file.Comments = comments
	var out bytes.Buffer
	if err := format.Node(&out, files, file); err != nil {
		return nil, err
	}
	out.WriteString(table)
	return format.Source(out.Bytes())
}

// slimModule writes into dir what the program needs of the library, rewritten, and a go.mod that uses it; it gives the
// name of that file.
func slimModule(ctx context.Context, dir, program string) (string, error) {
	list := exec.CommandContext(ctx, "go", "list", "-deps", "-json=ImportPath,Dir,Standard,Module,GoFiles,SFiles,HFiles,EmbedFiles", program)
	list.Env = browserEnv()
	var said bytes.Buffer
	list.Stderr = &said
	listed, err := list.Output()
	if err != nil {
		return "", fmt.Errorf("listing the program's packages: %w\n%s", err, said.String())
	}
	type pack struct {
		ImportPath, Dir                     string
		Module                              *struct{ Path, Dir, GoMod string }
		GoFiles, SFiles, HFiles, EmbedFiles []string
	}
	library, home := filepath.Join(dir, "drawing"), ""
	for read := json.NewDecoder(bytes.NewReader(listed)); ; {
		var p pack
		if err := read.Decode(&p); errors.Is(err, io.EOF) {
			break
		} else if err != nil {
			return "", err
		}
		if p.Module == nil || p.Module.Path != drawing {
			continue
		}
		home = p.Module.Dir
		under := strings.TrimPrefix(p.Dir, p.Module.Dir)
		for _, names := range [][]string{p.GoFiles, p.SFiles, p.HFiles, p.EmbedFiles} {
			for _, name := range names {
				if err := copyFile(filepath.Join(library, under, name), filepath.Join(p.Dir, name), nil); err != nil {
					return "", err
				}
			}
		}
	}
	if home == "" {
		return "", fmt.Errorf("%s does not use %s", program, drawing)
	}
	if err := copyFile(filepath.Join(library, "go.mod"), filepath.Join(home, "go.mod"), nil); err != nil {
		return "", err
	}
	for name, change := range map[string]func([]byte) ([]byte, error){
		shaderFile: withoutTemplate, shadersFile: replaced(shadersFile, lateShaders), contextFile: replaced(contextFile, lateContext),
	} {
		if err := copyFile(filepath.Join(library, name), filepath.Join(home, name), change); err != nil {
			return "", err
		}
	}
	own, err := exec.CommandContext(ctx, "go", "env", "GOMOD").Output()
	if err != nil {
		return "", err
	}
	mod := strings.TrimSpace(string(own))
	name := filepath.Join(dir, "go.mod")
	if err := copyFile(name, mod, func(text []byte) ([]byte, error) {
		return append(text, "\nreplace "+drawing+" => "+strconv.Quote(library)+"\n"...), nil
	}); err != nil {
		return "", err
	}
	return name, copyFile(filepath.Join(dir, "go.sum"), strings.TrimSuffix(mod, ".mod")+".sum", nil)
}

// copyFile copies, making the directories and passing the content through change, if there is one.
func copyFile(to, from string, change func([]byte) ([]byte, error)) error {
	data, err := os.ReadFile(from)
	if err == nil && change != nil {
		data, err = change(data)
	}
	if err != nil {
		return err
	}
	if err := os.MkdirAll(filepath.Dir(to), 0o755); err != nil {
		return err
	}
	return os.WriteFile(to, data, 0o644)
}
