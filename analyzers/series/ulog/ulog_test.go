package ulog_test

import (
	"bytes"
	"encoding/binary"
	"fmt"
	"math"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/analyzers/series/ulog"
	"dextral/analyzers/series/ulog/ulogtest"
)

// rows reads all fields of all topics as text.
func rows(t *testing.T, log []byte) ([]string, ulog.Report) {
	t.Helper()
	var out []string
	report, err := ulog.Read(bytes.NewReader(log), func(topic *ulog.Topic) func([]byte) {
		return func(data []byte) {
			s := fmt.Sprintf("%s.%d", topic.Name, topic.Nth)
			for i := range topic.Fields {
				c := topic.Fields[i].Cell(data)
				s += fmt.Sprintf(" %s=%v", topic.Fields[i].Name, c.Value())
			}
			out = append(out, s)
		}
	})
	require.NoError(t, err)
	return out, report
}

// Types, arrays, nesting before and after definition, and padding as the format
// description has them: padding at the end is not logged, inside it is.
func TestFields(t *testing.T) {
	l := ulogtest.New("PX4").
		Format("outer:uint64_t timestamp;inner[2] part;int8_t a;uint8_t[3] _padding0;double d;bool yes;char[4] text;int16_t last;uint8_t[2] _padding1;").
		Format("inner:float x;uint8_t n;uint8_t[3] _padding0;").
		Format("big:uint64_t timestamp;uint8_t[64] blob;int64_t far;uint16_t u;int32_t i;uint32_t v;").
		Subscribe(3, "outer").Subscribe(4, "big").
		Data(3, uint64(7), float32(1.5), uint8(2), [3]byte{9, 9, 9}, float32(-2.5), uint8(4), [3]byte{9, 9, 9}, int8(-3), [3]byte{8, 8, 8}, 0.1, true, [4]byte{'a', 'b', 'c', 'd'}, int16(-300)).
		Data(4, uint64(8), [64]byte{}, int64(math.MinInt64), uint16(65535), int32(-70000), uint32(4e9))
	got, report := rows(t, l.Bytes())
	assert.Zero(t, report.Damaged)
	assert.Equal(t, []string{
		"outer.0 timestamp=7 part[0].x=1.5 part[0].n=2 part[1].x=-2.5 part[1].n=4 a=-3 d=0.1 yes=1 last=-300",
		"big.0 timestamp=8 far=-9.223372036854776e+18 u=65535 i=-70000 v=4e+09",
	}, got)
}

func small() *ulogtest.Log {
	return ulogtest.New("").Format("a:uint64_t timestamp;float x;").Subscribe(0, "a").Subscribe(1, "a")
}

// A log that ends anywhere gives the messages before, and says where it ends.
func TestTruncated(t *testing.T) {
	l := small()
	head := l.Len()
	for i := range 3 {
		l.Data(uint16(i&1), uint64(i), float32(i))
	}
	size := (l.Len() - head) / 3
	for n := range l.Len() {
		got, report := rows(t, l.Bytes()[:n])
		assert.Len(t, got, max(0, n-head)/size, "%d bytes", n)
		if n > head && (n-head)%size != 0 {
			require.Equal(t, int64(1), report.Damaged)
			assert.Equal(t, int64(head+(n-head)/size*size), report.First[0].Offset)
		}
	}
	got, report := rows(t, l.Bytes())
	assert.Equal(t, []string{"a.0 timestamp=0 x=0", "a.1 timestamp=1 x=1", "a.0 timestamp=2 x=2"}, got)
	assert.Zero(t, report.Damaged)
}

// Behind bytes that are none of a message reading goes on at the next mark; messages that contradict
// their format are passed over one by one.
func TestCorrupt(t *testing.T) {
	l := small().Data(0, uint64(1), float32(1))
	at := l.Len()
	l.WriteString(strings.Repeat("\x00", 200))
	l.Sync().Data(0, uint64(2), float32(2)).Data(9, uint64(3), float32(3)).Data(0, uint64(4))
	l.Subscribe(5, "none").Format("broken:float;").Format("loop:loop x;").Subscribe(6, "loop").Message('Z', []byte{1}).Data(1, uint64(5), float32(5))
	got, report := rows(t, l.Bytes())
	assert.Equal(t, []string{"a.0 timestamp=1 x=1", "a.0 timestamp=2 x=2", "a.1 timestamp=5 x=5"}, got)
	require.Equal(t, int64(6), report.Damaged)
	assert.Equal(t, ulog.Damage{Offset: int64(at), Reason: "no message begins here; 200 bytes are passed over, up to the next mark"}, report.First[0])
	assert.Contains(t, report.First[1].Reason, "no topic")
	assert.Contains(t, report.First[2].Reason, "8 bytes; its format has 12")
	assert.Contains(t, report.First[3].Reason, "not defined")
	assert.Contains(t, report.First[4].Reason, "not of the form")
	assert.Contains(t, report.First[5].Reason, "nested more than")
}

// Appended data follow half a message of the first writer.
func TestAppended(t *testing.T) {
	l := small().Data(0, uint64(1), float32(1))
	l.Write([]byte{14, 0, 'D', 0, 0, 1})
	log := l.Bytes()
	at := len(log)
	log[16+3+8] = 1
	binary.LittleEndian.PutUint64(log[16+3+16:], uint64(at))
	l.Data(1, uint64(2), float32(2)).Message('O', []byte{5, 1})
	got, report := rows(t, l.Bytes())
	assert.Equal(t, []string{"a.0 timestamp=1 x=1", "a.1 timestamp=2 x=2"}, got)
	assert.Zero(t, report.Damaged)
	assert.Equal(t, int64(1), report.Dropouts)
	assert.Equal(t, int64(261), report.Lost)
}

// A reader must refuse incompatible flags that it does not know.
func TestIncompatible(t *testing.T) {
	l := small()
	l.Bytes()[16+3+9] = 1
	_, err := ulog.Read(l, func(*ulog.Topic) func([]byte) { return nil })
	assert.ErrorContains(t, err, "incompatible")
}

// Stamps of 16 bits turn over after 65.536 ms; those of 8 bits count milliseconds.
func TestStamps(t *testing.T) {
	l := ulogtest.New("").Format("a:uint16_t timestamp;").Format("b:uint8_t timestamp;").Subscribe(0, "a").Subscribe(1, "b")
	want := []uint64{0, 40000, 65000, 70000, 100000, 131072}
	for _, v := range want {
		l.Data(0, uint16(v))
	}
	l.Data(1, uint8(250)).Data(1, uint8(4))
	var got []uint64
	_, err := ulog.Read(l, func(topic *ulog.Topic) func([]byte) {
		return func(data []byte) {
			c, ok := topic.Stamp(data)
			require.True(t, ok)
			got = append(got, c.Mantissa)
		}
	})
	require.NoError(t, err)
	assert.Equal(t, want, got[:len(want)])
	assert.Equal(t, uint64(10000), got[len(want)+1]-got[len(want)])
}

// Whatever the bytes, reading ends, without a panic, and every offset lies in the file.
func FuzzRead(f *testing.F) {
	l := small().Data(0, uint64(1), float32(1)).Sync().Data(1, uint64(2), float32(2))
	f.Add(l.Bytes())
	f.Add(ulogtest.New("PX4").Format("o:i[3] p;uint8_t timestamp;").Format("i:double[2] x;").Subscribe(0, "o").Data(0, [7]float64{}).Bytes())
	f.Add([]byte(ulog.Magic))
	f.Fuzz(func(t *testing.T, log []byte) {
		if len(log) > 1<<16 {
			return
		}
		report, _ := ulog.Read(bytes.NewReader(log), func(topic *ulog.Topic) func([]byte) {
			return func(data []byte) {
				for i := range topic.Fields {
					topic.Fields[i].Cell(data)
				}
				topic.Stamp(data)
			}
		})
		for _, d := range report.First {
			if d.Offset < 0 || d.Offset > int64(len(log)) || d.Reason == "" {
				t.Fatalf("damage at %d of %d bytes: %q", d.Offset, len(log), d.Reason)
			}
		}
	})
}
