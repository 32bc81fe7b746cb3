package main

import (
	"bytes"
	"context"

	"github.com/spf13/cobra"

	"inkjoule/check"
	"inkjoule/check/project"
	"inkjoule/check/report/sheet"
	"inkjoule/check/rules"
)

func sheetVerb(w *world) *cobra.Command {
	var output, as string
	c := &cobra.Command{
		Use:   "sheet NOTE",
		Short: "Write the calculation sheet of a note: one page to read, print and sign",
		Long: "Writes one self-contained HTML page: the prose and the formulas of the note, typeset, with the computed\n" +
			"results behind the formulas, the criteria with their margins, hazards, assumptions, waivers and findings\n" +
			"in words, and room for signatures. `-` reads the note from standard input.",
		Args:              cobra.ExactArgs(1),
		RunE:              func(c *cobra.Command, args []string) error { return writeSheet(c.Context(), w, args[0], output, as) },
		ValidArgsFunction: noteFiles,
	}
	c.Flags().StringVarP(&output, "output", "o", "", "write to this `FILE`, whole or not at all, instead of standard output")
	c.Flags().StringVar(&as, "as", "", "the `NAME` under which standard input is read")
	return c
}

// writeSheet reviews one note as the verb review does, and writes its sheet.
func writeSheet(ctx context.Context, w *world, path, output, as string) error {
	all := rules.All()
	catalogue, err := check.NewCatalogue(all)
	if err != nil {
		return err
	}
	r := &review{world: w, flags: &reviewFlags{}, rules: all, configs: project.NewConfigs(catalogue)}
	g := gathering{world: w, configs: r.configs, as: as}
	sources, faults, err := g.sources(ctx, []string{path})
	switch {
	case err != nil:
		return err
	case len(faults) > 0:
		return faults[0]
	case len(sources) != 1:
		return usage("a sheet is of one note; %s holds %d", path, len(sources))
	}
	o := r.one(ctx, sources[0])
	for _, err := range append(o.errs, r.configs.Faults()...) {
		w.say("%s", err)
	}
	if o.note == nil {
		return errSaid
	}
	var page bytes.Buffer
	if err := sheet.Write(&page, o.note, versionOnly()); err != nil {
		return err
	}
	if output == "" {
		_, err := page.WriteTo(w.out)
		return err
	}
	file, err := createFile(output)
	if err != nil {
		return err
	}
	if _, err := page.WriteTo(file); err != nil {
		file.discard()
		return unwritable(output, err)
	}
	return file.commit()
}
