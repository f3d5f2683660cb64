package rules

import (
	"dextral/core/identify"
	"dextral/core/kinematics"
)

// Series is what one pass over a log found out about one orientation channel.
//
// Value describes the channel as it would a single value: form, claims, the
// place of its header; its Numbers are those of the first row. The summaries
// are folds of all rows. Rows are counted as RowPlace says, and a time T in
// them is counted from the first stamp of the log, in the log's unit; Stamp
// gives the stamp itself.
type Series struct {
	Value   Value
	Columns []string // names of the columns in the order of Value.Numbers
	Rows    int64    // data rows read
	Unit    string   // unit of time stamps as far as it is known: s, ms, us, ns; "" if none
	Clock   *Clock   // nil if the log has no time stamps

	Half    float64 // half a unit of the coarsest last digit seen in the channel's numbers, or half a step of Scale
	Float32 bool    // the digits show single precision
	Scale   float64 // the numbers are whole multiples of 1/Scale, such as 1/32767; 0 if they are not

	Gaps       kinematics.Tally      // rows in which the channel has no number at all
	Ranges     []Range               // of each number, in the order of Value.Numbers; finite numbers only
	Continuity kinematics.Continuity // quaternions; its scalar is only that if a claim says where the scalar is
	Matrices   Matrices              // rotation matrices and rigid transforms
	Wraps      kinematics.Tally      // angles: steps of one of them by 2 pi, within 5 %
	Rates      *Rates                // the angular rates beside a quaternion; nil if there are none

	// RowPlace gives the place of a data row. Rows of text files are lines: row
	// 1 is the first line of data, and comments and blank lines between count.
	RowPlace func(row int64) Place
	// Stamp is the time stamp, as written up to trailing zeros, that a fold
	// calls T. It is nil if the log has no time stamps.
	Stamp func(t float64) string
}

// Rates are the angular rates beside a quaternion and what they say about its
// conventions.
type Rates struct {
	Columns   []string // x, y, z
	Place     Place    // of their header, if that states the unit
	Unit      Claim    // of angle; Says is nil if nobody states it
	Claim     identify.SeriesClaim
	Result    identify.SeriesResult
	Stretches []identify.Stretch // more than one if the log changes its convention
}

// Range is the least and the greatest of some numbers.
type Range struct{ Min, Max kinematics.Extreme }

// Matrices is a fold over the rotation matrices of a channel.
type Matrices struct {
	NonFinite kinematics.Tally
	Zero      kinematics.Tally
	Count     int64              // rows that are neither, over which the rest is taken
	Mirrors   kinematics.Tally   // determinant below zero
	Det       Range              // determinants
	Defect    kinematics.Extreme // greatest |M^T M - 1|
	Largest   kinematics.Extreme // greatest |M - N| of neighbours (Frobenius): 2 sqrt 2 sin of half the angle between
}

// MaxStamps is the number of rows of each kind that a Clock keeps.
const MaxStamps = 8

// Clock is what one pass found out about the time stamps of a log.
type Clock struct {
	Column string // as written; "" if no header names it
	Place  Place  // of the header, or of the first stamp
	Unit   string // s, ms, us, ns; "" if unknown
	Source Source // who says the unit: Label, or Shape if it follows from the size of the numbers

	Count       int64            // rows with a stamp
	Missing     kinematics.Tally // rows without
	First, Last string           // as written up to trailing zeros
	Span        float64          // last minus first, in the unit

	Repeated          kinematics.Tally            // stamps equal to the one before
	Reversed          kinematics.Tally            // stamps before the one before
	RepeatedAt        [MaxStamps]kinematics.Place // the first of them
	ReversedAt        [MaxStamps]kinematics.Place
	Shortest, Longest kinematics.Extreme // steps forward; the row is the later of the two
}

// NonIncreasing is the number of stamps that do not advance.
func (c *Clock) NonIncreasing() int64 { return c.Repeated.Count + c.Reversed.Count }

// SeriesPair is two channels of one log that by their names state the same
// orientation, with a sample of rows in which both are complete. The rows are
// chosen by their numbers alone, spread over the log, no more than 64 of them.
type SeriesPair struct {
	First, Second *Series
	Samples       []PairSample
}

// PairSample is one row of a SeriesPair, numbers in the order of Value.Numbers.
type PairSample struct {
	Row           int64
	First, Second []float64
}
