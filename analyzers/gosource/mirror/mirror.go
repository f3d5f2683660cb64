package mirror

import (
	_ "embed" // of the package's essay
	"fmt"
	"math"
	"slices"
	"strings"

	"golang.org/x/tools/go/analysis"

	"dextral/analyzers/gosource/doc"
	"dextral/analyzers/gosource/found"
	"dextral/analyzers/gosource/measure"
	"dextral/analyzers/gosource/named"
	"dextral/core/convention"
	"dextral/core/frame"
	"dextral/core/matrix"
	"dextral/core/operation"
	"dextral/rules"
)

//go:embed doc.go
var essay string

// Analyzer reports functions that mirror.
var Analyzer = &analysis.Analyzer{
	Name:       "mirror",
	Doc:        doc.Section(essay),
	Run:        run,
	Requires:   []*analysis.Analyzer{measure.Analyzer},
	ResultType: found.Type,
}

func run(pass *analysis.Pass) (any, error) {
	measured := pass.ResultOf[measure.Analyzer].(*measure.Result)
	c := found.In(pass)
	for _, f := range measured.Funcs {
		if f.Decl == nil {
			continue
		}
		for _, s := range f.Cases {
			if x := judge(measured, f, s); x != nil {
				c.Add(x, f.Decl.Name)
				break
			}
		}
	}
	return c.Done()
}

func judge(measured *measure.Result, f *measure.Function, c *measure.Case) *rules.Finding {
	if !c.Identity.Known() || c.Identity.Readings[0].Map == nil {
		return nil
	}
	m := *c.Identity.Readings[0].Map
	if !orthogonal(m) {
		return nil
	}
	switch c.Identity.Op() {
	case operation.LinearMap:
		return vectors(f, c, m)
	case operation.AxisMapped:
		return quaternions(measured, f, c, m)
	}
	return nil
}

// orthogonal reports whether a map keeps lengths and angles.
func orthogonal(m matrix.Mat3) bool {
	return m.Mul(m.Transpose()).Sub(matrix.Identity).Norm() < 1e-4
}

// vectors judges a map of vectors that keeps lengths.
func vectors(f *measure.Function, c *measure.Case, m matrix.Mat3) *rules.Finding {
	from, to, ok := frames(f.Object.Name())
	switch {
	case ok && from.Handedness() == convention.RightHanded && to.Handedness() == convention.RightHanded && m.Det() < 0:
		x := finding(f, c, m, rules.MirroringFunction, rules.Error, fmt.Sprintf(
			"%s maps %s, which has determinant -1: it mirrors, and no rotation leads from one right-handed frame to another so", f.Label(c), images(m)))
		x.Claim = "a map between right-handed frames, by name"
		return x
	case ok && from.Setting() == to.Setting():
		want := to.Matrix().Transpose().Mul(from.Matrix())
		if want.Sub(m).Norm() < 1e-4 {
			return nil
		}
		x := finding(f, c, m, rules.FunctionMislabelled, rules.Error, fmt.Sprintf(
			"%s maps %s; between the frames of its name the map is %s", f.Label(c), images(m), images(want)))
		x.Claim = "the map between two frames, by name"
		return x
	case !ok && m.Det() < 0 && slices.ContainsFunc(named.Words(f.Object.Name()), rotates):
		x := finding(f, c, m, rules.MirroringFunction, rules.Error, fmt.Sprintf(
			"%s maps %s, which has determinant -1: it mirrors, and is called a rotation", f.Label(c), images(m)))
		x.Claim = "a rotation, by name"
		return x
	}
	return nil
}

func rotates(word string) bool {
	switch word {
	case "rotate", "rotated", "rotation", "rot90", "turn":
		return true
	}
	return false
}

// quaternions judges a change of a quaternion's axes.
func quaternions(measured *measure.Result, f *measure.Function, c *measure.Case, m matrix.Mat3) *rules.Finding {
	if m.Det() > 0 || !measured.Orients(f, c, nil) {
		return nil
	}
	level := rules.Warning
	what := ""
	if _, _, ok := frames(f.Object.Name()); ok {
		level = rules.Error
		what = " between the frames of its name"
	}
	x := finding(f, c, m, rules.MirroringFunction, level, fmt.Sprintf(
		"%s maps the vector part of a quaternion, %s, with determinant -1; a change of axes%s, mirrored or not, has +1: the result turns the other way", f.Label(c), images(m), what))
	x.Claim = "a change of axes, by what it computes"
	return x
}

func finding(f *measure.Function, c *measure.Case, m matrix.Mat3, rule string, level rules.Level, message string) *rules.Finding {
	return &rules.Finding{
		Rule: rule, Level: level, Key: f.Key(), Message: message,
		Remedy: "of the three axes an even number changes its sign, or two change places and one its sign",
		Evidence: []rules.Evidence{
			{What: "map", Computed: rules.Words(images(m))},
			{What: "determinant", Stated: rules.Plain(1), Computed: rules.Plain(m.Det()), Residual: rules.Plain(c.Identity.Residual)},
		},
	}
}

// images prints what becomes of the three numbers: (x, y, z) to (y, x, -z).
func images(m matrix.Mat3) string {
	var parts []string
	for _, row := range m {
		var terms []string
		for k, x := range row {
			if math.Abs(x) < 1e-9 {
				continue
			}
			axis := "xyz"[k : k+1]
			switch {
			case x == 1:
				terms = append(terms, axis)
			case x == -1:
				terms = append(terms, "-"+axis)
			default:
				terms = append(terms, fmt.Sprintf("%.4g*%s", x, axis))
			}
		}
		parts = append(parts, strings.ReplaceAll(strings.Join(terms, " + "), "+ -", "- "))
	}
	return "(x, y, z) to (" + strings.Join(parts, ", ") + ")"
}

// frames reads two triads out of a name: NEDToENU, enuFromNED, ned2enu.
func frames(name string) (from, to frame.Triad, ok bool) {
	words := named.Words(name)
	if len(words) == 1 {
		if a, b, cut := strings.Cut(words[0], "2"); cut {
			words = []string{a, "to", b}
		}
	}
	for i := 1; i+1 < len(words); i++ {
		reversed := words[i] == "from"
		if words[i] != "to" && !reversed {
			continue
		}
		a, errA := frame.ParseTriad(strings.ToUpper(words[i-1]))
		b, errB := frame.ParseTriad(strings.ToUpper(words[i+1]))
		if errA != nil || errB != nil {
			continue
		}
		if reversed {
			return b, a, true
		}
		return a, b, true
	}
	return from, to, false
}
