package gosource

import "bytes"

// cues are words of orientations in lower case. They admit a package to the
// type checker, no more: what is an orientation is decided there.
var cues = map[string]bool{
	"quat": true, "quats": true, "quaternion": true, "quaternions": true, "rotor": true, "rotors": true,
	"versor": true, "versors": true, "kmag": true, "qw": true, "qx": true, "qy": true, "qz": true,
	"rot": true, "rots": true, "rotation": true, "rotations": true, "dcm": true, "rotmat": true,
	"euler": true, "rpy": true, "ypr": true, "roll": true, "pitch": true, "yaw": true, "heading": true,
	"attitude": true, "orientation": true, "orient": true, "mount": true, "mounting": true,
	"extrinsic": true, "extrinsics": true, "pose": true,
	"ned": true, "enu": true, "frd": true, "flu": true,
	"axis": true, "triad": true, "rotvec": true, "rodrigues": true, "gibbs": true, "mrp": true,
}

// shapes are types of matrices, whose names may be as short as R_cam_imu.
var shapes = [][]byte{[]byte("[3][3]float"), []byte("[9]float"), []byte("[4][4]float"), []byte("[16]float"), []byte("[3][4]float"), []byte("[12]float")}

// mentions reports whether a source file may speak of orientations: in an
// identifier's or a comment's words, or as a name like qBodyCam.
func mentions(src []byte) bool {
	for start := 0; start < len(src); {
		if !isLetter(src[start]) {
			start++
			continue
		}
		end := wordEnd(src, start)
		if isCue(src[start:end]) || isShortName(src, start, end) {
			return true
		}
		start = end
	}
	for _, s := range shapes {
		if bytes.Contains(src, s) {
			return true
		}
	}
	return false
}

// wordEnd is where the word that starts at i ends: before a capital that
// follows a small letter, before the last capital of a run that a small letter
// follows (RPYDeg is RPY, Deg), or where the letters end.
func wordEnd(src []byte, i int) int {
	for i++; i < len(src) && isLetter(src[i]); i++ {
		if !isUpper(src[i]) {
			continue
		}
		if !isUpper(src[i-1]) || i+1 < len(src) && isLower(src[i+1]) {
			return i
		}
	}
	return i
}

func isCue(word []byte) bool {
	if len(word) < 2 || len(word) > 11 {
		return false
	}
	var lower [11]byte
	for i, c := range word {
		lower[i] = c | 0x20 // letters only
	}
	return cues[string(lower[:len(word)])]
}

// isShortName reports a lone q, r, t or c before another word of the same
// identifier: qBodyCam, R_cam_imu. Before a capital, only q is rare enough.
func isShortName(src []byte, start, end int) bool {
	if end-start != 1 || end == len(src) || start > 0 && (isLetter(src[start-1]) || src[start-1] == '_') {
		return false
	}
	switch src[start] {
	case 'q':
		return src[end] == '_' || isUpper(src[end])
	case 'Q', 'R', 'T', 'C':
		return src[end] == '_'
	}
	return false
}

func isLower(c byte) bool  { return 'a' <= c && c <= 'z' }
func isUpper(c byte) bool  { return 'A' <= c && c <= 'Z' }
func isLetter(c byte) bool { return isLower(c | 0x20) }
