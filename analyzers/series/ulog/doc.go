// Package ulog reads ULog, the self-describing binary log of the PX4 autopilot,
// from its published format description (docs.px4.io, "ULog File Format",
// version 1).
//
// A log is a header and a stream of messages: definitions of types, then
// subscriptions that give a definition a number, then data under that number.
// Read walks the stream once. For each subscription it asks its caller whether
// the topic is wanted, and hands the data of wanted topics over as bytes, of
// which a Field takes its number. So nothing is decoded that nobody asked for,
// and memory does not grow with the log.
//
// What is damaged is passed over: behind bytes that are no message reading goes
// on at the next synchronisation message, and a log that ends in the middle of
// a message ends with the one before. Damage says where.
package ulog

import (
	"encoding/binary"
	"math"

	"dextral/analyzers/series/fold"
)

// Magic is how a ULog begins; a byte of version follows.
const Magic = "ULog\x01\x12\x35"

// Topic is a subscription.
type Topic struct {
	Name   string // of the message
	Nth    int    // of several subscriptions to one message, from 0
	System string // what the log says of the system that wrote it, such as PX4; "" if it has not yet said
	Fields []Field

	size   int // bytes of a message of data, without padding at its end
	stamp  int // index of the field timestamp; -1: none
	push   func(data []byte)
	latest uint64 // stamp, with the turns of a counter that is too short
}

// Field is a number of a topic: a field of a basic type, or an item of an array.
// Nested ones have their path for a name, as in pose.q[0].
type Field struct {
	Name   string
	kind   kind
	offset int
}

// Single reports whether the field is a float32.
func (f *Field) Single() bool { return f.kind == floats }

// Flag reports whether the field is true or false.
func (f *Field) Flag() bool { return f.kind == bools }

// Cell reads the field out of a message of its topic.
func (f *Field) Cell(data []byte) fold.Cell {
	b := data[f.offset:]
	switch f.kind {
	case floats:
		return real(float64(math.Float32frombits(binary.LittleEndian.Uint32(b))))
	case doubles:
		return real(math.Float64frombits(binary.LittleEndian.Uint64(b)))
	case int8s:
		return signed(int64(int8(b[0])))
	case int16s:
		return signed(int64(int16(binary.LittleEndian.Uint16(b))))
	case int32s:
		return signed(int64(int32(binary.LittleEndian.Uint32(b))))
	case int64s:
		return signed(int64(binary.LittleEndian.Uint64(b)))
	}
	return whole(f.unsigned(data), false)
}

// unsigned reads a field of an unsigned type.
func (f *Field) unsigned(data []byte) uint64 {
	b := data[f.offset:]
	switch f.kind {
	case uint16s:
		return uint64(binary.LittleEndian.Uint16(b))
	case uint32s:
		return uint64(binary.LittleEndian.Uint32(b))
	case uint64s:
		return binary.LittleEndian.Uint64(b)
	}
	return uint64(b[0])
}

func real(v float64) fold.Cell {
	c := fold.Cell{State: fold.Binary}
	if math.IsNaN(v) {
		c.State = fold.Gap // how the autopilot writes that there is no value
	}
	c.Number.Value = v
	return c
}

func signed(v int64) fold.Cell {
	if v < 0 {
		return whole(uint64(-v), true)
	}
	return whole(uint64(v), false)
}

func whole(v uint64, negative bool) fold.Cell {
	c := fold.Cell{State: fold.Written}
	c.Number.Mantissa, c.Number.Negative, c.Number.Exact = v, negative, true
	if c.Number.Value = float64(v); negative {
		c.Number.Value = -c.Number.Value
	}
	return c
}

// Stamp is the field timestamp of a message, in microseconds; false if the topic
// has none. Counters of less than 64 bits turn over, and stamps never decrease, by the
// format description; the messages of a topic must
// be handed in one after the other.
func (t *Topic) Stamp(data []byte) (fold.Cell, bool) {
	if t.stamp < 0 {
		return fold.Cell{}, false
	}
	f := &t.Fields[t.stamp]
	v := f.unsigned(data)
	if f.kind != uint64s {
		v = t.latest + (v-t.latest)&(1<<(8*sizes[f.kind])-1)
		t.latest = v
	}
	if f.kind == uint8s { // the format description counts these in milliseconds
		v *= 1000
	}
	return whole(v, false), true
}

// Stamped reports whether the topic has time stamps.
func (t *Topic) Stamped() bool { return t.stamp >= 0 }
