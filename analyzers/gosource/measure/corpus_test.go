package measure_test

import (
	"flag"
	"fmt"
	"os"
	"slices"
	"strings"
	"testing"
	"time"
)

// A corpus is a directory of a module that requires others; what their functions
// compute is printed, not tested:
//
//	go test -run Corpus -v ./analyzers/gosource/measure -corpus DIR -packages gonum.org/v1/gonum/num/quat
var (
	corpus         = flag.String("corpus", "", "directory of a module whose dependencies are to be measured")
	corpusPackages = flag.String("packages", "all", "patterns of packages, separated by commas")
)

func TestCorpus(t *testing.T) {
	if *corpus == "" {
		t.Skip("no -corpus")
	}
	start := time.Now()
	all := results(t, *corpus, strings.Split(*corpusPackages, ",")...)
	var paths []string
	for p := range all {
		paths = append(paths, p)
	}
	slices.Sort(paths)
	functions, known := 0, 0
	for _, p := range paths {
		for _, f := range all[p].Funcs {
			functions++
			for _, c := range f.Cases {
				if !c.Identity.Known() {
					if os.Getenv("UNKNOWN") != "" {
						fmt.Printf("%s %s: %v %v %s\n", f.Name, c.Label, kinds(c.In), kinds(c.Out), c.Identity.Why)
					}
					continue
				}
				known++
				r := c.Identity.Readings[0]
				fmt.Printf("%s %s: %d readings: %s %v unit=%v %.1e\n", f.Name, c.Label, len(c.Identity.Readings), r, r.Orders, c.Identity.OnUnit, c.Identity.Residual)
			}
		}
	}
	fmt.Printf("%d functions, %d identities, %s\n", functions, known, time.Since(start))
}
