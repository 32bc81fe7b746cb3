package lang

import (
	"fmt"
	"math"

	"inkjoule/lang/eval"
	"inkjoule/lang/kind"
	"inkjoule/lang/unit"
)

// This file judges the relations of assume, criterion and check.

// judge elaborates a relation statement and gives its verdict.
func (a *analysis) judge(c *cell) {
	e := &elab{a: a, c: c}
	j := &Judgement{Stmt: c.stmt}
	var rel *Relation
	switch t := c.tree.(type) {
	case *Assume:
		j.Word, rel = "assume", t.Rel
		if t.Text != nil {
			j.Text = t.Text.Text
		}
		j.Per = t.Per.text()
	case *Criterion:
		j.Word, rel, j.Per = "criterion", t.Rel, t.Per.text()
	case *Check:
		j.Word, rel, j.Per = "check", t.Rel, t.Per.text()
	}
	c.judged = j
	if rel != nil {
		j.Text = c.stmt.Text[rel.Span.Start:rel.Span.End]
		e.relation(rel, j)
	}
}

// text is the quoted text, "" where there is none.
func (q *Quote) text() string {
	if q == nil {
		return ""
	}
	return q.Text
}

// relation elaborates the terms and judges each pair of neighbours.
func (e *elab) relation(r *Relation, j *Judgement) {
	ts := e.terms(r)
	j.Holds, j.Margin, j.Worst = true, math.Inf(1), math.Inf(1)
	known := len(r.Ops) > 0
	for i, op := range r.Ops {
		if !e.comparable(r, i, ts[i], ts[i+1]) || ts[i].blind || ts[i+1].blind {
			known = false
			continue
		}
		known = e.pair(r, i, op, ts, j) && known
	}
	j.Known = known
	if !known {
		j.Margin, j.Worst = 0, 0
	}
}

// terms elaborates the terms. A level of which only the kind tells whether it
// counts a power or a field takes the kind of a term beside it.
func (e *elab) terms(r *Relation) []typed {
	ts := make([]typed, len(r.Terms))
	lost := false // what is unknown was told, and is no reason for a second finding
	for i, x := range r.Terms {
		if e.levelByKind(x) {
			continue
		}
		ts[i] = e.expr(x)
		lost = lost || !ts[i].Known
		if _, known := kind.RootPower(ts[i].Kind); known && e.want == 0 {
			e.want = ts[i].Kind
		}
	}
	for i, x := range r.Terms {
		if e.levelByKind(x) && !lost {
			ts[i] = e.expr(x)
		}
	}
	return ts
}

// levelByKind reports a literal in dB or Np.
func (e *elab) levelByKind(x Expr) bool {
	l, ok := x.(*Literal)
	return ok && l.Unit != nil && e.a.readUnit(l.Unit.Text).unit.ByKind()
}

// comparable checks that two terms can be compared.
func (e *elab) comparable(r *Relation, i int, x, y typed) bool {
	if !x.Known || !y.Known {
		return false
	}
	if !x.Dim.Compatible(y.Dim) && !isZero(r.Terms[i]) && !isZero(r.Terms[i+1]) {
		e.fault("dimension-mismatch", r, fmt.Sprintf("%s is compared with %s", describe(x.Facts), describe(y.Facts)), "")
		return false
	}
	equal := r.Ops[i] == "="
	for k, t := range []typed{x, y} {
		if t.Shape == eval.List && !equal {
			continue
		}
		if !equal && (t.Shape != eval.Scalar || t.Complex) {
			what := shapeName(t.Shape)
			if t.Shape == eval.Scalar {
				what = "a complex number"
			}
			e.fault("shape-mix", r.Terms[i+k], fmt.Sprintf("%s cannot be compared: %s is %s", sketch(r.Terms[i+k]), sketch(r.Terms[i+k]), what), fmt.Sprintf("write its magnitude: |%s|", sketch(r.Terms[i+k])))
			return false
		}
	}
	return true
}

// pair judges one pair and reports where it does not hold.
func (e *elab) pair(r *Relation, i int, op string, ts []typed, j *Judgement) bool {
	x, y := ts[i], ts[i+1]
	a, b := e.a.run(e.c, r.ID, x.code), e.a.run(e.c, r.ID, y.code)
	for k, o := range []outcome{a, b} {
		if o.fault != nil {
			e.evalFault(o.fault, r.Terms[i+k])
			return false
		}
	}
	if op == "=" {
		return e.equal(r, i, a, b, j)
	}
	if op[0] == '>' {
		a, b, x, y = b, a, y, x
	}
	ten := 1.0
	if len(op) == 2 && op[0] == op[1] {
		ten = 10
	}
	m, w := e.margin(r, x, y, a, b, ten)
	holds := m > 0 || m == 0 && (len(op) == 2)
	if m < j.Margin {
		j.Margin, j.Worst = m, min(w, m)
	}
	if !holds {
		j.Holds = false
		e.fails(r, i, ts, j, m)
	} else if w < 0 && m > 1e-12 {
		e.doubtful(r, i, j, m, w)
	}
	return true
}

// margin is limit/value − 1 at the values and at the worst-case bounds, where
// x should be below y; ten is the factor that << asks for.
func (e *elab) margin(r *Relation, x, y typed, a, b outcome, ten float64) (m, worst float64) {
	av, bv := largest(a.value)*ten, smallest(b.value)
	if av > 0 && bv > 0 {
		m = bv/av - 1
	} else {
		m = (bv - av) / math.Max(math.Max(math.Abs(av), math.Abs(bv)), math.SmallestNonzeroFloat64)
	}
	if len(a.grad) == 0 && len(b.grad) == 0 || a.value.Shape() != eval.Scalar || b.value.Shape() != eval.Scalar {
		return m, m
	}
	return m, e.worst(r, x, y, a, b, ten)
}

// worst is the margin at the worst-case bounds: that of the difference, which
// knows what the two sides have in common, over the greatest value of x.
func (e *elab) worst(r *Relation, x, y typed, a, b outcome, ten float64) float64 {
	av, bv := a.value.Re()*ten, b.value.Re()
	times, err := eval.Mul(r.ID, x.code, eval.Num(ten))
	if err != nil {
		return math.Inf(1)
	}
	code, err := eval.Sub(r.ID, y.code, times)
	if err != nil {
		return math.Inf(1)
	}
	o := e.a.run(e.c, r.ID, code)
	low := o.value.Re()
	if len(o.grad) > 0 {
		low = o.low
	}
	if av > 0 && bv > 0 {
		high := av
		if len(a.grad) > 0 {
			high = a.high * ten
		}
		return low / high
	}
	return low / math.Max(math.Max(math.Abs(av), math.Abs(bv)), math.SmallestNonzeroFloat64)
}

// largest and smallest are the extremes of a list, the value of a scalar.
func largest(v eval.Value) float64 {
	out := math.Inf(-1)
	for i := range v.Len() {
		out = math.Max(out, v.At(i).Re())
	}
	return out
}

func smallest(v eval.Value) float64 {
	out := math.Inf(1)
	for i := range v.Len() {
		out = math.Min(out, v.At(i).Re())
	}
	return out
}

// failing names the finding of a relation that does not hold.
func failing(word string) (string, Severity) {
	switch word {
	case "assume":
		return "assumption-fails", Caution
	case "check":
		return "check-fails", Error
	}
	return "criterion-fails", Error
}

// fails reports a pair that does not hold, with both values and the factor.
func (e *elab) fails(r *Relation, i int, ts []typed, j *Judgement, m float64) {
	rule, sev := failing(j.Word)
	e.report(Fault{
		Rule: rule, Severity: sev, Span: r.Span,
		Message: fmt.Sprintf("%s does not hold: %s (margin %s)", j.Text, e.both(r, i, ts), e.marginText(ts[i], ts[i+1], m)),
		Detail:  "change the design or its inputs; the relation itself is what was agreed",
		Related: e.relateTerms(r),
	})
}

// doubtful reports a criterion that holds for the values only.
func (e *elab) doubtful(r *Relation, i int, j *Judgement, m, w float64) {
	if j.Word != "criterion" {
		return
	}
	e.report(Fault{
		Rule: "criterion-within-uncertainty", Severity: Caution, Span: r.Span,
		Message: fmt.Sprintf("%s holds for the values (margin %s), and not for the worst case within their uncertainty (%s)", j.Text, percent(m), percent(w)),
		Detail:  "narrow the tolerances, or enlarge the margin",
		Related: e.relateTerms(r),
	})
}

// marginText writes a margin as a ratio; between absolute temperatures, whose
// ratio says little, as a difference.
func (e *elab) marginText(x, y typed, m float64) string {
	if x.Absolute || y.Absolute {
		a, b := e.a.run(e.c, 0, x.code), e.a.run(e.c, 0, y.code)
		if a.fault == nil && b.fault == nil {
			return "-" + number4(math.Abs(a.value.Re()-b.value.Re())) + " K"
		}
	}
	return percent(m)
}

// percent writes a margin.
func percent(m float64) string {
	if math.IsInf(m, 0) || math.IsNaN(m) {
		return "unbounded"
	}
	return decimal(m*100, formatter{digits: 3}.scale(math.Abs(m*100))) + " %"
}

// both writes what the two sides of a pair are, in one unit.
func (e *elab) both(r *Relation, i int, ts []typed) string {
	u := unit.Unit{}
	for _, x := range []Expr{r.Terms[i+1], r.Terms[i]} {
		if p := unitOf(x); p != nil {
			u = e.a.readUnit(p.Text).unit
		}
	}
	var values [2]eval.Value
	for k := range values {
		values[k] = e.a.run(e.c, r.ID, ts[i+k].code).value
	}
	if u.IsZero() {
		u = chosenUnit(ts[i].Facts, values[0])
	}
	var text [2]string
	for k, s := range apart(e.formatter(u, shownDigits), values) {
		x := r.Terms[i+k]
		if isLiteral(x) {
			text[k] = "against " + s
		} else {
			text[k] = sketch(x) + " is " + s
		}
	}
	if isLiteral(r.Terms[i]) {
		text[0], text[1] = text[1], text[0]
	}
	return text[0] + ", " + text[1]
}

// apart writes two values with as many digits as it takes to see that they
// differ, where they do.
func apart(f formatter, values [2]eval.Value) [2]string {
	short := [2]string{f.value(values[0]), f.value(values[1])}
	for text := short; f.digits <= 16; f.digits++ {
		if text = [2]string{f.value(values[0]), f.value(values[1])}; text[0] != text[1] {
			return text
		}
	}
	return short
}

// formatter writes what a relation compares, levels by its kind.
func (e *elab) formatter(u unit.Unit, digits int) formatter {
	root, _ := kind.RootPower(e.want)
	return formatter{unit: u, root: root, digits: digits}
}

// relateTerms points at the definitions of the names in a relation.
func (e *elab) relateTerms(r *Relation) []Related {
	var out []Related
	seen := map[string]bool{}
	for _, u := range e.c.uses {
		c := e.a.cells[u.key]
		if c == nil || c.stmt == nil || seen[u.key] || c.sym.Shown == "" {
			continue
		}
		seen[u.key] = true
		out = append(out, Related{Name: u.key, Message: fmt.Sprintf("%s = %s", c.title(), c.sym.Shown)})
	}
	return out
}

// equal judges `=`: by the digits written where one side is a literal.
func (e *elab) equal(r *Relation, i int, a, b outcome, j *Judgement) bool {
	x, y := r.Terms[i], r.Terms[i+1]
	ok := false
	switch {
	case isLiteral(y) || isNumeric(y):
		ok = e.byDigits(y, a.value, b.value)
	case isLiteral(x) || isNumeric(x):
		ok = e.byDigits(x, b.value, a.value)
	default:
		d, n := distance(a.value, b.value), norm(b.value)
		ok = d <= relativeSlack*n
	}
	q, has := ratio(a.value, b.value)
	m := 0.0
	if has {
		m = -math.Abs(q - 1)
	}
	if ok {
		j.Margin, j.Worst = min(j.Margin, 0), min(j.Worst, 0)
		return true
	}
	j.Holds, j.Margin, j.Worst = false, min(m, j.Margin), min(m, j.Worst)
	rule, sev := failing(j.Word)
	msg := fmt.Sprintf("%s does not hold: %s", j.Text, e.sides(x, y, a, b))
	detail := "correct the stated value, or the formula"
	if has {
		msg += fmt.Sprintf(" (%s)", factorText("ratio", q))
		if h := ratioHint(q); h != "" {
			detail += "; " + h
		}
	}
	e.report(Fault{Rule: rule, Severity: sev, Span: r.Span, Message: msg, Detail: detail, Related: e.relateTerms(r)})
	return true
}

func (e *elab) byDigits(literal Expr, computed, stated eval.Value) bool {
	u := unit.Unit{}
	if p := unitOf(literal); p != nil {
		u = e.a.readUnit(p.Text).unit
	}
	digit, ok := finestDigit(literal)
	root, _ := kind.RootPower(e.want)
	return ok && agrees(computed, stated, u, digit, root)
}

// sides writes the two sides of an equation.
func (e *elab) sides(x, y Expr, a, b outcome) string {
	u, digits := unit.Unit{}, shownDigits
	for _, z := range []Expr{x, y} {
		if p := unitOf(z); p != nil {
			u = e.a.readUnit(p.Text).unit
		}
		if isLiteral(z) {
			digits = max(digits, significantDigits(z)+1)
		}
	}
	if f, ok := e.c.factsOf(x); ok && u.IsZero() {
		u = chosenUnit(f, a.value)
	}
	s := e.formatter(u, digits)
	return fmt.Sprintf("%s is %s, and %s is %s", sketch(x), s.value(a.value), sketch(y), s.value(b.value))
}
