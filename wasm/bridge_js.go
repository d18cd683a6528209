package main

import (
	"syscall/js"

	"levelspan/game/app"
)

// bridge calls globalThis.levelspan. Its functions do not throw; nothing else of the browser is touched.
type bridge struct {
	object js.Value
	bytes  js.Value
	none   js.Value
	wire   wire
}

func newBridge() *bridge {
	object := js.Global().Get("levelspan")
	return &bridge{object: object, bytes: object.Get("bytes")}
}

func (b *bridge) call(name string, args ...any) js.Value { return b.object.Call(name, args...) }

// wake asks for a frame.
func (b *bridge) wake() { b.call("wake") }

// fail covers the page.
func (b *bridge) fail(why string) { b.call("fail", why) }

// listen makes the page's call of a name call f.
func (b *bridge) listen(name string, f func()) {
	b.object.Set(name, js.FuncOf(func(js.Value, []js.Value) any {
		f()
		return nil
	}))
}

// drain empties the queue into the input.
func (b *bridge) drain(in *app.Input) {
	count := b.call("drain").Int()
	used := b.bytes
	if count == 0 {
		used = b.bytes.Call("subarray", 0, 8*wireHead)
	}
	js.CopyBytesToGo(b.wire.buf[:], used)
	texts := b.none
	if count > 0 {
		texts = b.call("texts")
	}
	b.wire.decode(in, count, func(i int) string {
		if i < 0 || texts.IsUndefined() || i >= texts.Length() {
			return ""
		}
		return texts.Index(i).String()
	}, func(i int) []byte {
		file := b.call("file", i)
		if !file.Truthy() {
			return nil
		}
		data := make([]byte, file.Get("length").Int())
		js.CopyBytesToGo(data, file)
		return data
	})
}

// host is the program's outside: see app.Host. Results come back through the queue.
type host struct {
	bridge  *bridge
	version string
}

// Copy puts text on the clipboard, or shows it to be copied by hand.
func (h *host) Copy(what, text string) { h.bridge.call("copy", what, text) }

// OpenFile shows the browser's file picker.
func (h *host) OpenFile() { h.bridge.call("pick") }

// SaveFile downloads the data, or shares it where there are no downloads.
func (h *host) SaveFile(name, mime string, data []byte) {
	bytes := js.Global().Get("Uint8Array").New(len(data))
	js.CopyBytesToJS(bytes, data)
	h.bridge.call("save", name, mime, bytes)
}

// LinkBase is the page's own address.
func (h *host) LinkBase() string { return h.bridge.call("base").String() }

// Version is that of the page, with the hash of all that is in it.
func (h *host) Version() string { return h.version }

// Paste reads the clipboard.
func (h *host) Paste() { h.bridge.call("paste") }

// CanShare reports whether the browser has a share sheet.
func (h *host) CanShare() bool { return h.bridge.call("canshare").Bool() }

// Share shows it.
func (h *host) Share(s app.Shared) {
	h.bridge.call("share", s.Title, s.Text, s.Link, s.FileName, s.MIME, s.File)
}
