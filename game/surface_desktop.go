//go:build !js

package game

// inBrowser is whether the surface is a canvas of a page.
const inBrowser = false
