package columns

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/convention"
)

// One group of three, and neither bias nor covariance.
func TestFindRates(t *testing.T) {
	for header, want := range map[string]bool{
		"gyro_x,gyro_y,gyro_z":                true,
		"gyro_bias_x,gyro_bias_y,gyro_bias_z": false,
		"field.angular_velocity.x,field.angular_velocity.y,field.angular_velocity.z,field.angular_velocity_covariance0": true,
		"bad_rate_iss_x,bad_rate_iss_y,bad_rate_iss_z":                                                                  true,
		"gyro0_x,gyro0_y,gyro0_z,gyro1_x,gyro1_y,gyro1_z":                                                               false, // which of them?
		"accel_x,accel_y,accel_z":          false,
		"sample_rate,frame_rate":           false,
		"wx,wy,wz":                         true,
		"w,x,y,z":                          false,
		"gyro_x_dps,gyro_y_dps,gyro_z_dps": true,
	} {
		var columns []Column
		for _, name := range strings.Split(header, ",") {
			columns = append(columns, Column{Text: name})
		}
		_, ok := FindRates(columns)
		assert.Equal(t, want, ok, header)
	}
	for name, want := range map[string]convention.Unit{
		"gyro_x [deg/s]": convention.Degree, "gyro_x_dps": convention.Degree, "gyro_x [rad/s]": convention.Radian,
		"gyro_x_rad_s": convention.Radian, "gyro_x": convention.UnitUnstated,
	} {
		assert.Equal(t, want, rateUnit(name), name)
	}
}
