package rotor

// Mirrors factors two unit rotors into reflections that share a mirror: unit
// vectors u, v, w with
//
//	b = v u   a = w v   a b = w u
func Mirrors(a, b Rotor) (u, v, w Vec) {
	n, ok := a.Bivector().Axis().Cross(b.Bivector().Axis()).Unit()
	if !ok {
		axis := a.Bivector().Axis()
		if axis == (Vec{}) {
			axis = b.Bivector().Axis()
		}
		n, _ = axis.Cross(leastAlong(axis)).Unit()
		if axis == (Vec{}) {
			n = Vec{X: 1}
		}
	}
	m := n.Multivector()
	return m.Mul(b.Multivector()).Vec(), n, a.Multivector().Mul(m).Vec()
}
