package rules

import (
	"fmt"
	"math"

	"inkjoule/check"
	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
)

// BranchEnergyAsRecoverable finds energies called recoverable that are the
// energy put in, or the area of the loop.
func (Book) BranchEnergyAsRecoverable() check.Rule {
	return check.Rule{
		Name:     "branch-energy-as-recoverable",
		Severity: lang.Error,
		Title:    "The energy that goes into a loop is called the energy that comes back",
		Sees: "A recoverable energy (or its density) that is the integral of the field over the flux density along the increasing branch of a loop; that is the area of the loop; " +
			"that starts below the remanence on the decreasing branch; that is made with the same curve as a source work or an energy put in, in a medium declared hysteretic. " +
			"Of two tables with the same tip the one with the greater field at the same flux density is the increasing branch. " +
			"A caution where there is one table only, its field rises from row to row, and the medium is hysteretic.",
		Silent: "For energies that are not said to be recovered; for the decreasing branch; for an input energy less the area of the loop, or times an efficiency; " +
			"where the medium is not hysteretic and no second branch is given.",
		Formula: "W_in = ∫E dD up, W_rec = ∫E dD from D_r to D_m along the decreasing branch, loss = area of the loop = W_in − W_rec, η = W_rec/W_in.",
		Remedy:  "Integrate along the decreasing branch from the remanence to the tip, and report the efficiency.",
		Source:  "Hao, A review on the dielectric materials for high energy-storage application, J. Adv. Dielectr. 3, 1330001 (2013); common practice of energy-storage ceramics (from memory)",
		Wrong: check.Example{Note: `    table up, linear: D [C/m^2], E [MV/m]
        0.00   0
        0.10  14
        0.20  24
        0.30  40
    table down, linear: D [C/m^2], E [MV/m]
        0.05   0
        0.15   8
        0.25  22
        0.30  40
    w_out, recoverable energy density = integral(up.E for up.D from 0 C/m^2 to 0.30 C/m^2) = 5.8 MJ/m^3
    w_in, energy density = integral(up.E for up.D from 0 C/m^2 to 0.30 C/m^2) = 5.8 MJ/m^3
    w_d, energy density = integral(down.E for down.D from 0.05 C/m^2 to 0.30 C/m^2) = 3.45 MJ/m^3
`},
		Right: check.Example{Note: `    table up, linear: D [C/m^2], E [MV/m]
        0.00   0
        0.10  14
        0.20  24
        0.30  40
    table down, linear: D [C/m^2], E [MV/m]
        0.05   0
        0.15   8
        0.25  22
        0.30  40
    w_in, energy density = integral(up.E for up.D from 0 C/m^2 to 0.30 C/m^2) = 5.8 MJ/m^3
    w_out, recoverable energy density = integral(down.E for down.D from 0.05 C/m^2 to 0.30 C/m^2) = 3.45 MJ/m^3
    η, efficiency = w_out/w_in = 59.5 %
`},
		Run: branchEnergy,
	}
}

// isRecovered reports a quantity that is said to come back.
func isRecovered(s *lang.Symbol) bool {
	return s.Facts.Kind.Is(kind.RecoverableEnergy) || s.Facts.Kind.Is(kind.RecoverableEnergyDensity)
}

func branchEnergy(p *check.Pass) error {
	for _, c := range viewOf(p).claims {
		if !isRecovered(c.sym) {
			continue
		}
		if c.loopRecovered(p) {
			continue
		}
		if a := integralOf(c.note, c.sym, isRecovered); a != nil && a.overFlux() {
			c.branch(p, a)
		}
	}
	return nil
}

// loopRecovered finds the area of a loop as a recoverable energy.
func (c *claim) loopRecovered(p *check.Pass) bool {
	for _, x := range productFactors(c.x) {
		if call, ok := x.(*lang.Call); ok && call.Fn.Text == "loop" {
			c.report(p, lang.Fault{
				Message: fmt.Sprintf("%s is the area of the loop: that is what becomes heat in a cycle, and does not come back", c.sym.Name),
				Detail:  "Integrate the field over the flux density along the decreasing branch, from the remanence to the tip.",
			})
			return true
		}
	}
	return false
}

// branch judges the curve along which a recoverable energy is taken.
func (c *claim) branch(p *check.Pass, a *along) {
	if a.table == nil || a.colY == "" {
		c.sameAsInput(p, a)
		return
	}
	own, ok := curveOf(c.note, a.table.Key, a.colX, a.colY)
	if !ok {
		return
	}
	partner, other, found := c.otherBranch(a, own)
	switch {
	case found && own.leads(other):
		c.increasing(p, a, own, partner, other)
	case found:
		c.belowRemanence(p, a, own)
	case c.belowRemanence(p, a, own):
	case c.hysteretic() && rises(c.note, a):
		c.branchUnstated(p, a)
	default:
		c.sameAsInput(p, a)
	}
}

// tipTolerance is how far the tips of two branches of one loop may lie apart.
const tipTolerance = 0.02

// tip is the end of a branch.
func (k curve) tip() (x, y float64) { return k.x[len(k.x)-1], k.y[len(k.y)-1] }

// otherBranch finds the table with the other branch of the same loop: columns
// of the same quantities, the same tip, and another field in between.
func (c *claim) otherBranch(a *along, own curve) (*lang.Symbol, curve, bool) {
	for _, t := range c.note.Symbols {
		if t.Role != lang.RoleTable || t.Key == a.table.Key || t.Stmt == nil {
			continue
		}
		for _, x := range c.columnsLike(t, a.x) {
			for _, y := range c.columnsLike(t, a.y) {
				if k, ok := curveOf(c.note, t.Key, x, y); ok && own.sameTip(k) && own.apart(k) {
					return t, k, true
				}
			}
		}
	}
	return nil, curve{}, false
}

// columnsLike names the columns of a table of the same dimension.
func (c *claim) columnsLike(table *lang.Symbol, f lang.Facts) []string {
	t, ok := table.Stmt.Tree.(*lang.Table)
	if !ok {
		return nil
	}
	var out []string
	for _, col := range t.Columns {
		name := lang.CanonicalName(col.Name.Text)
		if s := c.note.Lookup(table.Key + "." + name); s != nil && s.Facts.Known && s.Facts.Dim.Base() == f.Dim.Base() {
			out = append(out, name)
		}
	}
	return out
}

func (k curve) sameTip(o curve) bool {
	x, y := k.tip()
	u, v := o.tip()
	return math.Abs(x-u) <= tipTolerance*math.Abs(x) && math.Abs(y-v) <= tipTolerance*math.Abs(y)
}

// lead is the mean difference of the fields of two branches at the same flux
// density, over their common range, in parts of the tip's field.
func (k curve) lead(o curve) float64 {
	lo := math.Max(k.x[0], o.x[0])
	hi, top := k.tip()
	u, _ := o.tip()
	hi = math.Min(hi, u)
	if hi <= lo || top == 0 {
		return 0
	}
	return (k.area(lo, hi) - o.area(lo, hi)) / (hi - lo) / math.Abs(top)
}

func (k curve) apart(o curve) bool { return math.Abs(k.lead(o)) > 0.005 }
func (k curve) leads(o curve) bool { return k.lead(o) > 0 }

// increasing reports the energy put in as the energy that comes back.
func (c *claim) increasing(p *check.Pass, a *along, own curve, partner *lang.Symbol, other curve) {
	in := own.area(math.Max(own.x[0], own.zero()), own.x[len(own.x)-1])
	back := other.area(other.zero(), other.x[len(other.x)-1])
	c.report(p, lang.Fault{
		Severity: c.declaredSeverity(p),
		Message: fmt.Sprintf("%s is the energy that is put in: %s holds the increasing branch, since its field is greater than that of %s at the same flux density; "+
			"%.3g times what comes back", c.sym.Name, a.table.Name, partner.Name, in/back),
		Detail:  fmt.Sprintf("Integrate along %s, from the flux density at which its field is zero to the tip; the rest, %.0f %%, becomes heat.", partner.Name, 100*(1-back/in)),
		Related: append(pointTo(a.table, "the increasing branch"), pointTo(partner, "the decreasing branch")...),
	})
}

// declaredSeverity is one level lower where the kind is not written.
func (c *claim) declaredSeverity(p *check.Pass) lang.Severity {
	if c.declared() {
		return p.Rule.Severity
	}
	return p.Lowered()
}

// zero is the flux density at which the field is zero, or the first one.
func (k curve) zero() float64 {
	for i := 1; i < len(k.x); i++ {
		if k.y[i-1] < 0 && k.y[i] >= 0 {
			return k.x[i-1] - k.y[i-1]*(k.x[i]-k.x[i-1])/(k.y[i]-k.y[i-1])
		}
	}
	return k.x[0]
}

// belowRemanence finds an integral along the decreasing branch that starts
// where the field has changed its sign.
func (c *claim) belowRemanence(p *check.Pass, a *along, own curve) bool {
	from, to, ok := a.bounds(c.note)
	start := own.zero()
	if !ok || own.y[0] >= 0 || to <= start || from >= start-tipTolerance*math.Abs(to-start) {
		return false
	}
	c.report(p, lang.Fault{
		Severity: c.declaredSeverity(p),
		Message:  fmt.Sprintf("%s starts below the remanence: along %s the field is zero at %s, and opposite below", c.sym.Name, a.table.Name, c.inUnit(a, start)),
		Detail:   "The branch gives back energy from the tip to the remanence only; to go on, the source has to push. Start the integral at the remanence.",
		Related:  pointTo(a.table, "the decreasing branch"),
	})
	return true
}

// inUnit writes a value in the unit of the column that is integrated over.
func (c *claim) inUnit(a *along, si float64) string {
	if s := c.note.Lookup(a.table.Key + "." + a.colX); s != nil && !s.Result.Unit.IsZero() {
		return fmt.Sprintf("%.3g %s", s.Result.Unit.FromSI(si), s.Result.Unit.Symbol)
	}
	return fmt.Sprintf("%.3g", si)
}

// hysteretic reports a claim with a medium that is declared hysteretic.
func (c *claim) hysteretic() bool {
	for _, m := range c.mediaOf() {
		if m.says("hysteretic") {
			return true
		}
	}
	return false
}

// rises reports rows in which the field rises: nothing shows that they are the
// decreasing branch.
func rises(n *lang.Note, a *along) bool {
	s := n.Lookup(a.table.Key + "." + a.colY)
	if s == nil || s.Facts.Shape != eval.List || s.Value.Len() < 2 {
		return false
	}
	return s.Value.At(0).Re() < s.Value.At(s.Value.Len()-1).Re()
}

func (c *claim) branchUnstated(p *check.Pass, a *along) {
	c.report(p, lang.Fault{
		Severity: p.Lowered(),
		Message:  fmt.Sprintf("%s is taken along %s, and nothing shows that this is the decreasing branch of the loop", c.sym.Name, a.table.Name),
		Detail:   "The rows show the field rising, as it does while energy is put in. Give both branches as tables, or write the rows of the decreasing branch in the order of the record, from the tip down.",
		Related:  pointTo(a.table, "the branch"),
	})
}

// sameAsInput finds a recoverable energy that is made with the same curve and
// limits as an energy that is put in.
func (c *claim) sameAsInput(p *check.Pass, a *along) {
	if !c.hysteretic() {
		return
	}
	text := lang.PrintExpr(a.call)
	for _, o := range c.view.claims {
		if o == c || isRecovered(o.sym) || o.sym == a.sym {
			continue
		}
		if b := integralOf(c.note, o.sym, isRecovered); b == nil || lang.PrintExpr(b.call) != text || !b.overFlux() {
			continue
		}
		c.report(p, lang.Fault{
			Severity: c.declaredSeverity(p),
			Message:  fmt.Sprintf("%s comes back along the same curve on which %s is put in: the area of the loop is left out", c.sym.Name, o.sym.Name),
			Detail:   "In a hysteretic medium the decreasing branch gives back less. Integrate along that branch, or take the area of the loop away.",
			Related:  pointTo(o.sym, "the energy put in"),
		})
		return
	}
}
