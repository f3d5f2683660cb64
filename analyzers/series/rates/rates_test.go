package rates

import (
	"fmt"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"dextral/core/convention"
	"dextral/core/identify"
	"dextral/core/kinematics"
	"dextral/core/rotor"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// flight writes a log of a body that turns about all axes: the rates are its
// body rates, scaled and named as asked, the quaternion has its scalar first.
func flight(header string, scale float64, stamp func(row int) string) string {
	var text strings.Builder
	text.WriteString(header + "\n")
	r := rotor.One
	for row := range 800 {
		t := float64(row) * 0.05
		rate := rotor.Vec{X: 0.5 * math.Sin(t), Y: 0.4 * math.Cos(0.7*t), Z: 0.3 + 0.2*math.Sin(1.3*t)}
		w, x, y, z := r.Quaternion()
		fmt.Fprintf(&text, "%s,%.7f,%.7f,%.7f,%.7f,%.6f,%.6f,%.6f\n", stamp(row), w, x, y, z, scale*rate.X, scale*rate.Y, scale*rate.Z)
		r = kinematics.Step(r, rate, 0.05)
	}
	return text.String()
}

func seconds(row int) string { return fmt.Sprintf("%.2f", float64(row)*0.05) }

func TestIdentify(t *testing.T) {
	for _, c := range []struct {
		name, header string
		scale        float64
		stamp        func(int) string
		verdict      identify.Verdict
		changes      []identify.Change
	}{
		{"as stated", "t [s],q_w,q_x,q_y,q_z,gyro_x [rad/s],gyro_y [rad/s],gyro_z [rad/s]", 1, seconds, identify.Agree, nil},
		{"unit unstated", "t,q_w,q_x,q_y,q_z,gyro_x,gyro_y,gyro_z", 180 / math.Pi, seconds, identify.Agree, nil},
		{"degrees called radians", "t [s],q_w,q_x,q_y,q_z,gyro_x [rad/s],gyro_y [rad/s],gyro_z [rad/s]", 180 / math.Pi, seconds, identify.Contradicted, []identify.Change{identify.UnitSlip}},
		{"nanoseconds since 1970", "timestamp,q_w,q_x,q_y,q_z,gyro_x [rad/s],gyro_y [rad/s],gyro_z [rad/s]", 1,
			func(row int) string { return fmt.Sprint(1900000000000000000 + int64(row)*50000000) }, identify.Agree, nil},
	} {
		l, err := Identify("flight.csv", strings.NewReader(flight(c.header, c.scale, c.stamp)), "")
		require.NoError(t, err, c.name)
		assert.Equal(t, int64(800), l.Rows, c.name)
		assert.Equal(t, c.verdict, l.Result.Verdict, c.name)
		assert.Equal(t, c.changes, l.Result.Best.Changes(), c.name)
		assert.True(t, l.Result.Decided, c.name)
	}
}

// TestGaps: rows that are short, empty or not finite are left out.
func TestGaps(t *testing.T) {
	log := flight("t [s],q_w,q_x,q_y,q_z,gyro_x,gyro_y,gyro_z", 1, seconds)
	log += "40.00,NaN,0,0,0,0,0,0\n40.05,1,0,0\n\n40.10,1,0,0,0,,0,0\n"
	l, err := Identify("flight.csv", strings.NewReader(log), "")
	require.NoError(t, err)
	assert.Equal(t, int64(800), l.Rows)
	assert.Equal(t, identify.Agree, l.Result.Verdict)
}

func TestNone(t *testing.T) {
	for header, want := range map[string]string{
		"":                                       ErrNone.Error(),
		"t,q_w,q_x,q_y,q_z":                      ErrNone.Error(),
		"t,gyro_x,gyro_y,gyro_z":                 ErrNone.Error(),
		"t,q_w,q_x,q_y,q_z,bias_x,bias_y,bias_z": ErrNone.Error(),
		"n,q_w,q_x,q_y,q_z,gyro_x,gyro_y,gyro_z": "--time",
	} {
		_, err := Identify("a.csv", strings.NewReader(header+"\n"), "")
		require.Error(t, err, header)
		assert.Contains(t, err.Error(), want, header)
	}
	_, err := Identify("a.csv", strings.NewReader("t,q_w,q_x,q_y,q_z,gyro_x,gyro_y,gyro_z\n"), "clock")
	assert.ErrorContains(t, err, `no column is called "clock"`)
}

// TestRateColumns: one group of three, and neither bias nor covariance.
func TestRateColumns(t *testing.T) {
	for header, want := range map[string]bool{
		"gyro_x,gyro_y,gyro_z":                true,
		"gyro_bias_x,gyro_bias_y,gyro_bias_z": false,
		"field.angular_velocity.x,field.angular_velocity.y,field.angular_velocity.z,field.angular_velocity_covariance0": true,
		"bad_rate_iss_x,bad_rate_iss_y,bad_rate_iss_z":                                                                  true,
		"gyro0_x,gyro0_y,gyro0_z,gyro1_x,gyro1_y,gyro1_z":                                                               false, // which of them?
		"accel_x,accel_y,accel_z": false,
		"sample_rate,frame_rate":  false,
	} {
		_, ok := rateColumns(strings.Split(header, ","))
		assert.Equal(t, want, ok, header)
	}
	assert.Equal(t, convention.Degree, rateUnit("gyro_x [deg/s]"))
	assert.Equal(t, convention.Degree, rateUnit("gyro_x_dps"))
	assert.Equal(t, convention.Radian, rateUnit("gyro_x [rad/s]"))
	assert.Equal(t, convention.UnitUnstated, rateUnit("gyro_x"))
}

// TestRealLogs compares with what the index beside the logs says was found by
// an independent computation: the order is decided, or the motion is too poor.
func TestRealLogs(t *testing.T) {
	dir := filepath.Join("..", "..", "..", "..", "shared", "corpus", "logs")
	for name, time := range map[string]string{"ros_quadruped_imu.csv": "", "iss_openloop_sc_ck.csv": "ert"} {
		f, err := os.Open(filepath.Join(dir, name))
		if err != nil {
			t.Skipf("%s is not beside the repository", name)
		}
		l, err := Identify(name, f, time)
		f.Close()
		require.NoError(t, err)
		assert.Equal(t, identify.Agree, l.Result.Verdict, name)
		assert.Less(t, l.Result.Best.Residual, 0.1, name)
		assert.Equal(t, identify.BodyToSpace, l.Result.Best.Readings[0].Sense, name)
		assert.Equal(t, convention.BodyRates, l.Result.Best.Readings[0].Axes, name)
		assert.False(t, l.Result.Decided, "%s turns about one axis: not all can be decided", name)
	}
}
