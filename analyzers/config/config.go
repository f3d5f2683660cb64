// Package config finds the orientations in a configuration or calibration file.
//
// A reader of the format turns the text into a tree (package tree); here the
// tree is walked, and every group of numbers that has the shape of an
// orientation is looked up in the lexicon (package claims): what its key says,
// what the keys beside it say, what the comments say. Where nothing says that
// the numbers are an orientation, they are none; where the words leave two
// readings, the value is returned with a reason and stays undecided.
//
// # Adding a format
//
// A format is one package that turns a source.File into a tree.Document, and one
// line in the table of formats. If its specification fixes conventions (glTF
// does), a table of those goes beside it: see specification.
package config

import (
	"bytes"
	"fmt"
	"path"
	"strings"

	"dextral/analyzers/config/jsondoc"
	"dextral/analyzers/config/linedoc"
	"dextral/analyzers/config/sourcedoc"
	"dextral/analyzers/config/tomldoc"
	"dextral/analyzers/config/tree"
	"dextral/analyzers/config/xmldoc"
	"dextral/analyzers/config/yamldoc"
	"dextral/analyzers/source"
	"dextral/rules"
	"dextral/rules/policy"
)

// Result is what a file says about orientations.
type Result struct {
	Values   []*rules.Value // in the order in which they stand
	Warnings []Warning
	Waivers  []source.Directive // comments that speak to dextral
}

// Warning is something about a file that is not a finding but that whoever
// trusts the result should know: a key that stands twice, a list that is none.
type Warning struct {
	Place   rules.Place
	Message string
}

// format is a format that can be read.
type format struct {
	name string
	read func(*source.File) (*tree.Document, error)
	spec func(*tree.Document) specification // for what the format itself fixes; nil for nothing
	code bool                               // a program, see code.go
}

// always is for formats with one specification.
func always(spec specification) func(*tree.Document) specification {
	return func(*tree.Document) specification { return spec }
}

var formats = map[string]format{
	".yaml":       {"YAML", yamldoc.Read, nil, false},
	".yml":        {"YAML", yamldoc.Read, nil, false},
	".json":       {"JSON", jsondoc.Read, nil, false},
	".jsonc":      {"JSON", jsondoc.Read, nil, false},
	".gltf":       {"glTF", jsondoc.Read, always(gltf), false},
	".toml":       {"TOML", tomldoc.Read, nil, false},
	".xml":        {"XML", xmldoc.Read, byRoot, false},
	".urdf":       {"URDF", xmldoc.Read, byRoot, false},
	".xacro":      {"URDF", xmldoc.Read, byRoot, false},
	".sdf":        {"SDF", xmldoc.Read, byRoot, false},
	".world":      {"SDF", xmldoc.Read, byRoot, false},
	".launch":     {"launch file", xmldoc.Read, byRoot, false},
	".mjcf":       {"MJCF", xmldoc.Read, byRoot, false},
	".ini":        {"INI", linedoc.Sections, nil, false},
	".cfg":        {"INI", linedoc.Sections, nil, false},
	".conf":       {"INI", linedoc.Sections, nil, false},
	".properties": {"properties", linedoc.Sections, nil, false},
	".param":      {"parameter file", linedoc.Parameters, always(parameters), false},
	".params":     {"parameter file", linedoc.Parameters, always(parameters), false},
	".parm":       {"parameter file", linedoc.Parameters, always(parameters), false},
	".g2o":        graphFormat,
	".c":          {"C", sourcedoc.Read, nil, true},
	".h":          {"C", sourcedoc.Read, nil, true},
	".cc":         {"C++", sourcedoc.Read, nil, true},
	".cpp":        {"C++", sourcedoc.Read, nil, true},
	".cxx":        {"C++", sourcedoc.Read, nil, true},
	".hh":         {"C++", sourcedoc.Read, nil, true},
	".hpp":        {"C++", sourcedoc.Read, nil, true},
	".hxx":        {"C++", sourcedoc.Read, nil, true},
	".py":         {"Python", sourcedoc.Read, nil, true},
	".m":          {"MATLAB", sourcedoc.Read, nil, true},
}

// Formats that are told by their first lines.
var (
	graphFormat   = format{"pose graph", linedoc.Graph, always(poseGraph), false}
	messageFormat = format{"CCSDS attitude parameter message", linedoc.KeyValue, always(ccsds), false}
	kernelFormat  = format{"SPICE text kernel", linedoc.Kernel, always(spice), false}
	sheetFormat   = format{"table by name", linedoc.Sheet, nil, false}
	colonFormat   = format{"calibration text", linedoc.Colon, nil, false}
)

// Format names the format of a file by its name; "" if the name does not tell,
// or tells of none that is read.
func Format(name string) string { return formats[strings.ToLower(path.Ext(name))].name }

// Recognise names the format of a file by its name or, where that does not tell,
// by its first bytes; "" if it is none that is read.
func Recognise(name string, head []byte) string { return recognise(name, head).name }

func recognise(name string, head []byte) format {
	extension := strings.ToLower(path.Ext(name))
	if f, ok := formats[extension]; ok {
		return f
	}
	start := bytes.TrimPrefix(head[:min(len(head), 64)], []byte(source.ByteOrderMark))
	switch {
	case bytes.HasPrefix(bytes.TrimLeft(start, " \r\n"), []byte("CCSDS_APM_VERS")):
		return messageFormat
	case linedoc.IsKernel(head[:min(len(head), headSize)]):
		return kernelFormat
	case linedoc.IsGraph(head):
		return graphFormat
	case (extension == ".csv" || extension == ".tsv") && isSheet(name, head):
		return sheetFormat
	case extension == ".txt" && linedoc.IsColon(head[:min(len(head), headSize)]):
		return colonFormat
	}
	return format{}
}

// headSize is how much of a text is looked at to tell what it is.
const headSize = 4096

// byRoot tells the formats in XML by their root element. Others are read by
// custom, as OpenCV's storage is.
func byRoot(d *tree.Document) specification {
	for _, e := range d.Roots[0].Entries {
		switch e.Key {
		case "robot":
			return urdf
		case "sdf", "gazebo":
			return sdf
		case "launch":
			return launch
		case "mujoco", "mujocoinclude":
			return mjcf
		case "apm":
			return ccsds
		}
	}
	return nil
}

// Read reads a file whose format Recognise knows. The error is of type *source.Error,
// with the place of the fault and what to do; the values found before it are
// not returned.
func Read(name string, text []byte) (Result, error) {
	f := source.New(name, text)
	format := recognise(name, text)
	if err := f.CheckText(); err != nil && !format.code { // comments of old sources are in many encodings
		return Result{}, err
	}
	if format.read == nil {
		return Result{}, f.ErrorAt(source.Span{}, "this format is not read", "give the file the usual ending of its format")
	}
	if format.code && len(text) > sourcedoc.MaxBytes {
		return Result{Warnings: []Warning{{rules.Place{Path: name}, fmt.Sprintf("sources of more than %d MB are not read; they are tables that a program wrote", sourcedoc.MaxBytes>>20)}}}, nil
	}
	doc, err := format.read(f)
	if err != nil {
		return Result{}, err
	}
	waivers := f.Directives(doc.Comments, policy.Addresses)
	for i, c := range doc.Comments {
		if policy.Addresses(c.Text) {
			doc.Comments[i].Text = "" // claims nothing
		}
	}
	var spec specification
	if format.spec != nil {
		spec = format.spec(doc)
	}
	w := newWalker(doc, spec)
	w.code = format.code
	w.walk()
	result := w.result()
	result.Waivers = waivers
	return result, nil
}
