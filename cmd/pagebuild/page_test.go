package main

import (
	"bytes"
	"compress/gzip"
	"encoding/base64"
	"encoding/json"
	"encoding/xml"
	"fmt"
	"html"
	"image/png"
	"io"
	"regexp"
	"strings"
	"testing"

	"levelspan/assets/page"
)

// sample has a program that does not compress to nothing and a loader of a few bytes.
func sample() *parts {
	program := make([]byte, 5000)
	for i, x := 0, uint32(1); i < len(program); i++ {
		x = x*1664525 + 1013904223
		program[i] = byte(x >> 24)
	}
	return &parts{Wasm: program, WasmExec: "globalThis.Go=class{};", Version: "v1<&\""}
}

func TestSingleHoldsTheProgram(t *testing.T) {
	p := sample()
	text, err := p.single()
	if err != nil {
		t.Fatal(err)
	}
	found := regexp.MustCompile(`id="levelspan-program" data-size="5000">([^<]+)</script>`).FindStringSubmatch(text)
	if found == nil {
		t.Fatal("the program is not in the page")
	}
	packed, err := base64.StdEncoding.DecodeString(found[1])
	if err != nil {
		t.Fatal(err)
	}
	r, err := gzip.NewReader(bytes.NewReader(packed))
	if err != nil {
		t.Fatal(err)
	}
	if got, err := io.ReadAll(r); err != nil || !bytes.Equal(got, p.Wasm) {
		t.Errorf("the program does not come out as it went in (%v)", err)
	}
	if strings.Contains(text, "{{") {
		t.Error("a mark of the shell was not filled")
	}
	if !strings.Contains(text, html.EscapeString(p.shown())) || strings.Contains(text, p.Version) {
		t.Error("the version is not in the page, or not escaped")
	}
}

// Every inline script and style must be allowed by its hash, and nothing else by anything.
func TestSinglePolicy(t *testing.T) {
	text, err := sample().single()
	if err != nil {
		t.Fatal(err)
	}
	policy := policyOf(t, text)
	for _, part := range []string{"default-src 'none'", "connect-src 'none'", "base-uri 'none'", "form-action 'none'"} {
		if !strings.Contains(policy, part) {
			t.Errorf("the policy lacks %s", part)
		}
	}
	for _, part := range []string{"unsafe-inline", "'unsafe-eval'", "*", "http", "'self'"} {
		if strings.Contains(policy, part) {
			t.Errorf("the policy has %s", part)
		}
	}
	scripts := regexp.MustCompile(`(?s)<script>(.*?)</script>`).FindAllStringSubmatch(text, -1)
	if len(scripts) != 5 {
		t.Errorf("%d inline scripts, not 5", len(scripts))
	}
	allowed, _, _ := strings.Cut(policy[strings.Index(policy, "script-src"):], ";")
	for _, s := range scripts {
		if !strings.Contains(allowed, source(s[1])) {
			t.Errorf("a script is not allowed: %.40q", s[1])
		}
	}
	style := regexp.MustCompile(`(?s)<style>(.*?)</style>`).FindStringSubmatch(text)
	if style == nil || !strings.Contains(policy, "style-src "+source(style[1])) {
		t.Error("the style is not allowed")
	}
}

func policyOf(t *testing.T, text string) string {
	t.Helper()
	found := regexp.MustCompile(`Content-Security-Policy" content="([^"]+)"`).FindStringSubmatch(text)
	if found == nil {
		t.Fatal("no policy")
	}
	return html.UnescapeString(found[1])
}

// The page in one file names no address at all: not to load, not to link to.
func TestSingleNamesNoAddress(t *testing.T) {
	text, err := sample().single()
	if err != nil {
		t.Fatal(err)
	}
	text = strings.Replace(text, icon(), "", 1) // the namespace of SVG is a name, not an address
	if found := regexp.MustCompile(`(?i:https?:|//[a-z0-9-]+\.[a-z]|\bsrc=|@import)|\burl\(`).FindString(text); found != "" {
		t.Errorf("the page contains %q", found)
	}
}

func TestSameInSameOut(t *testing.T) {
	one, err1 := sample().single()
	two, err2 := sample().single()
	if err1 != nil || err2 != nil || one != two {
		t.Error("two builds differ")
	}
	changed := sample()
	changed.Wasm[0]++
	if changed.shown() == sample().shown() {
		t.Error("another program has the same version")
	}
}

func TestScriptThatEndsItselfIsRefused(t *testing.T) {
	p := sample()
	p.WasmExec = "let s = '</SCRIPT>'"
	if _, err := p.single(); err == nil {
		t.Error("a script with its own end tag was put into the page")
	}
}

// Every file that the hosted page names is there, and is named by its content.
func TestSiteIsWhole(t *testing.T) {
	files, err := sample().site()
	if err != nil {
		t.Fatal(err)
	}
	index := string(files["index.html"])
	named := regexp.MustCompile(`(?:src|href)="([a-z0-9_-]+-[0-9a-f]{12}\.(?:js|css|wasm|png))"`).FindAllStringSubmatch(index, -1)
	if len(named) != 9 {
		t.Errorf("the page names %d files", len(named))
	}
	if !strings.Contains(index, `rel="manifest" href="`+manifestName+`"`) {
		t.Error("the page names no manifest")
	}
	for n := range files { // the worker keeps all of them, and itself not
		kept := strings.Contains(string(files[workerName]), `"`+n+`"`) || n == "index.html" && strings.Contains(string(files[workerName]), `"./"`)
		if kept == (n == workerName) {
			t.Errorf("%s: kept by the worker is %v", n, kept)
		}
	}
	for _, n := range named {
		if files[n[1]] == nil {
			t.Errorf("%s is not there", n[1])
		}
	}
	policy := policyOf(t, index)
	if !strings.Contains(policy, "default-src 'none'") || !strings.Contains(policy, "connect-src 'self'") || strings.Contains(policy, "unsafe-inline") {
		t.Errorf("policy %q", policy)
	}
	if strings.Contains(index, "<script>") || strings.Contains(index, "<style>") {
		t.Error("the hosted page has inline code, which its policy forbids")
	}
}

func TestIconIsXML(t *testing.T) {
	if err := xml.Unmarshal([]byte(page.Icon), new(struct{})); err != nil {
		t.Error(err)
	}
}

// The manifest's icons are pictures of the sizes that it says, and the maskable ones are opaque to their corners.
func TestManifestIcons(t *testing.T) {
	files, err := sample().site()
	if err != nil {
		t.Fatal(err)
	}
	var m struct {
		Name    string
		Start   string `json:"start_url"`
		Display string
		Icons   []struct{ Src, Sizes, Type, Purpose string }
	}
	if err := json.Unmarshal(files[manifestName], &m); err != nil {
		t.Fatal(err)
	}
	if m.Name != "levelspan" || m.Start != "./" || m.Display != "standalone" || len(m.Icons) != 4 {
		t.Errorf("manifest %+v", m)
	}
	for _, i := range m.Icons {
		picture, err := png.Decode(bytes.NewReader(files[i.Src]))
		if err != nil {
			t.Errorf("%s: %v", i.Src, err)
			continue
		}
		size := picture.Bounds().Size()
		if got := fmt.Sprintf("%dx%d", size.X, size.Y); got != i.Sizes || i.Type != "image/png" {
			t.Errorf("%s is %s, said to be %s %s", i.Src, got, i.Sizes, i.Type)
		}
		if _, _, _, alpha := picture.At(0, 0).RGBA(); (alpha == 0xffff) != (i.Purpose == "maskable") {
			t.Errorf("%s, %s: alpha of the corner %d", i.Src, i.Purpose, alpha)
		}
	}
}
