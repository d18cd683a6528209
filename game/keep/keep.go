// Package keep is where cases outlive the program: a small store of named texts that never loses the version before the
// last, and refuses to write over what another window wrote meanwhile. It knows no aeroplane and no window.
//
// NewKV makes a Store of any map of strings, as a browser's local storage; Files is one of the files in a folder; Memory
// forgets all at the end.
package keep

import "errors"

// Entry is one kept text.
type Entry struct {
	Name    string
	Changed int64 // when it was last saved, seconds since 1970 UTC; 0 unknown
	Size    int   // bytes
}

// Store keeps texts by name. All calls return when the work is done. A Store belongs to one goroutine; what other windows
// and processes do to the same storage is seen at the next call.
type Store interface {
	// List is what is kept, the last changed first.
	List() ([]Entry, error)
	// Load is a kept text and the stamp of that version, for Save. ErrMissing where there is none.
	Load(name string) (data []byte, stamp string, err error)
	// Save keeps data under a name. The stamp is that of the version it replaces, "" where there is to be none;
	// ErrChanged, and nothing is written, where another version is there or none is. It gives the new version's stamp.
	Save(name string, data []byte, stamp string) (newStamp string, err error)
	// Delete forgets a text. ErrChanged where another version is there than the stamp's; "" means any. A text that is
	// not there is no error.
	Delete(name, stamp string) error
	// Current is the name of the text that was last worked on; false where none has been set.
	Current() (name string, ok bool, err error)
	// SetCurrent says which text is worked on.
	SetCurrent(name string) error
	// Session is what SetSession kept, "" nothing: how the screen was left.
	Session() (string, error)
	// SetSession keeps a short text.
	SetSession(session string) error
}

// The errors of a Store, to be tested for with errors.Is. Their texts are for the person.
var (
	ErrChanged = errors.New("it was changed in another window")
	ErrFull    = errors.New("the storage is full")
	ErrDenied  = errors.New("the storage cannot be used")
	ErrMissing = errors.New("there is no such case")
	ErrName    = errors.New("a name needs 1 to 60 letters, figures, spaces or signs")
)

// KV is a map of strings that outlives the program. The values are UTF-8. Its errors are, or wrap, ErrFull and ErrDenied;
// any other counts as ErrDenied.
type KV interface {
	Get(key string) (value string, ok bool, err error)
	Set(key, value string) error
	Remove(key string) error
	Keys() ([]string, error)
}
