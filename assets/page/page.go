// Package page holds the sources of the browser page: its shell, its style and the scripts that stand between the
// browser and the program. cmd/pagebuild puts them together; nothing here is read at run time.
package page

import _ "embed"

// Shell is the document with marks in double braces where pagebuild puts the style, scripts, policy and program.
//
//go:embed shell.html
var Shell string

// Style is the style sheet of the shell and of the elements that lie over the drawing.
//
//go:embed page.css
var Style string

// Bridge defines globalThis.levelspan: every access to the browser that can throw, behind calls that do not.
//
//go:embed bridge.js
var Bridge string

// Pointer is the pointer and key layer: it fills the queue that the program reads once a frame.
//
//go:embed pointer.js
var Pointer string

// Mirror keeps the elements that say what is drawn, from the patches that the program writes.
//
//go:embed mirror.js
var Mirror string

// Boot probes the browser, unpacks the program and starts it.
//
//go:embed boot.js
var Boot string

// Offline keeps the hosted page in the browser and offers a newer one.
//
//go:embed offline.js
var Offline string

// Worker is the hosted page's service worker, without the list of its files.
//
//go:embed sw.js
var Worker string

// Offer is the bar in which the hosted page offers a newer version.
const Offer = `<div id="levelspan-offer" role="group" aria-label="Newer version">
<div><p role="status"></p><small></small></div><button type="button" hidden>Reload</button><button type="button" hidden>Later</button>
</div>
`

// Theme colours what a browser shows around the installed page.
const Theme = `<meta name="theme-color" content="#fcfbf7" media="(prefers-color-scheme: light)">
<meta name="theme-color" content="#101418" media="(prefers-color-scheme: dark)">
`

// Icon is the icon of the page.
//
//go:embed icon.svg
var Icon string
