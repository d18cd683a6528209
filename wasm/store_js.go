package main

import (
	"fmt"

	"levelspan/game/keep"
)

// storage is one of the browser's two stores as a keep.KV. Every access is guarded on the page's side.
type storage struct {
	bridge *bridge
	area   string // localStorage, sessionStorage
}

// ask calls the page; the value is undefined where there is none.
func (s storage) ask(what, key, value string) (answer []string, found bool, err error) {
	got := s.bridge.call("store", s.area, what, key, value)
	switch state := got.Index(0).String(); state {
	case "ok":
	case "none":
		return nil, false, nil
	case "full":
		return nil, false, keep.ErrFull
	default:
		return nil, false, fmt.Errorf("%w: %s", keep.ErrDenied, state)
	}
	for i := 1; i < got.Length(); i++ {
		answer = append(answer, got.Index(i).String())
	}
	return answer, true, nil
}

// Get is the value of a key.
func (s storage) Get(key string) (string, bool, error) {
	answer, found, err := s.ask("get", key, "")
	if err != nil || !found || len(answer) == 0 {
		return "", false, err
	}
	return answer[0], true, nil
}

// Set keeps a value.
func (s storage) Set(key, value string) error {
	_, _, err := s.ask("set", key, value)
	return err
}

// Remove forgets a key.
func (s storage) Remove(key string) error {
	_, _, err := s.ask("remove", key, "")
	return err
}

// Keys are all keys.
func (s storage) Keys() ([]string, error) {
	answer, _, err := s.ask("keys", "", "")
	return answer, err
}
