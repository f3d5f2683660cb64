package tape

import "math"

// mathFunc is one function of package math. Exactly one of f1, f2 and general
// is set.
type mathFunc struct {
	name    string
	in, out []Kind
	f1      func(float64) float64
	f2      func(float64, float64) float64
	general func(in [3]uint64) (out [2]uint64)
}

func (f *mathFunc) info() opInfo {
	info := opInfo{name: "math." + f.name}
	info.dst = operand{role: write, class: f.out[0].class()}
	if len(f.out) == 2 {
		info.dst = operand{role: write, words: 2}
	}
	in := []*operand{&info.a, &info.b, &info.c}
	for i, k := range f.in {
		*in[i] = operand{role: read, class: k.class()}
	}
	return info
}

func one(name string, f func(float64) float64) mathFunc {
	return mathFunc{name: name, in: []Kind{F64}, out: []Kind{F64}, f1: f}
}

func two(name string, f func(float64, float64) float64) mathFunc {
	return mathFunc{name: name, in: []Kind{F64, F64}, out: []Kind{F64}, f2: f}
}

func other(name string, in, out []Kind, f func(in [3]uint64) (out [2]uint64)) mathFunc {
	return mathFunc{name: name, in: in, out: out, general: f}
}

func word(f float64) uint64   { return math.Float64bits(f) }
func float(w uint64) float64  { return math.Float64frombits(w) }
func word32(f float32) uint64 { return uint64(math.Float32bits(f)) }
func float32of(w uint64) float32 {
	return math.Float32frombits(uint32(w))
}

func bit(b bool) uint64 {
	if b {
		return 1
	}
	return 0
}

// mathTable lists package math. The order is part of the serialised form:
// append only.
var mathTable = []mathFunc{
	one("Sqrt", math.Sqrt), one("Abs", math.Abs), one("Sin", math.Sin), one("Cos", math.Cos), one("Tan", math.Tan),
	one("Asin", math.Asin), one("Acos", math.Acos), one("Atan", math.Atan), two("Atan2", math.Atan2), two("Hypot", math.Hypot),
	one("Sinh", math.Sinh), one("Cosh", math.Cosh), one("Tanh", math.Tanh),
	one("Asinh", math.Asinh), one("Acosh", math.Acosh), one("Atanh", math.Atanh),
	one("Exp", math.Exp), one("Exp2", math.Exp2), one("Expm1", math.Expm1),
	one("Log", math.Log), one("Log2", math.Log2), one("Log10", math.Log10), one("Log1p", math.Log1p), one("Logb", math.Logb),
	two("Pow", math.Pow), two("Mod", math.Mod), two("Remainder", math.Remainder),
	two("Min", math.Min), two("Max", math.Max), two("Dim", math.Dim), two("Copysign", math.Copysign), two("Nextafter", math.Nextafter),
	one("Floor", math.Floor), one("Ceil", math.Ceil), one("Trunc", math.Trunc), one("Round", math.Round), one("RoundToEven", math.RoundToEven),
	one("Cbrt", math.Cbrt), one("Erf", math.Erf), one("Erfc", math.Erfc), one("Erfinv", math.Erfinv), one("Erfcinv", math.Erfcinv),
	one("Gamma", math.Gamma), one("J0", math.J0), one("J1", math.J1), one("Y0", math.Y0), one("Y1", math.Y1),
	other("Sincos", []Kind{F64}, []Kind{F64, F64}, func(in [3]uint64) (out [2]uint64) {
		s, c := math.Sincos(float(in[0]))
		return [2]uint64{word(s), word(c)}
	}),
	other("Modf", []Kind{F64}, []Kind{F64, F64}, func(in [3]uint64) (out [2]uint64) {
		i, f := math.Modf(float(in[0]))
		return [2]uint64{word(i), word(f)}
	}),
	other("Frexp", []Kind{F64}, []Kind{F64, I64}, func(in [3]uint64) (out [2]uint64) {
		f, e := math.Frexp(float(in[0]))
		return [2]uint64{word(f), uint64(int64(e))}
	}),
	other("Lgamma", []Kind{F64}, []Kind{F64, I64}, func(in [3]uint64) (out [2]uint64) {
		f, s := math.Lgamma(float(in[0]))
		return [2]uint64{word(f), uint64(int64(s))}
	}),
	other("FMA", []Kind{F64, F64, F64}, []Kind{F64}, func(in [3]uint64) (out [2]uint64) {
		return [2]uint64{word(math.FMA(float(in[0]), float(in[1]), float(in[2])))}
	}),
	other("Ldexp", []Kind{F64, I64}, []Kind{F64}, func(in [3]uint64) (out [2]uint64) {
		return [2]uint64{word(math.Ldexp(float(in[0]), int(in[1])))}
	}),
	other("Pow10", []Kind{I64}, []Kind{F64}, func(in [3]uint64) (out [2]uint64) {
		return [2]uint64{word(math.Pow10(int(in[0])))}
	}),
	other("Ilogb", []Kind{F64}, []Kind{I64}, func(in [3]uint64) (out [2]uint64) {
		return [2]uint64{uint64(int64(math.Ilogb(float(in[0]))))}
	}),
	other("Inf", []Kind{I64}, []Kind{F64}, func(in [3]uint64) (out [2]uint64) {
		return [2]uint64{word(math.Inf(int(in[0])))}
	}),
	other("IsInf", []Kind{F64, I64}, []Kind{Bool}, func(in [3]uint64) (out [2]uint64) {
		return [2]uint64{bit(math.IsInf(float(in[0]), int(in[1])))}
	}),
	other("IsNaN", []Kind{F64}, []Kind{Bool}, func(in [3]uint64) (out [2]uint64) {
		f := float(in[0])
		return [2]uint64{bit(f != f)}
	}),
	other("NaN", nil, []Kind{F64}, func([3]uint64) [2]uint64 { return [2]uint64{word(math.NaN())} }),
	other("Signbit", []Kind{F64}, []Kind{Bool}, func(in [3]uint64) (out [2]uint64) {
		return [2]uint64{bit(math.Signbit(float(in[0])))}
	}),
	other("Nextafter32", []Kind{F32, F32}, []Kind{F32}, func(in [3]uint64) (out [2]uint64) {
		return [2]uint64{word32(math.Nextafter32(float32of(in[0]), float32of(in[1])))}
	}),
	other("Jn", []Kind{I64, F64}, []Kind{F64}, func(in [3]uint64) (out [2]uint64) {
		return [2]uint64{word(math.Jn(int(in[0]), float(in[1])))}
	}),
	other("Yn", []Kind{I64, F64}, []Kind{F64}, func(in [3]uint64) (out [2]uint64) {
		return [2]uint64{word(math.Yn(int(in[0]), float(in[1])))}
	}),
	other("Float64bits", []Kind{F64}, []Kind{U64}, func(in [3]uint64) (out [2]uint64) { return [2]uint64{in[0]} }),
	other("Float64frombits", []Kind{U64}, []Kind{F64}, func(in [3]uint64) (out [2]uint64) { return [2]uint64{in[0]} }),
	other("Float32bits", []Kind{F32}, []Kind{U32}, func(in [3]uint64) (out [2]uint64) { return [2]uint64{in[0]} }),
	other("Float32frombits", []Kind{U32}, []Kind{F32}, func(in [3]uint64) (out [2]uint64) { return [2]uint64{in[0]} }),
	// The min and max built into the language, which order NaN and the zeros
	// as math.Min and math.Max do but for an infinity beside a NaN.
	two("builtin_min", func(x, y float64) float64 { return min(x, y) }),
	two("builtin_max", func(x, y float64) float64 { return max(x, y) }),
}
