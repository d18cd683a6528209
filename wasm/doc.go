// Command wasm is the program in the browser: the only package that imports syscall/js.
//
// What needs the browser is in files named *_js.go. What does not (the wire format of the event queue, the patches
// that keep the DOM mirror) has no build constraint, so that it is tested without one. The other half of the bridge is
// in assets/page: bridge.js holds every access to the browser that can throw, pointer.js is the pointer and key layer,
// mirror.js applies the patches. Go only ever reaches the browser by calling those.
//
// A surface shows the scene; ebiten is one. Input, mirror and state do not depend on which it is.
package main
