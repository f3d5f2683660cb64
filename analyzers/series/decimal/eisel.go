package decimal

import (
	"math"
	"math/big"
	"math/bits"
	"sync/atomic"
)

// The table of 128-bit powers covers what instruments write: 19 digits at any
// exponent from 1e-64 to 1e64. Beyond it strconv is asked.
const (
	leastPower    = -64
	greatestPower = 64
)

// power is 10^e as high*2^64 + low, scaled by a power of two so that the top bit
// is set, rounded down.
type power struct{ high, low uint64 }

type powerTable [greatestPower - leastPower + 1]power

// table is made when it is needed first. Whoever comes in the meantime makes it
// again, alike.
var table atomic.Pointer[powerTable]

func newTable() *powerTable {
	t := &powerTable{}
	for i := range t {
		t[i] = powerOf10(leastPower + i)
	}
	table.Store(t)
	return t
}

func powerOf10(e int) power {
	ten := new(big.Int).Exp(big.NewInt(10), big.NewInt(int64(max(e, -e))), nil)
	if e < 0 { // 2^k / 10^-e with 128 bits of result
		k := uint(ten.BitLen() + 127)
		ten.Quo(new(big.Int).Lsh(big.NewInt(1), k), ten)
	}
	if shift := ten.BitLen() - 128; shift > 0 {
		ten.Rsh(ten, uint(shift))
	} else {
		ten.Lsh(ten, uint(-shift))
	}
	low := new(big.Int).And(ten, new(big.Int).SetUint64(math.MaxUint64)).Uint64()
	return power{ten.Rsh(ten, 64).Uint64(), low}
}

// eiselLemire is the float64 nearest to mantissa * 10^exponent. It reports false
// where a product of 64 by 128 bits does not decide, and outside the table.
//
// The product of the normalised mantissa with the table's power, which is too
// small by less than one unit of its last bit, has the bits of the answer at
// its top. The nine bits below tell how to round unless they are all ones (the
// missing part could carry: more bits are needed) or look like exactly one half
// (it may be just above). The method is M. Eisel's, described and proved in D. Lemire,
// "Number parsing at a gigabyte per second", Software: Practice and Experience 51 (2021) 1700.
func eiselLemire(mantissa uint64, exponent int) (float64, bool) {
	if mantissa == 0 {
		return 0, true
	}
	if exponent < leastPower || exponent > greatestPower {
		return 0, false
	}
	powers := table.Load()
	if powers == nil {
		powers = newTable()
	}
	ten := &powers[exponent-leastPower]
	zeros := bits.LeadingZeros64(mantissa)
	mantissa <<= uint(zeros)
	high, low := bits.Mul64(mantissa, ten.high)
	if high&0x1ff == 0x1ff && low+mantissa < mantissa {
		more, rest := bits.Mul64(mantissa, ten.low)
		sum, carry := bits.Add64(low, more, 0)
		high += carry
		if high&0x1ff == 0x1ff && sum == math.MaxUint64 && rest+mantissa < mantissa {
			return 0, false
		}
		low = sum
	}
	top := high >> 63
	m := high >> (top + 9) // 54 bits: the answer's 53 and one more
	if low == 0 && high&0x1ff == 0 && m&3 == 1 {
		return 0, false
	}
	m = (m + m&1) >> 1
	// floor(log2 10^exponent) = 217706*exponent >> 16 over this range.
	binary := (217706*exponent)>>16 + 64 + 1023 - zeros - int(1^top)
	if m>>53 != 0 {
		m >>= 1
		binary++
	}
	// Table and 19 digits keep the exponent well inside the normal numbers.
	return math.Float64frombits(uint64(binary)<<52 | m&(1<<52-1)), true
}
