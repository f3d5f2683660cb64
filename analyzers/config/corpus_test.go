package config

import (
	"os"
	"path/filepath"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// corpus is a folder of public files that stands beside the project. They are
// not ours to copy; without the folder the tests that use it are skipped.
const corpus = "../../../shared/corpus/configs"

// What each file holds, counted by hand from its text: values that are read, and
// values that are rightly left undecided.
func TestCorpus(t *testing.T) {
	for name, want := range map[string][2]int{
		"apollo_imu_localization_extrinsics.yaml": {1, 0},
		"basalt_euroc_ds_calib.json":              {4, 0},
		"euroc_cam0_sensor.yaml":                  {1, 0},
		"gltf_matrix_trs.gltf":                    {0, 1}, // the matrix may have a scale
		"gltf_rotation_non_unit.gltf":             {1, 0},
		"json_vlmap_extrinsics.json":              {15, 0},
		"liosam_params.yaml":                      {2, 0},
		"openvins_rpng_sim_imucam.yaml":           {4, 0},
		"openvins_t265_imucam.yaml":               {3, 0},
		"viam_frame.json":                         {1, 1}, // an orientation vector, which is no axis and angle
		"vins_d435i.yaml":                         {2, 0},
		"anipose_mocap_calibration.toml":          {0, 6}, // camera matrices; "rotation" with three numbers
		"apm_BigOwl_14_mandatory.param":           {0, 1},
		"apm_X500V2_05_board_orientation.param":   {0, 1},
		"ccsds_APM-euler-angles-rates.xml":        {1, 0},
		"ccsds_APM-wrong-Euler-sequence.kvn":      {1, 1}, // sequence 331
		"ccsds_APMExample01.kvn":                  {1, 0},
		"gtsam_pose3example.g2o.txt":              {11, 0},
		"kitti_raw_calib_velo_to_cam.txt":         {1, 0},
		"opencv_roco321_extrinsics.xml":           {3, 3}, // P1, P2, Q
		"ros_vehicle_launch_static_tf.launch":     {8, 0},
		"ros_vod_static_tf.launch":                {2, 0},
		"sdf_rotations_in_quaternions.sdf":        {1, 0},
		"spice_ctim_v01.frames.fk.tf":             {1, 0},
		"viam_ur5e.urdf":                          {19, 0},
	} {
		t.Run(name, func(t *testing.T) {
			text, err := os.ReadFile(filepath.Join(corpus, name))
			if os.IsNotExist(err) {
				t.Skipf("%s is not beside the project", name)
			}
			require.NoError(t, err)
			r, err := Read(name, text)
			require.NoError(t, err)
			var got [2]int
			for _, v := range r.Values {
				if v.Decided() {
					got[0]++
				} else {
					got[1]++
				}
				assert.Empty(t, v.Of, "%s: no file of these states an orientation twice in one map", v.Key)
				for _, n := range v.Numbers {
					assert.Equal(t, n.Text, cut(t, string(text), n.Place))
				}
			}
			assert.Equal(t, want, got)
			if name != "ccsds_APM-wrong-Euler-sequence.kvn" {
				assert.Empty(t, r.Warnings)
			}
		})
	}
}
