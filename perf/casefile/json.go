package casefile

import (
	"strconv"
	"unicode/utf16"
	"unicode/utf8"
)

// Bounds of what is read. They are far above any case that people make, and keep a hostile file cheap.
const (
	maxFileSize = 16 << 20
	maxDepth    = 64
)

// nodeKind is what a JSON value is.
type nodeKind uint8

const (
	nodeNull nodeKind = iota
	nodeBool
	nodeNumber
	nodeString
	nodeArray
	nodeObject
)

// node is one JSON value. Numbers keep the text they were written with; so NaN and Infinity, which JSON does not
// know but some programs write, get as far as a fault with a path.
type node struct {
	kind    nodeKind
	text    string // number: as written; string: decoded; bool: true or false
	items   []node
	members []pair
}

type pair struct {
	key   string
	value node
}

// get is the first member of that key.
func (n *node) get(key string) *node {
	for i := range n.members {
		if n.members[i].key == key {
			return &n.members[i].value
		}
	}
	return nil
}

// duplicates are the keys that stand more than once.
func (n *node) duplicates() []string {
	if len(n.members) < 2 {
		return nil
	}
	var twice []string
	seen := make(map[string]int, len(n.members))
	for i := range n.members {
		k := n.members[i].key
		seen[k]++
		if seen[k] == 2 {
			twice = append(twice, k)
		}
	}
	return twice
}

type parser struct {
	data []byte
	pos  int
}

// parseJSON reads one JSON value and nothing after it. A byte-order mark before it is passed over.
func parseJSON(data []byte) (node, error) {
	p := &parser{data: data}
	if len(data) > maxFileSize {
		return node{}, &SyntaxError{1, 1, "the file is larger than " + strconv.Itoa(maxFileSize>>20) + " MiB"}
	}
	if len(data) >= 3 && data[0] == 0xEF && data[1] == 0xBB && data[2] == 0xBF {
		p.pos = 3
	}
	p.space()
	if p.pos == len(data) {
		return node{}, p.fail("the file is empty")
	}
	var n node
	if err := p.value(&n, 0); err != nil {
		return node{}, err
	}
	p.space()
	if p.pos < len(data) {
		return node{}, p.fail("something follows the end of the case")
	}
	return n, nil
}

func (p *parser) fail(reason string) error {
	line, start := 1, 0
	for i := 0; i < p.pos && i < len(p.data); i++ {
		if p.data[i] == '\n' {
			line++
			start = i + 1
		}
	}
	return &SyntaxError{line, 1 + utf8.RuneCount(p.data[start:p.pos]), reason}
}

// unexpected names what stands where something else is due.
func (p *parser) unexpected(due string) error {
	if p.pos >= len(p.data) {
		return p.fail("the file ends where " + due + " is due; it may have been cut short")
	}
	r, _ := utf8.DecodeRune(p.data[p.pos:])
	return p.fail("found " + strconv.QuoteRune(r) + " where " + due + " is due")
}

func (p *parser) space() {
	for p.pos < len(p.data) {
		switch p.data[p.pos] {
		case ' ', '\t', '\n', '\r':
			p.pos++
		default:
			return
		}
	}
}

func (p *parser) value(n *node, depth int) error {
	if depth > maxDepth {
		return p.fail("nested deeper than " + strconv.Itoa(maxDepth) + " levels")
	}
	if p.pos >= len(p.data) {
		return p.unexpected("a value")
	}
	switch c := p.data[p.pos]; {
	case c == '{':
		return p.object(n, depth)
	case c == '[':
		return p.array(n, depth)
	case c == '"':
		n.kind = nodeString
		return p.str(&n.text)
	case c == '-' || c >= '0' && c <= '9':
		n.kind = nodeNumber
		return p.number(n)
	}
	for _, w := range [...]struct {
		text string
		kind nodeKind
	}{{"null", nodeNull}, {"true", nodeBool}, {"false", nodeBool}, {"NaN", nodeNumber}, {"Infinity", nodeNumber}} {
		if p.word(w.text) {
			n.kind, n.text = w.kind, w.text
			return nil
		}
	}
	return p.unexpected("a value")
}

// word passes over w if it stands here.
func (p *parser) word(w string) bool {
	if len(p.data)-p.pos >= len(w) && string(p.data[p.pos:p.pos+len(w)]) == w {
		p.pos += len(w)
		return true
	}
	return false
}

func (p *parser) digits() int {
	n := 0
	for p.pos < len(p.data) && p.data[p.pos] >= '0' && p.data[p.pos] <= '9' {
		p.pos++
		n++
	}
	return n
}

func (p *parser) number(n *node) error {
	start := p.pos
	if p.data[p.pos] == '-' {
		p.pos++
		if p.word("Infinity") {
			n.text = "-Infinity"
			return nil
		}
	}
	zero := p.pos < len(p.data) && p.data[p.pos] == '0'
	if k := p.digits(); k == 0 {
		return p.unexpected("a digit")
	} else if zero && k > 1 {
		p.pos = start
		return p.fail("a number begins with a needless 0")
	}
	if p.pos < len(p.data) && p.data[p.pos] == '.' {
		p.pos++
		if p.digits() == 0 {
			return p.unexpected("a digit")
		}
	}
	if p.pos < len(p.data) && (p.data[p.pos] == 'e' || p.data[p.pos] == 'E') {
		p.pos++
		if p.pos < len(p.data) && (p.data[p.pos] == '+' || p.data[p.pos] == '-') {
			p.pos++
		}
		if p.digits() == 0 {
			return p.unexpected("a digit")
		}
	}
	n.text = string(p.data[start:p.pos])
	return nil
}

func (p *parser) str(dst *string) error {
	p.pos++ // the quote
	start := p.pos
	for p.pos < len(p.data) { // most strings have nothing to decode
		c := p.data[p.pos]
		if c == '"' {
			*dst = string(p.data[start:p.pos])
			p.pos++
			return nil
		}
		if c < ' ' || c == '\\' || c >= utf8.RuneSelf {
			break
		}
		p.pos++
	}
	b := append([]byte(nil), p.data[start:p.pos]...)
	for p.pos < len(p.data) {
		switch c := p.data[p.pos]; {
		case c == '"':
			p.pos++
			*dst = string(b)
			return nil
		case c < ' ':
			return p.fail("a text holds a line end or control character; it may lack its closing quote")
		case c == '\\':
			var err error
			if b, err = p.escape(b); err != nil {
				return err
			}
		case c < utf8.RuneSelf:
			b = append(b, c)
			p.pos++
		default:
			r, size := utf8.DecodeRune(p.data[p.pos:])
			if r == utf8.RuneError && size == 1 {
				return p.fail("the text is not UTF-8")
			}
			b = append(b, p.data[p.pos:p.pos+size]...)
			p.pos += size
		}
	}
	return p.unexpected("the closing quote of a text")
}

func (p *parser) escape(b []byte) ([]byte, error) {
	p.pos++
	if p.pos >= len(p.data) {
		return b, p.unexpected("the rest of an escape")
	}
	c := p.data[p.pos]
	switch c {
	case '"', '\\', '/':
	case 'b':
		c = '\b'
	case 'f':
		c = '\f'
	case 'n':
		c = '\n'
	case 'r':
		c = '\r'
	case 't':
		c = '\t'
	case 'u':
		p.pos++
		r, ok := p.hex4()
		if ok && utf16.IsSurrogate(r) {
			low := rune(0)
			if ok = p.word(`\u`); ok {
				low, ok = p.hex4()
			}
			r = utf16.DecodeRune(r, low)
			ok = ok && r != utf8.RuneError
		}
		if !ok {
			return b, p.fail(`a \u escape in a text is no character`)
		}
		return utf8.AppendRune(b, r), nil
	default:
		return b, p.fail("a backslash in a text is followed by " + strconv.QuoteRune(rune(c)))
	}
	p.pos++
	return append(b, c), nil
}

func (p *parser) hex4() (rune, bool) {
	if len(p.data)-p.pos < 4 {
		return 0, false
	}
	x, err := strconv.ParseUint(string(p.data[p.pos:p.pos+4]), 16, 32)
	if err != nil {
		return 0, false
	}
	p.pos += 4
	return rune(x), true
}

func (p *parser) array(n *node, depth int) error {
	n.kind = nodeArray
	p.pos++
	p.space()
	if p.pos < len(p.data) && p.data[p.pos] == ']' {
		p.pos++
		return nil
	}
	for {
		var item node
		p.space()
		if err := p.value(&item, depth+1); err != nil {
			return err
		}
		n.items = append(n.items, item)
		p.space()
		if p.pos < len(p.data) && p.data[p.pos] == ',' {
			p.pos++
			continue
		}
		if p.pos < len(p.data) && p.data[p.pos] == ']' {
			p.pos++
			return nil
		}
		return p.unexpected("a comma or the end of a list")
	}
}

func (p *parser) object(n *node, depth int) error {
	n.kind = nodeObject
	p.pos++
	p.space()
	if p.pos < len(p.data) && p.data[p.pos] == '}' {
		p.pos++
		return nil
	}
	for {
		var m pair
		p.space()
		if p.pos >= len(p.data) || p.data[p.pos] != '"' {
			return p.unexpected("a key in quotes")
		}
		if err := p.str(&m.key); err != nil {
			return err
		}
		p.space()
		if p.pos >= len(p.data) || p.data[p.pos] != ':' {
			return p.unexpected("a colon after a key")
		}
		p.pos++
		p.space()
		if err := p.value(&m.value, depth+1); err != nil {
			return err
		}
		n.members = append(n.members, m)
		p.space()
		if p.pos < len(p.data) && p.data[p.pos] == ',' {
			p.pos++
			continue
		}
		if p.pos < len(p.data) && p.data[p.pos] == '}' {
			p.pos++
			return nil
		}
		return p.unexpected("a comma or the end of an object")
	}
}
