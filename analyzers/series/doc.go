// Package series reads attitude logs: one pass, constant memory.
//
// Recognise says whether a file is a log that can be read. Read looks at its
// head, finds orientation channels among the columns (package columns), and
// folds every row (package fold) into what the rules judge: continuity, norms,
// determinants, ranges, stamps, and a sample of rows in which two channels that
// state the same orientation are both complete.
//
// Rows of a text log are lines: row 1 is the first line of data, and blank
// lines and comments below it count, so that a row is a line of the file without
// anything remembered between. Rows that cannot be read are counted, the first
// few with place and reason; the rest of the log is judged without them.
//
// A binary log may hold several tables, such as the topics of a ULog; each has rows,
// stamps and channels of its own, and row 1 is its first message.
//
// # Blocks
//
// The file is cut into blocks of whole records. A block is folded by itself,
// by one worker or several, and folds are merged in the order of the file. The
// result does not depend on the number of workers or on the size of blocks.
package series
