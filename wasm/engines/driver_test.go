package engines

import (
	"bytes"
	"encoding/base64"
	"encoding/json"
	"fmt"
	"io"
	"net"
	"net/http"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"sync"
	"testing"
	"time"
)

// browser is one engine with one window.
type browser interface {
	open(address string) error
	// eval gives the value of an expression, which must be a text.
	eval(expression string) (string, error)
	// act carries out input sources' actions as the WebDriver standard writes them.
	act(sources []any) error
	size(width, height int) error
	picture() ([]byte, error)
	reload() error
	// console gives the errors on the browser's console that it has not given yet, where the browser tells them.
	console() ([]string, error)
	close()
}

// required reports whether the absence of an engine is a failure.
func required() bool { return os.Getenv("LEVELSPAN_OUTSIDE") == "required" }

func without(t *testing.T, what string) {
	t.Helper()
	if required() {
		t.Fatalf("%s is not here, and LEVELSPAN_OUTSIDE=required", what)
	}
	t.Skipf("%s is not here (make test installs it)", what)
}

// program finds the first of some programs.
func program(t *testing.T, names ...string) string {
	t.Helper()
	for _, n := range names {
		if path, err := exec.LookPath(n); err == nil {
			return path
		}
		if found, _ := filepath.Glob(n); len(found) > 0 {
			return found[0]
		}
	}
	without(t, names[0])
	return ""
}

// freePort is a port of the loopback address that nothing listens on.
func freePort(t *testing.T) string {
	t.Helper()
	l, err := net.Listen("tcp", "127.0.0.1:0")
	if err != nil {
		t.Fatal(err)
	}
	defer l.Close()
	_, port, _ := net.SplitHostPort(l.Addr().String())
	return port
}

// start starts a program that ends with the test, with a home directory of its own.
func start(t *testing.T, env []string, path string, args ...string) *lines {
	t.Helper()
	home := t.TempDir()
	cmd := exec.Command(path, args...)
	cmd.Env = append(os.Environ(), append([]string{"HOME=" + home, "XDG_CACHE_HOME=" + home, "XDG_CONFIG_HOME=" + home, "XDG_DATA_HOME=" + home, "XDG_RUNTIME_DIR=" + home}, env...)...)
	said := &lines{}
	cmd.Stdout, cmd.Stderr = said, said
	own(cmd)
	if err := cmd.Start(); err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() {
		end(cmd)
		cmd.Wait()
		if t.Failed() {
			t.Logf("%s said:\n%s", filepath.Base(path), said.tail())
		}
	})
	return said
}

// lines collects what a program says.
type lines struct {
	mu   sync.Mutex
	text []byte
}

func (l *lines) Write(p []byte) (int, error) {
	l.mu.Lock()
	defer l.mu.Unlock()
	l.text = append(l.text, p...)
	return len(p), nil
}

func (l *lines) String() string {
	l.mu.Lock()
	defer l.mu.Unlock()
	return string(l.text)
}

func (l *lines) tail() string {
	s := l.String()
	if len(s) > 3000 {
		s = s[len(s)-3000:]
	}
	return s
}

// display starts an X display of its own and gives its name.
func display(t *testing.T) string {
	t.Helper()
	path := program(t, "Xvfb")
	said := start(t, nil, path, "-displayfd", "1", "-screen", "0", "1400x1400x24", "-nolisten", "tcp")
	for end := time.Now().Add(30 * time.Second); time.Now().Before(end); time.Sleep(20 * time.Millisecond) {
		if s := said.String(); strings.HasSuffix(s, "\n") {
			for _, l := range strings.Fields(s) {
				if strings.Trim(l, "0123456789") == "" {
					return ":" + l
				}
			}
		}
	}
	t.Fatalf("no display: %s", said.tail())
	return ""
}

// webDriver is an engine behind a WebDriver server (W3C WebDriver).
type webDriver struct {
	server, session string
	extra           [2]int // what the window has around the page
	logs            bool   // the server tells what is on the console
}

// call sends one command; into takes the value.
func (d *webDriver) call(method, path string, body, into any) error {
	var in io.Reader
	if body != nil {
		text, err := json.Marshal(body)
		if err != nil {
			return err
		}
		in = bytes.NewReader(text)
	}
	request, err := http.NewRequest(method, d.server+path, in)
	if err != nil {
		return err
	}
	request.Header.Set("Content-Type", "application/json")
	client := http.Client{Timeout: 60 * time.Second}
	answer, err := client.Do(request)
	if err != nil {
		return err
	}
	defer answer.Body.Close()
	text, err := io.ReadAll(answer.Body)
	if err != nil {
		return err
	}
	if answer.StatusCode != http.StatusOK {
		return fmt.Errorf("%s %s: %s: %.600s", method, path, answer.Status, text)
	}
	if into == nil {
		return nil
	}
	return json.Unmarshal(text, &struct{ Value any }{into})
}

// newWebDriver opens a session once the server answers.
func newWebDriver(t *testing.T, port string, capabilities map[string]any) *webDriver {
	t.Helper()
	d := &webDriver{server: "http://127.0.0.1:" + port}
	var made struct {
		SessionID string `json:"sessionId"`
	}
	ask := map[string]any{"capabilities": map[string]any{"alwaysMatch": capabilities}}
	for end := time.Now().Add(60 * time.Second); ; time.Sleep(100 * time.Millisecond) {
		err := d.call("GET", "/status", nil, nil)
		if err == nil {
			break
		}
		if time.Now().After(end) {
			t.Fatal("the driver does not answer: ", err)
		}
	}
	if err := d.call("POST", "/session", ask, &made); err != nil {
		t.Fatal(err)
	}
	d.session = "/session/" + made.SessionID
	t.Cleanup(d.close)
	return d
}

func (d *webDriver) open(address string) error {
	return d.call("POST", d.session+"/url", map[string]any{"url": address}, nil)
}

func (d *webDriver) eval(expression string) (value string, err error) {
	err = d.call("POST", d.session+"/execute/sync", map[string]any{"script": "return (" + expression + ")", "args": []any{}}, &value)
	return value, err
}

func (d *webDriver) act(sources []any) error {
	return d.call("POST", d.session+"/actions", map[string]any{"actions": sources}, nil)
}

// size sets the window so that the page has the size asked for.
func (d *webDriver) size(width, height int) error {
	for range 3 {
		if err := d.call("POST", d.session+"/window/rect", map[string]any{"x": 0, "y": 0, "width": width + d.extra[0], "height": height + d.extra[1]}, nil); err != nil {
			return err
		}
		for range 20 {
			text, err := d.eval("innerWidth + ' ' + innerHeight")
			if err != nil {
				return err
			}
			var w, h int
			fmt.Sscan(text, &w, &h)
			if w == width && h == height {
				return nil
			}
			time.Sleep(50 * time.Millisecond)
		}
		text, err := d.eval("innerWidth + ' ' + innerHeight")
		if err != nil {
			return err
		}
		var w, h int
		fmt.Sscan(text, &w, &h)
		d.extra[0] += width - w
		d.extra[1] += height - h
	}
	return fmt.Errorf("the window does not take the size %d x %d", width, height)
}

func (d *webDriver) picture() (data []byte, err error) {
	var text string
	if err = d.call("GET", d.session+"/screenshot", nil, &text); err != nil {
		return nil, err
	}
	return base64.StdEncoding.DecodeString(text)
}

func (d *webDriver) reload() error {
	return d.call("POST", d.session+"/refresh", map[string]any{}, nil)
}

// console asks by the command that Chromium's driver adds to the standard.
func (d *webDriver) console() (said []string, err error) {
	if !d.logs {
		return nil, nil
	}
	var entries []struct{ Level, Message string }
	if err := d.call("POST", d.session+"/se/log", map[string]any{"type": "browser"}, &entries); err != nil {
		return nil, err
	}
	for _, e := range entries {
		if e.Level == "SEVERE" {
			said = append(said, e.Message)
		}
	}
	return said, nil
}

func (d *webDriver) close() {
	if d.session != "" {
		d.call("DELETE", d.session, nil, nil)
		d.session = ""
	}
}
