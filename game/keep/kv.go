package keep

import (
	"errors"
	"fmt"
	"slices"
	"strings"
)

// The keys: a text has two places, and a new version goes into the one that does not hold the last.
const (
	keyCase    = "levelspan/case/"
	keyCurrent = "levelspan/current"
	keySession = "levelspan/session"
)

// Map is a Store over a KV. Make it with NewKV.
type Map struct {
	kv, tab KV
	now     func() int64
}

// NewKV makes a Store of a map of strings. The tab, if not nil, is one of this window alone that outlives a reload: what
// was last worked on is sought there first. Now is the time, seconds since 1970 UTC.
func NewKV(kv, tab KV, now func() int64) *Map { return &Map{kv, tab, now} }

var slots = [...]string{"/a", "/b"}

// fail is an error of the map below as one of this package's.
func fail(err error) error {
	if err == nil || errors.Is(err, ErrFull) || errors.Is(err, ErrDenied) {
		return err
	}
	return fmt.Errorf("%w: %w", ErrDenied, err)
}

// newest is the last whole version of a text and the place that the next one goes to; found is false where none is whole.
func (m *Map) newest(name string) (last record, next string, found bool, err error) {
	base := keyCase + Escape(name)
	next = base + slots[0]
	for i, slot := range slots {
		s, ok, err := m.kv.Get(base + slot)
		if err != nil {
			return record{}, "", false, fail(err)
		}
		if !ok {
			continue
		}
		if r, whole := decode(s); whole && (!found || r.count > last.count) {
			last, found, next = r, true, base+slots[1-i]
		}
	}
	return last, next, found, nil
}

// List is what is kept, the last changed first.
func (m *Map) List() ([]Entry, error) {
	keys, err := m.kv.Keys()
	if err != nil {
		return nil, fail(err)
	}
	slices.Sort(keys)
	var list []Entry
	seen := ""
	for _, key := range keys {
		rest, ok := strings.CutPrefix(key, keyCase)
		if !ok || len(rest) < 2 || rest[len(rest)-2] != '/' {
			continue
		}
		name, ok := Unescape(rest[:len(rest)-2])
		if !ok || name == seen {
			continue
		}
		seen = name
		r, _, found, err := m.newest(name)
		if err != nil {
			return nil, err
		}
		if found {
			list = append(list, Entry{name, r.changed, len(r.data)})
		}
	}
	slices.SortStableFunc(list, func(a, b Entry) int {
		switch {
		case a.Changed > b.Changed:
			return -1
		case a.Changed < b.Changed:
			return 1
		}
		return strings.Compare(a.Name, b.Name)
	})
	return list, nil
}

// Load is the last whole version of a text.
func (m *Map) Load(name string) (data []byte, stamp string, err error) {
	r, _, found, err := m.newest(name)
	switch {
	case err != nil:
		return nil, "", err
	case !found:
		return nil, "", ErrMissing
	}
	return []byte(r.data), r.stamp(), nil
}

// Save keeps a new version beside the last, and reads it back: storage that says it took a text and did not is denied.
func (m *Map) Save(name string, data []byte, stamp string) (newStamp string, err error) {
	if err := CheckName(name); err != nil {
		return "", err
	}
	if len(data) > maxRecord {
		return "", ErrFull
	}
	last, next, found, err := m.newest(name)
	if err != nil {
		return "", err
	}
	if found != (stamp != "") || found && last.stamp() != stamp {
		return "", ErrChanged
	}
	r := record{last.count + 1, m.now(), string(data)}
	text := r.encode()
	if err := m.kv.Set(next, text); err != nil {
		return "", fail(err)
	}
	back, ok, err := m.kv.Get(next)
	switch {
	case err != nil:
		return "", fail(err)
	case !ok:
		return "", ErrDenied
	case back != text:
		if _, whole := decode(back); whole {
			return "", ErrChanged // another window wrote at the same moment
		}
		return "", ErrDenied
	}
	return r.stamp(), nil
}

// Delete forgets a text, the older version first: what stops in between leaves the last one.
func (m *Map) Delete(name, stamp string) error {
	last, next, found, err := m.newest(name)
	if err != nil {
		return err
	}
	if found && stamp != "" && last.stamp() != stamp {
		return ErrChanged
	}
	base := keyCase + Escape(name)
	for _, key := range [...]string{next, base + slots[0], base + slots[1]} {
		if err := m.kv.Remove(key); err != nil {
			return fail(err)
		}
	}
	return nil
}

// Current is what this window last worked on, or else any.
func (m *Map) Current() (name string, ok bool, err error) {
	name, ok, err = m.short(keyCurrent)
	if ok && CheckName(name) != nil {
		return "", false, err
	}
	return name, ok, err
}

// SetCurrent says which text is worked on.
func (m *Map) SetCurrent(name string) error {
	if err := CheckName(name); err != nil {
		return err
	}
	return m.setShort(keyCurrent, name)
}

// Session is what this window, or else any, kept with SetSession.
func (m *Map) Session() (string, error) {
	s, _, err := m.short(keySession)
	return s, err
}

// SetSession keeps how the screen was left.
func (m *Map) SetSession(session string) error { return m.setShort(keySession, session) }

// short reads a record of few bytes, this window's first.
func (m *Map) short(key string) (string, bool, error) {
	if m.tab != nil {
		if s, ok, err := m.tab.Get(key); err == nil && ok {
			if r, whole := decode(s); whole {
				return r.data, true, nil
			}
		}
	}
	s, ok, err := m.kv.Get(key)
	if err != nil {
		return "", false, fail(err)
	}
	r, whole := decode(s)
	return r.data, ok && whole, nil
}

func (m *Map) setShort(key, data string) error {
	text := record{1, m.now(), data}.encode()
	if m.tab != nil {
		_ = m.tab.Set(key, text) // only for this window's reload; the other one counts
	}
	return fail(m.kv.Set(key, text))
}
