// Package gosource reads Go packages as a source of orientation values.
//
// A Go program states orientations in composite literals: a mounting
// quaternion in a variable, a rotation matrix in a struct of calibration data,
// three angles in a table. Package literal finds them in one package; this
// package brings packages to it.
//
// # How packages are read
//
// Files without a word that belongs to orientations are not looked at any
// further. The directories of the others are listed by the go command, module
// by module, parsed, and type-checked against the export data of what they
// import. The user's program is neither run nor changed, nothing is downloaded
// (GOPROXY=off, GOTOOLCHAIN=local), and no file of the user's tree is written;
// the go command may compile imported packages into its own cache.
//
// # When that does not work
//
// A package that does not compile, an import that is not on this machine, a
// module file that cannot be read, a directory outside any module, a machine
// without the go command: each costs precision, never the audit. Type checking
// goes on after errors, an import that cannot be found becomes an empty
// package, and what type-checks is audited. The first error of a package is
// reported with its place as a Failure whose Partial is set.
//
// # What is left out
//
// Test files, testdata directories, mocks and fakes state wrong or made-up
// orientations on purpose; they are counted and not read. So is vendored code, which is somebody
// else's. Files that this machine's build constraints exclude are read too,
// each beside the files of its package.
package gosource
