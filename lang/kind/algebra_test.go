package kind

import (
	"math"
	"slices"
	"testing"
)

// TestProducts holds the design's last paragraph on qualifiers: rms × rms gives
// average, static × static static, unlike qualifiers are a finding.
func TestProducts(t *testing.T) {
	for _, c := range []struct {
		a, b, want Qualifier
		ok         bool
	}{
		{RMS, RMS, Average, true},
		{Static, Static, Static, true},
		{Peak, Peak, Unqualified, true}, // the coefficient decides
		{Instantaneous, Instantaneous, Instantaneous, true},
		{RMS, Peak, Unqualified, false},
		{RMS, PeakToPeak, Unqualified, false},
		{Peak, PeakToPeak, Unqualified, false},
		{RMS, Average, Unqualified, false},
		{Static, Peak, Peak, true},
		{Static, RMS, RMS, true},
		{Unqualified, Static, Unqualified, true}, // unknown, not static
		{Unqualified, RMS, Unqualified, true},
	} {
		for _, p := range [][2]Qualifier{{c.a, c.b}, {c.b, c.a}} {
			if got, ok := Product(p[0], p[1]); got != c.want || ok != c.ok {
				t.Errorf("%s × %s is %q, %t; want %q, %t", p[0], p[1], got, ok, c.want, c.ok)
			}
		}
	}
}

func TestSums(t *testing.T) {
	for _, c := range []struct {
		a, b, want Qualifier
		ok         bool
	}{
		{Static, Peak, Peak, true}, // a static and an alternating part: the crest
		{Static, RMS, Unqualified, false},
		{Peak, RMS, Unqualified, false},
		{Peak, Peak, Peak, true},
		{RMS, RMS, RMS, true},
		{Average, Average, Average, true},
		{Static, Average, Average, true},
		{Average, Peak, Unqualified, false},
		{PeakToPeak, Peak, Unqualified, false},
		{Unqualified, RMS, Unqualified, true},
	} {
		if got, ok := Add(c.a, c.b); got != c.want || ok != c.ok {
			t.Errorf("%s + %s is %q, %t; want %q, %t", c.a, c.b, got, ok, c.want, c.ok)
		}
	}
	if !Like(Instantaneous, Peak) || !Like(RMS, RMS) || Like(RMS, Peak) || Like(Average, Peak) || Like(PeakToPeak, Peak) || Like(Static, RMS) || !Like(Unqualified, RMS) {
		t.Error("instantaneous compares with peak; rms, peak, average and peak-to-peak with themselves")
	}
}

// crest and mean of a quantity over one cycle, by sampling.
func statistics(q func(phase float64) float64) (crest, mean float64) {
	const n = 4096
	crest = math.Inf(-1)
	for i := range n {
		x := q(2 * math.Pi * float64(i) / n)
		crest, mean = max(crest, x), mean+x/n
	}
	return crest, mean
}

// TestConversions samples a sinusoid for the squares of the factors.
func TestConversions(t *testing.T) {
	crest, _ := statistics(math.Sin)
	low, _ := statistics(func(p float64) float64 { return -math.Sin(p) })
	_, square := statistics(func(p float64) float64 { return math.Sin(p) * math.Sin(p) })
	size := map[Qualifier]float64{Peak: crest, RMS: math.Sqrt(square), PeakToPeak: crest + low}
	for from, x := range size {
		for to, y := range size {
			num, den, ok := Conversion(from, to)
			if from == to {
				if ok {
					t.Errorf("%s converts to itself", from)
				}
				continue
			}
			if want := (y / x) * (y / x); !ok || math.Abs(float64(num)/float64(den)-want) > 1e-9 {
				t.Errorf("%s to %s: squared factor %d/%d, sampled %g", from, to, num, den, want)
			}
		}
	}
	if _, _, ok := Conversion(Average, Peak); ok {
		t.Error("an average has no factor to a peak")
	}
}

// TestCoefficients samples each line of the table over a cycle: the amplitudes
// are sinusoids of peak 1 or √2 (rms 1), or a constant; the form at each instant
// is ½ or 1 times their product.
func TestCoefficients(t *testing.T) {
	instant := map[Form]float64{StoredEnergy: 0.5, TotalEnergy: 1, Dissipation: 1, Flux: 1, FieldForce: 0.5, DrawnEnergy: 1, CycleHeat: 1}
	for _, c := range coefficients {
		wave := math.Sin
		scale := 1.0
		switch c.from {
		case RMS:
			scale = math.Sqrt2
		case Static:
			wave = func(float64) float64 { return 1 }
		}
		crest, mean := statistics(func(p float64) float64 {
			return instant[c.form] * scale * scale * wave(p) * wave(p)
		})
		want := crest
		if c.to == Average {
			want = mean
		}
		if got := float64(c.num) / float64(c.den); math.Abs(got-want) > 1e-9 {
			t.Errorf("form %d from %s to %s: %d/%d, sampled %g", c.form, c.from, c.to, c.num, c.den, want)
		}
		if num, den, ok := Coefficient(c.form, c.from, c.to); !ok || num != c.num || den != c.den {
			t.Errorf("form %d from %s to %s stands twice", c.form, c.from, c.to)
		}
	}
}

// TestTable14 holds the table of the rules itself, column by column; 0 is its
// dash. Columns: static, peak, rms; rows in the order of the table.
func TestTable14(t *testing.T) {
	for _, row := range []struct {
		name          string
		form          Form
		to            Qualifier
		dc, peak, rms float64
	}{
		{"energy, that instant", StoredEnergy, Static, 0.5, 0, 0},
		{"its maximum over the cycle", StoredEnergy, Peak, 0, 0.5, 1},
		{"its time mean", StoredEnergy, Average, 0, 0.25, 0.5},
		{"time-mean electric + magnetic", TotalEnergy, Average, 0, 0.5, 1},
		{"time-mean dissipation", Dissipation, Average, 1, 0.5, 1},
		{"time-mean power flux", Flux, Average, 1, 0.5, 1},
		{"time-mean pressure", FieldForce, Average, 0.5, 0.25, 0.5},
		{"drawn from a source", DrawnEnergy, Static, 1, 0, 0},
		{"heat per cycle", CycleHeat, Static, 1, 0, 0},
	} {
		for from, want := range map[Qualifier]float64{Static: row.dc, Peak: row.peak, RMS: row.rms} {
			num, den, ok := Coefficient(row.form, from, row.to)
			if got := float64(num) / float64(max(den, 1)); ok != (want != 0) || got != want {
				t.Errorf("%s from %s: %d/%d, want %g", row.name, from, num, den, want)
			}
		}
	}
}

// TestResults: half of peak × peak is the peak of an energy and the average of
// a power; a quarter of it the average of an energy; one is neither.
func TestResults(t *testing.T) {
	for _, c := range []struct {
		k        ID
		from     Qualifier
		num, den int
		want     []Qualifier
	}{
		{Energy, Peak, 1, 2, []Qualifier{Peak}},
		{Energy, Peak, 2, 8, []Qualifier{Average}},
		{EnergyDensity, Peak, 1, 1, nil},
		{EnergyDensity, RMS, 1, 1, []Qualifier{Peak}},
		{EnergyDensity, RMS, 1, 2, []Qualifier{Average}},
		{Power, Peak, 1, 2, []Qualifier{Average}},
		{PowerDensity, RMS, 1, 1, []Qualifier{Average}},
		{PowerFluxDensity, Peak, 1, 2, []Qualifier{Average}},
		{Pressure, RMS, 1, 2, []Qualifier{Average}},
		{SourceWork, Static, 1, 2, nil},
	} {
		form, ok := FormOf(c.k)
		if got := Results(form, c.from, c.num, c.den); !ok || !slices.Equal(got, c.want) {
			t.Errorf("%d/%d of %s factors is %v of a %s, want %v", c.num, c.den, c.from, got, c.k, c.want)
		}
	}
	if _, ok := FormOf(Capacitance); ok {
		t.Error("a capacitance is not quadratic in the fields")
	}
}
