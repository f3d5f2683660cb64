package series

import (
	"bytes"
	"context"
	"math"
	"testing"

	"github.com/parquet-go/parquet-go"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/core/convention"
	"dextral/rules"
)

// state is a row with a nested group that may be null, a list and a column of words.
type state struct {
	Time int64 `parquet:"time,timestamp(microsecond)"`
	Pose struct {
		Orientation *pose
	}
	Note string
	Quat []float32 `parquet:"quat,list"`
}

type pose struct{ X, Y, Z, W float64 }

// states are a turn about z, one degree every 10 ms, quaternions negated in rows
// 60 to 79, none in row 30.
func states(n int) []state {
	all := make([]state, n)
	for i := range all {
		half := float64(i) * math.Pi / 360
		w, z := math.Cos(half), math.Sin(half)
		if i+1 >= 60 && i+1 < 80 {
			w, z = -w, -z
		}
		s := &all[i]
		s.Time, s.Note = 1_700_000_000_000_000+int64(i)*10_000, "on"
		if i+1 != 30 {
			s.Pose.Orientation = &pose{Z: z, W: w}
		}
		s.Quat = []float32{float32(w), 0, 0, float32(z)}
	}
	return all
}

func parquetFile(t testing.TB, rows []state, options ...parquet.WriterOption) []byte {
	t.Helper()
	var b bytes.Buffer
	w := parquet.NewGenericWriter[state](&b, options...)
	for len(rows) > 0 { // a row group each
		n := min(len(rows), 70)
		_, err := w.Write(rows[:n])
		require.NoError(t, err)
		require.NoError(t, w.Flush())
		rows = rows[n:]
	}
	require.NoError(t, w.Close())
	return b.Bytes()
}

func TestParquet(t *testing.T) {
	for name, option := range map[string]parquet.WriterOption{
		"plain": parquet.Compression(&parquet.Uncompressed), "snappy": parquet.Compression(&parquet.Snappy),
		"zstd": parquet.Compression(&parquet.Zstd), "small pages": parquet.PageBufferSize(64), "version 1": parquet.DataPageVersion(1),
	} {
		file := parquetFile(t, states(200), option)
		r, err := ReadParquet(context.Background(), "tern.parquet", bytes.NewReader(file), int64(len(file)), Options{})
		require.NoError(t, err, name)
		require.Len(t, r.Channels, 2, name)
		assert.Empty(t, r.Undecided, name)
		assert.EqualValues(t, 200, r.Rows, name)

		s := r.Channels[0]
		assert.Equal(t, "Pose.Orientation", s.Value.Key)
		assert.Equal(t, convention.ScalarFirst, s.Value.Claims.Scalar(), "by the names of its columns")
		assert.EqualValues(t, 1, s.Gaps.Count, name)
		assert.EqualValues(t, 30, s.Gaps.First.Row, name)
		assert.EqualValues(t, 2, s.Continuity.JumpCount, name)
		assert.False(t, s.Float32)
		assert.Equal(t, "us", s.Clock.Unit)
		assert.InDelta(t, 1.99e6, s.Clock.Span, 1e-9)

		q := r.Channels[1]
		assert.Equal(t, "quat", q.Value.Key)
		assert.True(t, q.Float32)
		assert.Zero(t, q.Gaps.Count)
		found := rules.CheckSeries(q)
		require.Len(t, found, 1, name)
		assert.Equal(t, "sign-jump", found[0].Rule)
		assert.EqualValues(t, 60, found[0].Place.Row)
	}
}

// A file that is cut off has lost its directory; one with no orientation is silent.
func TestParquetWithout(t *testing.T) {
	file := parquetFile(t, states(10))
	_, err := ReadParquet(context.Background(), "p", bytes.NewReader(file), int64(len(file)-9), Options{})
	assert.ErrorContains(t, err, "cut off")

	var b bytes.Buffer
	require.NoError(t, parquet.Write(&b, []struct{ X, Y, Z float64 }{{1, 2, 3}}))
	r, err := ReadParquet(context.Background(), "p", bytes.NewReader(b.Bytes()), int64(b.Len()), Options{})
	require.NoError(t, err)
	assert.Empty(t, r.Channels)
	assert.Empty(t, r.Undecided)
}

// Damage anywhere ends reading with an error or is not seen; it never panics.
func TestParquetDamaged(t *testing.T) {
	file := parquetFile(t, states(20))
	for i := range file {
		damaged := bytes.Clone(file)
		damaged[i] ^= 0xff
		assert.NotPanics(t, func() {
			_, _ = ReadParquet(context.Background(), "p", bytes.NewReader(damaged), int64(len(damaged)), Options{})
		})
	}
}

// A list that claims two thousand million items, in the footer and in a page header,
// is refused before memory is asked for.
func TestParquetClaims(t *testing.T) {
	huge := []byte{0x29, 0xfc, 0xff, 0xff, 0xff, 0xff, 0x07, 0x00} // field 2: list of structs
	file := append([]byte("PAR1"), huge...)
	file = append(file, byte(len(huge)), 0, 0, 0)
	file = append(file, "PAR1"...)
	_, err := ReadParquet(context.Background(), "p", bytes.NewReader(file), int64(len(file)), Options{})
	assert.ErrorIs(t, err, errThrift)

	file = parquetFile(t, states(3))
	damaged := bytes.Clone(file)
	copy(damaged[4:], huge) // the first page header
	_, err = ReadParquet(context.Background(), "p", bytes.NewReader(damaged), int64(len(damaged)), Options{})
	assert.Error(t, err)
}

func FuzzParquet(f *testing.F) {
	f.Add(parquetFile(f, states(3)))
	f.Add([]byte("PAR1\x00\x00\x00\x00PAR1"))
	f.Fuzz(func(t *testing.T, file []byte) {
		if len(file) > 1<<14 {
			return
		}
		r, err := ReadParquet(context.Background(), "p", bytes.NewReader(file), int64(len(file)), Options{})
		if err == nil && len(r.Channels) > 0 && r.Rows == 0 {
			t.Fatal("channels of no rows")
		}
	})
}
