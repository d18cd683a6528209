package casefile

import (
	"strings"
	"unicode/utf8"
)

// lineWidth is how long the one-line form of a small list or object may be, in bytes, before it is spread over lines.
const lineWidth = 100

// appendCompact writes n without spaces.
func appendCompact(b []byte, n *node) []byte {
	switch n.kind {
	case nodeNull:
		return append(b, "null"...)
	case nodeBool, nodeNumber:
		return append(b, n.text...)
	case nodeString:
		return appendQuoted(b, n.text)
	case nodeArray:
		b = append(b, '[')
		for i := range n.items {
			if i > 0 {
				b = append(b, ',')
			}
			b = appendCompact(b, &n.items[i])
		}
		return append(b, ']')
	}
	b = append(b, '{')
	for i := range n.members {
		if i > 0 {
			b = append(b, ',')
		}
		b = appendQuoted(b, n.members[i].key)
		b = append(b, ':')
		b = appendCompact(b, &n.members[i].value)
	}
	return append(b, '}')
}

// appendPretty writes n with two-space indents. A list or object of plain values alone stands on one line if that is
// at most lineWidth long.
func appendPretty(b []byte, n *node, depth int) []byte {
	if n.kind < nodeArray {
		return appendCompact(b, n)
	}
	if depth > 0 && n.flat() {
		mark := len(b)
		b = appendLine(b, n)
		if len(b)-mark <= lineWidth {
			return b
		}
		b = b[:mark]
	}
	open, end, count := byte('['), byte(']'), len(n.items)
	if n.kind == nodeObject {
		open, end, count = '{', '}', len(n.members)
	}
	b = append(b, open)
	for i := 0; i < count; i++ {
		if i > 0 {
			b = append(b, ',')
		}
		b = indent(b, depth+1)
		if n.kind == nodeArray {
			b = appendPretty(b, &n.items[i], depth+1)
			continue
		}
		b = appendQuoted(b, n.members[i].key)
		b = append(b, ": "...)
		b = appendPretty(b, &n.members[i].value, depth+1)
	}
	if count > 0 {
		b = indent(b, depth)
	}
	return append(b, end)
}

func indent(b []byte, depth int) []byte {
	b = append(b, '\n')
	for i := 0; i < depth; i++ {
		b = append(b, ' ', ' ')
	}
	return b
}

// flat reports whether n holds plain values alone.
func (n *node) flat() bool {
	for i := range n.items {
		if n.items[i].kind >= nodeArray {
			return false
		}
	}
	for i := range n.members {
		if n.members[i].value.kind >= nodeArray {
			return false
		}
	}
	return true
}

// appendLine writes a flat list or object on one line, with a space after each comma and colon.
func appendLine(b []byte, n *node) []byte {
	if n.kind == nodeArray {
		b = append(b, '[')
		for i := range n.items {
			if i > 0 {
				b = append(b, ", "...)
			}
			b = appendCompact(b, &n.items[i])
		}
		return append(b, ']')
	}
	b = append(b, '{')
	for i := range n.members {
		if i > 0 {
			b = append(b, ", "...)
		}
		b = appendQuoted(b, n.members[i].key)
		b = append(b, ": "...)
		b = appendCompact(b, &n.members[i].value)
	}
	return append(b, '}')
}

const hexDigits = "0123456789abcdef"

// appendQuoted writes s as a JSON string: quotes, backslashes and control characters are escaped, everything else
// stands as it is. What is not UTF-8 becomes the replacement character.
func appendQuoted(b []byte, s string) []byte {
	b = append(b, '"')
	for i := 0; i < len(s); {
		c := s[i]
		if c >= utf8.RuneSelf {
			r, size := utf8.DecodeRuneInString(s[i:])
			b = utf8.AppendRune(b, r)
			i += size
			continue
		}
		switch {
		case c == '"' || c == '\\':
			b = append(b, '\\', c)
		case c == '\n':
			b = append(b, `\n`...)
		case c == '\t':
			b = append(b, `\t`...)
		case c == '\r':
			b = append(b, `\r`...)
		case c < ' ':
			b = append(b, `\u00`...)
			b = append(b, hexDigits[c>>4], hexDigits[c&15])
		default:
			b = append(b, c)
		}
		i++
	}
	return append(b, '"')
}

func quote(s string) string { return string(appendQuoted(nil, s)) }

// written is n as it stands in a fault: its compact form, cut to a readable length.
func written(n *node) string {
	s := string(appendCompact(nil, n))
	const most = 60
	if len(s) <= most {
		return s
	}
	s = strings.ToValidUTF8(s[:most], "")
	return s + "…"
}
