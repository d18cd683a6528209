package casefile

import (
	"bytes"
	"compress/flate"
	"encoding/base64"
	"errors"
	"hash/crc32"
	"strings"
)

// A fragment is the letter A, then base64url without padding of: deflate of the canonical form, and the CRC-32 (IEEE) of
// the canonical form in 4 bytes, highest first.
const (
	fragmentLetter  = 'A'
	maxFragmentCase = 1 << 20 // bytes of the canonical form
	maxFragment     = 1 << 20 // characters
)

// FragmentError says why a share link's fragment cannot be read.
type FragmentError struct{ Reason string }

// Error is the reason.
func (e *FragmentError) Error() string { return "share link: " + e.Reason }

// Fragment is the share link's fragment. It is "" for a case whose canonical form is larger than 1 MiB, which no link
// can carry.
func (c *Case) Fragment() string {
	text := c.Marshal()
	if len(text) > maxFragmentCase {
		return ""
	}
	var packed bytes.Buffer
	w, err := flate.NewWriter(&packed, flate.BestCompression)
	if err != nil {
		panic(err) // the level is a constant
	}
	_, _ = w.Write(text) // a bytes.Buffer takes everything
	_ = w.Close()
	sum := crc32.ChecksumIEEE(text)
	packed.Write([]byte{byte(sum >> 24), byte(sum >> 16), byte(sum >> 8), byte(sum)})
	return string(fragmentLetter) + base64.RawURLEncoding.EncodeToString(packed.Bytes())
}

// ParseFragment reads a fragment in bounded memory. A "#", "#case=" or whole address before it is allowed, and spaces
// and line ends that a message may have put into it are passed over. The error is a *FragmentError, a *VersionError or
// that of Parse.
func ParseFragment(s string) (*Case, []Warning, error) {
	fail := func(reason string) (*Case, []Warning, error) { return nil, nil, &FragmentError{reason} }
	if len(s) > maxFragment {
		return fail("it is longer than any link that levelspan makes")
	}
	if i := strings.LastIndexByte(s, '#'); i >= 0 {
		s = s[i+1:]
	}
	s = strings.TrimPrefix(strings.TrimSpace(s), "case=")
	s = strings.Map(func(r rune) rune {
		if r == ' ' || r == '\n' || r == '\r' || r == '\t' {
			return -1
		}
		return r
	}, s)
	if s == "" {
		return fail("it is empty")
	}
	if s[0] != fragmentLetter {
		if s[0] > fragmentLetter && s[0] <= 'Z' {
			return nil, nil, &VersionError{"fragment " + s[:1], formatVersion}
		}
		return fail("it does not begin as a link of levelspan does")
	}
	s = s[1:]
	whole := s
	if len(s)%4 == 1 {
		s = s[:len(s)-1]
	}
	packed, err := base64.RawURLEncoding.DecodeString(s)
	if err != nil {
		return fail("it holds characters that no link has; copy it again")
	}
	text, reason := unpack(packed)
	if reason != "" {
		return fail(reason)
	}
	if base64.RawURLEncoding.EncodeToString(packed) != whole {
		return fail(damaged)
	}
	return Parse(text)
}

const (
	cutShort = "it has been cut short; copy the whole of it"
	tooMuch  = "it unpacks to more than 1 MiB"
	damaged  = "it has been damaged on the way; copy it again"
)

// unpack inflates and checks; reason is "" when all is well.
func unpack(packed []byte) (text []byte, reason string) {
	in := bytes.NewReader(packed)
	r := flate.NewReader(in)
	buffer := make([]byte, 0, min(maxFragmentCase+1, 16*len(packed)+512))
	for {
		if len(buffer) > maxFragmentCase {
			return nil, tooMuch
		}
		if len(buffer) == cap(buffer) {
			buffer = append(buffer, 0)[:len(buffer)]
		}
		n, err := r.Read(buffer[len(buffer):min(cap(buffer), maxFragmentCase+1)])
		buffer = buffer[:len(buffer)+n]
		if err == nil {
			continue
		}
		if len(buffer) > maxFragmentCase {
			return nil, tooMuch
		}
		var corrupt flate.CorruptInputError
		switch left := in.Len(); {
		case errors.As(err, &corrupt):
			return nil, damaged
		case left < 4:
			return nil, cutShort
		case left > 4:
			return nil, "something follows its end; copy it alone"
		}
		tail := packed[len(packed)-4:]
		sum := uint32(tail[0])<<24 | uint32(tail[1])<<16 | uint32(tail[2])<<8 | uint32(tail[3])
		if sum != crc32.ChecksumIEEE(buffer) {
			return nil, damaged
		}
		return buffer, ""
	}
}
