// Package kinematics relates orientations to rates and times, and watches the
// continuity of a series.
//
// # Rates
//
// A rotor R here maps the coordinates of a body to those of the space it turns
// in, v_space = R v_body R~. Its angular rate is one vector with two sets of
// coordinates, omega_space = R omega_body R~. With the bivectors Omega = I omega
//
//	R' = -R Omega_body / 2 = -Omega_space R / 2
//
// In quaternions, with omega for the one without a scalar part:
//
//	q' =  q omega_body / 2  =  omega_space q / 2     Hamilton's product
//	q' =  omega_body q / 2  =  q omega_space / 2     Shuster's product
//
// The numbers are the same in both lines. Texts that use Shuster's product read
// them as the passive attitude, space to body, and write the first form as
// q' = Omega(omega) q / 2 with a matrix of four rows.
//
// A series may also hold the reverse, P = R~, the map from space to body. Then
// the rates change places and signs: the body rate is minus what [SpaceRate]
// returns for P, the space rate minus what [BodyRate] returns.
//
// # Orders
//
// The rate between two orientations h apart is that of the middle of the
// interval up to terms in h^2. Integrating a gyro by [Increment] is right to
// the same order, and to h^4 where the rate is linear in time. [Interpolate]
// between orientations and a gyro is right to h^3, where interpolation at
// constant rate is right to h^2.
//
// # Series
//
// [Continuity] is a fold over the rows of a log: push rows one after the other,
// in any number of parts, and merge the parts.
package kinematics
