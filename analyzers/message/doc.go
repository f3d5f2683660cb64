// Package message reads CCSDS attitude messages as far as they are more than a
// configuration file: it holds the text of parameter messages (APM) and of ephemeris
// messages (AEM) against the standard, and hands the data lines of an ephemeris, and the
// attitude histories of a comprehensive message (ACM), to package series, segment by
// segment.
//
// The standard is CCSDS 504.0-B-2 (2024), "Attitude Data Messages": tables 3-3, 4-3
// and 4-4, chapter 6, annexes F and J. The first issue (2008) means other things by the
// same words; what the second removed is an error in a message that says it is of the
// second, and nothing in one of the first.
//
// # Meaning
//
// By annex F a quaternion, or angles, "from A to B" turn the axes of A onto those of
// B: v_A = R v_B with their active matrix. The scalar is QC and stands last; turns
// are about moving axes; angles are in degrees. The first issue leaves the direction
// open, so that none is claimed for it.
//
// # Notations
//
// Both issues are read in key-value notation. Of the XML notation the ephemerides are
// read here, and parameter messages by package config; their order and spelling are
// the schema's business.
package message
