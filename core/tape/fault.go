package tape

// fault is why a sample ended without results. Values from zero on are the
// machine's reasons, which the programs state; the others are below.
type fault int32

const (
	noFault fault = -1 - iota
	faultNil
	faultIndex
	faultDivide
	faultShift
	faultLength
	faultFuel
	faultMemory
	faultBranch
	faultCallee
	faultAddress
	faultGlobal
	faultAbsent
	faultResultLength
)

// faults gives the outcome and the text of each fault that no program states.
var faults = map[fault]struct {
	outcome Outcome
	text    string
}{
	faultNil:          {Panicked, "nil pointer dereference"},
	faultIndex:        {Panicked, "index out of range"},
	faultDivide:       {Panicked, "integer divide by zero"},
	faultShift:        {Panicked, "negative shift amount"},
	faultLength:       {Panicked, "slice length out of range"},
	faultFuel:         {OutOfFuel, "too many instructions"},
	faultMemory:       {OutOfFuel, "too much memory"},
	faultBranch:       {Undecided, "a condition depends on an unknown value"},
	faultCallee:       {Undecided, "an unknown function is given an address"},
	faultAddress:      {Undecided, "an address depends on an unknown value"},
	faultGlobal:       {Undecided, "a package variable is written"},
	faultAbsent:       {Undecided, "the pointer returned is nil"},
	faultResultLength: {Undecided, "the slice returned has another length"},
}
