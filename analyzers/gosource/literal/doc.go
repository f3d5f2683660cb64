// Package literal finds the orientations that Go composite literals state.
//
// # Claims in a program
//
// In a program, names are everywhere and speak precisely: the variable, field
// or map key, the type and its package, the function whose result it is; and
// comments stand on the line, above it, on the field's and on the type's
// declaration. What a word means is for package claims to say. What this package
// adds is how the words of a program belong together:
//
//	mountQuat, Rotation, q_body_cam     the value's own name: a claim
//	mountQuats[2], Rotations["left"]    the name of the list: a claim about each element
//	RotationMatrix{m: ...}              a wrapper of one field speaks for the field
//	attitude.Quaternion                 type and package together say that it is a rotation
//	quat.Number, Quaternion             the type alone says that it is of the algebra: an
//	                                    inferred claim, and none for whole numbers off the sphere
//	struct{ X, Y, Z, W float64 }        nothing: a plane, a colour, a rectangle
//
// # Forms
//
//	quaternions      four named fields, a scalar and a vector part, lists of four,
//	                 qw qx qy qz among other fields
//	matrices         3x3, 3x4, 4x4, nested or flat, structs of rows, wrappers of one field,
//	                 and constructors such as mat.NewDense(3, 3, []float64{...})
//	angles           roll, pitch and yaw as fields or constants, lists such as eulerZYX and mountRPYDeg
//	rotation vectors, axes, axis and angle in two fields, triads, axis maps
//
// Numbers are constants as go/types folds them, and elementary functions of
// constants such as math.Sqrt(0.5). Fields left out are zero; an empty literal
// states nothing. Numbers of a keyed literal come scalar first; those of a
// positional one as they are written, with the order of the fields as a claim, so
// that a comment which says otherwise is a contradiction.
//
// # Silence
//
// A literal is judged only where somebody names it: as a variable, field,
// element, map value, or result of a function whose name says what it returns.
// Arguments and operands are not; nor is what is normalised at once or changed
// after it is initialised, what stands in tests, what a name or comment calls a
// rate, a difference, a covariance, a colour. These are listed in
// Result.Skipped, with the reason, if they would have been values otherwise.
//
// # Twins
//
// Two values state one orientation if they are fields of one struct literal, or
// variables of one scope and file, whose names agree in all words but those of
// the representation: Quat and RPYDeg of one literal, mountQuat and mountRPYDeg.
//
// # Analyzer orientationliteral
//
// orientationliteral: find orientations that are written as constants
//
// The analyzer finds quaternions, rotation matrices, rigid transforms, angles,
// rotation vectors, axes, triads and axis maps in composite literals, with what
// names and comments claim about them. It reports no diagnostics: its result, a
// list of values with their places, is for other analyzers and programs to judge.
package literal
