package tape

// divide is integer division or remainder by b, which is not zero.
func divide(op Op, a, b uint64) uint64 {
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
