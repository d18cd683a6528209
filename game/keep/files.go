package keep

import (
	"errors"
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"time"
)

// Files is a Store in a folder: each version of a text is a file of its own, put in place whole. Make it with NewFiles.
type Files struct {
	*Map
	folder string
}

// Folder is where the desktop keeps cases: the folder "levelspan/cases" of the person's configuration.
func Folder() (string, error) {
	base, err := os.UserConfigDir()
	if err != nil {
		return "", fmt.Errorf("%w: %w", ErrDenied, err)
	}
	return filepath.Join(base, "levelspan", "cases"), nil
}

// NewFiles makes a Store of a folder, which is made at the first save where it is not there. A folder that cannot be used
// is told by the calls.
func NewFiles(folder string) *Files {
	return &Files{Map: NewKV(fileKV{folder}, nil, Seconds), folder: folder}
}

// lockPatience is how long a window waits for another's save to end; a save takes a few hundredths of a second.
const lockPatience = 2 * time.Second

// locked does something while no other process writes.
func (f *Files) locked(do func() error) error {
	if err := os.MkdirAll(f.folder, 0o700); err != nil {
		return storage(err)
	}
	var lock *os.File
	for wait := time.Duration(0); lock == nil; wait += 5 * time.Millisecond {
		var err error
		if lock, err = tryLock(filepath.Join(f.folder, lockName)); err != nil {
			return storage(err)
		}
		if lock == nil {
			if wait >= lockPatience {
				return fmt.Errorf("%w: another window is writing to it", ErrDenied)
			}
			time.Sleep(5 * time.Millisecond)
		}
	}
	defer lock.Close()
	if left, err := filepath.Glob(filepath.Join(f.folder, "new-*.tmp")); err == nil { // of a program that was stopped in a save
		for _, path := range left {
			_ = os.Remove(path)
		}
	}
	return do()
}

// Save is Map's, under a lock that ends with the process.
func (f *Files) Save(name string, data []byte, stamp string) (newStamp string, err error) {
	err = f.locked(func() (err error) {
		newStamp, err = f.Map.Save(name, data, stamp)
		return err
	})
	return newStamp, err
}

// Delete is Map's, under the same lock.
func (f *Files) Delete(name, stamp string) error {
	return f.locked(func() error { return f.Map.Delete(name, stamp) })
}

// SetCurrent is Map's, under the same lock.
func (f *Files) SetCurrent(name string) error {
	return f.locked(func() error { return f.Map.SetCurrent(name) })
}

// SetSession is Map's, under the same lock.
func (f *Files) SetSession(session string) error {
	return f.locked(func() error { return f.Map.SetSession(session) })
}

// fileKV is a folder as a KV: a key is a file.
type fileKV struct{ folder string }

const (
	lockName = "lock"
	fileEnd  = ".kept"
)

// file is the name of a key's file: the key without its beginning, with full stops for strokes; no escaped name has one.
func (k fileKV) file(key string) string {
	rest := strings.TrimPrefix(key, "levelspan/")
	return filepath.Join(k.folder, strings.ReplaceAll(rest, "/", ".")+fileEnd)
}

func (k fileKV) Get(key string) (string, bool, error) {
	path := k.file(key)
	info, err := os.Stat(path)
	if errors.Is(err, os.ErrNotExist) {
		return "", false, nil
	}
	if err != nil {
		return "", false, storage(err)
	}
	if info.Size() > maxRecord+256 || !info.Mode().IsRegular() {
		return "", true, nil // not written here
	}
	data, err := os.ReadFile(path)
	if errors.Is(err, os.ErrNotExist) {
		return "", false, nil
	}
	return string(data), err == nil, storage(err)
}

// Set writes beside the file and renames: the file is the old one or the new one, whole.
func (k fileKV) Set(key, value string) (err error) {
	path := k.file(key)
	f, err := os.CreateTemp(k.folder, "new-*.tmp")
	if err != nil {
		return storage(err)
	}
	defer func() {
		if err != nil {
			_ = os.Remove(f.Name())
		}
	}()
	_, err = f.WriteString(value)
	if err = errors.Join(err, f.Sync(), f.Close()); err != nil {
		return storage(err)
	}
	if err = os.Rename(f.Name(), path); err != nil {
		return storage(err)
	}
	return storage(syncFolder(k.folder))
}

func (k fileKV) Remove(key string) error {
	if err := os.Remove(k.file(key)); err != nil && !errors.Is(err, os.ErrNotExist) {
		return storage(err)
	}
	return storage(syncFolder(k.folder))
}

func (k fileKV) Keys() ([]string, error) {
	entries, err := os.ReadDir(k.folder)
	if errors.Is(err, os.ErrNotExist) {
		return nil, nil
	}
	var keys []string
	for _, e := range entries {
		if stem, ok := strings.CutSuffix(e.Name(), fileEnd); ok {
			keys = append(keys, "levelspan/"+strings.ReplaceAll(stem, ".", "/"))
		}
	}
	return keys, storage(err)
}

// storage is an error of the file system as one of this package's.
func storage(err error) error {
	switch {
	case err == nil:
		return nil
	case isFull(err):
		return fmt.Errorf("%w: %w", ErrFull, err)
	}
	return fmt.Errorf("%w: %w", ErrDenied, err)
}
