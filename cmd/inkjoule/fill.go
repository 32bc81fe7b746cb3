package main

import (
	"context"
	"fmt"
	"strings"

	"github.com/spf13/cobra"

	"inkjoule/check/project"
	"inkjoule/lang"
)

func fillVerb(w *world) *cobra.Command {
	var stale bool
	r := &rewriting{world: w, did: "filled"}
	r.edits = func(ctx context.Context, s origin, text string) ([]lang.Edit, []error) {
		return fillings(ctx, s, text, stale)
	}
	c := &cobra.Command{
		Use:   "fill [PATH…]",
		Short: "Write results into notes",
		Long: "Writes the results that notes ask for: the value stands where `__ UNIT` stood. With --stale a\n" +
			"stated result that differs from the computed value is replaced too. Everything else is kept byte\n" +
			"for byte. A blank whose value is not known is told, and left; the others are filled.\n" +
			"`-` reads a note and writes it filled.",
		RunE:              func(c *cobra.Command, args []string) error { return r.run(c.Context(), args) },
		ValidArgsFunction: noteFiles,
	}
	c.Flags().BoolVar(&stale, "stale", false, "replace stated results that differ from the computed value")
	r.flags.add(c)
	return c
}

// fillings gives the edits that write the results of a note, and tells which
// blanks have none.
func fillings(ctx context.Context, s origin, text string, stale bool) ([]lang.Edit, []error) {
	note, err := lang.Analyze(ctx, text, lang.Options{Path: s.path, Files: project.DiskFor(s.abs), Budget: s.budget})
	if err != nil {
		return nil, []error{err}
	}
	f := filling{note: note, path: s.path}
	for _, sym := range note.Symbols {
		f.symbol(sym)
	}
	for _, st := range note.Script.Stmts {
		if len(st.Faults) > 0 && strings.Contains(st.Text, "__") {
			f.refuse(st.At, "this statement cannot be read, and is left as it is")
		}
	}
	for _, found := range note.Faults {
		if stale && found.Rule == "stated-result-differs" && found.Fix != nil {
			f.edits = append(f.edits, found.Fix.Edits...)
		}
	}
	return f.edits, f.errs
}

// filling collects what is to be written into one note, and what cannot be.
type filling struct {
	note  *lang.Note
	path  string
	edits []lang.Edit
	errs  []error
}

func (f *filling) symbol(sym *lang.Symbol) {
	if sym.Def == nil || sym.Stmt == nil {
		return
	}
	for _, m := range sym.Def.Members {
		blank, ok := m.(*lang.Blank)
		if !ok {
			continue
		}
		at := sym.Stmt.Abs(blank)
		if sym.Asked == blank && sym.Known && sym.Shown != "" {
			f.edits = append(f.edits, lang.Edit{Span: at, New: sym.Shown})
			continue
		}
		why := sym.Why
		if why == "" {
			why = "it is not known; `inkjoule review` tells why"
		}
		f.refuse(at.Start, "the value of "+sym.Name+" is not filled in: "+why)
	}
}

func (f *filling) refuse(at int, why string) {
	line, column := f.note.Script.Source.Position(at)
	f.errs = append(f.errs, fmt.Errorf("%s:%d:%d: %s", f.path, line, column, why))
}
