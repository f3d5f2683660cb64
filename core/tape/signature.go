package tape

import "strconv"

// Mode says how a parameter or result is passed.
type Mode uint8

const (
	// Value is passed as its words, one for each field.
	Value Mode = iota
	// Pointer is one word, the address of the fields. After a run the fields
	// of a pointer parameter are read back: they may have been written.
	Pointer
	// Slice is three words, address, length and capacity, of Len elements. The
	// fields of all elements are listed, and read back as those of a pointer.
	Slice
	// Hidden is any other value. A program with hidden parameters can be called
	// but not be run by itself; a hidden result is not read.
	Hidden
)

var modeNames = [...]string{"value", "pointer", "slice", "hidden"}

func (m Mode) String() string {
	if int(m) < len(modeNames) {
		return modeNames[m]
	}
	return "mode" + strconv.Itoa(int(m))
}

// Field is one scalar of a parameter or result.
type Field struct {
	Path string // within the value, as the author writes it: ".W", "[0][2]", ""
	Kind Kind
}

// Named is a named constant of an enumeration.
type Named struct {
	Name  string
	Value int64
}

// Param describes one parameter; the receiver of a method comes first.
type Param struct {
	Name     string
	Type     string // with the path of its package: "gonum.org/v1/gonum/num/quat.Number"
	Mode     Mode
	Receiver bool
	Words    int     // words that the parameter takes in the frame
	Len      int     // elements of a slice
	Fields   []Field // scalars; none if hidden
	Values   []Named // constants declared of this integer type, for sweeping
}

// Result describes one result.
type Result struct {
	Name   string
	Type   string
	Mode   Mode
	Words  int
	Len    int
	Fields []Field
}

// Signature describes what goes into a program and what comes out.
type Signature struct {
	Params  []Param
	Results []Result
}

// Words returns the number of words that all parameters take in the frame.
func (s *Signature) Words() int {
	n := 0
	for i := range s.Params {
		n += s.Params[i].Words
	}
	return n
}

// ResultWords returns the number of words that the program returns.
func (s *Signature) ResultWords() int {
	n := 0
	for i := range s.Results {
		n += s.Results[i].Words
	}
	return n
}

// Runnable reports whether every parameter can be given as numbers.
func (s *Signature) Runnable() bool {
	for i := range s.Params {
		if s.Params[i].Mode == Hidden {
			return false
		}
	}
	return true
}

// Port is one scalar that goes in or comes out.
type Port struct {
	Param  int // index into Params, or -1
	Result int // index into Results, or -1
	Field  int // index into Fields
	Kind   Kind
	Name   string // as the author would write it: "q.W", "m[0][2]", "result.X"
}

// Inputs returns the scalars that go in, in the order of [Batch] inputs:
// parameter by parameter, field by field.
func (s *Signature) Inputs() []Port {
	var ports []Port
	for i := range s.Params {
		p := &s.Params[i]
		for j, f := range p.Fields {
			ports = append(ports, Port{Param: i, Result: -1, Field: j, Kind: f.Kind, Name: s.ParamName(i) + f.Path})
		}
	}
	return ports
}

// Outputs returns the scalars that come out, in the order of [Batch] outputs:
// the fields of all results, then those of all pointer and slice parameters as
// the program leaves them.
func (s *Signature) Outputs() []Port {
	var ports []Port
	for i := range s.Results {
		for j, f := range s.Results[i].Fields {
			ports = append(ports, Port{Param: -1, Result: i, Field: j, Kind: f.Kind, Name: s.ResultName(i) + f.Path})
		}
	}
	for i := range s.Params {
		p := &s.Params[i]
		if p.Mode != Pointer && p.Mode != Slice {
			continue
		}
		for j, f := range p.Fields {
			ports = append(ports, Port{Param: i, Result: -1, Field: j, Kind: f.Kind, Name: s.ParamName(i) + f.Path})
		}
	}
	return ports
}

// ParamName returns the name of parameter i, or "arg1", "arg2" ... for one
// without.
func (s *Signature) ParamName(i int) string {
	if n := s.Params[i].Name; n != "" && n != "_" {
		return n
	}
	return "arg" + strconv.Itoa(i+1)
}

// ResultName returns the name of result i, or "result" for a lone one without,
// or "result1", "result2" ....
func (s *Signature) ResultName(i int) string {
	if n := s.Results[i].Name; n != "" && n != "_" {
		return n
	}
	if len(s.Results) == 1 {
		return "result"
	}
	return "result" + strconv.Itoa(i+1)
}
