//go:build js

package game

// inBrowser keeps ebiten from taking the focus to its canvas: the page's own elements have it.
const inBrowser = true
