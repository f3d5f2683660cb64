package ulog

import (
	"bufio"
	"bytes"
	"encoding/binary"
	"errors"
	"fmt"
	"io"
	"slices"
	"strings"
)

// MaxDamage is the number of damaged places of which Report keeps the particulars.
const MaxDamage = 8

// Report is what a pass found out besides the data.
type Report struct {
	Damaged  int64 // places at which the file is damaged
	First    []Damage
	Dropouts int64 // gaps that the writer itself reports
	Lost     int64 // milliseconds that these took
}

// Damage is a place at which the file cannot be read.
type Damage struct {
	Offset int64 // byte, from 0
	Reason string
}

func (r *Report) damage(at int64, format string, args ...any) {
	if len(r.First) < MaxDamage {
		r.First = append(r.First, Damage{at, fmt.Sprintf(format, args...)})
	}
	r.Damaged++
}

// Read reads a log to its end. Open is asked about each topic and returns what is
// to be done with its messages, whose bytes it must not keep, or nil. The error is
// one of the reader or says why the file is no ULog that can be read; what was
// handed over before it holds.
func Read(r io.Reader, open func(*Topic) func(data []byte)) (Report, error) {
	l := &log{in: bufio.NewReaderSize(r, 1<<17), open: open, formats: map[string][]member{}, layouts: map[string]*Topic{}, topics: map[uint16]*Topic{}, nth: map[string]int{}}
	err := l.read()
	return l.report, err
}

// log is a log that is being read.
type log struct {
	in     *bufio.Reader
	open   func(*Topic) func([]byte)
	at     int64
	report Report

	system   string
	formats  map[string][]member
	layouts  map[string]*Topic // by format, without what belongs to a subscription
	fields   int               // of all layouts
	topics   map[uint16]*Topic
	nth      map[string]int
	appended []int64 // offsets at which a later writer went on
}

const headerSize = 16

func (l *log) read() error {
	head, err := l.in.Peek(headerSize)
	switch {
	case len(head) < headerSize && (err == io.EOF || err == nil):
		l.report.damage(0, "the file ends in its header")
		return nil
	case err != nil:
		return err
	case !bytes.HasPrefix(head, []byte(Magic)):
		return errors.New("does not begin as a ULog does")
	}
	l.skip(headerSize)
	for {
		if err := l.message(); err != nil {
			if err == io.EOF {
				return nil
			}
			return err
		}
	}
}

// skip passes over bytes that were peeked.
func (l *log) skip(n int) {
	n, _ = l.in.Discard(n)
	l.at += int64(n)
}

// message reads one message. Its error is io.EOF at the end.
func (l *log) message() error {
	head, err := l.in.Peek(3)
	if len(head) < 3 {
		return l.end(len(head), err)
	}
	size, tag := int(binary.LittleEndian.Uint16(head)), head[2]
	if l.cutAt(3 + size) {
		return nil
	}
	if size == 0 || (tag|0x20) < 'a' || (tag|0x20) > 'z' {
		return l.resume("no message begins here")
	}
	m, err := l.in.Peek(3 + size)
	if len(m) < 3+size {
		return l.end(len(m), err)
	}
	err = l.handle(tag, m[3:])
	l.skip(3 + size)
	return err
}

// end is the end of the file, with some bytes of a message left.
func (l *log) end(left int, err error) error {
	if left > 0 && (err == io.EOF || err == nil) {
		l.report.damage(l.at, "the file ends in the middle of a message")
	}
	if err == nil {
		err = io.EOF
	}
	return err
}

// cutAt reports whether a message of this length would run into appended data: a
// writer that was cut off left half of one. It then goes on behind.
func (l *log) cutAt(length int) bool {
	for len(l.appended) > 0 && l.appended[0] <= l.at {
		l.appended = l.appended[1:]
	}
	if len(l.appended) == 0 || l.at+int64(length) <= l.appended[0] {
		return false
	}
	l.skip(int(l.appended[0] - l.at)) // less than the length of a message
	return true
}

// syncMessage is a synchronisation message with its header.
var syncMessage = []byte{8, 0, 'S', 0x2F, 0x73, 0x13, 0x20, 0x25, 0x0C, 0xBB, 0x12}

// resume looks for the next synchronisation message.
func (l *log) resume(why string) error {
	from := l.at
	l.skip(1)
	for {
		window, err := l.in.Peek(1 << 16)
		if i := bytes.Index(window, syncMessage); i >= 0 {
			l.skip(i)
			l.report.damage(from, "%s; %d bytes are passed over, up to the next mark", why, l.at-from)
			return nil
		}
		if len(window) < len(syncMessage) || err != nil {
			l.skip(len(window))
			l.report.damage(from, "%s, and no mark follows from which to go on; %d bytes are passed over", why, l.at-from)
			if err == nil {
				err = io.EOF
			}
			return err
		}
		l.skip(len(window) - len(syncMessage) + 1)
	}
}

func (l *log) handle(tag byte, m []byte) error {
	switch tag {
	case 'B':
		return l.flags(m)
	case 'F':
		name, members, err := definition(string(m))
		switch {
		case err != nil:
			l.report.damage(l.at, "%v", err)
		case len(l.formats) >= maxFormats:
			return fmt.Errorf("defines more than %d formats", maxFormats)
		default:
			l.formats[name] = members
		}
	case 'I':
		if key, value, ok := info(m); ok && strings.HasPrefix(key, "char[") && strings.HasSuffix(key, " sys_name") {
			l.system = value
		}
	case 'A':
		if len(m) < 4 {
			l.report.damage(l.at, "a subscription is too short")
			return nil
		}
		return l.subscribe(binary.LittleEndian.Uint16(m[1:]), string(m[3:]))
	case 'D':
		l.data(m)
	case 'O':
		if len(m) >= 2 {
			l.report.Dropouts++
			l.report.Lost += int64(binary.LittleEndian.Uint16(m))
		}
	}
	return nil
}

func info(m []byte) (key, value string, ok bool) {
	n := int(m[0])
	if len(m) < 1+n {
		return "", "", false
	}
	return string(m[1 : 1+n]), string(bytes.TrimRight(m[1+n:], "\x00")), true
}

// flags reads the flag message: what a reader must understand, and where data
// were appended.
func (l *log) flags(m []byte) error {
	if len(m) < 40 {
		l.report.damage(l.at, "the message of flags is too short")
		return nil
	}
	if m[8]&^1 != 0 || slices.ContainsFunc(m[9:16], func(b byte) bool { return b != 0 }) {
		return errors.New("is a ULog of a kind that readers of version 1 must refuse: unknown incompatible flags are set")
	}
	if m[8]&1 == 0 {
		return nil
	}
	for i := range 3 {
		if at := binary.LittleEndian.Uint64(m[16+8*i:]); at > uint64(l.at) && at < 1<<62 {
			l.appended = append(l.appended, int64(at))
		}
	}
	slices.Sort(l.appended)
	return nil
}

func (l *log) subscribe(id uint16, name string) error {
	if len(l.topics) >= maxSubjects {
		return fmt.Errorf("has more than %d subscriptions", maxSubjects)
	}
	layout := l.layouts[name]
	if layout == nil {
		f := flattener{formats: l.formats}
		if err := f.add(name, "", 0); err != nil {
			l.report.damage(l.at, "the topic %.60q cannot be read: %v", name, err)
			return nil
		}
		layout = &Topic{Name: name, Fields: f.fields, size: f.at - f.padding, stamp: -1}
		for i := range f.fields {
			if k := f.fields[i].kind; f.fields[i].Name == "timestamp" && (k == uint64s || k == uint32s || k == uint16s || k == uint8s) {
				layout.stamp = i
			}
		}
		if l.fields += len(f.fields); l.fields > maxAll {
			return fmt.Errorf("its topics have more than %d fields", maxAll)
		}
		l.layouts[name] = layout
	}
	t := *layout
	t.System = l.system
	t.Nth = l.nth[name]
	l.nth[name]++
	t.push = l.open(&t)
	l.topics[id] = &t
	return nil
}

func (l *log) data(m []byte) {
	if len(m) < 2 {
		l.report.damage(l.at, "a message of data is too short")
		return
	}
	t := l.topics[binary.LittleEndian.Uint16(m)]
	switch {
	case t == nil:
		l.report.damage(l.at, "a message of data belongs to no topic")
	case len(m)-2 < t.size:
		l.report.damage(l.at, "a message of %s has %d bytes; its format has %d", t.Name, len(m)-2, t.size)
	case t.push != nil:
		t.push(m[2:])
	}
}
