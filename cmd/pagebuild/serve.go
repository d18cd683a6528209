package main

import (
	"context"
	"fmt"
	"io"
	"mime"
	"net"
	"net/http"
	"os"
	"os/exec"
	"path"
	"path/filepath"
	"runtime"
	"strings"
	"time"
)

// serveSite serves dir until ctx ends or the seconds are over. It refuses an address that is not loopback: this is
// for looking at the page on the machine that built it.
func serveSite(ctx context.Context, dir, address string, seconds int, open bool, out io.Writer) error {
	if _, err := os.Stat(filepath.Join(dir, "index.html")); err != nil {
		return fmt.Errorf("no page to serve (run make page first): %w", err)
	}
	host, _, err := net.SplitHostPort(address)
	if err != nil {
		return err
	}
	if ip := net.ParseIP(host); ip == nil || !ip.IsLoopback() {
		return fmt.Errorf("%s is not a loopback address", address)
	}
	listener, err := net.Listen("tcp", address)
	if err != nil {
		// The usual port is taken: any other will do.
		if listener, err = net.Listen("tcp", net.JoinHostPort(host, "0")); err != nil {
			return err
		}
	}
	if seconds > 0 {
		var stop context.CancelFunc
		ctx, stop = context.WithTimeout(ctx, time.Duration(seconds)*time.Second)
		defer stop()
	}
	where := "http://" + listener.Addr().String() + "/"
	fmt.Fprintf(out, "The page is at %s\n", where)
	if open {
		openBrowser(where)
	}
	server := &http.Server{Handler: siteHandler(dir), ReadHeaderTimeout: 10 * time.Second}
	go func() {
		<-ctx.Done()
		server.Close()
	}()
	if err := server.Serve(listener); err != http.ErrServerClosed {
		return err
	}
	return nil
}

// siteHandler serves the files of a built site, compressed where the browser takes it, hashed names for ever.
func siteHandler(dir string) http.Handler {
	return http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
		name := strings.TrimPrefix(path.Clean("/"+r.URL.Path), "/")
		if name == "" {
			name = "index.html"
		}
		if strings.ContainsAny(name, `/\`) || (r.Method != http.MethodGet && r.Method != http.MethodHead) {
			http.NotFound(w, r)
			return
		}
		h := w.Header()
		h.Set("X-Content-Type-Options", "nosniff")
		h.Set("Vary", "Accept-Encoding")
		h.Set("Cache-Control", "public, max-age=31536000, immutable")
		if name == "index.html" || name == manifestName || name == workerName {
			h.Set("Cache-Control", "no-cache")
		}
		switch ext := path.Ext(name); ext {
		case ".wasm":
			h.Set("Content-Type", "application/wasm")
		case ".webmanifest":
			h.Set("Content-Type", "application/manifest+json")
		default:
			h.Set("Content-Type", mime.TypeByExtension(ext))
		}
		file := filepath.Join(dir, name)
		for _, c := range []struct{ token, ext string }{{"br", ".br"}, {"gzip", ".gz"}} {
			if accepts(r.Header.Get("Accept-Encoding"), c.token) {
				if _, err := os.Stat(file + c.ext); err == nil {
					h.Set("Content-Encoding", c.token)
					file += c.ext
					break
				}
			}
		}
		f, err := os.Open(file)
		if err != nil {
			h.Del("Content-Encoding")
			h.Del("Cache-Control")
			http.NotFound(w, r)
			return
		}
		defer f.Close()
		http.ServeContent(w, r, "", time.Time{}, f)
	})
}

// accepts reports whether a browser's Accept-Encoding names the coding and does not refuse it.
func accepts(header, coding string) bool {
	for _, part := range strings.Split(header, ",") {
		name, weight, _ := strings.Cut(part, ";")
		if strings.TrimSpace(name) == coding {
			w := strings.ReplaceAll(weight, " ", "")
			return w != "q=0" && !strings.HasPrefix(w, "q=0.000")
		}
	}
	return false
}

// openBrowser asks the desktop for its browser. Where there is none, the printed address is enough.
func openBrowser(address string) {
	name, args := "xdg-open", []string{address}
	switch runtime.GOOS {
	case "darwin":
		name = "open"
	case "windows":
		name, args = "rundll32", []string{"url.dll,FileProtocolHandler", address}
	default:
		if os.Getenv("DISPLAY") == "" && os.Getenv("WAYLAND_DISPLAY") == "" {
			return
		}
	}
	if _, err := exec.LookPath(name); err != nil {
		return
	}
	cmd := exec.Command(name, args...)
	if cmd.Start() == nil {
		go cmd.Wait()
	}
}
