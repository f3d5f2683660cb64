package policy

import (
	"fmt"
	"regexp"
	"strings"

	"dextral/rules"
)

// PlaceOf is the place, as a waiver names it, of the findings at a key of a file.
// The path is relative to the directory of the sheet; characters that mean
// something in a pattern are written so that they mean themselves, or, in keys,
// any part of their element.
func PlaceOf(rel, key string) string {
	var b strings.Builder
	for i, c := range rel {
		switch {
		case strings.ContainsRune("*?[{}", c):
			b.WriteString("[" + string(c) + "]")
		case c == '#' || c == '\\' || c == '!' && i == 0:
			b.WriteByte('?') // # would begin the key, the others are refused
		default:
			b.WriteRune(c)
		}
	}
	if key == "" {
		return b.String()
	}
	elements := keyElements(key)
	for i, e := range elements {
		if strings.TrimSpace(e) == "" || strings.ContainsAny(e, "*{}?\n") {
			e = special.ReplaceAllString(e, "*")
			if strings.TrimSpace(e) == "" {
				e = "*"
			}
		}
		elements[i] = e
	}
	return b.String() + "#" + strings.Join(elements, ".")
}

// special are the characters of a key that its pattern cannot write.
var special = regexp.MustCompile(`[*{}?\n]+`)

// Entry is a waiver as a [[waiver]] table, with LF at the end of each line.
func Entry(w *rules.Waiver) string {
	return fmt.Sprintf("[[waiver]]\nrule = %s\nplace = %s\nuntil = %s\nbecause = %s\nowner = %s\n",
		quoted(w.Rule), quoted(w.Place), w.Until, quoted(w.Because), quoted(w.Owner))
}

// Comment is a waiver as the text of a comment beside a value.
func Comment(w *rules.Waiver) string {
	return fmt.Sprintf("dextral:waive rule = %s, until = %s, because = %s, owner = %s", quoted(w.Rule), w.Until, quoted(w.Because), quoted(w.Owner))
}

// quoted is a TOML basic string.
func quoted(s string) string {
	var b strings.Builder
	b.WriteByte('"')
	for _, r := range strings.ToValidUTF8(s, "\ufffd") {
		switch {
		case r == '"' || r == '\\':
			b.WriteByte('\\')
			b.WriteRune(r)
		case r < ' ' || r == 0x7f:
			fmt.Fprintf(&b, `\u%04x`, r)
		default:
			b.WriteRune(r)
		}
	}
	b.WriteByte('"')
	return b.String()
}

// Append adds a table to the end of a sheet, after an empty line and with the
// line ends of the sheet. Nothing else changes.
func Append(sheet, table string) string {
	end := lineEnd(sheet)
	if strings.TrimPrefix(sheet, "\ufeff") != "" {
		if !strings.HasSuffix(sheet, "\n") {
			sheet += end
		}
		if !strings.HasSuffix(sheet, end+end) {
			sheet += end
		}
	}
	return sheet + strings.ReplaceAll(table, "\n", end)
}

// lineEnd is how the first line of a text ends.
func lineEnd(text string) string {
	if i := strings.IndexByte(text, '\n'); i > 0 && text[i-1] == '\r' {
		return "\r\n"
	}
	return "\n"
}

// NameFile adds a file of waivers to those that a sheet names. The sheet must be
// one that Parse accepts; what is not concerned keeps its bytes.
func NameFile(sheet, file string) string {
	mark := ""
	if strings.HasPrefix(sheet, "\ufeff") {
		mark, sheet = sheet[:3], sheet[3:]
	}
	top := locate(sheet)
	if n := top.child("waiver_files"); n.value.end > 0 {
		if len(n.list) > 0 {
			last := n.list[len(n.list)-1].value.end
			return mark + sheet[:last] + ", " + quoted(file) + sheet[last:]
		}
		return mark + sheet[:n.value.start] + "[" + sheet[n.value.start:n.value.end] + ", " + quoted(file) + "]" + sheet[n.value.end:]
	}
	end := lineEnd(sheet)
	line := "waiver_files = " + quoted(file) + end
	last := -1 // the end of the last key that stands above all tables
	for _, n := range top.table {
		if isPair(sheet, n) {
			last = max(last, n.value.end)
		}
	}
	if last < 0 {
		at := headComment(sheet)
		if strings.TrimSpace(sheet[at:]) != "" {
			line += end
		}
		return mark + sheet[:at] + line + sheet[at:]
	}
	last += lengthTo(sheet[last:], "\n")
	if last == len(sheet) {
		return mark + sheet + end + line
	}
	return mark + sheet[:last+1] + line + sheet[last+1:]
}

// isPair reports whether a node of the top table is a key = value, not a header.
func isPair(text string, n *node) bool {
	before := strings.TrimRight(text[:n.key.start], " \t")
	return !strings.HasSuffix(before, "[")
}

// headComment is the length of the comment that opens a sheet, with the empty
// line that sets it off; 0 if none is set off.
func headComment(text string) int {
	at := 0
	for at < len(text) {
		line := text[at : at+lengthTo(text[at:], "\n")]
		at = min(at+len(line)+1, len(text))
		switch line = strings.TrimSpace(line); {
		case line == "":
			return at
		case line[0] != '#':
			return 0
		}
	}
	return 0
}
