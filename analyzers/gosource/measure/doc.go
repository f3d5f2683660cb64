// Package measure asks every numeric function of a package what it computes.
//
// # From types to operands
//
// Package lower gives a function as a tape, whose inputs and outputs are single
// numbers. This package puts them together again: a struct or array of four floats may
// be a quaternion, one of nine a matrix, three consecutive float parameters a vector or three
// angles, a pointer that is written and never read a result. That is a guess by shape;
// where there are several, they are alternative Layouts, and the one whose numbers
// turn out to compute a known operation is kept. Integers, truth values and named constants
// are swept: each setting is a Case with an identity of its own.
//
// # Types
//
// How a type stores its numbers follows from all functions that deal in it together: each
// leaves some orders open, and what most agree on is kept (Type.Orders, Type.Storage). Then
// functions are asked again, with that knowledge. Both are exported as the fact Meanings.
//
// # What other passes use
//
//	Result.Funcs            the functions that could be evaluated, in the order of the source
//	Result.Of               those of a declared *types.Func
//	Result.Types, .Type     how named types are stored, which functions rotate by them
//	Result.Orients          whether the operands of a case are orientations, as far as anybody says
//	Result.Meaning          what a case computes, in words
//	Result.Imported         what is known of another package
//	Function.In, Out        operands with the author's names
//	Function.Cases          settings; one without a label for a function that has none
//	Case.Identity           what it computes (package operation)
//	Function.Question       a case as package operation sees it: Identify, Explain, Miss
//	Function.Evaluate       run samples of your own (operation.Draw makes some)
//	Function.Separates      the condition under which exactly some samples were evaluated
//	Function.Uses           whether it calls another, so that the callee is blamed
//	Function.Key, Label     how findings call it
//
// The user's program is never run: tapes are.
//
// # Analyzer measure
//
// measure: find out what numeric functions compute
//
// The analyzer evaluates the tapes of a package's numeric functions on samples and
// names the operation on orientations that each one computes, with its
// conventions. It reports no diagnostics: its result is for other analyzers.
package measure
