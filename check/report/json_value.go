package report

import (
	"inkjoule/lang"
	"inkjoule/lang/eval"
	"inkjoule/lang/unit"
)

// jsonValue is a value of the note in coherent SI units.
type jsonValue struct {
	Name        string   `json:"name"` // of a property: MEDIUM.PROPERTY
	Line        int      `json:"line"`
	Kind        string   `json:"kind,omitempty"`
	Qualifier   string   `json:"qualifier,omitempty"`
	Unit        string   `json:"unit"`
	Value       any      `json:"value"` // null where it is not known; Why tells the reason
	Uncertainty *number  `json:"uncertainty"`
	Low         *number  `json:"low"`
	High        *number  `json:"high"`
	Shown       string   `json:"shown"`
	Media       []string `json:"media"`
	Input       bool     `json:"input"`
	Why         string   `json:"why,omitempty"`
}

// complexNumber is a complex value.
type complexNumber struct {
	Re number `json:"re"`
	Im number `json:"im"`
}

func valuesOf(n *Note) []jsonValue {
	out := []jsonValue{}
	for _, s := range n.Symbols {
		if isValue(s) {
			out = append(out, valueOf(n, s))
		}
	}
	return out
}

func valueOf(n *Note, s *lang.Symbol) jsonValue {
	out := jsonValue{
		Name: fullName(s), Line: lineOf(n, s.Span.Start), Kind: s.Facts.Kind.String(), Qualifier: s.Facts.Qualifier.String(),
		Unit: coherentUnit(s), Shown: s.Result.Shown, Media: mediaOf(n, s), Input: s.Input, Why: s.Result.Why,
	}
	if !s.Result.Known {
		return out
	}
	out.Value = plainValue(s.Result.Value)
	if v := s.Result.Value; v.Shape() == eval.Scalar && v.IsReal() {
		out.bounds(v.Re(), &s.Result)
	}
	return out
}

// bounds of a value without uncertainty are the value itself.
func (j *jsonValue) bounds(x float64, r *lang.Result) {
	u, low, high := number(r.Standard), number(r.Low), number(r.High)
	if r.Low == 0 && r.High == 0 {
		low, high = number(x), number(x)
	}
	j.Uncertainty, j.Low, j.High = &u, &low, &high
}

// fullName is MEDIUM.PROPERTY for what belongs to something.
func fullName(s *lang.Symbol) string {
	if s.Owner != nil {
		return s.Owner.Name + "." + s.Name
	}
	return s.Name
}

// mediaOf gives the names of the media that entered, as the note spells them.
func mediaOf(n *Note, s *lang.Symbol) []string {
	out := []string{}
	for _, key := range s.Facts.Media {
		out = append(out, spelledMedium(n, key))
	}
	return out
}

func spelledMedium(n *Note, key string) string {
	for _, s := range n.Symbols {
		if s.Role == lang.RoleMedium && s.Key == key {
			return s.Name
		}
	}
	return key
}

// plainValue writes a scalar as a number, a vector or list as an array, a
// tensor as an array of its three rows, a complex number as {"re","im"}.
func plainValue(v eval.Value) any {
	switch v.Shape() {
	case eval.Scalar:
		return plainNumber(v)
	case eval.Tensor:
		rows := make([][]any, 3)
		for i := range 9 {
			rows[i/3] = append(rows[i/3], plainNumber(v.At(i)))
		}
		return rows
	}
	out := make([]any, v.Len())
	for i := range out {
		out[i] = plainNumber(v.At(i))
	}
	return out
}

func plainNumber(v eval.Value) any {
	if v.IsReal() {
		return number(v.Re())
	}
	return complexNumber{number(v.Re()), number(v.Im())}
}

// coherentUnit names the coherent SI unit of a value: that of its kind where
// the kind is known (J or N·m, Hz or rad/s), else the shortest of its dimension.
func coherentUnit(s *lang.Symbol) string {
	if u := s.Facts.Kind.Unit(); !u.IsZero() && u.Dim.Compatible(s.Facts.Dim) {
		return u.Symbol
	}
	if !s.Facts.Known {
		return ""
	}
	return unit.Coherent(s.Facts.Dim).Symbol
}
