// Package identify tells which conventions explain numbers.
//
// Two statements of one orientation, a chain of orientations, a log of
// orientations with rates, a function by its values: numbers that should agree
// are evidence about the words beside them. If they agree as the words say, nothing
// is wrong. If they do not, somebody has read or written one of a few things
// another way, and the readings that would make them agree can be searched. This
// package holds the set of these readings, once, and says when one of them
// may be held responsible and when the numbers cannot tell.
//
// # The set
//
// A statement is read as an active rotation, v' = R v R~ of its rotor R.
// What may be read otherwise, and what that costs:
//
//	quaternion       scalar first or last                               1
//	                 half or twice the turn                             2
//	matrix           with determinant -1: a row, a column or all negated 3
//	angles           degrees or radians                                 1
//	                 the same axes moving or fixed                      1
//	                 any other of the 24 sequences                      2
//	                 any other order of the three numbers               2
//	                 any signs                                          2
//	rotation vector  degrees or radians                                 1
//	                 as Gibbs vector, MRP or vector part                2
//	axis and angle   degrees or radians                                 1
//	between two      one the reverse of the other                       1
//	                 axes of the result, of the argument, or of both
//	                 in the same way, mapped by one of 23               2
//	                 axes of both mapped in two ways                    4
//
// What a claim leaves open costs nothing, and the sign of a rotor never does.
// Everything that costs up to six together is searched, half angles and maps of
// axes up to four. The table of costs is at [Change].
//
// The numbers cannot tell all of these apart, whatever they are. A conjugate,
// a transpose, storage by columns, Shuster's algebra for Hamilton's and a
// direction read backwards are one relation between two statements. Fixed axes
// are moving axes backwards. The reverse of three turns is the turns backwards with all
// signs changed. One map of axes for both frames of an orientation gives angles of
// another sequence, and changing two signs of three is such a map. A scalar that
// moves from one end to the other is a reverse between two maps of axes. Every
// hypothesis has an alias, which is the linear map that it makes of the numbers,
// and hypotheses of one alias form a class: it costs what its cheapest member costs.
//
// # Solved, not tried
//
// Maps of axes are solved: what is left between two rotations must be one of
// the 24, and the sum of fourth powers of the matrix, which no map changes, excludes nearly
// all pairs before. A reverse costs a sign in the scalar product. Turns come from six
// sines and cosines. Readings are made in order of cost, and the search ends a
// little beyond the first that fits. In a series the sums of rate times
// prediction give the residuals of all 192 classes at once; a function of angles
// is asked at zero and for one angle at a time.
//
// # When a reading is held responsible
//
// The claims must fail and another reading must hold, and neither by accident.
//
// A reading holds if its residual is no larger than what the digits of both
// sides leave open (package tolerance), eps. The claims fail if theirs is
// larger than four times that; in between nothing is decided. Any other
// relation that costs no more and is within four times eps is a tie, and one that costs up
// to two more, unless it is the same rotation exactly, leaves the verdict but
// takes away Decided. An error of the tolerance by a factor of four is thereby harmless.
//
// Two orientations that have nothing to do with each other are within eps of
// each other with a chance of (eps - sin eps)/pi, about eps^3/19, if they are
// spread over all rotations; but files are not like that. Near the identity, on
// one axis or at whole degrees much fits by accident. So the chance is taken as
// the product of eps/d over three distances d: how far the orientation is
// from the nearest places where readings coincide. These are the mirrors that exchange
// and negate the four components of a rotor; for angles the multiples of a right
// angle and equal sizes. A reading is believed if, with the number N of hypotheses that
// cost as much or less,
//
//	N * (eps/d1) * (eps/d2) * (eps/d3) <= 3e-4
//
// with factors of at most one, and if there are as many numbers (d larger than
// four times eps) as it costs, or all three. One angle about one axis supports one
// change, a whole number of degrees none but that of the unit, and a right angle
// nothing. What is not believed is still listed.
//
// # Measured
//
// A third of the pairs as claimed, a third with one or two changes planted, a
// third of them unrelated or measured again with errors beyond their digits; half of them of
// any orientation, half near the identity, near maps of axes, on one or two
// axes. Columns: decided, and rightly, of the generic orientations with a relation
// in the set, in percent, for numbers with 3, 4, 6 and 9 decimals (degrees with two less),
// float32 and float64; and all that was decided wrongly, of six hundred thousand.
//
//	                                          3      4      6      9     32     64    wrong
//	quaternion, matrix                    69.84  99.25  99.99 100.00 100.00 100.00        0
//	angles, quaternion                    47.50  94.54  99.86  99.90  99.91 100.00        0
//	angles, matrix                        56.36  97.64  99.87  99.91  99.91 100.00        1
//	angles, quaternion, nothing claimed    0.00  93.07  99.92  99.95  99.92 100.00        0
//	two quaternions                       58.41  98.19  99.99 100.00 100.00 100.00        0
//	two matrices                          87.30  99.63  99.99  99.99  99.99 100.00        0
//	rotation vector, quaternion           70.32  99.03  99.92  99.92  99.93 100.00        2
//	axis and angle, matrix                60.86  90.51  99.90  99.96  99.94 100.00        1
//
// The same for six decimals by family, of eight hundred thousand in all; families that
// decide nothing have to. Below, loops with one edge changed or replaced, and series with
// one slip or with rates of another motion, noise in every sample, of a hundred thousand each.
//
//	                                      right    wrong
//	generic                               99.93        0
//	within some degrees of identity       91.46        0
//	within some degrees of an axis map    94.80        0
//	one axis                              52.90        0
//	one axis, multiple of 5 degrees       43.27        0
//	two axes                              77.71        0
//	axis map                               0.00        0
//	loop of three to five edges           99.99        4
//	series, noise 1 % of the rates       100.00        0
//	series, noise 10 % of the rates      100.00        0
//	series, noise 30 % of the rates      100.00        0
//	series, noise 100 % of the rates       0.00        0
//
// In all 4.8 million pairs nothing that was as claimed was called wrong. The test
// that measures this holds the table to it, with fewer cases unless told:
//
//	go test ./core/identify -run Confusion -v -timeout 2h -cases 100000
//
// # Limits
//
// Numbers that agree by a rule outside of the set are unexplained: an offset
// of an angle that is no right angle, a left-handed sequence, two frames of one
// name. A direction that nobody states is never contradicted. Which of two sides is wrong
// the numbers do not say; the classes name what stands between them.
package identify
