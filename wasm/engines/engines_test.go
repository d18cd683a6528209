package engines

import (
	"flag"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"sync"
	"testing"
)

var shots = flag.String("shots", "", "directory to write a picture of each engine's page into")

var built struct {
	once         sync.Once
	dir, command string
	err          error
}

func TestMain(m *testing.M) {
	code := m.Run()
	if built.dir != "" {
		os.RemoveAll(built.dir)
	}
	os.Exit(code)
}

// page is the file of the page, made once a run beside the command to compare it with.
func page(t *testing.T) string {
	t.Helper()
	built.once.Do(func() {
		if built.dir, built.err = os.MkdirTemp("", "levelspan-engines"); built.err != nil {
			return
		}
		built.command = filepath.Join(built.dir, "levelspan")
		for _, args := range [][]string{
			{"build", "-o", built.command, "levelspan/cmd/levelspan"},
			{"run", "levelspan/cmd/pagebuild", "-out", filepath.Join(built.dir, "dist"), "-version", "test", "-brotli=false"},
		} {
			if said, err := exec.Command("go", args...).CombinedOutput(); err != nil {
				built.err = fmt.Errorf("go %s: %w\n%s", strings.Join(args, " "), err, said)
				return
			}
		}
	})
	if built.err != nil {
		t.Fatal(built.err)
	}
	return filepath.Join(built.dir, "dist", "levelspan.html")
}

// command runs the levelspan command.
func command(t *testing.T, stdin string, args ...string) string {
	t.Helper()
	page(t)
	cmd := exec.Command(built.command, args...)
	cmd.Stdin = strings.NewReader(stdin)
	out, err := cmd.Output()
	if err != nil && cmd.ProcessState.ExitCode() != 1 {
		t.Fatalf("levelspan %s: %v", strings.Join(args, " "), err)
	}
	return string(out)
}

// demo is the demonstration's case file with another weight.
func demo(t *testing.T, mass string) string {
	t.Helper()
	text, err := os.ReadFile(filepath.Join("..", "..", "assets", "case", "marram.json"))
	if err != nil {
		t.Fatal(err)
	}
	changed := strings.Replace(string(text), `"mass_kg": 760`, `"mass_kg": `+mass, 1)
	if changed == string(text) && mass != "760" {
		t.Fatal("the demonstration's weight is not 760 kg")
	}
	return changed
}

// engine is one of the browsers' engines.
type engine struct {
	name   string
	start  func(t *testing.T) browser
	webgl2 bool   // there is, drawn by the processor here
	choice string // the surface that the page takes by itself
	finger string // what a finger is to the page: WebKit's driver makes a mouse of it
}

// The engines. WebKit's port needs a display; the others are headless. WebKit does not say that its WebGL2 is software.
var engines = []engine{
	{"chromium", chromium, true, "software", "touch"},
	{"firefox", func(t *testing.T) browser { return newBiDi(t, program(t, "firefox-esr", "firefox")) }, false, "software", "touch"},
	{"webkit", webkit, true, "webgl", "mouse"},
}

func chromium(t *testing.T) browser {
	binary := program(t, "chromium", "chromium-browser", "google-chrome")
	port := freePort(t)
	start(t, nil, program(t, "chromedriver"), "--port="+port)
	d := newWebDriver(t, port, map[string]any{
		"goog:loggingPrefs": map[string]any{"browser": "SEVERE"},
		"goog:chromeOptions": map[string]any{"binary": binary,
			"args": []string{"--headless=new", "--no-sandbox", "--disable-component-update", "--disable-background-networking", "--enable-unsafe-swiftshader"}}})
	d.logs = true
	return d
}

// webkit starts the small browser of WebKitGTK. Its tool bar would keep the window wider than a telephone, if it were not
// for a style of its own.
func webkit(t *testing.T) browser {
	driver := program(t, "WebKitWebDriver")
	small := program(t, "/usr/lib/*/webkit2gtk-4*/MiniBrowser", "/usr/libexec/webkit2gtk-4*/MiniBrowser")
	config := t.TempDir()
	if err := os.MkdirAll(filepath.Join(config, "gtk-3.0"), 0o755); err != nil {
		t.Fatal(err)
	}
	style := "button, entry, toolbar, toolbutton, headerbar, box { min-width: 0; padding: 0; margin: 0; border-width: 0 }\n"
	if err := os.WriteFile(filepath.Join(config, "gtk-3.0", "gtk.css"), []byte(style), 0o644); err != nil {
		t.Fatal(err)
	}
	port := freePort(t)
	start(t, []string{"DISPLAY=" + display(t), "WEBKIT_DISABLE_SANDBOX_THIS_IS_DANGEROUS=1", "LIBGL_ALWAYS_SOFTWARE=1", "GDK_BACKEND=x11", "NO_AT_BRIDGE=1",
		"XDG_CONFIG_HOME=" + config}, driver, "--port="+port)
	return newWebDriver(t, port, map[string]any{"webkitgtk:browserOptions": map[string]any{"binary": small, "args": []string{"--automation"}}})
}

// TestEngines does in each engine what a person does with the page in the field.
func TestEngines(t *testing.T) {
	file := "file://" + filepath.ToSlash(page(t))
	for _, e := range engines {
		t.Run(e.name, func(t *testing.T) {
			b := e.start(t)
			for _, s := range scenarios {
				t.Run(s.name, func(t *testing.T) {
					u := user{t, b}
					u.check(b.size(1280, 800))
					s.do(u, e, file)
					u.quiet()
				})
			}
		})
	}
}
