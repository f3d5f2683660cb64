// Package claims is the lexicon: what names, neighbouring keys and comments say
// about numbers.
//
// It knows words and no formats. Read takes a name apart; Name.Form says what
// numbers of a given shape claim to be under that name, and how strongly; a
// Comment holds what a comment says. Where a word could mean two things the
// lexicon says so, or nothing: a claim that nobody made cannot be contradicted,
// and reporting one is worse than missing one that somebody did make.
//
// # Strength
//
// A full word that says what the numbers are (rotation_matrix, dcm, quaternion,
// rpy_deg) is a rules.Label. A customary short name (R, R_cam_imu, q, T_cam_imu)
// and a word that leaves room (transform, orientation) is a rules.Name.
//
// # Stem
//
// The words of a name that say neither representation nor convention tell which
// orientation it is: mount_quaternion_wxyz and mount_rpy_deg share the stem
// "mount". Words of direction stay in the stem, so that cam_to_body and
// body_to_cam never share one.
//
// # What is left open
//
// T_a_b maps coordinates from b to a for some teams and from a to b for others,
// so Name gives it no direction; SubscriptFrames reads the two names for whoever
// can settle it from other evidence.
package claims
