package main

import (
	"cmp"
	"io"
	"os"
	"runtime"
	"strings"

	"dextral/rules/report"

	"golang.org/x/term"
)

// layout suits a report to where it goes. Files and pipes get UTF-8 without
// colours, in lines as long as they are; a terminal gets its width, and what its
// environment says that it can show.
func layout(w io.Writer) report.Options {
	f, ok := w.(*os.File)
	if !ok || !term.IsTerminal(int(f.Fd())) {
		return report.Options{}
	}
	width, _, err := term.GetSize(int(f.Fd()))
	if err != nil {
		width = 0
	}
	o := shown(os.Getenv, runtime.GOOS)
	o.Width = width
	return o
}

// shown is what a terminal can show: no colours where NO_COLOR is set or TERM is
// dumb, and nothing but ASCII where the locale has no UTF-8. The locale is that of
// POSIX: LC_ALL before LC_CTYPE before LANG, and C if none is set.
func shown(env func(string) string, system string) report.Options {
	locale := strings.ToLower(cmp.Or(env("LC_ALL"), env("LC_CTYPE"), env("LANG")))
	utf8 := system == "windows" || strings.Contains(locale, "utf-8") || strings.Contains(locale, "utf8")
	return report.Options{Color: env("NO_COLOR") == "" && env("TERM") != "dumb", ASCII: !utf8}
}
