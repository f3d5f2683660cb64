package main

import (
	"context"
	"io"
	"os"

	"dextral/analyzers/audit"
	"dextral/analyzers/gosource"
	"dextral/rules/report"
)

// writeHTML gathers what the page shows beside the report: the source lines of the
// findings, the frames, and what the functions mean if there are any.
func writeHTML(ctx context.Context, w io.Writer, r *audit.Result, paths []string) error {
	page := &report.Page{
		Report: &r.Report, Version: version(),
		Lines:  audit.Excerpts(r.Report.Findings),
		Graphs: report.FrameGraphs(r.Chains, r.Frames),
	}
	if r.Report.Audited.GoPackages > 0 {
		page.Sheets, page.NoSheet = sheets(ctx, paths)
	}
	return report.HTML(w, page)
}

// sheets measures the packages below directories, each with the go command's view from
// there. Paths that name single files have no sheet.
func sheets(ctx context.Context, paths []string) (list []report.Sheet, why []string) {
	if len(paths) == 0 {
		paths = []string{"."}
	}
	for _, dir := range paths {
		if info, err := os.Stat(dir); err != nil || !info.IsDir() {
			continue
		}
		switch sheet, err := gosource.Sheet(ctx, dir, []string{"./..."}); {
		case err != nil:
			why = append(why, dir+": "+err.Error())
		case len(sheet.Packages) > 0:
			list = append(list, *sheet)
		}
	}
	return list, why
}
