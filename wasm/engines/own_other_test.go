//go:build !unix

package engines

import "os/exec"

func own(*exec.Cmd) {}

func end(cmd *exec.Cmd) { cmd.Process.Kill() }
