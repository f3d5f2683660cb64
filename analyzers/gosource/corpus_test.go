package gosource

import (
	"flag"
	"fmt"
	"os"
	"strings"
	"testing"
	"time"

	"github.com/stretchr/testify/require"
	"golang.org/x/tools/go/analysis"
	"golang.org/x/tools/go/analysis/checker"
	"golang.org/x/tools/go/packages"

	"dextral/analyzers/gosource/found"
)

// A corpus is a directory of a module; what the passes find in it, or in what it requires, is
// printed, not tested:
//
//	go test -run Corpus -v ./analyzers/gosource -corpus DIR -packages gonum.org/v1/gonum/...
var (
	corpus         = flag.String("corpus", "", "directory of a module whose packages are to be judged")
	corpusPackages = flag.String("packages", "./...", "patterns of packages, separated by commas")
)

func TestAnalyzers(t *testing.T) {
	require.NoError(t, analysis.Validate(Passes))
}

func TestCorpus(t *testing.T) {
	if *corpus == "" {
		t.Skip("no -corpus")
	}
	cfg := &packages.Config{Mode: packages.LoadAllSyntax, Dir: *corpus, Env: append(os.Environ(), "GOFLAGS=-mod=mod")}
	pkgs, err := packages.Load(cfg, strings.Split(*corpusPackages, ",")...)
	require.NoError(t, err)
	start := time.Now()
	g, err := checker.Analyze(Passes, pkgs, nil)
	require.NoError(t, err)
	n := 0
	for _, a := range g.Roots {
		if a.Err != nil {
			fmt.Println(a.Package.PkgPath, a.Err)
			continue
		}
		for _, f := range a.Result.(*found.Result).Findings {
			n++
			fmt.Printf("%s: %s: %s: %s\n", f.Place, f.Rule, f.Level, f.Message)
			if testing.Verbose() && os.Getenv("EVIDENCE") != "" {
				for _, e := range f.Evidence {
					fmt.Printf("    %+v\n", e)
				}
			}
		}
	}
	fmt.Printf("%d findings in %s\n", n, time.Since(start))
}
