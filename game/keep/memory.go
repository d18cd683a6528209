package keep

import "time"

// Table is a KV in memory. Two stores over one Table are like two windows over one storage.
type Table map[string]string

// Get is the value of a key.
func (t Table) Get(key string) (string, bool, error) {
	v, ok := t[key]
	return v, ok, nil
}

// Set puts a value.
func (t Table) Set(key, value string) error {
	t[key] = value
	return nil
}

// Remove takes a key away.
func (t Table) Remove(key string) error {
	delete(t, key)
	return nil
}

// Keys is every key, in no order.
func (t Table) Keys() ([]string, error) {
	keys := make([]string, 0, len(t))
	for k := range t {
		keys = append(keys, k)
	}
	return keys, nil
}

// Memory is a Store that forgets all at the end of the program.
func Memory() *Map { return NewKV(Table{}, nil, Seconds) }

// Seconds is the time, seconds since 1970 UTC.
func Seconds() int64 { return time.Now().Unix() }
