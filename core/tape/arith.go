package tape

// float64Op does float64 arithmetic and comparison on the given lanes.
func float64Op(op Op, d, a, b *column, lanes []uint8) {
	switch op {
	case AddF:
		for _, l := range lanes {
			d[l&63] = word(float(a[l&63]) + float(b[l&63]))
		}
	case SubF:
		for _, l := range lanes {
			d[l&63] = word(float(a[l&63]) - float(b[l&63]))
		}
	case MulF:
		for _, l := range lanes {
			d[l&63] = word(float(a[l&63]) * float(b[l&63]))
		}
	case DivF:
		for _, l := range lanes {
			d[l&63] = word(float(a[l&63]) / float(b[l&63]))
		}
	case NegF:
		for _, l := range lanes {
			d[l&63] = word(-float(a[l&63]))
		}
	case EqF:
		for _, l := range lanes {
			d[l&63] = bit(float(a[l&63]) == float(b[l&63]))
		}
	case NeF:
		for _, l := range lanes {
			d[l&63] = bit(float(a[l&63]) != float(b[l&63]))
		}
	case LtF:
		for _, l := range lanes {
			d[l&63] = bit(float(a[l&63]) < float(b[l&63]))
		}
	case LeF:
		for _, l := range lanes {
			d[l&63] = bit(float(a[l&63]) <= float(b[l&63]))
		}
	}
}

// float32Op does float32 arithmetic and comparison on the given lanes.
func float32Op(op Op, d, a, b *column, lanes []uint8) {
	switch op {
	case AddG:
		for _, l := range lanes {
			d[l&63] = word32(float32of(a[l&63]) + float32of(b[l&63]))
		}
	case SubG:
		for _, l := range lanes {
			d[l&63] = word32(float32of(a[l&63]) - float32of(b[l&63]))
		}
	case MulG:
		for _, l := range lanes {
			d[l&63] = word32(float32of(a[l&63]) * float32of(b[l&63]))
		}
	case DivG:
		for _, l := range lanes {
			d[l&63] = word32(float32of(a[l&63]) / float32of(b[l&63]))
		}
	case NegG:
		for _, l := range lanes {
			d[l&63] = word32(-float32of(a[l&63]))
		}
	case EqG:
		for _, l := range lanes {
			d[l&63] = bit(float32of(a[l&63]) == float32of(b[l&63]))
		}
	case NeG:
		for _, l := range lanes {
			d[l&63] = bit(float32of(a[l&63]) != float32of(b[l&63]))
		}
	case LtG:
		for _, l := range lanes {
			d[l&63] = bit(float32of(a[l&63]) < float32of(b[l&63]))
		}
	case LeG:
		for _, l := range lanes {
			d[l&63] = bit(float32of(a[l&63]) <= float32of(b[l&63]))
		}
	}
}

// intOp does what integers, truth values and addresses do, division aside.
func intOp(op Op, d, a, b *column, lanes []uint8) {
	for _, l := range lanes {
		x, y := a[l&63], b[l&63]
		var z uint64
		switch op {
		case AddI:
			z = x + y
		case SubI:
			z = x - y
		case MulI:
			z = x * y
		case AndI:
			z = x & y
		case OrI:
			z = x | y
		case XorI:
			z = x ^ y
		case AndNotI:
			z = x &^ y
		case ShlI:
			z = x << y
		case ShrI:
			z = uint64(int64(x) >> y)
		case ShrU:
			z = x >> y
		case NegI:
			z = -x
		case LtI:
			z = bit(int64(x) < int64(y))
		case LeI:
			z = bit(int64(x) <= int64(y))
		case LtU:
			z = bit(x < y)
		case LeU:
			z = bit(x <= y)
		case EqW:
			z = bit(x == y)
		case NeW:
			z = bit(x != y)
		case NotB:
			z = x ^ 1
		}
		d[l&63] = z
	}
}

// divide is integer division and remainder; lanes that divide by zero panic.
func (m *Machine) divide(g *group, op Op, d, a, b *column) {
	var bad uint64
	for _, l := range g.lanes() {
		if b[l&63] == 0 {
			bad |= 1 << l
			continue
		}
		d[l&63] = quotient(op, a[l&63], b[l&63])
	}
	m.kill(g, bad, faultDivide)
}

// quotient is division or remainder by b, which is not zero.
func quotient(op Op, a, b uint64) uint64 {
	switch op {
	case DivI:
		return uint64(int64(a) / int64(b))
	case RemI:
		return uint64(int64(a) % int64(b))
	case DivU:
		return a / b
	}
	return a % b
}

// complexDiv divides complex numbers, whose parts are words.
func complexDiv(d, a, b []column, lanes []uint8) {
	for _, l := range lanes {
		x := complex(float(a[0][l&63]), float(a[1][l&63]))
		y := complex(float(b[0][l&63]), float(b[1][l&63]))
		z := x / y
		d[0][l&63], d[1][l&63] = word(real(z)), word(imag(z))
	}
}

// convertOp converts words from one kind to another.
func convertOp(op Op, k Kind, d, a *column, lanes []uint8) {
	for _, l := range lanes {
		x := a[l&63]
		switch op {
		case FtoG:
			x = word32(float32(float(x)))
		case GtoF:
			x = word(float64(float32of(x)))
		case ItoF:
			x = intToFloat(k, x)
		case ItoG:
			x = intToFloat32(k, x)
		case FtoI:
			x = truncate(k, float(x))
		case GtoI:
			x = truncate32(k, float32of(x))
		case Wrap:
			x = wrap(k, x)
		}
		d[l&63] = x
	}
}

// wrap reduces a word to the width of an integer kind and extends it again.
func wrap(k Kind, w uint64) uint64 {
	switch k {
	case I8:
		return uint64(int64(int8(w)))
	case I16:
		return uint64(int64(int16(w)))
	case I32:
		return uint64(int64(int32(w)))
	case U8:
		return uint64(uint8(w))
	case U16:
		return uint64(uint16(w))
	case U32:
		return uint64(uint32(w))
	}
	return w
}

// intToFloat converts an integer of kind k to a float64 word.
func intToFloat(k Kind, w uint64) uint64 {
	if k == U64 {
		return word(float64(w))
	}
	return word(float64(int64(w)))
}

// intToFloat32 converts an integer of kind k to a float32 word, with one
// rounding.
func intToFloat32(k Kind, w uint64) uint64 {
	if k == U64 {
		return word32(float32(w))
	}
	return word32(float32(int64(w)))
}

// truncate converts to an integer of kind k as this processor does, also where
// the number does not fit: Go leaves that open.
func truncate(k Kind, f float64) uint64 {
	switch k {
	case I8:
		return uint64(int64(int8(f)))
	case I16:
		return uint64(int64(int16(f)))
	case I32:
		return uint64(int64(int32(f)))
	case U8:
		return uint64(uint8(f))
	case U16:
		return uint64(uint16(f))
	case U32:
		return uint64(uint32(f))
	case U64:
		return uint64(f)
	}
	return uint64(int64(f))
}

// truncate32 is truncate for a float32.
func truncate32(k Kind, f float32) uint64 {
	switch k {
	case I8:
		return uint64(int64(int8(f)))
	case I16:
		return uint64(int64(int16(f)))
	case I32:
		return uint64(int64(int32(f)))
	case U8:
		return uint64(uint8(f))
	case U16:
		return uint64(uint16(f))
	case U32:
		return uint64(uint32(f))
	case U64:
		return uint64(f)
	}
	return uint64(int64(f))
}
