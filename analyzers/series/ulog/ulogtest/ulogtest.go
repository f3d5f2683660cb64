// Package ulogtest writes ULogs for tests, from the published format description.
package ulogtest

import (
	"bytes"
	"encoding/binary"
)

// Log is a log that is being written.
type Log struct{ bytes.Buffer }

// New begins a log of the given system, with the flags that a log without appended
// data has, and no other message.
func New(system string) *Log {
	l := &Log{}
	l.WriteString("ULog\x01\x12\x35\x01")
	_ = binary.Write(l, binary.LittleEndian, uint64(1000))
	l.Message('B', make([]byte, 40))
	if system != "" {
		key := "char[" + string(rune('0'+len(system))) + "] sys_name"
		l.Message('I', append([]byte{byte(len(key))}, key+system...))
	}
	return l
}

// Message writes a message.
func (l *Log) Message(tag byte, body []byte) *Log {
	_ = binary.Write(l, binary.LittleEndian, uint16(len(body)))
	l.WriteByte(tag)
	l.Write(body)
	return l
}

// Format writes a definition, such as "attitude:uint64_t timestamp;float[4] q;".
func (l *Log) Format(text string) *Log { return l.Message('F', []byte(text)) }

// Subscribe gives a topic a number.
func (l *Log) Subscribe(id uint16, name string) *Log {
	return l.Message('A', append([]byte{0, byte(id), byte(id >> 8)}, name...))
}

// Data writes a message of data. Fields are of types of fixed size.
func (l *Log) Data(id uint16, fields ...any) *Log {
	var b bytes.Buffer
	for _, f := range append([]any{id}, fields...) {
		_ = binary.Write(&b, binary.LittleEndian, f)
	}
	return l.Message('D', b.Bytes())
}

// Sync writes a synchronisation message.
func (l *Log) Sync() *Log {
	return l.Message('S', []byte{0x2F, 0x73, 0x13, 0x20, 0x25, 0x0C, 0xBB, 0x12})
}
