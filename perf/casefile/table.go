package casefile

// The case as a tree of tables: each object lists its members in the order in which they are written. One tree
// serves reading, writing, checking, the schema and access by path.

type shape uint8

const (
	shapeLeaf     shape = iota // *float64, **float64, *string or *[]float64, by Field.Kind
	shapePart                  // an object that is always there
	shapeMaybe                 // an object or nothing
	shapeList                  // a list of objects
	shapeConstant              // "format" and "version", checked apart
)

// member is one key of an object. The functions take a pointer to the Go struct that holds the member.
type member struct {
	key   string
	shape shape
	field Field // shapeLeaf

	at       func(parent any) any // leaf: pointer to the value; part: pointer to the struct; maybe: the same or nil
	required bool                 // part, list
	object   *object              // part, maybe, list
	help     string               // part, maybe, list

	create func(parent any) any // maybe: make it if it is not there
	remove func(parent any)     // maybe

	count    func(parent any) int        // list
	resize   func(parent any, n int)     // list: n fresh elements
	item     func(parent any, i int) any // list
	min, max int                         // list: how many
	kinds    []string                    // list: kinds that need it
	omit     bool                        // list: not written when it is empty
}

// object is a table of members.
type object struct {
	members []member
	extra   func(any) *string
	index   map[string]int
	kind    int // member that is the "kind", -1 none
}

func newObject[T any](extra func(*T) *string, members ...member) *object {
	o := &object{members: members, extra: func(p any) *string { return extra(p.(*T)) }, index: map[string]int{}, kind: -1}
	for i := range members {
		o.index[members[i].key] = i
		if members[i].key == "kind" {
			o.kind = i
		}
	}
	return o
}

// kindOf is the value of the object's "kind" member, "" where it has none.
func (o *object) kindOf(p any) string {
	if o.kind < 0 {
		return ""
	}
	return *o.members[o.kind].at(p).(*string)
}

func leaf[T, V any](key string, at func(*T) *V, f Field) member {
	switch any((*V)(nil)).(type) {
	case *float64:
		f.Kind = KindNumber
	case **float64:
		f.Kind = KindMaybe
	case *[]float64:
		f.Kind = KindNumbers
	case *string:
		f.Kind = KindText
		if f.Choices != nil {
			f.Kind = KindChoice
		}
	}
	return member{key: key, shape: shapeLeaf, field: f, at: func(p any) any { return at(p.(*T)) }}
}

func part[T, E any](key string, at func(*T) *E, required bool, help string, o *object) member {
	return member{key: key, shape: shapePart, object: o, required: required, help: help,
		at: func(p any) any { return at(p.(*T)) }}
}

func maybe[T, E any](key string, at func(*T) **E, help string, o *object) member {
	return member{key: key, shape: shapeMaybe, object: o, help: help,
		at: func(p any) any {
			if q := *at(p.(*T)); q != nil {
				return q
			}
			return nil
		},
		create: func(p any) any {
			q := at(p.(*T))
			if *q == nil {
				*q = new(E)
			}
			return *q
		},
		remove: func(p any) { *at(p.(*T)) = nil },
	}
}

func list[T, E any](key string, at func(*T) *[]E, min, max int, help string, o *object) member {
	return member{key: key, shape: shapeList, object: o, min: min, max: max, required: min > 0, help: help,
		count: func(p any) int { return len(*at(p.(*T))) },
		item:  func(p any, i int) any { return &(*at(p.(*T)))[i] },
		resize: func(p any, n int) {
			s := at(p.(*T))
			if n == 0 {
				*s = nil
				return
			}
			*s = make([]E, n)
		},
	}
}

// omitted marks a list that is not written when it is empty.
func (m member) omitted() member { m.omit = true; return m }

// Fields lists every key that holds a number, text or choice, in the order of the file. The slice is the caller's.
func Fields() []Field { return appendFields(nil, caseObject, "") }

func appendFields(fields []Field, o *object, prefix string) []Field {
	for i := range o.members {
		m := &o.members[i]
		path := joinPath(prefix, m.key)
		switch m.shape {
		case shapeLeaf:
			f := m.field
			f.Path = path
			fields = append(fields, f)
		case shapePart, shapeMaybe:
			fields = appendFields(fields, m.object, path)
		case shapeList:
			fields = appendFields(fields, m.object, path+"[]")
		}
	}
	return fields
}

func joinPath(prefix, key string) string {
	if prefix == "" {
		return key
	}
	return prefix + "." + key
}
