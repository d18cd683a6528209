package keep

import (
	"errors"
	"os"
	"syscall"
)

// tryLock opens a file that no other process can open meanwhile; that ends with the process, however that ends. Nil and
// no error where another has it.
func tryLock(path string) (*os.File, error) {
	name, err := syscall.UTF16PtrFromString(path)
	if err != nil {
		return nil, err
	}
	const sharingViolation = syscall.Errno(32)
	h, err := syscall.CreateFile(name, syscall.GENERIC_READ|syscall.GENERIC_WRITE, 0, nil, syscall.OPEN_ALWAYS, syscall.FILE_ATTRIBUTE_NORMAL, 0)
	if errors.Is(err, sharingViolation) {
		return nil, nil
	}
	if err != nil {
		return nil, err
	}
	return os.NewFile(uintptr(h), path), nil
}

// syncFolder does nothing: a folder cannot be synced here.
func syncFolder(string) error { return nil }

// isFull reports whether an error says that there is no room left.
func isFull(err error) bool {
	const diskFull, handleDiskFull = syscall.Errno(112), syscall.Errno(39)
	return errors.Is(err, diskFull) || errors.Is(err, handleDiskFull)
}
