package tape

import (
	"testing"
)

// product is a Hamilton product with a scalar first, written by hand.
const product = `
tape "tern.Mul"
param a "tern.Quat" value 4 0 .W:f64 .X:f64 .Y:f64 .Z:f64
param b "tern.Quat" value 4 0 .W:f64 .X:f64 .Y:f64 .Z:f64
result - "tern.Quat" value 4 0 .W:f64 .X:f64 .Y:f64 .Z:f64
slots 36
results s14 s21 s28 s35
place "tern.go" 3 7
b0:
	mul.f64 s8 s0 s4 @1
	mul.f64 s9 s1 s5
	mul.f64 s10 s2 s6
	mul.f64 s11 s3 s7
	sub.f64 s12 s8 s9
	sub.f64 s13 s12 s10
	sub.f64 s14 s13 s11
	mul.f64 s15 s0 s5
	mul.f64 s16 s1 s4
	mul.f64 s17 s2 s7
	mul.f64 s18 s3 s6
	add.f64 s19 s15 s16
	add.f64 s20 s19 s17
	sub.f64 s21 s20 s18
	mul.f64 s22 s0 s6
	mul.f64 s23 s1 s7
	mul.f64 s24 s2 s4
	mul.f64 s25 s3 s5
	sub.f64 s26 s22 s23
	add.f64 s27 s26 s24
	add.f64 s28 s27 s25
	mul.f64 s29 s0 s7
	mul.f64 s30 s1 s6
	mul.f64 s31 s2 s5
	mul.f64 s32 s3 s4
	add.f64 s33 s29 s30
	sub.f64 s34 s33 s31
	add.f64 s35 s34 s32
	return #0
`

func TestTextRoundTrip(t *testing.T) {
	p, _ := MustParse(product)
	text := p.String()
	q, _ := MustParse(text)
	if q.String() != text {
		t.Errorf("got\n%s\nwant\n%s", q, text)
	}
}
