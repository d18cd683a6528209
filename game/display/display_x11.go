//go:build linux || freebsd || netbsd || openbsd

package display

import "syscall"

// Missing says in a few words why no window can be opened, "" if one can.
func Missing() string { return missing(syscall.Getenv, reachable) }

// missing is Missing in a given environment. The window is an X11 one, also under Wayland, where
// DISPLAY names the bridge.
func missing(getenv func(string) (string, bool), reachable func(path string) bool) string {
	name, _ := getenv("DISPLAY")
	if name == "" {
		if wayland, _ := getenv("WAYLAND_DISPLAY"); wayland != "" {
			return "this Wayland session has no X11 display (DISPLAY is not set; XWayland gives one)"
		}
		return "there is no display to open a window on (DISPLAY is not set)"
	}
	if path := socketOf(name); path != "" && !reachable(path) {
		return "the display " + name + " does not answer"
	}
	return ""
}

// socketOf is the path of a local display's socket, "" if the display is on another machine or the name is strange.
func socketOf(name string) string {
	const unix = "unix:"
	if len(name) > len(unix) && name[:len(unix)] == unix {
		name = name[len(unix)-1:]
	}
	if len(name) < 2 || name[0] != ':' {
		return ""
	}
	end := 1
	for end < len(name) && name[end] >= '0' && name[end] <= '9' {
		end++
	}
	if end == 1 || end < len(name) && name[end] != '.' {
		return ""
	}
	return "/tmp/.X11-unix/X" + name[1:end]
}

// reachable reports whether a server listens on the socket, at its path or at its abstract name.
func reachable(path string) bool {
	for _, name := range []string{path, "@" + path} {
		fd, err := syscall.Socket(syscall.AF_UNIX, syscall.SOCK_STREAM, 0)
		if err != nil {
			return true // not the display's fault: let the window try
		}
		err = syscall.Connect(fd, &syscall.SockaddrUnix{Name: name})
		syscall.Close(fd)
		if err == nil {
			return true
		}
	}
	return false
}
