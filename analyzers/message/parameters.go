package message

import (
	"bytes"
	"errors"
	"io"

	"dextral/rules"
)

// IsParameters reports whether a text begins as an APM in key-value notation.
func IsParameters(text []byte) bool {
	return bytes.HasPrefix(bytes.TrimLeft(bytes.TrimPrefix(text, []byte("\xef\xbb\xbf")), " \t\r\n"), []byte("CCSDS_APM_VERS"))
}

// CheckParameters holds the text of an attitude parameter message in key-value
// notation against the standard, and the rates that it states against each other.
// What its quaternions and angles state is read by package config.
func CheckParameters(path string, text []byte) []*rules.Finding {
	l := newLines(path, bytes.NewReader(text))
	c := &checker{lines: l}
	var r rates
	for {
		n, err := l.next()
		if errors.Is(err, io.EOF) {
			break
		}
		if err != nil {
			return c.found // bytes in memory have no other errors
		}
		switch word := n.word(); {
		case word == "COMMENT":
			c.comment(n)
		case n.key == "CCSDS_APM_VERS":
			c.version(n)
		case n.key != "":
			c.keyword(n)
			r.keyword(c, n)
		default:
			c.boundary(n, word)
			r.boundary(c)
		}
	}
	c.unclosed()
	return append(c.found, r.judge(c.lines)...)
}
