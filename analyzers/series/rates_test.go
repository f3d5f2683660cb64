package series

import (
	"context"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/core/convention"
	"dextral/core/identify"
	"dextral/core/kinematics"
	"dextral/core/rotor"
)

// turning writes a log of a body that turns about all axes: the rates are its
// body rates, scaled and named as asked, the quaternion has its scalar first.
func turning(header string, scale float64, stamp func(row int) string) string {
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

func TestRates(t *testing.T) {
	const deg = 180 / math.Pi
	for _, c := range []struct {
		name, header string
		scale        float64
		stamp        func(int) string
		verdict      identify.Verdict
		changes      []identify.Change
	}{
		{"as stated", "t [s],q_w,q_x,q_y,q_z,gyro_x [rad/s],gyro_y [rad/s],gyro_z [rad/s]", 1, seconds, identify.Agree, nil},
		{"unit unstated", "t,q_w,q_x,q_y,q_z,gyro_x,gyro_y,gyro_z", deg, seconds, identify.Agree, nil},
		{"degrees called radians", "t [s],q_w,q_x,q_y,q_z,gyro_x [rad/s],gyro_y [rad/s],gyro_z [rad/s]", deg, seconds, identify.Contradicted, []identify.Change{identify.UnitSlip}},
		{"unit in the name", "t [s],q_w,q_x,q_y,q_z,gyro_x_rad_s,gyro_y_rad_s,gyro_z_rad_s", deg, seconds, identify.Contradicted, []identify.Change{identify.UnitSlip}},
		{"short names", "t,q_w,q_x,q_y,q_z,wx [deg/s],wy [deg/s],wz [deg/s]", deg, seconds, identify.Agree, nil},
		{"nanoseconds since 1970", "timestamp,q_w,q_x,q_y,q_z,gyro_x [rad/s],gyro_y [rad/s],gyro_z [rad/s]", 1,
			func(row int) string { return fmt.Sprint(1900000000000000000 + int64(row)*50000000) }, identify.Agree, nil},
	} {
		r := read(t, turning(c.header, c.scale, c.stamp), Options{})
		require.Len(t, r.Channels, 1, c.name)
		rates := r.Channels[0].Rates
		require.NotNil(t, rates, c.name)
		assert.Equal(t, c.verdict, rates.Result.Verdict, c.name)
		assert.Equal(t, c.changes, rates.Result.Best.Changes(), c.name)
		assert.True(t, rates.Result.Decided, c.name)
		assert.Len(t, rates.Columns, 3)
	}
}

// Rows that are short, empty or not finite are left out.
func TestRatesWithGaps(t *testing.T) {
	log := turning("t [s],q_w,q_x,q_y,q_z,gyro_x,gyro_y,gyro_z", 1, seconds)
	log += "40.00,NaN,0,0,0,0,0,0\n40.05,1,0,0\n\n40.10,1,0,0,0,,0,0\n"
	r := read(t, log, Options{})
	assert.Equal(t, identify.Agree, r.Channels[0].Rates.Result.Verdict)
}

func TestNoRates(t *testing.T) {
	for _, header := range []string{"t,q_w,q_x,q_y,q_z,bias_x,bias_y,bias_z", "t,q_w,q_x,q_y,q_z,a_x,a_y,a_z"} {
		r := read(t, turning(header, 1, seconds), Options{})
		assert.Nil(t, r.Channels[0].Rates, header)
	}
	header := "n,q_w,q_x,q_y,q_z,gyro_x,gyro_y,gyro_z"
	r := read(t, turning(header, 1, seconds), Options{})
	assert.Nil(t, r.Channels[0].Rates)
	assert.True(t, r.RatesWithoutTime)
	r = read(t, turning(header, 1, seconds), Options{Time: "n"})
	assert.NotNil(t, r.Channels[0].Rates, "a column of time that is named by the user")
	assert.Nil(t, read(t, turning(header, 1, seconds), Options{Time: "clock"}).Clock)
}

// Public logs, with what the index beside them says was found by an independent
// computation: scalar place, direction and axes, or that the motion is too poor.
func TestRatesOfRealLogs(t *testing.T) {
	for name, time := range map[string]string{"ros_quadruped_imu.csv": "", "iss_openloop_sc_ck.csv": "ert"} {
		f, err := os.Open(filepath.Join(corpus, name))
		if err != nil {
			t.Skipf("%s is not beside the repository", name)
		}
		r, err := Read(context.Background(), name, f, Options{Time: time})
		f.Close()
		require.NoError(t, err)
		result := r.Channels[0].Rates.Result
		assert.Equal(t, identify.Agree, result.Verdict, name)
		assert.Less(t, result.Best.Residual, 0.1, name) // windows in time bins, the index has others
		assert.Equal(t, identify.BodyToSpace, result.Best.Readings[0].Sense, name)
		assert.Equal(t, convention.BodyRates, result.Best.Readings[0].Axes, name)
		assert.False(t, result.Decided, "%s turns about one axis: not all can be decided", name)
		assert.Nil(t, r.Channels[0].Rates.Stretches, name)
	}
}
