package operation

import (
	"math"

	"dextral/core/convention"
)

// factorFunc is a function of the canonical inputs with its name in the words of the
// author: a number, a square, the sine of half an angle.
type factorFunc struct {
	name string
	of   func(in []float64) float64
}

// one is the factor without a name.
var one = factorFunc{"", func([]float64) float64 { return 1 }}

// operandNames are the author's names of an operand's canonical numbers.
func operandNames(o Operand, order Order) []string {
	if o.Kind != Quaternion {
		return o.Names
	}
	names := make([]string, 4)
	if !order.Known() {
		order = ScalarFirst
	}
	for k, place := range order {
		if int(place) < len(o.Names) {
			names[k] = o.Names[place]
		} else {
			names[k] = "wxyz"[k : k+1]
		}
	}
	return names
}

// linearIn lists the numbers of an operand that starts at a place.
func linearIn(names []string, at int) []factorFunc {
	all := make([]factorFunc, len(names))
	for k := range names {
		all[k] = factorFunc{names[k], func(in []float64) float64 { return in[at+k] }}
	}
	return all
}

// quadratic lists the products of two numbers of an operand.
func quadratic(names []string, at int) []factorFunc {
	var all []factorFunc
	for i := range names {
		for j := i; j < len(names); j++ {
			all = append(all, factorFunc{names[i] + "*" + names[j], func(in []float64) float64 { return in[at+i] * in[at+j] }})
		}
	}
	return all
}

// cubic lists the products of three.
func cubic(names []string, at int) []factorFunc {
	var all []factorFunc
	for i := range names {
		for j := i; j < len(names); j++ {
			for k := j; k < len(names); k++ {
				all = append(all, factorFunc{names[i] + "*" + names[j] + "*" + names[k], func(in []float64) float64 { return in[at+i] * in[at+j] * in[at+k] }})
			}
		}
	}
	return all
}

// sines are sine and cosine of a multiple of an angle in radians.
func sines(name string, factor float64, of func(in []float64) float64) []factorFunc {
	switch factor {
	case 0.5:
		name += "/2"
	case 1:
	default:
		name = "angle of " + name
	}
	return []factorFunc{
		{"sin(" + name + ")", func(in []float64) float64 { return math.Sin(factor * of(in)) }},
		{"cos(" + name + ")", func(in []float64) float64 { return math.Cos(factor * of(in)) }},
	}
}

// times is every product of one of each list.
func times(lists ...[]factorFunc) []factorFunc {
	all := []factorFunc{one}
	for _, list := range lists {
		var next []factorFunc
		for _, a := range all {
			for _, b := range list {
				name := a.name
				if name != "" && b.name != "" {
					name += "*"
				}
				next = append(next, factorFunc{name + b.name, func(in []float64) float64 { return a.of(in) * b.of(in) }})
			}
		}
		all = next
	}
	return all
}

func with(list []factorFunc, more ...factorFunc) []factorFunc {
	return append(append([]factorFunc(nil), list...), more...)
}

// basis lists the functions of the inputs that the results of an operation are
// sums of, on the unit manifold; nil if they are none.
func (f *Function) basis(r Reading, c combo) []factorFunc {
	var names [][]string
	var at []int
	n := 0
	for i, o := range f.In {
		names, at = append(names, operandNames(o, c.in[i])), append(at, n)
		n += o.Size
	}
	lin := func(i int) []factorFunc { return linearIn(names[i], at[i]) }
	quad := func(i int) []factorFunc { return quadratic(names[i], at[i]) }
	unit := r.Unit.InRadians()
	number := func(i, k int) func(in []float64) float64 {
		return func(in []float64) float64 { return in[at[i]+k] * unit }
	}
	half := 0.5
	if f.Out[0].Kind != Quaternion {
		half = 1
	}
	q := 0
	for q < len(f.In) && f.In[q].Kind != Quaternion {
		q++
	}
	switch r.Op {
	case Product, Quotient, Dot, Sum, Difference, Cross, AngleBetween:
		if len(f.In) == 2 {
			return append(times(lin(0), lin(1)), append(lin(0), lin(1)...)...)
		}
	case Conjugate, Inverse, Negative, NegConjugate, Normalise, Copy, Transpose, Skew, UnitVector, LinearMap, AxisMapped, PureOf, VectorPart, Trace, ScalarPart:
		if len(f.In) == 1 {
			return lin(0)
		}
	case NormSquared, ToMatrix:
		return quad(0)
	case Determinant:
		if f.In[0].Kind == Matrix3 {
			return cubic(names[0], 0)
		}
	case MatrixProduct:
		return times(lin(0), lin(1))
	case MatrixInverse:
		if f.In[0].Kind == Matrix3 {
			return quad(0)
		}
	case RigidInverse:
		return lin(0)
	case Derivative:
		return times(lin(0), lin(1))
	case Scaled:
		if len(f.In) == 2 {
			return times(lin(0), lin(1))
		}
	case RotateVector:
		switch {
		case q < len(f.In) && len(f.In) == 2:
			return times(quad(q), lin(1-q))
		case q < len(f.In):
			return quad(q)
		case len(f.In) == 2 && f.In[0].Kind != Scalar && f.In[1].Kind != Scalar:
			return append(times(lin(0), lin(1)), append(lin(0), lin(1)...)...)
		case len(f.In) == 2:
			s := 0
			if f.In[1].Kind == Scalar {
				s = 1
			}
			return times(lin(1-s), append(sines(names[s][0], 1, number(s, 0)), one))
		case len(f.In) == 3:
			return f.aboutAxis(r, names, at)
		}
	case FromAngles:
		var lists [][]factorFunc
		for k := range 3 {
			list := sines(names[0][k], half, number(0, k))
			if half == 1 {
				list = append(list, one)
			}
			lists = append(lists, list)
		}
		return times(lists...)
	case AxisTurn:
		return append(sines(names[0][0], half, number(0, 0)), one)
	case FromAxisAngle:
		s := 0
		if f.In[1].Kind == Scalar {
			s = 1
		}
		turn := sines(names[s][0], half, number(s, 0))
		if half == 1 {
			return times(append(lin(1-s), quad(1-s)...), append(turn, one))
		}
		return times(append(lin(1-s), one), turn)
	case FromRotvec:
		return rotvecBasis(names[0], r.Unit)
	case Step:
		if r.Detail == "first order" && len(f.In) == 3 {
			return append(times(lin(0), lin(1), lin(2)), lin(0)...)
		}
	case Slerp, Nlerp, Lerp:
		return f.weighted(r, names, at)
	}
	return nil
}

// aboutAxis is the basis of a vector turned about an axis by an angle.
func (f *Function) aboutAxis(r Reading, names [][]string, at []int) []factorFunc {
	var vectors []int
	s := 0
	for i, o := range f.In {
		if o.Kind == Scalar {
			s = i
		} else {
			vectors = append(vectors, i)
		}
	}
	v, axis := vectors[0], vectors[1]
	if r.Swapped {
		v, axis = axis, v
	}
	turn := sines(names[s][0], 1, func(in []float64) float64 { return in[at[s]] * r.Unit.InRadians() })
	return times(linearIn(names[v], at[v]), append(linearIn(names[axis], at[axis]), quadratic(names[axis], at[axis])...), append(turn, one))
}

// rotvecBasis has the axis and the half angle of a rotation vector.
func rotvecBasis(names []string, unit convention.Unit) []factorFunc {
	length := func(in []float64) float64 { return math.Sqrt(in[0]*in[0] + in[1]*in[1] + in[2]*in[2]) }
	var axis []factorFunc
	for k, n := range names {
		axis = append(axis, factorFunc{n + "/|v|", func(in []float64) float64 { return in[k] / length(in) }})
	}
	return times(append(axis, one), sines("|v|", 0.5, func(in []float64) float64 { return length(in) * unit.InRadians() }))
}

// weighted has the two ends of an interpolation times the weights that the
// operation gives them, and times plain fractions.
func (f *Function) weighted(r Reading, names [][]string, at []int) []factorFunc {
	var ends []int
	t := 0
	for i, o := range f.In {
		if o.Kind == Quaternion {
			ends = append(ends, i)
		} else {
			t = i
		}
	}
	if r.Swapped {
		ends[0], ends[1] = ends[1], ends[0]
	}
	weight := func(second bool) func(in []float64) float64 {
		return func(in []float64) float64 {
			p, q, f := quat(in[at[ends[0]]:]), quat(in[at[ends[1]]:]), in[at[t]]
			dot, sign := p.Dot(q), 1.0
			if r.Way == Shorter && dot < 0 || r.Way == Longer && dot >= 0 {
				dot, sign = -dot, -1
			}
			a, b, n := 1-f, f*sign, 1.0
			switch r.Op {
			case Slerp:
				d := math.Acos(math.Min(1, math.Max(-1, dot/(p.Norm()*q.Norm()))))
				a, b, n = math.Sin((1-f)*d), sign*math.Sin(f*d), math.Sin(d)
			case Nlerp:
				n = p.Scale(a).Add(q.Scale(b)).Norm()
			}
			if second {
				return b / n
			}
			return a / n
		}
	}
	first := []factorFunc{{"weight of the first", weight(false)}, {"weight of the second", weight(true)}}
	return append(times(first, linearIn(names[ends[0]], at[ends[0]])), times(first, linearIn(names[ends[1]], at[ends[1]]))...)
}
