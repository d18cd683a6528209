//go:build unix

package engines

import (
	"os/exec"
	"syscall"
)

// own gives a program a process group of its own.
func own(cmd *exec.Cmd) { cmd.SysProcAttr = &syscall.SysProcAttr{Setpgid: true} }

// end ends it with all that it started.
func end(cmd *exec.Cmd) { syscall.Kill(-cmd.Process.Pid, syscall.SIGKILL) }
