package operation

// Order says where a stored quaternion has its canonical numbers: number k of
// w, x, y, z stands at place Order[k]. The zero Order is unknown.
type Order [4]uint8

// The two customary orders.
var (
	ScalarFirst = Order{0, 1, 2, 3}
	ScalarLast  = Order{3, 0, 1, 2}
)

// Known reports whether o is an order.
func (o Order) Known() bool { return o != Order{} }

// Orders lists all 24, the customary ones first.
var Orders = func() []Order {
	all := []Order{ScalarFirst, ScalarLast}
	for n := range uint8(255) {
		o := Order{n & 3, n >> 2 & 3, n >> 4 & 3, n >> 6}
		var seen [4]bool
		for _, place := range o {
			seen[place] = true
		}
		if seen == [4]bool{true, true, true, true} && o != ScalarFirst && o != ScalarLast {
			all = append(all, o)
		}
	}
	return all
}()

// String lists the letters as they are stored, such as "w x y z".
func (o Order) String() string {
	if !o.Known() {
		return "order unknown"
	}
	b := []byte("       ")
	for k, place := range o {
		b[2*place] = "wxyz"[k]
	}
	return string(b)
}

// load takes canonical numbers out of stored ones, and store puts them there.
// An unknown order is the canonical one.
func (o Order) load(stored, canonical []float64) {
	if !o.Known() {
		o = ScalarFirst
	}
	for k, place := range o {
		canonical[k] = stored[place]
	}
}

func (o Order) store(canonical, stored []float64) {
	if !o.Known() {
		o = ScalarFirst
	}
	for k, place := range o {
		stored[place] = canonical[k]
	}
}
