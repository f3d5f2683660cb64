package config

import (
	"bytes"
	"fmt"
	"strings"
	"testing"

	"github.com/tailscale/hujson"
	"go.yaml.in/yaml/v3"
)

// calibration writes a file of about 4 kB, of the kind that calibration tools
// write: a few orientations among other numbers.
func calibration(yaml bool) []byte {
	var b strings.Builder
	for cam := range 4 {
		fmt.Fprintf(&b, "cam%d:\n  T_cam_imu: # from camera to IMU\n", cam)
		for range 3 {
			b.WriteString("  - [0.0148655429818, -0.999880929698, 0.00414029679422, -0.0216401454975]\n")
		}
		b.WriteString("  - [0.0, 0.0, 0.0, 1.0]\n  cam_overlaps: [1, 2]\n  camera_model: pinhole\n  distortion_coeffs: [-0.28340811, 0.07395907, 0.00019359, 1.76187114e-05]\n")
		b.WriteString("  intrinsics: [458.654, 457.296, 367.215, 248.375] # fu, fv, cu, cv\n  resolution: [752, 480]\n  mount: {rpy_deg: [1.5, 2.5, 3.5], quaternion_wxyz: [1, 0, 0, 0]}\n")
		for k := range 12 {
			fmt.Fprintf(&b, "  parameter_%d: %d.5 # of the driver\n", k, k)
		}
	}
	if yaml {
		return []byte(b.String())
	}
	text := `{"mount": {"rpy_deg": [1.5, 2.5, 3.5], "quaternion_wxyz": [1, 0, 0, 0]}, "R": [[1, 0, 0], [0, 1, 0], [0, 0, 1]]`
	for k := range 150 {
		text += fmt.Sprintf(",\n  \"parameter_%d\": {\"gain\": %d.5}", k, k)
	}
	return []byte(text + "}")
}

// BenchmarkYAML reads a file; parse is the part of the library. Their ratio is
// what the finding of orientations costs.
func BenchmarkYAML(b *testing.B) {
	text := calibration(true)
	b.Run("read", func(b *testing.B) {
		b.SetBytes(int64(len(text)))
		for b.Loop() {
			if r, err := Read("m.yaml", text); err != nil || len(r.Values) != 12 {
				b.Fatal(len(r.Values), err)
			}
		}
	})
	b.Run("parse", func(b *testing.B) {
		b.SetBytes(int64(len(text)))
		for b.Loop() {
			var n yaml.Node
			if err := yaml.NewDecoder(bytes.NewReader(text)).Decode(&n); err != nil {
				b.Fatal(err)
			}
		}
	})
}

// BenchmarkJSON is the same for JSON.
func BenchmarkJSON(b *testing.B) {
	text := calibration(false)
	b.Run("read", func(b *testing.B) {
		b.SetBytes(int64(len(text)))
		for b.Loop() {
			if r, err := Read("m.json", text); err != nil || len(r.Values) != 3 {
				b.Fatal(len(r.Values), err)
			}
		}
	})
	b.Run("parse", func(b *testing.B) {
		b.SetBytes(int64(len(text)))
		for b.Loop() {
			if _, err := hujson.Parse(text); err != nil {
				b.Fatal(err)
			}
		}
	})
}
