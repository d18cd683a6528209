package main

import (
	"bytes"
	"compress/gzip"
	"context"
	"io"
	"net/http"
	"net/http/httptest"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

func TestSiteHandler(t *testing.T) {
	dir := t.TempDir()
	program := bytes.Repeat([]byte("program "), 1000)
	zipped, err := pack(program)
	if err != nil {
		t.Fatal(err)
	}
	for name, data := range map[string][]byte{"index.html": []byte("<p>page"), "a-1.wasm": program, "a-1.wasm.gz": zipped} {
		if err := os.WriteFile(filepath.Join(dir, name), data, 0o600); err != nil {
			t.Fatal(err)
		}
	}
	if err := os.WriteFile(filepath.Join(filepath.Dir(dir), "secret"), []byte("secret"), 0o600); err != nil {
		t.Fatal(err)
	}
	ask := func(method, path, encoding string) *http.Response {
		r := httptest.NewRequest(method, "http://host"+path, nil)
		r.Header.Set("Accept-Encoding", encoding)
		w := httptest.NewRecorder()
		siteHandler(dir).ServeHTTP(w, r)
		return w.Result()
	}

	if r := ask("GET", "/", ""); r.StatusCode != 200 || r.Header.Get("Cache-Control") != "no-cache" || !strings.HasPrefix(r.Header.Get("Content-Type"), "text/html") {
		t.Errorf("/: %d %v", r.StatusCode, r.Header)
	}
	r := ask("GET", "/a-1.wasm", "gzip, br")
	if r.Header.Get("Content-Type") != "application/wasm" || r.Header.Get("Content-Encoding") != "gzip" || !strings.Contains(r.Header.Get("Cache-Control"), "immutable") {
		t.Errorf("program: %v", r.Header)
	}
	unzip, err := gzip.NewReader(r.Body)
	if err != nil {
		t.Fatal(err)
	}
	if got, err := io.ReadAll(unzip); err != nil || !bytes.Equal(got, program) {
		t.Error("the program does not arrive")
	}
	r = ask("GET", "/a-1.wasm", "gzip;q=0")
	if got, _ := io.ReadAll(r.Body); r.Header.Get("Content-Encoding") != "" || !bytes.Equal(got, program) {
		t.Error("a browser that refuses gzip is sent gzip")
	}
	for _, path := range []string{"/none", "/../secret", "/%2e%2e/secret", "/..%2fsecret", "/..%5csecret"} {
		if r := ask("GET", path, ""); r.StatusCode != 404 {
			t.Errorf("%s: %d", path, r.StatusCode)
		}
	}
	if r := ask("POST", "/", ""); r.StatusCode != 404 {
		t.Errorf("POST: %d", r.StatusCode)
	}
}

func TestServeOnlyOnLoopback(t *testing.T) {
	dir := t.TempDir()
	if err := os.WriteFile(filepath.Join(dir, "index.html"), nil, 0o600); err != nil {
		t.Fatal(err)
	}
	for _, address := range []string{"0.0.0.0:0", "192.0.2.1:80", "example.invalid:80", "8080"} {
		if err := serveSite(context.Background(), dir, address, 1, false, io.Discard); err == nil {
			t.Errorf("%s was served", address)
		}
	}
	if err := serveSite(context.Background(), filepath.Join(dir, "none"), "127.0.0.1:0", 1, false, io.Discard); err == nil {
		t.Error("nothing was served as a site")
	}
	var out strings.Builder
	ended, cancel := context.WithCancel(context.Background())
	cancel()
	if err := serveSite(ended, dir, "127.0.0.1:0", 0, false, &out); err != nil || !strings.Contains(out.String(), "http://127.0.0.1:") {
		t.Errorf("%v, printed %q", err, out.String())
	}
}

func TestUsage(t *testing.T) {
	for _, args := range [][]string{{"-nonsense"}, {"extra"}} {
		if code := doMain(args, io.Discard, io.Discard); code != 2 {
			t.Errorf("%v: exit %d", args, code)
		}
	}
	var errs strings.Builder
	if code := doMain([]string{"-wasm", filepath.Join(t.TempDir(), "none"), "-version", "x", "-out", t.TempDir()}, io.Discard, &errs); code != 1 || errs.Len() == 0 {
		t.Errorf("exit %d, said %q", code, errs.String())
	}
}

func TestBuildWritesTheFiles(t *testing.T) {
	dir := t.TempDir()
	program := filepath.Join(dir, "p.wasm")
	if err := os.WriteFile(program, []byte("\x00asm program"), 0o600); err != nil {
		t.Fatal(err)
	}
	var out strings.Builder
	if code := doMain([]string{"-wasm", program, "-version", "v9", "-out", filepath.Join(dir, "dist")}, &out, &out); code != 0 {
		t.Fatalf("exit %d: %s", code, out.String())
	}
	for _, name := range []string{"levelspan.html", "site/index.html", "site/index.html.gz"} {
		if info, err := os.Stat(filepath.Join(dir, "dist", name)); err != nil || info.Size() == 0 {
			t.Errorf("%s: %v", name, err)
		}
	}
	if !strings.Contains(out.String(), "version v9 (") {
		t.Errorf("printed %q", out.String())
	}
}
