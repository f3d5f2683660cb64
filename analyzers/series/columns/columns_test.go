package columns

import (
	"fmt"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/core/convention"
	"dextral/rules"
)

// header makes columns of a header as in a comma-separated file.
func header(line string) []Column {
	var columns []Column
	at := 1
	for _, field := range strings.Split(line, ",") {
		end := at + len([]rune(field))
		columns = append(columns, Column{Text: strings.TrimSpace(field), Place: rules.Place{Path: "f", Line: 1, Column: at, EndLine: 1, EndColumn: end}})
		at = end + 1
	}
	return columns
}

// shown is a channel in one line: key, form, columns, claims with their sources.
func shown(c Channel) string {
	var s strings.Builder
	fmt.Fprintf(&s, "%s: %s %v", c.Value.Key, c.Value.Form, c.Columns)
	for _, claim := range c.Value.Claims {
		if claim.Says.Subject() == convention.OfSequence {
			continue
		}
		text := claim.Says.String()
		if claim.Says.Subject() == convention.OfForm {
			text = "form"
		}
		fmt.Fprintf(&s, "; %s by %s", text, claim.Source)
	}
	if c.Doubtful {
		s.WriteString("; doubtful")
	}
	return s.String()
}

const first = "; scalar first (w x y z) by label"

func TestFind(t *testing.T) {
	for _, c := range []struct{ header, channels, stem string }{
		// The header of the EuRoC ground truth, and those of other public recorders.
		{"#timestamp, p_RS_R_x [m], p_RS_R_y [m], p_RS_R_z [m], q_RS_w [], q_RS_x [], q_RS_y [], q_RS_z [], b_w_RS_S_x [rad s^-1], b_w_RS_S_y [rad s^-1], b_w_RS_S_z [rad s^-1]",
			"q_RS: quaternion [4 5 6 7]; form by name" + first, "rs"},
		{"%time,field.orientation.x,field.orientation.y,field.orientation.z,field.orientation.w,field.orientation_covariance0,field.orientation_covariance1,field.orientation_covariance2,field.orientation_covariance3",
			"field.orientation: quaternion [4 1 2 3]; form by name" + first, "field"},
		{"frame,hps.bad_quat_iss_eci_s,hps.bad_quat_iss_eci_i,hps.bad_quat_iss_eci_j,hps.bad_quat_iss_eci_k",
			"hps.bad_quat_iss_eci: quaternion [1 2 3 4]; form by label" + first, "hps bad iss eci"},
		{"timestamp,tx,ty,tz,qx,qy,qz,qw", "q: quaternion [7 4 5 6]; form by name" + first, ""},
		{"timestamp,q[0],q[1],q[2],q[3],delta_q_reset[0],delta_q_reset[1]", "q: quaternion [1 2 3 4]; form by name; scalar first (w x y z) by name; doubtful", ""},
		{"t,Quat1,Quat2,Quat3,Quat4", "Quat: quaternion [1 2 3 4]; form by label", ""},
		{"t,quaternion_0,quaternion_1,quaternion_2,quaternion_3", "quaternion: quaternion [1 2 3 4]; form by label", ""},
		{"t,q1,q2,q3,q4", "q: quaternion [1 2 3 4]; form by name; doubtful", ""},
		{"RotX,RotY,RotZ,RotW", "Rot: quaternion [3 0 1 2]; form by name" + first, ""},
		{"IMUQuatW,IMUQuatX,IMUQuatY,IMUQuatZ", "IMUQuat: quaternion [0 1 2 3]; form by label" + first, "imu"},
		{"est_qw,est_qx,est_qy,est_qz,gt_qw,gt_qx,gt_qy,gt_qz", "est_q: quaternion [0 1 2 3]; form by name" + first + "\ngt_q: quaternion [4 5 6 7]; form by name" + first, "est\ngt"},
		{"qw_gt,qx_gt,qy_gt,qz_gt", "q_gt: quaternion [0 1 2 3]; form by name" + first, "gt"},
		{"orientation_x_1,orientation_y_1,orientation_z_1,orientation_w_1", "orientation_1: quaternion [3 0 1 2]; form by name" + first, "1"},
		{"w,x,y,z", "w,x,y,z: quaternion [0 1 2 3]; form by shape" + first + "; doubtful", ""},
		{"q_w_0,q_w_1,q_w_2,q_w_3,q_x_0,q_x_1,q_x_2,q_x_3,q_y_0,q_y_1,q_y_2,q_y_3,q_z_0,q_z_1,q_z_2,q_z_3",
			"q_0: quaternion [0 4 8 12]; form by name" + first + "\nq_1: quaternion [1 5 9 13]; form by name" + first +
				"\nq_2: quaternion [2 6 10 14]; form by name" + first + "\nq_3: quaternion [3 7 11 15]; form by name" + first, "0\n1\n2\n3"},

		{"t,roll,pitch,yaw", "roll,pitch,yaw: angles [1 2 3]; form by label", ""},
		{"t,yaw [deg],pitch [deg],roll [deg]", "yaw,pitch,roll: angles [1 2 3]; form by label; degree by label", ""},
		{"t,roll_rad,pitch_rad,yaw_rad,rollrate,pitchrate,yawrate", "roll,pitch,yaw: angles [1 2 3]; form by label; radian by label", ""},
		{"TimeUS,DesRoll,Roll,DesPitch,Pitch,DesYaw,Yaw", "DesRoll,DesPitch,DesYaw: angles [1 3 5]; form by label\nRoll,Pitch,Yaw: angles [2 4 6]; form by label", "des\n"},
		{"att.roll (\u00b0),att.pitch (\u00b0),att.heading (\u00b0)", "att.roll,att.pitch,att.heading: angles [0 1 2]; form by name; degree by label", ""},
		{"phi,theta,psi", "phi,theta,psi: angles [0 1 2]; form by name", ""},
		{"rpy[0],rpy[1],rpy[2]", "rpy[0],rpy[1],rpy[2]: angles [0 1 2]; form by label", ""},
		{"euler_x,euler_y,euler_z", "euler_x,euler_y,euler_z: angles [0 1 2]; form by label", ""},
		{"roll,pitch,yaw,heading", "roll,pitch,yaw: angles [0 1 2]; form by label", ""},

		{"r11,r12,r13,r21,r22,r23,r31,r32,r33", "r: rotation matrix [0 1 2 3 4 5 6 7 8]; form by name; doubtful", ""},
		{"dcm_00,dcm_10,dcm_20,dcm_01,dcm_11,dcm_21,dcm_02,dcm_12,dcm_22", "dcm: rotation matrix [0 3 6 1 4 7 2 5 8]; form by label", ""},
		{"R[0][0],R[0][1],R[0][2],R[1][0],R[1][1],R[1][2],R[2][0],R[2][1],R[2][2]", "R: rotation matrix [0 1 2 3 4 5 6 7 8]; form by name; doubtful", ""},
		{"rotation_matrix_xx,rotation_matrix_xy,rotation_matrix_xz,rotation_matrix_yx,rotation_matrix_yy,rotation_matrix_yz,rotation_matrix_zx,rotation_matrix_zy,rotation_matrix_zz",
			"rotation_matrix: rotation matrix [0 1 2 3 4 5 6 7 8]; form by label", ""},
		{"T00,T01,T02,T03,T10,T11,T12,T13,T20,T21,T22,T23", "T: rigid transform [0 1 2 3 4 5 6 7 8 9 10 11]; form by name; doubtful", ""},
		{"dcm0,dcm1,dcm2,dcm3,dcm4,dcm5,dcm6,dcm7,dcm8", "", ""}, // flat with the index in the word: not split
		{"dcm[0],dcm[1],dcm[2],dcm[3],dcm[4],dcm[5],dcm[6],dcm[7],dcm[8]", "dcm: rotation matrix [0 1 2 3 4 5 6 7 8]; form by label; doubtful", ""},
	} {
		found := Find(header(c.header))
		var channels, stems []string
		for _, channel := range found.Channels {
			channels = append(channels, shown(channel))
			stems = append(stems, channel.Stem)
		}
		assert.Equal(t, c.channels, strings.Join(channels, "\n"), c.header)
		assert.Equal(t, c.stem, strings.Join(stems, "\n"), c.header)
		assert.Empty(t, found.Undecided, c.header)
	}
}

// Columns that only look like orientations make no channel and no noise.
func TestFindNothing(t *testing.T) {
	for _, line := range []string{
		"", "a,b,c", "t,x,y,z", "pos.x,pos.y,pos.z", "box_x,box_y,box_w,box_h",
		"q0,q1,q2,q3,q4,q5",                      // joints of an arm
		"p,q,r",                                  // body rates
		"qdot_w,qdot_x,qdot_y,qdot_z",            // a derivative
		"q_w_std,q_x_std,q_y_std,q_z_std",        // its uncertainty
		"roll_rate,pitch_rate,yaw_rate",          // rates by word
		"roll [deg/s],pitch [deg/s],yaw [deg/s]", // rates by unit
		"gyro.x,gyro.y,gyro.z",
		"R00,R01,R02,R10,R11,R12,R20,R21",   // one is missing
		"q_w [K],q_x [K],q_y [K],q_z [K]",   // something with a unit
		"quat_0 [m],quat_1,quat_2,quat_3",   // likewise
		"heading", "theta", "speed,heading", // one angle
		"roll_bias,pitch_bias,yaw_bias",
		"orientation_covariance0,orientation_covariance1,orientation_covariance2,orientation_covariance3",
	} {
		found := Find(header(line))
		assert.Empty(t, found.Channels, line)
		assert.Empty(t, found.Undecided, line)
	}
}

func TestUndecided(t *testing.T) {
	for line, why := range map[string]string{
		"qx,qy,qz":                            "without a fourth",
		"rot_x,rot_y,rot_z":                   "without a fourth",
		"roll,pitch":                          "yaw is missing",
		"roll [deg],pitch [deg],yaw [rad]":    `different units: "deg", "rad"`,
		"roll [cdeg],pitch [cdeg],yaw [cdeg]": `unit "cdeg" is neither`,
		"qw,qx,qy,qz,qx":                      "twice",
		"roll,pitch,yaw,yaw":                  "twice",
		"dcm11,dcm12,dcm13,dcm21,dcm22,dcm23,dcm31,dcm32,dcm33,dcm33": "twice",
	} {
		found := Find(header(line))
		assert.Empty(t, found.Channels, line)
		if assert.Len(t, found.Undecided, 1, line) {
			assert.Contains(t, found.Undecided[0].Value.Why, why)
			assert.False(t, found.Undecided[0].Value.Decided())
		}
	}
}

func TestPlacesAndClaims(t *testing.T) {
	found := Find(header("t, yaw [deg], pitch [deg], roll [deg]"))
	require.Len(t, found.Channels, 1)
	v := found.Channels[0].Value
	assert.Equal(t, rules.Place{Path: "f", Line: 1, Column: 3, EndLine: 1, EndColumn: 38}, v.Place)
	assert.Equal(t, convention.Degree, v.Claims.Unit())
	unit, _ := v.Claims.On(convention.OfUnit)
	assert.Equal(t, "yaw [deg]", unit.Text)
	sequence, ok := v.Claims.On(convention.OfSequence)
	require.True(t, ok)
	assert.False(t, sequence.Source.Stated(), "the order of columns is custom, not a statement")

	columns := header("t,roll,pitch,yaw")
	for i, u := range []string{"s", "deg", "deg", "deg"} {
		columns[i].Unit = u
	}
	found = Find(columns)
	require.Len(t, found.Channels, 1)
	unit, _ = found.Channels[0].Value.Claims.On(convention.OfUnit)
	assert.Equal(t, "roll deg", unit.Text)
	assert.Equal(t, &Time{Column: 0, Fine: -1, Unit: "s"}, found.Time)
}

func TestTime(t *testing.T) {
	for line, want := range map[string]*Time{
		"t,x":                                    {0, -1, 0, ""},
		"#timestamp,x":                           {0, -1, 0, ""},
		"timestamp [ns],x":                       {0, -1, 0, "ns"},
		"x,time_us":                              {1, -1, 0, "us"},
		"frame,hps.corrected_tms,ert":            {2, -1, 0, ""},
		"TimeUS,Roll":                            {0, -1, 0, "us"},
		"frame,time_boot_ms":                     {1, -1, 0, "ms"},
		"t_s,x":                                  {0, -1, 0, "s"},
		"seconds,timestamp":                      {1, -1, 0, ""},
		"%time,field.header.stamp":               {0, -1, 0, ""},
		"header.stamp.secs,header.stamp.nsecs,x": {0, 1, 1e9, "s"},
		"h.stamp.sec,h.stamp.nanosec,x":          {0, 1, 1e9, "s"},
		"tv_sec,tv_usec":                         {0, 1, 1e6, "s"},
		"elapsed (s),x":                          {0, -1, 0, "s"},
		"t_x,t_y,t_z":                            nil,
		"time_offset,x":                          nil,
		"time [m],x":                             nil,
		"x,y":                                    nil,
		"":                                       nil,
	} {
		assert.Equal(t, want, Find(header(line)).Time, line)
	}
}

// No header, however odd, makes Find panic or return columns that are not there.
func FuzzFind(f *testing.F) {
	for _, line := range []string{"qw,qx,qy,qz", "q_RS_w [],roll(\u00b0)", "R[0][0],dcm_01", "\u00c4QuatX,(,[],{}", "_,-,.", "AAaA0B", "\xce0"} {
		f.Add(line)
	}
	f.Fuzz(func(t *testing.T, line string) {
		columns := header(line)
		found := Find(columns)
		seen := map[int]bool{}
		for _, c := range append(found.Channels, found.Undecided...) {
			require.NotEmpty(t, c.Value.Key)
			for _, i := range c.Columns {
				require.Less(t, i, len(columns))
				require.False(t, seen[i], "column %d is in two channels", i)
				seen[i] = true
			}
		}
	})
}
