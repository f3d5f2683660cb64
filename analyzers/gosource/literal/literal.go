package literal

import (
	_ "embed"
	"go/token"
	"reflect"

	"golang.org/x/tools/go/analysis"

	"dextral/analyzers/gosource/doc"
	"dextral/analyzers/source"
	"dextral/rules"
)

//go:embed doc.go
var essay string

// Analyzer finds the orientations that a package's composite literals state.
// It reports nothing: its Result is for package rules to judge.
var Analyzer = &analysis.Analyzer{
	Name:             "orientationliteral",
	Doc:              doc.Section(essay),
	Run:              run,
	RunDespiteErrors: true, // what type-checks is worth reading
	ResultType:       reflect.TypeFor[*Result](),
}

// Result lists what one package states, in the order of its files. Paths in
// places are the names under which the driver opened the files.
type Result struct {
	Values  []*rules.Value
	Skipped []Skip
}

// Skip is a literal that has the looks of an orientation and is not judged.
type Skip struct {
	Place rules.Place
	Why   Reason
}

// Reason says why a literal is not judged.
type Reason uint8

// The reasons.
const (
	InTest      Reason = iota // a test may state a wrong orientation on purpose
	Normalised                // it is made unit at once, so its norm means nothing
	NotConstant               // it is computed at run time
	Operand                   // an argument or operand, which nobody names
	Altered                   // the variable is changed before it is used
)

// String completes the sentence "is not judged: ...".
func (r Reason) String() string {
	return [...]string{
		"it stands in a test",
		"it is normalised at once",
		"it is computed at run time",
		"it is an argument or an operand, which nothing names",
		"it is changed after it is initialised",
	}[r]
}

func run(pass *analysis.Pass) (any, error) {
	w := &walker{
		pass: pass, result: &Result{}, sources: map[*token.File]*source.File{},
		altered: altered(pass.Files, pass.TypesInfo), declared: declared(pass.Files, pass.TypesInfo),
	}
	for _, file := range pass.Files {
		w.enter(file)
	}
	return w.result, nil
}
