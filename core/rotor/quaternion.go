package rotor

// FromQuaternion returns the rotor of w + x i + y j + z k with
//
//	i = e3e2   j = e1e3   k = e2e1
//
// so that i i = j j = k k = i j k = -1 (Hamilton) and the numbers of axis n
// and angle a are (cos a/2, n sin a/2). The tempting i = e2e3, j = e3e1,
// k = e1e2 gives i j = -k.
func FromQuaternion(w, x, y, z float64) Rotor { return Rotor{w, -x, -y, -z} }

// Quaternion returns the numbers w, x, y, z of r by the correspondence of
// [FromQuaternion]. Hamilton's product of two quaternions is the geometric
// product of their rotors; Shuster's product (ij = -k) of the same numbers is
// the geometric product in the opposite order.
func (r Rotor) Quaternion() (w, x, y, z float64) { return r.S, -r.E23, -r.E31, -r.E12 }
