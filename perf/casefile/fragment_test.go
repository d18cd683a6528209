package casefile

import (
	"bytes"
	"compress/flate"
	"encoding/base64"
	"errors"
	"hash/crc32"
	"math/rand/v2"
	"runtime"
	"strings"
	"testing"
)

func TestFragmentRoundTrip(t *testing.T) {
	c := sample()
	s := c.Fragment()
	if strings.Trim(s, "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789-_") != "" {
		t.Errorf("characters that an address may not hold: %s", s)
	}
	for _, link := range []string{s, "#" + s, "#case=" + s, "case=" + s, "https://example.org/a#b/levelspan.html#case=" + s, "  #case=" + s + "\n", "#case=" + s[:70] + "\r\n" + s[70:]} {
		d, warnings, err := ParseFragment(link)
		if err != nil || len(warnings) > 0 {
			t.Errorf("%.60s: %v %v", link, err, warnings)
			continue
		}
		if !bytes.Equal(c.Marshal(), d.Marshal()) || d.Fragment() != s {
			t.Errorf("%.60s: another case came back", link)
		}
	}
}

func TestEveryCutSaysThatItIsOne(t *testing.T) {
	s := sample().Fragment()
	for n := 2; n < len(s); n++ {
		_, _, err := ParseFragment(s[:n])
		var e *FragmentError
		if !errors.As(err, &e) || !strings.Contains(e.Reason, "cut short") {
			t.Fatalf("cut to %d of %d characters: %v", n, len(s), err)
		}
	}
}

func TestEveryChangedCharacterIsNoticed(t *testing.T) {
	s := sample().Fragment()
	const alphabet = "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789-_"
	r := rand.New(rand.NewPCG(7, 7))
	for i := range s {
		other := alphabet[r.IntN(len(alphabet))]
		if other == s[i] {
			continue
		}
		if _, _, err := ParseFragment(s[:i] + string(other) + s[i+1:]); err == nil {
			t.Errorf("character %d changed from %c to %c and nothing was said", i, s[i], other)
		}
	}
}

// pack makes a fragment of any bytes.
func pack(text []byte, after string) string {
	var b bytes.Buffer
	w, _ := flate.NewWriter(&b, 9)
	_, _ = w.Write(text)
	_ = w.Close()
	sum := crc32.ChecksumIEEE(text)
	b.Write([]byte{byte(sum >> 24), byte(sum >> 16), byte(sum >> 8), byte(sum)})
	b.WriteString(after)
	return "A" + base64.RawURLEncoding.EncodeToString(b.Bytes())
}

func TestHostileFragments(t *testing.T) {
	whole := sample().Marshal()
	for _, x := range []struct{ name, link, reason string }{
		{"nothing", "", "empty"},
		{"nothing after the mark", "#case=", "empty"},
		{"another page's", "#section-2", "does not begin"},
		{"not base64", "A%%%%", "characters"},
		{"padding", sample().Fragment() + "=", "damaged"},
		{"bomb", pack(make([]byte, 64<<20), ""), "1 MiB"},
		{"one byte too many", pack(make([]byte, maxFragmentCase+1), ""), "1 MiB"},
		{"something after", pack(whole, "x"), "follows its end"},
		{"a link after", pack(whole, string(whole)), "follows its end"},
		{"random", "A" + strings.Repeat("_7Qx", 50), "damaged"},
		{"too long", strings.Repeat("A", maxFragment+1), "longer"},
		{"letter alone", "A", "cut short"},
	} {
		_, _, err := ParseFragment(x.link)
		var e *FragmentError
		if !errors.As(err, &e) || !strings.Contains(e.Reason, x.reason) {
			t.Errorf("%s: %v, want %q", x.name, err, x.reason)
		}
	}
	var newer *VersionError
	if _, _, err := ParseFragment("#case=B" + sample().Fragment()[1:]); !errors.As(err, &newer) {
		t.Errorf("a newer fragment: %v", err)
	}
	var syntax *SyntaxError
	if _, _, err := ParseFragment(pack([]byte("{"), "")); !errors.As(err, &syntax) {
		t.Errorf("no JSON inside: %v", err)
	}
	if _, _, err := ParseFragment(pack([]byte(`{"format":"levelspan-case","version":1}`), "")); len(faultsOf(err)) == 0 {
		t.Errorf("no case inside: %v", err)
	}
}

// A bomb that would unpack to 64 MiB takes little more than the 1 MiB that is let through.
func TestBombIsRefusedInBoundedMemory(t *testing.T) {
	bomb := pack(make([]byte, 64<<20), "")
	var before, after runtime.MemStats
	runtime.ReadMemStats(&before)
	if _, _, err := ParseFragment(bomb); err == nil {
		t.Fatal("taken")
	}
	runtime.ReadMemStats(&after)
	if used := after.TotalAlloc - before.TotalAlloc; used > 6<<20 {
		t.Errorf("%d bytes were allocated", used)
	}
}

func TestCaseTooLargeForALink(t *testing.T) {
	c := sample()
	for len(c.Runs) < maxRuns/2 {
		c.Runs = append(c.Runs, c.Runs[:5]...)
	}
	if s := c.Fragment(); s != "" {
		t.Errorf("a link of %d characters", len(s))
	}
	if _, _, err := Parse(c.Marshal()); err != nil {
		t.Errorf("as a file it is sound: %.200v", err)
	}
}

func FuzzFragment(f *testing.F) {
	f.Add(sample().Fragment())
	f.Add("#case=" + sample().Fragment()[:40])
	f.Add(pack([]byte(smallest), ""))
	f.Add(pack(make([]byte, 2<<20), ""))
	f.Add("A")
	f.Fuzz(func(t *testing.T, s string) {
		c, _, err := ParseFragment(s)
		if err != nil {
			if err.Error() == "" {
				t.Error("an error without a reason")
			}
			return
		}
		d, _, err := ParseFragment(c.Fragment())
		if err != nil || !bytes.Equal(c.Marshal(), d.Marshal()) {
			t.Errorf("its own fragment: %v", err)
		}
	})
}

func FuzzSetNumber(f *testing.F) {
	f.Add("today.mass_kg", 700.0)
	f.Add("aeroplane.configurations[1].cl_max", 9.0)
	f.Add("aeroplane.propeller.advance_ratio[1]", 1.0)
	f.Add("aeroplane.fuel.usable_kg", 0.0)
	f.Add("runs[4].legs[2].track_deg", -90.0)
	f.Add("a[", 0.0)
	f.Fuzz(func(t *testing.T, path string, x float64) {
		c := sample()
		before := c.Marshal()
		err := c.SetNumber(path, x)
		if err != nil {
			var fault *Fault
			if !errors.As(err, &fault) || fault.Allowed == "" {
				t.Errorf("%q = %v: %v is no fault", path, x, err)
			}
			if !bytes.Equal(before, c.Marshal()) {
				t.Errorf("%q = %v was refused and changed the case", path, x)
			}
		} else if got, set := c.Number(path); !set || got != x {
			t.Errorf("%q = %v: now %v, %v", path, x, got, set)
		}
		if err := c.Validate(); err != nil {
			t.Errorf("%q = %v left the case unphysical: %v", path, x, err)
		}
		_ = c.ClearNumber(path)
		if err := c.Validate(); err != nil {
			t.Errorf("clearing %q left the case unphysical: %v", path, err)
		}
	})
}

func BenchmarkFragment(b *testing.B) {
	c := sample()
	for b.Loop() {
		if c.Fragment() == "" {
			b.Fatal("nothing")
		}
	}
}

func BenchmarkParseFragment(b *testing.B) {
	s := sample().Fragment()
	b.ReportAllocs()
	for b.Loop() {
		if _, _, err := ParseFragment(s); err != nil {
			b.Fatal(err)
		}
	}
}
