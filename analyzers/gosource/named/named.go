package named

import (
	"slices"
	"strings"

	"dextral/analyzers/gosource/measure"
	"dextral/core/operation"
	"dextral/rules"
)

// Claim is what a function is called to compute.
type Claim struct {
	Ops    []operation.Op // any of them would make the name true
	Word   string         // the word that says it, as written
	Source rules.Source   // Label for a name, Comment for the doc comment
}

// Claimed reports whether anything is claimed.
func (c Claim) Claimed() bool { return len(c.Ops) > 0 }

// word is what one word of a name may mean.
type word struct {
	ops []operation.Op
	in  string // kinds that must be among the inputs; "" for any
	out string // kinds that the result must be one of; "" for any
}

// meaning of words, in lower case. Kinds are those of operation.Shape.
var meaning = map[string][]word{}

func say(words string, list ...word) {
	for _, w := range strings.Fields(words) {
		meaning[w] = append(meaning[w], list...)
	}
}

func ops(list ...operation.Op) []operation.Op { return list }

func init() {
	product := ops(operation.Product, operation.MatrixProduct, operation.RotateVector)
	say("mul multiply multiplied mult times product prod compose composed composition concat concatenate hamilton mulquat quatmul", word{ops: product})
	say("conj conjugate conjugated", word{ops: ops(operation.Conjugate)})
	say("inv inverse invert inverted", word{ops: ops(operation.Inverse, operation.Conjugate, operation.MatrixInverse, operation.RigidInverse, operation.Transpose)})
	say("normalize normalized normalise normalised unit", word{ops: ops(operation.Normalise, operation.UnitVector)})
	say("norm", word{ops: ops(operation.Norm, operation.NormSquared, operation.Length), out: "s"}, word{ops: ops(operation.Normalise, operation.UnitVector), out: "qv"})
	say("len length abs magnitude mag norm2 normsq lengthsq sqnorm normsquared lengthsquared", word{ops: ops(operation.Norm, operation.NormSquared, operation.Length), out: "s"})
	say("dot inner dotproduct", word{ops: ops(operation.Dot), out: "s"})
	say("cross", word{ops: ops(operation.Cross)})
	say("rotate rotated rotates rot apply transform transformed act rotatevec rotatevector", word{ops: ops(operation.RotateVector), out: "v"})
	say("rotate rotated rotation rot", word{ops: ops(operation.FromAxisAngle), in: "vs", out: "qmh"}, word{ops: ops(operation.AxisTurn), in: "s", out: "qmh"})
	say("mat matrix dcm rotmat rotationmatrix mat3 mat4 matrix3 matrix4 rotation", word{ops: ops(operation.ToMatrix), in: "q", out: "mh"})
	say("quat quaternion q rotor rotation orientation attitude matrix mat mat3 mat4 dcm", word{ops: ops(operation.FromMatrix), in: "mh", out: "q"})
	say("euler eulers rpy ypr angles roll rollpitchyaw yawpitchroll tait bryan pitch yaw eulerangles", word{ops: ops(operation.AnglesOf), in: "qmh", out: "v"}, word{ops: ops(operation.FromAngles), in: "v", out: "qmh"})
	say("axis axisangle angleaxis aboutaxis", word{ops: ops(operation.FromAxisAngle), in: "vs", out: "qmh"}, word{ops: ops(operation.AxisAngleOf), in: "qmh", out: "vs"}, word{ops: ops(operation.RotateVector), in: "vs", out: "v"})
	say("rotvec rotationvector expmap logmap", word{ops: ops(operation.FromRotvec), in: "v", out: "qmh"}, word{ops: ops(operation.RotvecOf), in: "qmh", out: "v"})
	say("between fromto twovectors arc vectors", word{ops: ops(operation.TwoVectors), in: "v", out: "qmh"})
	say("slerp interpolate interpolation", word{ops: ops(operation.Slerp)})
	say("nlerp", word{ops: ops(operation.Nlerp)})
	say("lerp", word{ops: ops(operation.Lerp, operation.Nlerp)})
	say("derivative deriv qdot rate rates kinematics dot", word{ops: ops(operation.Derivative), in: "qv", out: "q"})
	say("integrate step propagate advance integration", word{ops: ops(operation.Step), in: "qv", out: "q"})
	say("transpose transposed", word{ops: ops(operation.Transpose)})
	say("det determinant", word{ops: ops(operation.Determinant), out: "s"})
	say("skew hat", word{ops: ops(operation.Skew), in: "v", out: "m"})
	for _, axis := range []string{"x", "y", "z"} {
		say("rot"+axis+" rotate"+axis+" rotation"+axis+" about"+axis+" around"+axis, word{ops: ops(operation.AxisTurn), in: "s", out: "qmh"}, word{ops: ops(operation.RotateVector), in: "vs", out: "v"})
	}
}

// Of reads the claim of a function with the operands of a case. Where the name says
// nothing, the first sentence of the doc comment may.
func Of(f *measure.Function, c *measure.Case) Claim {
	shape := f.Question(c).Shape()
	words := Words(f.Object.Name())
	if c := find(words, shape); c.Claimed() {
		c.Source = rules.Label
		return c
	}
	if f.Decl != nil && f.Decl.Doc != nil {
		sentence := strings.FieldsFunc(firstSentence(f.Decl.Doc.Text()), func(r rune) bool { return strings.ContainsRune(" ,;:()-\"'", r) })
		for i, w := range sentence {
			sentence[i] = strings.ToLower(w)
		}
		if len(sentence) > 0 && sentence[0] == strings.ToLower(f.Object.Name()) {
			sentence = sentence[1:]
		}
		if c := find(spoken(sentence), shape); c.Claimed() {
			c.Source = rules.Comment
			return c
		}
	}
	return Claim{}
}

// find collects what words mean for operands of a shape: single words, and two
// written apart.
func find(words []string, shape operation.Shape) Claim {
	var c Claim
	note := func(text string) {
		for _, w := range meaning[text] {
			if !w.fits(shape) {
				continue
			}
			for _, op := range w.ops {
				if !slices.Contains(c.Ops, op) {
					c.Ops = append(c.Ops, op)
				}
			}
			if c.Word == "" {
				c.Word = text
			}
		}
	}
	for i, w := range words {
		note(w)
		if i+1 < len(words) {
			note(w + words[i+1])
		}
	}
	return c
}

// fits reports whether a word can speak of operands of a shape.
func (w word) fits(s operation.Shape) bool {
	if w.out != "" && (len(s.Out) != 1 && s.Out != w.out || !strings.ContainsAny(s.Out, w.out)) {
		return false
	}
	switch w.in {
	case "":
		return true
	case "vs", "qv":
		return strings.Contains(s.In, w.in[:1]) && strings.Contains(s.In, w.in[1:])
	}
	return len(s.In) == 1 && strings.Contains(w.in, s.In) || w.in == "v" && s.In == "vv"
}

// certain are the words that mean an operation on rotations in running text too.
// Most words of names do not: a product may be one of numbers, an inverse one of a sine.
var certain = []string{"hamilton", "slerp", "nlerp", "quaternion", "rotation", "dcm", "euler", "conjugate"}

// followers make an operation of a certain word before them.
var followers = []string{"product", "multiplication", "conjugate", "inverse", "matrix", "angles", "derivative", "interpolation"}

// spoken keeps what a sentence says for certain: certain words, and a word that
// follows one.
func spoken(words []string) []string {
	var kept []string
	for i, w := range words {
		if !slices.Contains(certain, w) {
			continue
		}
		if kept = append(kept, w); i+1 < len(words) && slices.Contains(followers, words[i+1]) {
			kept = append(kept, words[i+1])
		}
	}
	return kept
}
