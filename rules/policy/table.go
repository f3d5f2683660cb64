package policy

import (
	"fmt"
	"maps"
	"math"
	"slices"
	"strings"
	"time"

	"dextral/rules"
)

// table reads one TOML table strictly: it remembers which keys it was asked
// for, so that close can report every other one.
type table struct {
	r    *reader
	name string // as messages call it: [defaults], [[claim]]; "" for the top of the file
	vals map[string]any
	node *node
	keys []string // asked for
}

// at is the place of the table's header, or of its inline value.
func (t *table) at() rules.Place { return t.r.lines.at(t.node.value) }

// keyAt and valueAt are the places of a key and of its value.
func (t *table) keyAt(key string) rules.Place   { return t.r.lines.at(t.node.child(key).key) }
func (t *table) valueAt(key string) rules.Place { return t.r.lines.at(t.node.child(key).value) }

// pairAt is the place from a key to the end of its value.
func (t *table) pairAt(key string) rules.Place { return t.keyAt(key).To(t.valueAt(key)) }

// source is key = value as it stands in the file, on one line.
func (t *table) source(key string) string {
	return key + " = " + strings.Join(strings.Fields(t.r.lines.source(t.node.child(key).value)), " ")
}

// within says where in the file a message speaks of.
func (t *table) within() string {
	if t.name == "" {
		return ""
	}
	return " in " + t.name
}

func (t *table) get(key string) (any, bool) {
	t.keys = append(t.keys, key)
	v, ok := t.vals[key]
	return v, ok
}

func (t *table) wrong(key, want string) {
	t.r.fail(t.valueAt(key), "%s%s must be %s, not %s", key, t.within(), want, kind(t.vals[key]))
}

// text reads a string that is not empty.
func (t *table) text(key string) (string, bool) {
	v, ok := t.get(key)
	if !ok {
		return "", false
	}
	s, ok := v.(string)
	switch {
	case !ok:
		t.wrong(key, "a string")
	case strings.TrimSpace(s) == "":
		t.r.fail(t.valueAt(key), "%s%s is empty", key, t.within())
		ok = false
	}
	return s, ok
}

// located is a string and its place.
type located struct {
	text string
	at   rules.Place
}

// texts reads a string or an array of strings; it needs at least one.
func (t *table) texts(key string) []located {
	const want = "a string or an array of strings"
	v, ok := t.get(key)
	if !ok {
		return nil
	}
	n := t.node.child(key)
	if s, ok := v.(string); ok {
		return []located{{s, t.valueAt(key)}}
	}
	list, ok := v.([]any)
	if !ok {
		t.wrong(key, want)
		return nil
	}
	var all []located
	for i, v := range list {
		at := t.r.lines.at(n.element(i).value)
		s, ok := v.(string)
		if !ok {
			t.r.fail(at, "%s%s must be %s; this element is %s", key, t.within(), want, kind(v))
			continue
		}
		all = append(all, located{s, at})
	}
	if len(list) == 0 {
		t.r.fail(t.valueAt(key), "%s%s is empty; leave it out, or write %s", key, t.within(), want)
	}
	return all
}

// number reads an integer or a float.
func (t *table) number(key string) (float64, bool) {
	v, ok := t.get(key)
	if !ok {
		return 0, false
	}
	switch x := v.(type) {
	case int64:
		return float64(x), true
	case float64:
		return x, true
	}
	t.wrong(key, "a number")
	return 0, false
}

// interval reads an array of two numbers, the lower one first.
func (t *table) interval(key string) (low, high float64, ok bool) {
	v, ok := t.get(key)
	if !ok {
		return 0, 0, false
	}
	const want = "an array of two numbers, the lower one first, such as [-180, 180]"
	list, ok := v.([]any)
	if !ok {
		t.wrong(key, want)
		return 0, 0, false
	}
	var ends []float64
	for _, v := range list {
		switch x := v.(type) {
		case int64:
			ends = append(ends, float64(x))
		case float64:
			ends = append(ends, x)
		}
	}
	if len(list) != 2 || len(ends) != 2 || !(ends[0] < ends[1]) || math.IsInf(ends[1]-ends[0], 0) {
		t.r.fail(t.valueAt(key), "%s%s must be %s", key, t.within(), want)
		return 0, 0, false
	}
	return ends[0], ends[1], true
}

// truth reads a boolean.
func (t *table) truth(key string) (is, ok bool) {
	v, ok := t.get(key)
	if !ok {
		return false, false
	}
	is, ok = v.(bool)
	if !ok {
		t.wrong(key, "true or false")
	}
	return is, ok
}

// day reads a local date and returns it as YYYY-MM-DD.
func (t *table) day(key string) (string, bool) {
	v, ok := t.get(key)
	if !ok {
		return "", false
	}
	const want = "a date such as 2031-03-31"
	written := t.r.lines.source(t.node.child(key).value)
	switch v := v.(type) {
	case time.Time:
		if written == v.Format(time.DateOnly) {
			return written, true
		}
		t.r.fail(t.valueAt(key), "%s%s must be %s, without a time", key, t.within(), want)
	case string:
		t.r.fail(t.valueAt(key), "%s%s must be %s, without quotes", key, t.within(), want)
	default:
		t.wrong(key, want)
	}
	return "", false
}

// one reads a table.
func (t *table) one(key string) *table {
	v, ok := t.get(key)
	if !ok {
		return nil
	}
	vals, ok := v.(map[string]any)
	if !ok {
		t.wrong(key, "a table: ["+key+"]")
		return nil
	}
	return &table{r: t.r, name: "[" + key + "]", vals: vals, node: t.node.child(key)}
}

// many reads an array of tables.
func (t *table) many(key string) []*table {
	v, ok := t.get(key)
	if !ok {
		return nil
	}
	name := "[[" + key + "]]"
	var list []any
	switch v := v.(type) {
	case []map[string]any:
		for _, m := range v {
			list = append(list, m)
		}
	case []any:
		list = v
	default:
		t.wrong(key, "an array of tables: "+name)
		return nil
	}
	var all []*table
	for i, v := range list {
		n := t.node.child(key).element(i)
		vals, ok := v.(map[string]any)
		if !ok {
			t.r.fail(t.r.lines.at(n.value), "%s must be an array of tables: %s; this element is %s", key, name, kind(v))
			continue
		}
		all = append(all, &table{r: t.r, name: name, vals: vals, node: n})
	}
	return all
}

// close reports the keys that nobody asked for, and those of need that are
// not there.
func (t *table) close(need ...string) {
	allowed := slices.Clone(t.keys)
	slices.Sort(allowed)
	for _, key := range slices.Sorted(maps.Keys(t.vals)) {
		if slices.Contains(allowed, key) {
			continue
		}
		hint := ""
		if near := nearest(key, allowed); near != "" {
			hint = fmt.Sprintf("; did you mean %q?", near)
		}
		t.r.fail(t.keyAt(key), "unknown key %q%s%s (allowed: %s)", key, t.within(), hint, strings.Join(allowed, ", "))
	}
	var missing []string
	for _, key := range need {
		if _, ok := t.vals[key]; !ok {
			missing = append(missing, key)
		}
	}
	if len(missing) > 0 {
		t.r.fail(t.at(), "%s lacks %s", t.name, strings.Join(missing, ", "))
	}
}

// kind names the type of a decoded value, with its article.
func kind(v any) string {
	switch v.(type) {
	case string:
		return "a string"
	case int64:
		return "an integer"
	case float64:
		return "a float"
	case bool:
		return "a boolean"
	case time.Time:
		return "a date or time"
	case []any, []map[string]any:
		return "an array"
	case map[string]any:
		return "a table"
	}
	return fmt.Sprintf("%T", v)
}
