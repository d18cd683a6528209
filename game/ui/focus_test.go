package ui

import (
	"math"
	"testing"
	"time"
)

func TestTabWalksInOrder(t *testing.T) {
	var r Router
	var got []string
	for i := 0; i < 9; i++ {
		for _, a := range r.Route(nil, []Event{key(KeyTab)}, board(), 0) {
			if a.Kind == Focus {
				got = append(got, a.ID)
			}
		}
	}
	// A group is one stop, its selected member; the disabled button and the region are none; then round again.
	want := []string{"tab/chart", "kind/CAS", "undo", "row/a", "handle/in", "handle/mass", "handle/alt", "field/name", "tab/chart"}
	if len(got) != len(want) {
		t.Fatalf("%q, want %q", got, want)
	}
	for i := range want {
		if got[i] != want[i] {
			t.Fatalf("%q, want %q", got, want)
		}
	}
	if !r.FocusVisible {
		t.Error("no focus ring")
	}
	back := key(KeyTab)
	back.Shift = true
	r.Route(nil, []Event{back, back}, board(), 0)
	if r.Focus != "handle/alt" {
		t.Errorf("two back from the first: %q", r.Focus)
	}
}

func TestArrowsInGroups(t *testing.T) {
	for _, c := range []struct {
		from  string
		key   Key
		focus string
		want  string
	}{
		{"kind/CAS", KeyRight, "kind/TAS", "tap:kind/TAS"},
		{"kind/CAS", KeyUp, "kind/IAS", "tap:kind/IAS"},
		{"kind/TAS", KeyRight, "kind/IAS", "tap:kind/IAS"},
		{"kind/IAS", KeyLeft, "kind/TAS", "tap:kind/TAS"},
		{"tab/chart", KeyEnd, "tab/aeroplane", "tap:tab/aeroplane"},
		{"row/a", KeyRight, "row/a", "press:row/a"},
	} {
		r := Router{Focus: c.from}
		got := brief(r.Route(nil, []Event{key(c.key)}, board(), 0), false)
		if got != c.want || r.Focus != c.focus {
			t.Errorf("%v on %s: %q and focus %q, want %q and %q", c.key, c.from, got, r.Focus, c.want, c.focus)
		}
	}
}

func TestKeysOnASlider(t *testing.T) {
	slide := func(keys ...Key) (v float64) {
		r := Router{Focus: "handle/mass"}
		var events []Event
		for _, k := range keys {
			events = append(events, key(k))
		}
		v = math.NaN()
		for _, a := range r.Route(nil, events, board(), 0) {
			if a.Kind == Slide && a.ID == "handle/mass" {
				v = a.Value
			}
		}
		return v
	}
	for _, c := range []struct {
		keys []Key
		want float64
	}{
		{[]Key{KeyRight}, 761}, {[]Key{KeyUp}, 761}, {[]Key{KeyLeft}, 759}, {[]Key{KeyDownArrow}, 759},
		{[]Key{KeyPageUp}, 770}, {[]Key{KeyPageDown}, 750}, {[]Key{KeyHome}, 480}, {[]Key{KeyEnd}, 850},
		{[]Key{KeyRight, KeyRight, KeyRight}, 763}, // three in one frame, before the slider is drawn anew
		{[]Key{KeyEnd, KeyRight}, 850},
	} {
		if got := slide(c.keys...); got != c.want {
			t.Errorf("%v: %v, want %v", c.keys, got, c.want)
		}
	}
}

func TestKeysAndTheOutside(t *testing.T) {
	for _, c := range []struct {
		name  string
		focus string
		event Event
		want  string
	}{
		{"Enter taps", "undo", key(KeyEnter), "tap:undo"},
		{"Space taps", "kind/IAS", Event{Kind: KeyDown, Key: KeySpace, Rune: ' '}, "tap:kind/IAS"},
		{"Enter on a slider asks for an exact value", "handle/mass", key(KeyEnter), "double:handle/mass"},
		{"Escape passes", "undo", key(KeyEscape), "press:undo"},
		{"a rune passes", "undo", Event{Kind: KeyDown, Rune: '7'}, "press:undo"},
		{"nothing focused", "", key(KeyUndo), "press:"},
		{"arrows with nothing focused", "", key(KeyLeft), "press:"},
		{"Page Down scrolls the list", "", key(KeyPageDown), "scroll:list"},
		{"Page Down in the list scrolls it", "row/a", key(KeyPageDown), "scroll:list"},
		{"Enter in free text passes", "field/name", key(KeyEnter), "press:field/name"},
		{"Home in free text passes", "field/name", key(KeyHome), "press:field/name"},
		{"the page's focus counts", "", Event{Kind: KeyDown, Key: KeyEnter, ID: "undo"}, "focus:undo tap:undo"},
		{"a key on what is gone goes to nobody", "undone", key(KeyEnter), "press:"},
		{"focus moved outside", "", Event{Kind: FocusOn, ID: "handle/alt"}, "focus:handle/alt"},
		{"focus left", "undo", Event{Kind: FocusOn}, "focus:"},
		{"focus on the unknown", "undo", Event{Kind: FocusOn, ID: "nothing"}, ""},
		{"activated", "", Event{Kind: Activate, ID: "undo"}, "tap:undo"},
		{"activated a slider", "", Event{Kind: Activate, ID: "handle/alt"}, "focus:handle/alt double:handle/alt"},
		{"activated the disabled", "", Event{Kind: Activate, ID: "dead"}, ""},
		{"a value set", "", Event{Kind: SetValue, ID: "handle/mass", Value: 9e9}, "slide:handle/mass"},
		{"no number set", "", Event{Kind: SetValue, ID: "handle/mass", Value: math.NaN()}, ""},
		{"a value for a button", "", Event{Kind: SetValue, ID: "undo", Value: 1}, ""},
		{"text set", "", Event{Kind: SetText, ID: "field/name", Text: "x"}, "type:field/name"},
		{"text for a button", "", Event{Kind: SetText, ID: "undo", Text: "x"}, ""},
	} {
		r := Router{Focus: c.focus}
		if got := brief(r.Route(nil, []Event{c.event}, board(), 0), true); got != c.want {
			t.Errorf("%s: %q, want %q", c.name, got, c.want)
		}
	}
	r := Router{}
	got := r.Route(nil, []Event{{Kind: SetValue, ID: "handle/mass", Value: 9e9}}, board(), 0)
	if got[0].Value != 850 {
		t.Errorf("not confined: %v", got[0].Value)
	}
}

// Focus shows when it came by keyboard or from assistive technology, not when a finger brought it.
func TestFocusVisible(t *testing.T) {
	var r Router
	r.Route(nil, []Event{key(KeyTab)}, board(), 0)
	r.Route(nil, []Event{down(1, 500, 100, 0), up(1, 500, 100, 0), {Kind: FocusOn, ID: "handle/mass", Time: 10 * ms}}, board(), 0)
	if r.FocusVisible || r.Focus != "handle/mass" {
		t.Errorf("after a touch: visible %v, focus %q", r.FocusVisible, r.Focus)
	}
	r.Route(nil, []Event{{Kind: FocusOn, ID: "handle/alt", Time: 10 * time.Second}}, board(), 0)
	if !r.FocusVisible {
		t.Error("focus moved by assistive technology does not show")
	}
	// A tapped button leaves the focus where it was.
	r.Route(nil, []Event{down(1, 430, 130, 11*time.Second), up(1, 430, 130, 11*time.Second)}, board(), 0)
	if r.Focus != "handle/alt" {
		t.Errorf("focus %q", r.Focus)
	}
}

func TestFocusReturnsFromALayer(t *testing.T) {
	r := Router{Focus: "handle/alt", FocusVisible: true}
	ok := ctl("ok", RoleButton, 410, 110, 60, 60)
	ok.Modal = 1
	r.Route(nil, nil, append(board(), ok), 0)
	r.Route(nil, []Event{key(KeyTab), key(KeyTab)}, append(board(), ok), 0)
	if r.Focus != "ok" {
		t.Errorf("Tab left the layer: %q", r.Focus)
	}
	r.Route(nil, nil, board(), 0)
	if r.Focus != "handle/alt" {
		t.Errorf("focus %q, want it back", r.Focus)
	}
}
