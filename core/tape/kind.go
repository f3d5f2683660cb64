package tape

import "fmt"

// Kind says what the 64 bits of one word mean.
type Kind uint8

// The kinds. A float32 word holds the 32 bits of the number; integers are held
// sign- or zero-extended from their width; a bool is 0 or 1.
const (
	Any Kind = iota // not known, or of no concern
	F64
	F32
	I8
	I16
	I32
	I64
	U8
	U16
	U32
	U64
	Bool
	Addr   // an address, 0 is nil
	Err    // an error: 0 is nil, anything else is some error
	Opaque // a value that no instruction looks into: a string, an interface
)

var kindNames = [...]string{"any", "f64", "f32", "i8", "i16", "i32", "i64", "u8", "u16", "u32", "u64", "bool", "addr", "err", "opaque"}

func (k Kind) String() string {
	if int(k) < len(kindNames) {
		return kindNames[k]
	}
	return fmt.Sprintf("kind%d", uint8(k))
}

// IsFloat reports whether k is a floating-point kind.
func (k Kind) IsFloat() bool { return k == F64 || k == F32 }

// IsInt reports whether k is an integer kind.
func (k Kind) IsInt() bool { return k >= I8 && k <= U64 }

// IsSigned reports whether k is a signed integer kind.
func (k Kind) IsSigned() bool { return k >= I8 && k <= I64 }

// Bits returns the width of an integer kind, and 64 for all others.
func (k Kind) Bits() int {
	switch k {
	case I8, U8:
		return 8
	case I16, U16:
		return 16
	case I32, U32:
		return 32
	}
	return 64
}

// class folds the kinds that instructions do not tell apart: all integers are
// one class.
func (k Kind) class() Kind {
	if k.IsInt() {
		return I64
	}
	return k
}
