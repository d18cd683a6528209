//go:build unix

package keep

import (
	"errors"
	"os"
	"syscall"
)

// tryLock locks a file against other processes; the lock ends with the process, however that ends. Nil and no error where
// another holds it.
func tryLock(path string) (*os.File, error) {
	f, err := os.OpenFile(path, os.O_RDWR|os.O_CREATE, 0o600)
	if err != nil {
		return nil, err
	}
	switch err := syscall.Flock(int(f.Fd()), syscall.LOCK_EX|syscall.LOCK_NB); {
	case err == nil:
		return f, nil
	case errors.Is(err, syscall.EWOULDBLOCK) || errors.Is(err, syscall.EINTR):
		_ = f.Close()
		return nil, nil
	case errors.Is(err, syscall.ENOSYS) || errors.Is(err, syscall.ENOTSUP): // a file system without locks: the stamps still hold
		return f, nil
	default:
		_ = f.Close()
		return nil, err
	}
}

// syncFolder makes a rename in a folder last.
func syncFolder(path string) error {
	d, err := os.Open(path)
	if err != nil {
		return err
	}
	err = d.Sync()
	if errors.Is(err, syscall.EINVAL) || errors.Is(err, syscall.ENOTSUP) { // not every file system syncs folders
		err = nil
	}
	return errors.Join(err, d.Close())
}

// isFull reports whether an error says that there is no room left.
func isFull(err error) bool { return errors.Is(err, syscall.ENOSPC) || errors.Is(err, syscall.EDQUOT) }
