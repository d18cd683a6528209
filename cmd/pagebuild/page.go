package main

import (
	"crypto/sha256"
	"encoding/base64"
	"encoding/hex"
	"fmt"
	"html"
	"net/url"
	"strings"

	"levelspan/assets/page"
)

// parts is all that a page is made of.
type parts struct {
	Wasm     []byte
	WasmExec string
	Version  string // as described; the hash of the whole is added
}

// script is one inline or linked script; the order matters.
type script struct{ Name, Text string }

func (p *parts) scripts() []script {
	return []script{{"wasm_exec", p.WasmExec}, {"bridge", page.Bridge}, {"pointer", page.Pointer}, {"mirror", page.Mirror}, {"boot", page.Boot}}
}

// hash names everything that is in the page.
func (p *parts) hash() string {
	h := sha256.New()
	h.Write(p.Wasm)
	for _, s := range p.scripts() {
		h.Write([]byte(s.Text))
	}
	h.Write([]byte(page.Shell + page.Style + page.Icon + page.Offline + page.Worker + page.Offer + page.Theme))
	return hex.EncodeToString(h.Sum(nil))[:8]
}

// shown is the version as it stands on the screen.
func (p *parts) shown() string { return p.Version + " (" + p.hash() + ")" }

// source is the hash of an inline script or style as a content security policy wants it.
func source(text string) string {
	sum := sha256.Sum256([]byte(text))
	return "'sha256-" + base64.StdEncoding.EncodeToString(sum[:]) + "'"
}

func icon() string {
	return "data:image/svg+xml," + strings.ReplaceAll(url.QueryEscape(page.Icon), "+", "%20")
}

// fill puts the parts in the places that the shell marks. Install and offer are the hosted page's alone.
func (p *parts) fill(policy, style, program, scripts, install, offer string) (string, error) {
	marks := map[string]string{"VERSION": html.EscapeString(p.shown()), "POLICY": html.EscapeString(policy), "ICON": icon(),
		"STYLE": style, "PROGRAM": program, "SCRIPTS": scripts, "INSTALL": install, "OFFER": offer}
	var out strings.Builder
	rest := page.Shell
	for {
		before, after, found := strings.Cut(rest, "{{")
		out.WriteString(before)
		if !found {
			return out.String(), nil
		}
		name, tail, _ := strings.Cut(after, "}}")
		value, known := marks[name]
		if !known {
			return "", fmt.Errorf("the shell has an unknown mark %q", name)
		}
		out.WriteString(value)
		rest = tail
	}
}

// inlineable refuses text that would end its own element.
func inlineable(name, text, element string) error {
	if strings.Contains(strings.ToLower(text), "</"+element) {
		return fmt.Errorf("%s contains </%s and cannot stand inside the page", name, element)
	}
	return nil
}

// single is the page in one file: it asks nothing of any network, and its policy lets it ask nothing.
func (p *parts) single() (string, error) {
	packed, err := pack(p.Wasm)
	if err != nil {
		return "", err
	}
	if err := inlineable("the style", page.Style, "style"); err != nil {
		return "", err
	}
	policy := "default-src 'none'; script-src 'wasm-unsafe-eval'"
	var scripts strings.Builder
	for _, s := range p.scripts() {
		if err := inlineable(s.Name, s.Text, "script"); err != nil {
			return "", err
		}
		policy += " " + source(s.Text)
		scripts.WriteString("<script>" + s.Text + "</script>\n")
	}
	policy += "; style-src " + source(page.Style) + "; img-src data:; connect-src 'none'; base-uri 'none'; form-action 'none'"
	program := fmt.Sprintf("<script type=\"text/plain\" id=\"levelspan-program\" data-size=\"%d\">%s</script>", len(p.Wasm), base64.StdEncoding.EncodeToString(packed))
	return p.fill(policy, "<style>"+page.Style+"</style>", program, strings.TrimSuffix(scripts.String(), "\n"), "", "")
}

// site is the page split for hosting, and installable: names to contents. All but index.html, the manifest and the
// service worker carry the hash of their content in their name, so they may be kept for ever.
func (p *parts) site() (map[string][]byte, error) {
	files := map[string][]byte{}
	name := func(stem, ext string, data []byte) string {
		sum := sha256.Sum256(data)
		n := stem + "-" + hex.EncodeToString(sum[:])[:12] + "." + ext
		files[n] = data
		return n
	}
	var scripts strings.Builder
	for _, s := range append(p.scripts(), script{"offline", page.Offline}) {
		fmt.Fprintf(&scripts, "<script src=\"%s\"></script>\n", name(s.Name, "js", []byte(s.Text)))
	}
	style := fmt.Sprintf("<link rel=\"stylesheet\" href=\"%s\">", name("page", "css", []byte(page.Style)))
	program := fmt.Sprintf("<template id=\"levelspan-source\" data-href=\"%s\" data-size=\"%d\"></template>", name("levelspan", "wasm", p.Wasm), len(p.Wasm))
	manifest, touch, err := p.manifest(name)
	if err != nil {
		return nil, err
	}
	files[manifestName] = manifest
	install := fmt.Sprintf("<link rel=\"manifest\" href=\"%s\">\n<link rel=\"apple-touch-icon\" href=\"%s\">\n"+page.Theme, manifestName, touch)
	policy := "default-src 'none'; script-src 'self' 'wasm-unsafe-eval'; style-src 'self'; img-src 'self' data:; connect-src 'self'; " +
		"worker-src 'self'; manifest-src 'self'; base-uri 'none'; form-action 'none'"
	text, err := p.fill(policy, style, program, strings.TrimSuffix(scripts.String(), "\n"), install, page.Offer)
	if err != nil {
		return nil, err
	}
	files["index.html"] = []byte(text)
	files[workerName] = p.worker(files)
	return files, nil
}
