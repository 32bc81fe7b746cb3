package lang

import "inkjoule/lang/eval"

func (e *elab) bindSlot(key string, t typed) { e.bind(key, t) }
func (e *elab) measure(m *Member, c *cell, field string) typed {
	e.notYet(m, "region")
	return unknown()
}
func (e *elab) lookup(l *Lookup) typed                        { e.notYet(l, "at"); return unknown() }
func (a *analysis) region(c *cell, r *Region)                 {}
func (e *elab) overRegion(c *Call) typed                      { e.notYet(c, "region"); return unknown() }
func (e *elab) alongTable(c *Call, m *Member) typed           { e.notYet(c, "table"); return unknown() }
func (e *elab) assembly(c *Call, name string) typed           { e.notYet(c, name); return unknown() }
func (e *elab) worstCase(c *Call, name string) typed          { e.notYet(c, name); return unknown() }
func (e *elab) uncertain(l *Literal, x float64) eval.Code     { return eval.Num(x) }
func (e *elab) spreadOver(p *Paren, t typed, s *Spread) typed { return t }
