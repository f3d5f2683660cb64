package series

import (
	"context"
	"fmt"
	"os"
	"path/filepath"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/core/convention"
	"dextral/core/kinematics"
)

// corpus holds public logs that are not part of this repository, with an index
// that says what a computation with other tools found in each.
const corpus = "../../../shared/corpus/logs"

func corpusLog(t *testing.T, name string) (Kind, Result) {
	file := filepath.Join(corpus, name)
	data, err := os.ReadFile(file)
	if os.IsNotExist(err) {
		t.Skipf("%s is not here: the corpus of public logs is kept beside the repository", file)
	}
	require.NoError(t, err)
	kind := Recognise(name, data[:min(len(data), HeadSize)])
	f, err := os.Open(file)
	require.NoError(t, err)
	defer f.Close()
	r, err := Read(context.Background(), name, f, Options{})
	require.NoError(t, err)
	return kind, r
}

// What is expected of each log: rows and counts are those of the index beside
// the logs, or of wc and awk.
func TestCorpus(t *testing.T) {
	for _, c := range []struct {
		name, key    string
		form         convention.Form
		scalar       convention.ScalarPlace
		rows         int64
		jumps, stuck int64
		half         float64
		single       bool
		unit         string
	}{
		{"euroc_V102_groundtruth.csv", "q_RS", convention.Quaternion, convention.ScalarFirst, 16702, 8, 0, 0.5e-6, false, "ns"},
		{"tum_V102_estimate.txt", "columns 5-8", convention.Quaternion, convention.ScalarLast, 807, 26, 4, 0.5e-5, false, "s"},
		{"tum_freiburg1_xyz-rgbdslam_drift_short.txt", "columns 5-8", convention.Quaternion, convention.ScalarLast, 40, 0, 0, 0.5e-6, false, "s"},
		{"kitti_00_gt.txt", "columns 1-12", convention.Transform, convention.ScalarUnstated, 4541, 0, 0, 0.5e-7, false, ""},
		{"ros_quadruped_imu.csv", "field.orientation", convention.Quaternion, convention.ScalarFirst, 2635, 0, 248, 0.5e-12, false, "ns"},
		{"iss_openloop_sc_ck.csv", "hps.bad_quat_iss_eci", convention.Quaternion, convention.ScalarFirst, 300, 0, 0, 0.5e-15, true, "s"},
	} {
		t.Run(c.name, func(t *testing.T) {
			kind, r := corpusLog(t, c.name)
			assert.True(t, kind.Readable)
			assert.Zero(t, r.BadRows)
			assert.Empty(t, r.Undecided)
			require.Len(t, r.Channels, 1)
			s := r.Channels[0]
			assert.Equal(t, c.key, s.Value.Key)
			assert.Equal(t, c.form, s.Value.Form)
			assert.Equal(t, c.scalar, s.Value.Claims.Scalar())
			assert.Equal(t, c.rows, r.Rows)
			assert.Equal(t, c.jumps, s.Continuity.JumpCount)
			assert.InEpsilon(t, c.half, s.Half, 1e-9)
			assert.Equal(t, c.single, s.Float32)
			assert.Equal(t, c.unit, s.Unit)
			if r.Clock != nil {
				assert.Equal(t, c.stuck, r.Clock.NonIncreasing())
			}
		})
	}
}

// The greatest norm is in the index; row and stamp of the first sign jump are those
// that awk finds.
func TestCorpusParticulars(t *testing.T) {
	_, r := corpusLog(t, "euroc_V102_groundtruth.csv")
	s := r.Channels[0]
	assert.Equal(t, "1.000152", fmt.Sprintf("%.6f", s.Continuity.MaxNorm.Value))
	first := s.Continuity.Jumps[0]
	assert.EqualValues(t, 1553, first.Row)
	assert.Equal(t, 1554, s.RowPlace(first.Row).Line)
	assert.Equal(t, "1403715532667143168", s.Stamp(first.T))

	_, r = corpusLog(t, "kitti_00_gt.txt")
	m := r.Channels[0].Matrices
	assert.Zero(t, m.Mirrors.Count)
	worst := func(e kinematics.Extreme) float64 { return max(e.Value-1, 1-e.Value) }
	assert.Less(t, max(worst(m.Det.Min), worst(m.Det.Max)), 2.1e-7, "the index says 2e-7")
}

// Rows and numbers of the first row are those that a dozen lines of Python with its
// module struct take from the file.
func TestCorpusULog(t *testing.T) {
	kind, r := corpusLog(t, "px4_sample_log_small.ulg")
	assert.Equal(t, Kind{"ULog", true}, kind)
	assert.Zero(t, r.BadRows)
	assert.Empty(t, r.Undecided)
	require.NotEmpty(t, r.Channels)
	s := r.Channels[0]
	assert.Equal(t, "vehicle_attitude.q", s.Value.Key)
	assert.EqualValues(t, 1298, s.Rows)
	assert.Equal(t, "us", s.Clock.Unit)
	assert.Equal(t, "20326716", s.Clock.First)
	assert.True(t, s.Float32)
	assert.Equal(t, convention.ScalarFirst, s.Value.Claims.Scalar())
	for i, want := range []float64{0.9926282167434692, 0.00946800597012043, 0.00018696938059292734, 0.12082850188016891} {
		assert.Equal(t, want, s.Value.Numbers[i].Value)
	}
}

func TestCorpusNotReadable(t *testing.T) {
	for name, want := range map[string]Kind{
		"tf_example.bag":    {Name: "ROS bag"},
		"aem_Example14.kvn": {Name: "CCSDS attitude ephemeris (KVN)"},
	} {
		kind, r := corpusLog(t, name)
		assert.Equal(t, want, kind, name)
		assert.Empty(t, r.Channels, name)
	}
}
