package main

import (
	"bytes"
	"compress/gzip"
	"context"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
)

// compileProgram builds a package for the browser and gives its bytes. Slim leaves out what the drawing library makes the
// linker keep for nothing (see slim.go).
func compileProgram(ctx context.Context, program string, slim bool) ([]byte, error) {
	dir, err := os.MkdirTemp("", "pagebuild")
	if err != nil {
		return nil, err
	}
	defer os.RemoveAll(dir)
	file := filepath.Join(dir, "levelspan.wasm")
	args := []string{"build", "-trimpath", "-buildvcs=false", "-ldflags=-s -w", "-o", file}
	if slim {
		mod, err := slimModule(ctx, dir, program)
		if err != nil {
			return nil, err
		}
		args = append(args, "-modfile="+mod)
	}
	cmd := exec.CommandContext(ctx, "go", append(args, program)...)
	cmd.Env = browserEnv()
	if said, err := cmd.CombinedOutput(); err != nil {
		return nil, fmt.Errorf("compiling the program: %w\n%s", err, said)
	}
	return os.ReadFile(file)
}

// browserEnv is the environment in which the go command builds for the browser.
func browserEnv() []string {
	return append(os.Environ(), "GOOS=js", "GOARCH=wasm", "CGO_ENABLED=0")
}

// wasmExec is the toolchain's own loader. It must come from the toolchain that compiled the program.
func wasmExec(ctx context.Context) (string, error) {
	root, err := exec.CommandContext(ctx, "go", "env", "GOROOT").Output()
	if err != nil {
		return "", fmt.Errorf("finding the toolchain: %w", err)
	}
	text, err := os.ReadFile(filepath.Join(strings.TrimSpace(string(root)), "lib", "wasm", "wasm_exec.js"))
	return string(text), err
}

// describe is the version by the repository's tags and commits, "dev" outside one.
func describe(ctx context.Context) string {
	said, err := exec.CommandContext(ctx, "git", "describe", "--tags", "--always", "--dirty").Output()
	if err != nil || len(bytes.TrimSpace(said)) == 0 {
		return "dev"
	}
	return string(bytes.TrimSpace(said))
}

// pack compresses as far as gzip goes, without a time or a name, so that the same bytes give the same bytes.
func pack(data []byte) ([]byte, error) {
	var buf bytes.Buffer
	w, err := gzip.NewWriterLevel(&buf, gzip.BestCompression)
	if err != nil {
		return nil, err
	}
	if _, err := w.Write(data); err != nil {
		return nil, err
	}
	if err := w.Close(); err != nil {
		return nil, err
	}
	return buf.Bytes(), nil
}

// brotli compresses with the command of that name. It reports false where there is none.
func brotli(ctx context.Context, data []byte) ([]byte, bool) {
	path, err := exec.LookPath("brotli")
	if err != nil {
		return nil, false
	}
	cmd := exec.CommandContext(ctx, path, "--quality=11", "--lgwin=24", "--stdout", "-")
	cmd.Stdin = bytes.NewReader(data)
	packed, err := cmd.Output()
	return packed, err == nil && len(packed) > 0
}
