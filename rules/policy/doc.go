// Package policy reads dextral.toml, the conventions sheet of a repository.
//
// A repository says in this file what its numbers mean where the numbers'
// own files do not say it, which files speak of one rig, what is not to be
// audited, from which level a finding fails the audit, and which findings
// somebody accepted until a given day. The file is documented in dextral.md,
// which this package embeds and whose examples its tests execute.
//
// # Strictness
//
// A misspelt key would silently switch off what it was meant to declare, so
// everything that is not understood is an error with its line and column and
// with what is allowed there. All errors of a file are reported at once.
//
// # Positions
//
// The TOML library decodes the text but keeps no position of what it decoded.
// After it has accepted a text, locate walks the same text once more and
// returns where each key and value stands. It may rely on the text being valid;
// a test holds its tree against the library's, key by key and value by value.
//
// # Paths
//
// Globs are relative to the directory of the file. All paths that callers pass
// in, and all places, are as everywhere in dextral relative to the directory in
// which the command was started.
package policy

import _ "embed"

// Doc is the documentation of dextral.toml in Markdown.
//
//go:embed dextral.md
var Doc string
