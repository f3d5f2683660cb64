package report

import (
	"fmt"
	"io"
	"strings"
)

// Sheet is what the orientation types and functions of packages mean, from
// measurements alone.
type Sheet struct{ Packages []SheetPackage }

// SheetPackage is the part of one package.
type SheetPackage struct {
	Path  string
	Types []SheetEntry
	Funcs []SheetEntry
	Left  []SheetEntry // what could not be decided or evaluated
}

// SheetEntry is a type or function with what is known of it.
type SheetEntry struct {
	Name  string
	At    string // place
	Lines []SheetLine
}

// SheetLine is one thing that is known; Wrong marks a contradiction.
type SheetLine struct {
	What, Says string
	Wrong      bool
}

// SheetText writes a sheet for the terminal.
func SheetText(w io.Writer, s *Sheet, o Options) error {
	p := newPrinter(w, o)
	const margin = len("composition") + 2
	for i, pkg := range s.Packages {
		if i > 0 {
			p.line("")
		}
		p.line(p.styled(bold, "package "+clean(pkg.Path)))
		for _, part := range [][]SheetEntry{pkg.Types, pkg.Funcs, pkg.Left} {
			for _, e := range part {
				p.line("")
				p.line(p.styled(bold, clean(e.Name)) + "  " + p.styled(faint, clean(e.At)))
				for _, l := range e.Lines {
					style := faint
					if l.Wrong {
						style = red
					}
					p.labelled("  ", style, l.What, clean(l.Says), margin)
				}
			}
		}
	}
	return p.Flush()
}

// SheetMarkdown writes a sheet as Markdown, to be put into an interface control
// document.
func SheetMarkdown(w io.Writer, s *Sheet, _ Options) error {
	var b strings.Builder
	b.WriteString("# Conventions of orientation, as measured\n\n")
	b.WriteString("Every line was computed from what the code does on sample inputs. Nothing is taken from names or comments.\n")
	for _, pkg := range s.Packages {
		fmt.Fprintf(&b, "\n## Package %s\n", code(pkg.Path))
		entries(&b, "Types", pkg.Types)
		entries(&b, "Functions", pkg.Funcs)
		entries(&b, "Not decided", pkg.Left)
	}
	_, err := io.WriteString(w, b.String())
	return err
}

func entries(b *strings.Builder, title string, list []SheetEntry) {
	if len(list) == 0 {
		return
	}
	fmt.Fprintf(b, "\n### %s\n\n| | | |\n|---|---|---|\n", title)
	for _, e := range list {
		name := code(e.Name)
		for _, l := range e.Lines {
			says := cellText(l.Says)
			if l.Wrong {
				says = "**" + says + "**"
			}
			fmt.Fprintf(b, "| %s | %s | %s |\n", name, cellText(l.What), says)
			name = ""
		}
	}
}

// cellText keeps a text from ending its cell.
func cellText(s string) string { return strings.NewReplacer("|", "\\|", "*", "\\*").Replace(clean(s)) }
