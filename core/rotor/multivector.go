package rotor

// Multivector is a general element of Cl(3,0): a scalar, a vector, a bivector
// and a multiple of the pseudoscalar I = e1e2e3.
type Multivector struct {
	S             float64
	E1, E2, E3    float64
	E23, E31, E12 float64
	E123          float64
}

// Multivector returns v as a multivector.
func (v Vec) Multivector() Multivector { return Multivector{E1: v.X, E2: v.Y, E3: v.Z} }

// Multivector returns b as a multivector.
func (b Bivector) Multivector() Multivector {
	return Multivector{E23: b.E23, E31: b.E31, E12: b.E12}
}

// Multivector returns r as a multivector.
func (r Rotor) Multivector() Multivector {
	return Multivector{S: r.S, E23: r.E23, E31: r.E31, E12: r.E12}
}

// Even returns the even part of m, its scalar and bivector.
func (m Multivector) Even() Rotor { return Rotor{m.S, m.E23, m.E31, m.E12} }

// Vec returns the vector part of m.
func (m Multivector) Vec() Vec { return Vec{m.E1, m.E2, m.E3} }

// Bivector returns the bivector part of m.
func (m Multivector) Bivector() Bivector { return Bivector{m.E23, m.E31, m.E12} }

// oddOverI returns the even f with odd part I f: e1 = I (-e23) and so on.
func (m Multivector) oddOverI() Rotor { return Rotor{m.E123, -m.E1, -m.E2, -m.E3} }

func fromParts(even, f Rotor) Multivector {
	return Multivector{even.S, -f.E23, -f.E31, -f.E12, even.E23, even.E31, even.E12, f.S}
}

// Mul returns the geometric product m n. Since I commutes with everything and
// I^2 = -1, a multivector is a pair of even ones, e + I f, that multiplies
// as complex numbers do.
func (m Multivector) Mul(n Multivector) Multivector {
	e, f := m.Even(), m.oddOverI()
	g, h := n.Even(), n.oddOverI()
	return fromParts(e.Mul(g).Sub(f.Mul(h)), e.Mul(h).Add(f.Mul(g)))
}

// Add returns m + n.
func (m Multivector) Add(n Multivector) Multivector {
	return fromParts(m.Even().Add(n.Even()), m.oddOverI().Add(n.oddOverI()))
}

// Scale returns s m.
func (m Multivector) Scale(s float64) Multivector {
	return fromParts(m.Even().Scale(s), m.oddOverI().Scale(s))
}

// Reverse returns m~: products of vectors in reverse order. Grades two and
// three change sign.
func (m Multivector) Reverse() Multivector {
	return Multivector{m.S, m.E1, m.E2, m.E3, -m.E23, -m.E31, -m.E12, -m.E123}
}

// Grade returns the part of grade k: 0 scalar, 1 vector, 2 bivector, 3
// pseudoscalar; zero for other k.
func (m Multivector) Grade(k int) Multivector {
	switch k {
	case 0:
		return Multivector{S: m.S}
	case 1:
		return m.Vec().Multivector()
	case 2:
		return m.Bivector().Multivector()
	case 3:
		return Multivector{E123: m.E123}
	}
	return Multivector{}
}

// Sandwich returns r m r~ in full, for any even r: every grade keeps its grade,
// and lengths are scaled by the square of the norm of r.
func (r Rotor) Sandwich(m Multivector) Multivector {
	return r.Multivector().Mul(m).Mul(r.Reverse().Multivector())
}
