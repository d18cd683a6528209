//go:build !js

package main

import (
	"io"
	"net/http"
	"net/http/httptest"
	"net/http/httputil"
	"net/url"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"sync"
	"testing"
)

// The most that the page may weigh, bytes: in one file, and all that a first visit takes from a server with brotli.
const (
	mostSingle = 4_200_000
	mostHosted = 2_400_000
)

// TestSizes builds the page as make page does, weighs the one file, and counts what Chromium takes from the server until
// the hosted page is kept for use without it: answers with their headings, the service worker's among them.
func TestSizes(t *testing.T) {
	if _, err := exec.LookPath("brotli"); err != nil {
		without(t, "the command brotli")
	}
	h := newHosting(t)
	program, _ := filepath.Glob(filepath.Join(h.dist, "site", "levelspan-*.wasm"))
	if len(program) != 1 {
		t.Fatalf("programs %v", program)
	}
	dist := filepath.Join(t.TempDir(), "dist")
	if said, err := exec.Command(h.tool, "-out", dist, "-wasm", program[0], "-version", "test").CombinedOutput(); err != nil {
		t.Fatalf("pagebuild: %v\n%s", err, said)
	}
	single, err := os.Stat(filepath.Join(dist, "levelspan.html"))
	if err != nil {
		t.Fatal(err)
	}
	h.serve(dist)

	// Between the browser and the server, a proxy that weighs.
	origin, err := url.Parse(h.home())
	if err != nil {
		t.Fatal(err)
	}
	var mu sync.Mutex
	weight, coded := map[string]int{}, map[string]string{}
	proxy := httputil.NewSingleHostReverseProxy(origin)
	proxy.ModifyResponse = func(r *http.Response) error {
		head, err := httputil.DumpResponse(r, false)
		if err != nil {
			return err
		}
		name := r.Request.URL.Path
		mu.Lock()
		weight[name] += len(head)
		coded[name] = r.Header.Get("Content-Encoding")
		mu.Unlock()
		r.Body = &weighed{r.Body, func(n int) { mu.Lock(); weight[name] += n; mu.Unlock() }}
		return nil
	}
	server := httptest.NewServer(proxy)
	defer server.Close()
	b := newTab(t, 1280, 800, 1, false)
	b.open(server.URL + "/")
	b.kept()

	mu.Lock()
	defer mu.Unlock()
	hosted := 0
	for name, n := range weight {
		hosted += n
		t.Logf("%-32s %8d bytes %s", name, n, coded[name])
		if strings.HasSuffix(name, ".wasm") && coded[name] != "br" {
			t.Errorf("%s came as %q, not with brotli", name, coded[name])
		}
	}
	t.Logf("one file %.2f MB, first visit %.2f MB", float64(single.Size())/1e6, float64(hosted)/1e6)
	if single.Size() > mostSingle || single.Size() < 1_000_000 {
		t.Errorf("the page in one file is %d bytes, more than %d (or too little to be it)", single.Size(), mostSingle)
	}
	if hosted > mostHosted || hosted < 1_000_000 {
		t.Errorf("a first visit takes %d bytes, more than %d (or too little to be one)", hosted, mostHosted)
	}
}

// weighed tells how much is read of an answer.
type weighed struct {
	io.ReadCloser
	add func(n int)
}

func (w *weighed) Read(p []byte) (int, error) {
	n, err := w.ReadCloser.Read(p)
	w.add(n)
	return n, err
}
