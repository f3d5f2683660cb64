package ulog

import (
	"fmt"
	"strconv"
	"strings"
)

// kind is a basic type.
type kind uint8

const (
	none kind = iota
	int8s
	uint8s
	int16s
	uint16s
	int32s
	uint32s
	int64s
	uint64s
	floats
	doubles
	bools
	chars
)

var kinds = map[string]kind{"int8_t": int8s, "uint8_t": uint8s, "int16_t": int16s, "uint16_t": uint16s, "int32_t": int32s, "uint32_t": uint32s,
	"int64_t": int64s, "uint64_t": uint64s, "float": floats, "double": doubles, "bool": bools, "char": chars}

var sizes = [...]int{none: 0, int8s: 1, uint8s: 1, int16s: 2, uint16s: 2, int32s: 4, uint32s: 4, int64s: 8, uint64s: 8, floats: 4, doubles: 8, bools: 1, chars: 1}

// Bounds on what a file may define, against files made to exhaust memory. A
// message of data is 65,535 bytes at most.
const (
	maxFormats  = 4096
	maxDepth    = 16      // of nested types
	maxFields   = 2048    // of a topic
	maxAll      = 1 << 16 // of all topics together
	maxItems    = 16      // items of an array that are fields; longer ones are data of another kind
	maxName     = 256     // bytes of a field's name with those it is nested in
	maxData     = 1<<16 - 1
	maxSubjects = 4096 // subscriptions
)

// member is a field of a definition.
type member struct {
	kind, name string
	count      int // of an array; 0 for a single value
}

// definition takes a format message apart: name:type field;type[n] field;
func definition(text string) (name string, members []member, err error) {
	name, list, ok := strings.Cut(text, ":")
	if !ok || name == "" {
		return "", nil, fmt.Errorf("a format definition has no name")
	}
	for _, f := range strings.Split(strings.TrimSuffix(list, ";"), ";") {
		of, field, ok := strings.Cut(f, " ")
		m := member{kind: of, name: field}
		if base, rest, array := strings.Cut(of, "["); array && ok {
			m.kind = base
			m.count, err = strconv.Atoi(strings.TrimSuffix(rest, "]"))
			ok = err == nil && m.count > 0
		}
		if !ok || m.kind == "" || m.name == "" {
			return "", nil, fmt.Errorf("the format %.60q has the field %.60q, which is not of the form: type name", name, f)
		}
		members = append(members, m)
	}
	return name, members, nil
}

// flattener lays a definition out as fields with offsets.
type flattener struct {
	formats map[string][]member
	fields  []Field
	at      int
	padding int // bytes of padding at the very end, which are not logged
}

func (f *flattener) add(of, prefix string, depth int) error {
	members, ok := f.formats[of]
	switch {
	case !ok:
		return fmt.Errorf("the type %.60q is not defined", of)
	case depth > maxDepth:
		return fmt.Errorf("its types are nested more than %d deep", maxDepth)
	}
	for _, m := range members {
		for i := range max(1, m.count) {
			if err := f.item(m, i, prefix, depth); err != nil {
				return err
			}
			if f.at > maxData {
				return fmt.Errorf("it is longer than the %d bytes of a message", maxData)
			}
		}
	}
	return nil
}

func (f *flattener) item(m member, i int, prefix string, depth int) error {
	name := prefix + m.name
	if m.count > 0 {
		name += "[" + strconv.Itoa(i) + "]"
	}
	k := kinds[m.kind]
	if k == none {
		if len(name) > maxName {
			return fmt.Errorf("the name of a field is longer than %d bytes", maxName)
		}
		return f.add(m.kind, name+".", depth+1)
	}
	if strings.HasPrefix(m.name, "_padding") {
		f.at += sizes[k]
		f.padding += sizes[k]
		return nil
	}
	if k != chars && m.count <= maxItems && len(name) <= maxName && len(f.fields) < maxFields {
		f.fields = append(f.fields, Field{Name: name, kind: k, offset: f.at})
	}
	f.at += sizes[k]
	f.padding = 0
	return nil
}
