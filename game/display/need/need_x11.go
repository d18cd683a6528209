//go:build linux || freebsd || netbsd || openbsd

package need

import (
	"syscall"

	"levelspan/game/display"
)

func init() {
	if why := display.Missing(); why != "" {
		syscall.Write(2, []byte("levelspan-window: "+why+"; the command without a window is: levelspan limits CASE.json\n"))
		syscall.Exit(2)
	}
}
