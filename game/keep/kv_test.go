package keep

import (
	"errors"
	"fmt"
	"strings"
	"testing"
)

// trouble is a Table that fails when told to.
type trouble struct {
	Table
	get, set error
	tear     int  // bytes of the next Set that arrive, 0 all
	deaf     bool // Set does nothing and says that it did
}

func (k *trouble) Get(key string) (string, bool, error) {
	if k.get != nil {
		return "", false, k.get
	}
	return k.Table.Get(key)
}

func (k *trouble) Set(key, value string) error {
	if k.set != nil || k.deaf {
		return k.set
	}
	if k.tear > 0 {
		value = value[:min(k.tear, len(value))]
	}
	return k.Table.Set(key, value)
}

func at(seconds int64) func() int64 { return func() int64 { return seconds } }

func TestSaveLoadListDelete(t *testing.T) {
	table := Table{"other program": "x", "levelspan/case/_zz/a": "not ours"}
	s := NewKV(table, nil, at(100))
	if _, _, err := s.Load("Marram"); !errors.Is(err, ErrMissing) {
		t.Fatalf("Load of nothing: %v", err)
	}
	stamp := ""
	for i := range 5 {
		text := fmt.Sprintf("version %d", i)
		next, err := s.Save("Marram", []byte(text), stamp)
		if err != nil {
			t.Fatal(err)
		}
		if next == stamp {
			t.Fatal("two versions have one stamp")
		}
		data, loaded, err := s.Load("Marram")
		if err != nil || string(data) != text || loaded != next {
			t.Fatalf("Load gives %q, %q, %v after saving %q, %q", data, loaded, err, text, next)
		}
		stamp = next
	}
	later := NewKV(table, nil, at(200))
	if _, err := later.Save("Ærø / 2", []byte("x"), ""); err != nil {
		t.Fatal(err)
	}
	list, err := s.List()
	if err != nil || len(list) != 2 || list[0] != (Entry{"Ærø / 2", 200, 1}) || list[1] != (Entry{"Marram", 100, 9}) {
		t.Fatalf("List gives %v, %v", list, err)
	}
	if err := s.Delete("Marram", "7-0"); !errors.Is(err, ErrChanged) {
		t.Fatalf("Delete of another version: %v", err)
	}
	if err := s.Delete("Marram", stamp); err != nil {
		t.Fatal(err)
	}
	if list, _ := s.List(); len(list) != 1 || len(table) != 3 {
		t.Errorf("after Delete: %v, table %v", list, table)
	}
	if err := s.Delete("Marram", ""); err != nil {
		t.Errorf("Delete of nothing: %v", err)
	}
}

func TestTwoWindowsDoNotOverwrite(t *testing.T) {
	table := Table{}
	a, b := NewKV(table, nil, at(1)), NewKV(table, nil, at(2))
	stamp, err := a.Save("Marram", []byte("first"), "")
	if err != nil {
		t.Fatal(err)
	}
	if _, err := b.Save("Marram", []byte("mine"), ""); !errors.Is(err, ErrChanged) {
		t.Fatalf("a taken name: %v", err)
	}
	next, err := b.Save("Marram", []byte("theirs"), stamp)
	if err != nil {
		t.Fatal(err)
	}
	if _, err := a.Save("Marram", []byte("mine"), stamp); !errors.Is(err, ErrChanged) {
		t.Fatalf("an old stamp: %v", err)
	}
	if data, _, _ := a.Load("Marram"); string(data) != "theirs" {
		t.Fatalf("a refused save left %q", data)
	}
	if err := b.Delete("Marram", next); err != nil {
		t.Fatal(err)
	}
	if _, err := a.Save("Marram", []byte("mine"), next); !errors.Is(err, ErrChanged) {
		t.Fatalf("a deleted case: %v", err)
	}
}

func TestTornValueGivesThePrevious(t *testing.T) {
	const first, second = "the first version of some length", "the second version"
	whole := len(record{2, 1, second}.encode())
	for tear := 1; tear < whole; tear++ {
		kv := &trouble{Table: Table{}}
		s := NewKV(kv, nil, at(1))
		stamp, err := s.Save("Marram", []byte(first), "")
		if err != nil {
			t.Fatal(err)
		}
		kv.tear = tear
		if _, err := s.Save("Marram", []byte(second), stamp); !errors.Is(err, ErrDenied) {
			t.Fatalf("torn after %d bytes: Save says %v", tear, err)
		}
		kv.tear = 0
		data, loaded, err := s.Load("Marram")
		if err != nil || string(data) != first || loaded != stamp {
			t.Fatalf("torn after %d bytes: Load gives %q, %v", tear, data, err)
		}
		if _, err := s.Save("Marram", []byte(second), stamp); err != nil {
			t.Fatalf("torn after %d bytes: the next Save says %v", tear, err)
		}
	}
}

func TestTroubleIsSaid(t *testing.T) {
	for _, c := range []struct {
		name string
		kv   *trouble
		want error
	}{
		{"full", &trouble{set: fmt.Errorf("%w: quota", ErrFull)}, ErrFull},
		{"denied", &trouble{get: ErrDenied}, ErrDenied},
		{"something else", &trouble{set: errors.New("disk on fire")}, ErrDenied},
		{"deaf", &trouble{deaf: true}, ErrDenied},
	} {
		c.kv.Table = Table{}
		if _, err := NewKV(c.kv, nil, at(1)).Save("Marram", []byte("x"), ""); !errors.Is(err, c.want) {
			t.Errorf("%s: Save says %v", c.name, err)
		}
	}
	if _, err := Memory().Save("x", make([]byte, maxRecord+1), ""); !errors.Is(err, ErrFull) {
		t.Errorf("a text without end: %v", err)
	}
}

func TestCurrentOfTheWindowComesFirst(t *testing.T) {
	shared := Table{}
	a, b := NewKV(shared, Table{}, at(1)), NewKV(shared, Table{}, at(1))
	if _, ok, err := a.Current(); ok || err != nil {
		t.Fatalf("Current at first: %v, %v", ok, err)
	}
	for _, err := range []error{a.SetCurrent("Marram"), b.SetCurrent("Dunlin"), a.SetSession("chart"), b.SetSession("aeroplane")} {
		if err != nil {
			t.Fatal(err)
		}
	}
	for _, c := range []struct {
		s             *Map
		name, session string
	}{{a, "Marram", "chart"}, {b, "Dunlin", "aeroplane"}, {NewKV(shared, Table{}, at(1)), "Dunlin", "aeroplane"}, {NewKV(shared, &trouble{get: ErrDenied}, at(1)), "Dunlin", "aeroplane"}} {
		name, ok, err := c.s.Current()
		session, err2 := c.s.Session()
		if name != c.name || !ok || err != nil || session != c.session || err2 != nil {
			t.Errorf("Current %q, %v, %v; Session %q, %v; want %q, %q", name, ok, err, session, err2, c.name, c.session)
		}
	}
	shared[keyCurrent] = shared[keyCurrent][:20]
	if _, ok, err := NewKV(shared, nil, at(1)).Current(); ok || err != nil {
		t.Error("a torn current case counts")
	}
}

func TestNames(t *testing.T) {
	for _, name := range []string{"", " x", "x ", "a\nb", "\xff", strings.Repeat("x", MaxName+1), strings.Repeat("Ø", 40)} {
		if _, err := Memory().Save(name, []byte("x"), ""); !errors.Is(err, ErrName) {
			t.Errorf("%q is taken as a name: %v", name, err)
		}
	}
	for _, name := range []string{"Marram", "../../etc", "CON", "a/b\\c:d", ".", "<b>&", "Ærø 12", strings.Repeat("x", MaxName)} {
		e := Escape(name)
		if back, ok := Unescape(e); !ok || back != name {
			t.Errorf("Escape(%q) = %q, back %q, %v", name, e, back, ok)
		}
		if strings.ContainsAny(e, "/\\.: ") || e != strings.ToLower(e) {
			t.Errorf("Escape(%q) = %q is no part of a file name everywhere", name, e)
		}
	}
	for text, want := range map[string]string{"  Marram ": "Marram", "a\tb\x00": "a b", "\xff\xfe": "", strings.Repeat("x", 99): strings.Repeat("x", 56)} {
		if got := CleanName(text, 4); got != want {
			t.Errorf("CleanName(%q) = %q", text, got)
		}
	}
}

func FuzzDecode(f *testing.F) {
	f.Add(record{3, 1700000000, "{}\n"}.encode())
	f.Add("levelspan-kept 1 1 2 3 zz\nabc")
	f.Add("levelspan-kept 1 18446744073709551616 -1 0 0\n")
	f.Fuzz(func(t *testing.T, s string) {
		if r, ok := decode(s); ok && r.encode() != s {
			t.Fatalf("%q decodes to what does not encode to it", s)
		}
		r := record{uint64(len(s)), -5, s}
		back, ok := decode(r.encode())
		if !ok || back != r {
			t.Fatal("a record does not come back")
		}
		// Any one byte changed is noticed.
		torn := []byte(r.encode())
		torn[len(s)*7%len(torn)] ^= 1
		if _, ok := decode(string(torn)); ok {
			t.Fatal("a changed byte is not noticed")
		}
	})
}

func FuzzName(f *testing.F) {
	f.Add("Marram 2")
	f.Add("_4darram")
	f.Add("\xff/..")
	f.Fuzz(func(t *testing.T, s string) {
		if name, ok := Unescape(s); ok && (Escape(name) != s || CheckName(name) != nil) {
			t.Fatalf("Unescape(%q) = %q", s, name)
		}
		if name := CleanName(s, 4); name != "" && CheckName(name+" 999") != nil {
			t.Fatalf("CleanName(%q) = %q has no room for a number", s, name)
		}
	})
}
