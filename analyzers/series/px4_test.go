package series

import (
	"bytes"
	"context"
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/analyzers/series/ulog/ulogtest"
	"dextral/core/convention"
	"dextral/rules"
)

// ulogFlight is a log of a turn about the vertical, one degree every 10 ms, with the
// quaternion negated from the given row on.
func ulogFlight(system string, rows, negated int) *ulogtest.Log {
	l := ulogtest.New(system).
		Format("vehicle_attitude:uint64_t timestamp;uint64_t timestamp_sample;float[4] q;uint8_t reset;").
		Format("manual_control_setpoint:uint64_t timestamp;float roll;float pitch;float yaw;").
		Subscribe(0, "vehicle_attitude").Subscribe(1, "vehicle_attitude").Subscribe(2, "manual_control_setpoint")
	for i := range rows {
		half := float64(i) * math.Pi / 360
		w, z := float32(math.Cos(half)), float32(math.Sin(half))
		if i+1 >= negated {
			w, z = -w, -z
		}
		l.Data(0, uint64(i*10000), uint64(0), [4]float32{w, 0, 0, z}, uint8(0))
		l.Data(2, uint64(i*10000), [3]float32{0.1, 0.9, 0})
	}
	return l
}

func TestULog(t *testing.T) {
	r, err := Read(context.Background(), "tern.ulg", ulogFlight("PX4", 100, 60), Options{})
	require.NoError(t, err)
	require.Len(t, r.Channels, 1)
	s := r.Channels[0]
	assert.Equal(t, "vehicle_attitude.q", s.Value.Key)
	assert.Equal(t, convention.ScalarFirst, s.Value.Claims.Scalar())
	claim, ok := s.Value.Claims.On(convention.OfDirection)
	require.True(t, ok)
	assert.Equal(t, convention.Direction{To: "NED", From: "FRD"}, claim.Says)
	assert.Equal(t, rules.Format, claim.Source)
	assert.True(t, s.Float32)
	assert.Equal(t, int64(100), r.Rows)
	assert.Equal(t, int64(1), s.Continuity.JumpCount)
	assert.InDelta(t, 0.99, s.Clock.Span*1e-6, 1e-12)
	findings := rules.CheckSeries(s)
	require.Len(t, findings, 1)
	assert.Equal(t, "sign-jump", findings[0].Rule)
	assert.Equal(t, int64(60), findings[0].Place.Row)
}

// Without the name of the system nothing is known but names.
func TestULogOfAnother(t *testing.T) {
	r, err := Read(context.Background(), "tern.ulg", ulogFlight("", 100, 1000), Options{})
	require.NoError(t, err)
	require.Len(t, r.Channels, 1)
	claim, ok := r.Channels[0].Value.Claims.On(convention.OfDirection)
	assert.False(t, ok, claim)
	assert.Empty(t, rules.CheckSeries(r.Channels[0]))
}

// The same log, cut off: the part that is there is judged, and where it ends is named.
func TestULogCut(t *testing.T) {
	whole := ulogFlight("PX4", 100, 60).Bytes()
	r, err := Read(context.Background(), "tern.ulg", bytes.NewReader(whole[:len(whole)-5]), Options{})
	require.NoError(t, err)
	assert.Equal(t, int64(100), r.Rows)
	require.Equal(t, int64(1), r.BadRows)
	assert.Contains(t, r.FirstBad[0].Reason, "the file ends in the middle of a message")
}
