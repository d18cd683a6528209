package main

import (
	"context"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"sort"
)

// options are what a build is asked for.
type options struct {
	dir     string
	wasm    string // a program already compiled, or ""
	program string // or the package to compile
	version string // or "" to describe it
	brotli  bool
	slim    bool // see slim.go
}

// build writes levelspan.html and site into the directory and prints their sizes.
func build(ctx context.Context, o options, out io.Writer) error {
	var err error
	p := parts{Version: o.version}
	if p.Version == "" {
		p.Version = describe(ctx)
	}
	if p.WasmExec, err = wasmExec(ctx); err != nil {
		return err
	}
	if o.wasm != "" {
		p.Wasm, err = os.ReadFile(o.wasm)
	} else {
		p.Wasm, err = compileProgram(ctx, o.program, o.slim)
	}
	if err != nil {
		return err
	}
	single, err := p.single()
	if err != nil {
		return err
	}
	site, err := p.site()
	if err != nil {
		return err
	}
	siteDir := filepath.Join(o.dir, "site")
	if err := os.RemoveAll(siteDir); err != nil {
		return err
	}
	if err := os.MkdirAll(siteDir, 0o755); err != nil {
		return err
	}
	if err := os.WriteFile(filepath.Join(o.dir, "levelspan.html"), []byte(single), 0o644); err != nil {
		return err
	}
	plain, zipped, brotlied, err := writeSite(ctx, siteDir, site, o.brotli)
	if err != nil {
		return err
	}
	fmt.Fprintf(out, "%-22s %10d bytes\n", "levelspan.html", len(single))
	fmt.Fprintf(out, "%-22s %10d bytes, %d with gzip", "site", plain, zipped)
	if brotlied > 0 {
		fmt.Fprintf(out, ", %d with brotli", brotlied)
	}
	fmt.Fprintf(out, "\nversion %s\n", p.shown())
	return nil
}

// writeSite writes the files, each beside its compressed forms, and gives the sum of each form. The sum for brotli
// is 0 where it is not wanted or there is no such command.
func writeSite(ctx context.Context, dir string, files map[string][]byte, withBrotli bool) (plain, zipped, brotlied int, err error) {
	names := make([]string, 0, len(files))
	for n := range files {
		names = append(names, n)
	}
	sort.Strings(names)
	for _, n := range names {
		data := files[n]
		gz, err := pack(data)
		if err != nil {
			return 0, 0, 0, err
		}
		write := map[string][]byte{n: data, n + ".gz": gz}
		if withBrotli {
			br, ok := brotli(ctx, data)
			if ok {
				write[n+".br"] = br
				brotlied += len(br)
			}
			withBrotli = ok
		}
		for name, content := range write {
			if err := os.WriteFile(filepath.Join(dir, name), content, 0o644); err != nil {
				return 0, 0, 0, err
			}
		}
		plain += len(data)
		zipped += len(gz)
	}
	if !withBrotli {
		brotlied = 0
	}
	return plain, zipped, brotlied, nil
}
