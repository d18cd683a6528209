package keep

import (
	"hash/crc64"
	"strconv"
	"strings"
)

// A record is one version of a text as it is stored: a line, and the text.
//
//	levelspan-kept 1 COUNT CHANGED SIZE CRC
//
// COUNT rises by one with each version, CHANGED is seconds since 1970, SIZE the text's bytes, CRC the CRC-64 (ECMA) of the
// line up to it and of the text. A record that was cut short, or whose storage was torn, does not decode.
type record struct {
	count   uint64
	changed int64
	data    string
}

const (
	recordMark = "levelspan-kept 1 "
	maxRecord  = 8 << 20 // bytes of a text
)

var crcTable = crc64.MakeTable(crc64.ECMA)

func checksum(head, data string) uint64 {
	sum := crc64.Update(0, crcTable, []byte(head))
	return crc64.Update(sum, crcTable, []byte(data))
}

func (r record) head() string {
	return recordMark + strconv.FormatUint(r.count, 10) + " " + strconv.FormatInt(r.changed, 10) + " " + strconv.Itoa(len(r.data)) + " "
}

// encode is the record as stored.
func (r record) encode() string {
	head := r.head()
	return head + strconv.FormatUint(checksum(head, r.data), 16) + "\n" + r.data
}

// stamp tells this version from any other.
func (r record) stamp() string {
	return strconv.FormatUint(r.count, 10) + "-" + strconv.FormatUint(checksum("", r.data), 16)
}

// decode reads a record; false for anything that encode did not write.
func decode(s string) (record, bool) {
	line, data, ok := strings.Cut(s, "\n")
	if !ok || len(line) > 160 || len(data) > maxRecord || !strings.HasPrefix(line, recordMark) {
		return record{}, false
	}
	part := strings.Split(line[len(recordMark):], " ")
	if len(part) != 4 {
		return record{}, false
	}
	count, err1 := strconv.ParseUint(part[0], 10, 64)
	changed, err2 := strconv.ParseInt(part[1], 10, 64)
	r := record{count, changed, data}
	if err1 != nil || err2 != nil || r.encode() != s {
		return record{}, false
	}
	return r, true
}
