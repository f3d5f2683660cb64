// Package text reads delimited text: comma- and tab-separated tables, columns
// set off by blanks, with or without a header.
//
// Nobody agrees on what such a table is, so the reader looks before it reads.
// Sniff takes the first kilobytes and decides for the whole file which byte
// separates, which is the decimal point, how wide a row is and which lines name
// the columns. A Table then turns line after line into cells. It looks only at
// the columns it is asked for, but counts all of them, because a row with one
// column more or less has numbers in the wrong places.
//
// A line is a record, except where a quoted field contains line ends. Lines
// that are blank or begin with a comment mark (#, % or //) are no records.
package text

// Limits. What is longer is not a table that anybody meant.
const (
	MaxHead   = 256 << 10 // bytes at the start in which header and first data row must stand
	MaxRecord = 64 << 10  // bytes of a record; a longer line is passed over and counted as bad
)
