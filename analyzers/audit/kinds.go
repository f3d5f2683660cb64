package audit

import (
	"bytes"
	"context"
	"io"
	"os"
	"path/filepath"
	"regexp"
	"slices"
	"strings"

	"dextral/analyzers/config"
	"dextral/analyzers/message"
	"dextral/analyzers/rewrite"
	"dextral/analyzers/series"
	"dextral/analyzers/source"
	"dextral/analyzers/walk"
	"dextral/rules"
	"dextral/rules/policy"
	"dextral/rules/report"
)

// kind is how a file is treated.
type kind uint8

const (
	other      kind = iota // text of no format that can hold orientations
	goFile                 // read with its package
	configFile             // read whole
	logFile                // streamed
	sheet                  // dextral.toml, read before all else
	unreadable             // recognised by name or first bytes, not read yet
	binary
)

// kindOf judges by the name alone.
func kindOf(name string) kind {
	base := filepath.Base(name)
	switch {
	case strings.EqualFold(filepath.Ext(base), ".go"):
		return goFile
	case slices.Contains(policy.Names, base):
		return sheet
	case config.Format(base) != "":
		return configFile
	}
	return other
}

// unreadConfigs names formats that often hold orientations and have no reader
// yet, by extension.
var unreadConfigs = map[string]string{
	".bvh": "motion capture (BVH)", ".glb": "binary glTF",
	".usd": "USD", ".usda": "USD", ".fbx": "FBX", ".dae": "COLLADA",
}

// unreadHeads names such formats by what stands in their first line.
var unreadHeads = map[string]string{"42: ": "text file of the simulator 42"}

func unreadConfig(name string, head []byte) string {
	if config.Format(filepath.Base(name)) != "" {
		return ""
	}
	first, _, _ := bytes.Cut(head, []byte("\n"))
	for mark, kind := range unreadHeads {
		if bytes.HasPrefix(first, []byte("<<<<")) && bytes.Contains(first, []byte(mark)) {
			return kind
		}
	}
	return unreadConfigs[strings.ToLower(filepath.Ext(name))]
}

// reader reads one file.
type reader func(context.Context, walk.File, *Options) *found

func readerOf(f walk.File) reader {
	switch kindOf(f.Name) {
	case configFile:
		return readConfig
	case sheet:
		return func(context.Context, walk.File, *Options) *found { return &found{kind: sheet} }
	}
	return readByHead
}

func failed(k kind, f walk.File, err error) *found {
	return &found{kind: k, failures: []report.Failure{failure(rules.Place{Path: f.Path}, err)}}
}

// speaksOfOrientation is what a file says if it may hold orientations. A file
// met on the way that cannot be parsed, such as a template or a test's broken
// input, is worth a failed audit only if it says so.
var speaksOfOrientation = regexp.MustCompile(`(?i)quat|rot(at|or|mat)|euler|roll|pitch|yaw|orient|attitude|rpy|ypr|dcm|extrinsic|transform|ax[ei]s|pose|frame|[RTq]_[a-z]`)

func readConfig(ctx context.Context, f walk.File, o *Options) *found {
	if err := source.CheckSize(f.Path, f.Size); err != nil {
		return failed(configFile, f, err)
	}
	text, err := os.ReadFile(f.Name)
	if err != nil {
		return failed(configFile, f, err)
	}
	if message.IsEphemeris(text) {
		return readEphemeris(ctx, f, bytes.NewReader(text))
	}
	r, err := config.Read(f.Path, text)
	switch {
	case err != nil && !f.Asked && !speaksOfOrientation.Match(text):
		return &found{kind: other}
	case err != nil:
		return failed(configFile, f, err)
	}
	result := &found{kind: configFile, values: r.Values, sum: rewrite.SumOf(text)}
	if message.IsParameters(text) {
		result.findings = message.CheckParameters(f.Path, text)
	}
	result.waiversIn(r.Waivers)
	for _, w := range r.Warnings {
		result.limited = append(result.limited, report.Failure{Place: w.Place, Message: w.Message})
	}
	return result
}

// headSize is how much of a file is read to tell what it is.
const headSize = series.HeadSize

// readByHead opens a file whose name does not settle what it is, and looks at
// its first bytes.
func readByHead(ctx context.Context, f walk.File, o *Options) *found {
	file, err := os.Open(f.Name)
	if err != nil {
		return failed(other, f, err)
	}
	defer file.Close()
	head := make([]byte, headSize)
	n, err := io.ReadFull(file, head)
	if err != nil && err != io.EOF && err != io.ErrUnexpectedEOF {
		return failed(other, f, err)
	}
	head = head[:n]
	if message.IsEphemeris(head) {
		return readEphemeris(ctx, f, io.MultiReader(bytes.NewReader(head), file))
	}
	if config.Recognise(f.Name, head) != "" {
		return readConfig(ctx, f, o)
	}
	if series.IsParquet(head) {
		return readParquet(ctx, f, file)
	}
	return readLog(ctx, f, head, io.MultiReader(bytes.NewReader(head), o.watched(f, file)), o)
}
