// Package frame names coordinate frames by the directions of their axes, maps
// one naming onto another, places them on the earth and chains them.
//
// # Triads
//
// A frame's axes have directions that people name: forward, left and up (FLU), north,
// east and down (NED), right, down and forward (a camera's). Ways belong to a
// Setting in which they are perpendicular. A Triad is three of them, and right- or
// left-handed by what they are, whatever its author says.
//
// AxisMap is the signed permutation P between two triads, v_to = P v_from. Its
// determinant is -1 between triads of different hand, and then no rotation
// takes one to the other. An orientation changes by both of its frames: with
// maps P of the world and Q of the body it becomes P R Q^T. In one frame, P R P^T,
// the rotor's plane goes by det(P) P, which is proper for every P: a
// quaternion whose vector part is mapped by a matrix of determinant -1 has
// been conjugated or damaged.
//
// # Earth
//
// Geodetic places and their local axes are those of WGS-84. ENU and NED are
// columns of v_ECEF = M v_local.
//
// # Graphs
//
// A Graph joins named frames by edges, each the equation v_To = R v_From + t.
// Poses compose along paths; around a loop they ought to compose to nothing, and what
// is left is the closure error. Loops are found as an independent set, not
// enumerated, since their number may grow exponentially.
package frame
