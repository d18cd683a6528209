//go:build !js

package main

import (
	"strings"
	"testing"
)

// TestShareSheet moves a case by what the browser may have: its share sheet, its clipboard, and neither.
func TestShareSheet(t *testing.T) {
	b := newTab(t, 1000, 700, 1, false)
	b.before(`globalThis.shared = [];
		Object.defineProperty(navigator, 'share', {value: async data => { shared.push(data); }, configurable: true});
		Object.defineProperty(navigator, 'canShare', {value: () => true, configurable: true});
		globalThis.board = '';
		Object.defineProperty(navigator, 'clipboard', {value: {writeText: async t => { board = t; }, readText: async () => { if (globalThis.shut) throw new Error('shut'); return board; }}});`)
	b.open(singleFile(t))
	b.nudge(3)
	want := b.caseFile()
	b.press("share")
	b.press("share/system")
	b.until("shared.length === 1")
	link := eval[string](b, "shared[0].url || ''")
	_, fragment, found := strings.Cut(link, "#case=")
	if !found {
		t.Fatalf("the share sheet gets the link %q", link)
	}
	if got := b.command("", "open", fragment); got != want {
		t.Errorf("the share sheet's link holds\n%s\nnot\n%s", got, want)
	}
	if n := eval[int](b, "(shared[0].files || []).length"); n != 1 {
		t.Errorf("the share sheet gets %d files", n)
	}
	if file := eval[string](b, "shared[0].files[0].text()", awaitPromise); b.command("", "open", strings.TrimSpace(b.command(file, "link", "-"))) != want {
		t.Error("the share sheet's file is another case")
	}

	// As text on the clipboard, and from there into a page that has changed since.
	b.press("share")
	b.press("share/text")
	b.until("board !== ''")
	text := eval[string](b, "board")
	b.nudge(4)
	b.press("menu")
	b.press("paste")
	b.settle()
	if got := b.caseFile(); got != want {
		t.Errorf("pasted\n%s\ncopied\n%s", got, want)
	}

	// The clipboard is shut: the sheet to paste in opens, and takes the same text.
	b.nudge(2)
	eval[bool](b, "globalThis.shut = true")
	b.press("menu")
	b.press("paste")
	b.until("document.querySelector('#levelspan-layer input[data-control]')")
	id := b.attribute("#levelspan-layer input[data-control]", "data-control")
	eval[bool](b, "levelspan.push(levelspan.TEXT, {id: "+quoted(id)+", text: "+quoted(text)+"}), levelspan.push(levelspan.KEY, {key: 9, id: "+quoted(id)+"}), true")
	b.settle()
	b.settle()
	if got := b.caseFile(); got != want {
		t.Errorf("pasted by hand\n%s\ncopied\n%s\nstatus %s", got, want, eval[string](b, "[...document.querySelectorAll('[data-control]')].map(e => e.dataset.control).join(' ')"))
	}

	// No share sheet: the entry is not there.
	eval[bool](b, "Object.defineProperty(navigator, 'share', {value: undefined}), true")
	b.press("share")
	if b.has("share/system") {
		t.Error("a share sheet is offered that the browser has not")
	}
}
