//go:build !(linux || freebsd || netbsd || openbsd)

package display

// Missing says why no window can be opened: never on systems whose windows are not X11's.
func Missing() string { return "" }
