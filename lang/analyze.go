package lang

import "context"

type state struct{}

func analyze(ctx context.Context, text string, opt Options) (*Note, error) {
	src := NewSource(text)
	return &Note{Path: opt.Path, Script: &Script{Source: src}}, ctx.Err()
}
