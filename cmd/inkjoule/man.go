package main

import (
	"bytes"
	"os"
	"path/filepath"

	"github.com/spf13/cobra"
	"github.com/spf13/cobra/doc"
)

// manVerb writes the manual from what the verbs say of themselves.
func manVerb(w *world) *cobra.Command {
	var folder string
	c := &cobra.Command{
		Use:   "man [VERB]",
		Short: "Write the manual page of the program, or of a verb",
		Long: "Writes a manual page in the form that `man -l -` reads; with --folder the pages of the program and of\n" +
			"all its verbs, as files to be installed.",
		Args: cobra.MaximumNArgs(1),
		RunE: func(c *cobra.Command, args []string) error { return writeManual(w, c.Root(), folder, args) },
		ValidArgsFunction: func(c *cobra.Command, _ []string, _ string) ([]string, cobra.ShellCompDirective) {
			var names []string
			for _, v := range c.Root().Commands() {
				names = append(names, v.Name())
			}
			return names, cobra.ShellCompDirectiveNoFileComp
		},
	}
	c.Flags().StringVar(&folder, "folder", "", "write all pages into this `FOLDER`, which is made if it is missing")
	return c
}

func writeManual(w *world, root *cobra.Command, folder string, args []string) error {
	root.DisableAutoGenTag = true // the same program writes the same page
	built := builtAt()
	header := &doc.GenManHeader{Section: "1", Source: "inkjoule", Manual: "inkjoule", Date: &built}
	if folder == "" {
		page := root
		if len(args) == 1 {
			found, _, err := root.Find(args)
			if err != nil || found == root {
				return noVerb(root, args)
			}
			page = found
		}
		return doc.GenMan(page, header, w.out)
	}
	if err := os.MkdirAll(folder, 0o755); err != nil {
		return unwritable(folder, err)
	}
	pages := []*cobra.Command{root}
	for _, v := range root.Commands() {
		if v.IsAvailableCommand() {
			pages = append(pages, v)
		}
	}
	for _, page := range pages {
		if err := manPage(page, *header, folder); err != nil {
			return err
		}
	}
	return nil
}

// manPage writes one page, whole or not at all.
func manPage(page *cobra.Command, header doc.GenManHeader, folder string) error {
	var text bytes.Buffer
	if err := doc.GenMan(page, &header, &text); err != nil {
		return err
	}
	name := "inkjoule"
	if page.HasParent() {
		name += "-" + page.Name()
	}
	file, err := createFile(filepath.Join(folder, name+".1"))
	if err != nil {
		return err
	}
	if _, err := file.Write(text.Bytes()); err != nil {
		file.discard()
		return unwritable(file.name, err)
	}
	return file.commit()
}
