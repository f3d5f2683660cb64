package context

import "tern.example/attitude"

var mountQuat = attitude.Quaternion{1, 2, 3, 4} // want `^skip: it stands in a test`

var mountAngles = struct{ Roll, Pitch, Yaw float64 }{1, 2, 3} // want `^skip: it stands in a test`
