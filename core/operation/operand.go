package operation

// Kind says how many numbers an operand has, and what these may be.
type Kind uint8

// The kinds.
const (
	Numbers    Kind = iota // any other count
	Scalar                 // one number
	Three                  // a vector, or three angles
	Quaternion             // four numbers
	Matrix3                // nine numbers, row by row or column by column
	Matrix4                // sixteen
)

var kindNames = [...]string{"numbers", "scalar", "three numbers", "four numbers", "3x3 matrix", "4x4 matrix"}

func (k Kind) String() string { return kindNames[k] }

var kindSizes = [...]int{0, 1, 3, 4, 9, 16}

// KindOf is the kind of so many numbers.
func KindOf(size int) Kind {
	for k := Scalar; k <= Matrix4; k++ {
		if kindSizes[k] == size {
			return k
		}
	}
	return Numbers
}

// Operand is a group of numbers that go into a function or come out of it.
type Operand struct {
	Kind  Kind
	Size  int
	Names []string // what the author calls the numbers: "q.W", "m[0][2]"; one for each
	Type  string   // operands with equal non-empty types store their numbers alike
	Order Order    // of four numbers, where it is known: samples are stored so
}

// Shape is the kinds of what goes in and comes out.
type Shape struct{ In, Out string }

// letters name the kinds in shapes.
const letters = "nsvqmh"

func shapeOf(in, out []Operand) Shape {
	text := func(list []Operand) string {
		b := make([]byte, len(list))
		for i, o := range list {
			b[i] = letters[o.Kind]
		}
		return string(b)
	}
	return Shape{text(in), text(out)}
}

// size is the count of numbers of all operands.
func size(list []Operand) int {
	n := 0
	for _, o := range list {
		n += o.Size
	}
	return n
}
