package report

// jsonAgainst is the comparison with a revision.
type jsonAgainst struct {
	Revision string       `json:"revision"`
	Added    bool         `json:"added"`
	Changes  []jsonChange `json:"changes"`
	Flips    []jsonFlip   `json:"flips"`
}

// jsonChange is a changed value; before or now is null where there is none.
type jsonChange struct {
	Name   string  `json:"name"`
	Line   int     `json:"line"`
	Input  bool    `json:"input"`
	Before *string `json:"before"`
	Now    *string `json:"now"`
	Factor *number `json:"factor"`
}

type jsonFlip struct {
	Line         int    `json:"line"`
	Word         string `json:"word"`
	Text         string `json:"text"`
	Held         bool   `json:"held"`
	Holds        bool   `json:"holds"`
	MarginBefore number `json:"marginBefore"`
	Margin       number `json:"margin"`
}

func againstOf(c *Comparison) *jsonAgainst {
	if c == nil {
		return nil
	}
	out := &jsonAgainst{c.Revision, c.Added, []jsonChange{}, []jsonFlip{}}
	for _, ch := range c.Changes {
		one := jsonChange{Name: ch.Name, Line: ch.Line, Input: ch.Input}
		if ch.Old != "" {
			one.Before = &ch.Old
		}
		if ch.New != "" {
			one.Now = &ch.New
		}
		if ch.Factor != 0 {
			f := number(ch.Factor)
			one.Factor = &f
		}
		out.Changes = append(out.Changes, one)
	}
	for _, f := range c.Flips {
		out.Flips = append(out.Flips, jsonFlip{f.Line, f.Word, f.Text, f.Held, f.Holds, number(f.OldMargin), number(f.NewMargin)})
	}
	return out
}
