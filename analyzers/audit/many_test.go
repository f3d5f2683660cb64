package audit

import (
	"bytes"
	"context"
	"fmt"
	"os"
	"path/filepath"
	"testing"
	"time"

	"dextral/analyzers/config/jsondoc"
	"dextral/analyzers/config/linedoc"
	"dextral/analyzers/config/tomldoc"
	"dextral/analyzers/config/tree"
	"dextral/analyzers/config/xmldoc"
	"dextral/analyzers/config/yamldoc"
	"dextral/analyzers/source"
)

// smallFiles are the formats of BenchmarkManyFiles: what one sensor is written like,
// what stands before and after all of them, and the parser.
var smallFiles = []struct {
	name, before, sensor, between, after string
	parse                                func(*source.File) (*tree.Document, error)
}{
	{"mount.yaml", "", "sensor%d:\n  # scalar first\n  mount_quaternion: [0.72, 0.48, -0.44, 0.24]\n  serial: 17\n  gains: [1.0, 2.0, 3.0, 4.0, 5.0]\n  T_a_b: [[0, -1, 0, 1.5], [1, 0, 0, 0.25], [0, 0, 1, 0]]\n", "", "", yamldoc.Read},
	{"mount.json", "{", "\"sensor%d\": {\"mount_quaternion_wxyz\": [0.72, 0.48, -0.44, 0.24], \"serial\": 17, \"gains\": [1.0, 2.0, 3.0, 4.0, 5.0], \"T_a_b\": [[0, -1, 0, 1.5], [1, 0, 0, 0.25], [0, 0, 1, 0]]}", ",\n", "}\n", jsondoc.Read},
	{"mount.toml", "", "[sensor%d]\nmount_quaternion_wxyz = [0.72, 0.48, -0.44, 0.24]\nserial = 17\ngains = [1.0, 2.0, 3.0, 4.0, 5.0]\nT_a_b = [[0, -1, 0, 1.5], [1, 0, 0, 0.25], [0, 0, 1, 0]]\n", "", "", tomldoc.Read},
	{"mount.xml", "<rig>\n", "<sensor name=\"s%d\" mount_quaternion_wxyz=\"0.72 0.48 -0.44 0.24\"><serial>17</serial><gains>1.0 2.0 3.0 4.0 5.0</gains><rotation_matrix>0 -1 0 1 0 0 0 0 1</rotation_matrix></sensor>\n", "", "</rig>\n", xmldoc.Read},
	{"mount.ini", "", "[sensor%d]\nmount_quaternion_wxyz = 0.72 0.48 -0.44 0.24\nserial = 17\ngains = 1.0 2.0 3.0 4.0 5.0\nrotation_matrix = 0 -1 0 1 0 0 0 0 1\n", "", "", linedoc.Sections},
}

// BenchmarkManyFiles compares the audit of many small files of mixed formats, about 4 kB
// each, with reading and parsing them by the same parsers and doing nothing else, for two
// numbers of files: the ratio of the two is to be below 3, and that of the sizes five.
func BenchmarkManyFiles(b *testing.B) {
	for _, count := range []int{2000, 10000} {
		b.Run(fmt.Sprint(count), func(b *testing.B) {
			dir := b.TempDir()
			type small struct {
				name  string
				parse func(*source.File) (*tree.Document, error)
			}
			var files []small
			bytesWritten := 0
			for i := range count {
				f := smallFiles[i%len(smallFiles)]
				name := filepath.Join(dir, fmt.Sprintf("d%d", i/100), fmt.Sprintf("%d%s", i, f.name))
				if err := os.MkdirAll(filepath.Dir(name), 0o755); err != nil {
					b.Fatal(err)
				}
				var text bytes.Buffer
				text.WriteString(f.before)
				for k := range 24 {
					if k > 0 {
						text.WriteString(f.between)
					}
					fmt.Fprintf(&text, f.sensor, k)
				}
				text.WriteString(f.after)
				bytesWritten += text.Len()
				if err := os.WriteFile(name, text.Bytes(), 0o644); err != nil {
					b.Fatal(err)
				}
				files = append(files, small{name, f.parse})
			}
			var audited, parsed time.Duration
			b.ResetTimer()
			for range b.N {
				start := time.Now()
				r, err := Run(context.Background(), Options{Paths: []string{dir}, Workers: 1})
				if err != nil || len(r.Report.Failed) > 0 {
					b.Fatal(err, r.Report.Failed)
				}
				audited += time.Since(start)
				start = time.Now()
				for _, f := range files {
					text, err := os.ReadFile(f.name)
					if err != nil {
						b.Fatal(err)
					}
					if _, err := f.parse(source.New(f.name, text)); err != nil {
						b.Fatal(err)
					}
				}
				parsed += time.Since(start)
			}
			b.ReportMetric(float64(bytesWritten)/1e6, "MB")
			b.ReportMetric(audited.Seconds()/float64(b.N), "s/audit")
			b.ReportMetric(audited.Seconds()/parsed.Seconds(), "audit/parse")
		})
	}
}
