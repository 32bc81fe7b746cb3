package lang

import "math"

// ratioHint names the usual cause of a stated result that is off by a factor:
// rules.md 7.3. It speaks only where the ratio matches within 1 %.
func ratioHint(r float64) string {
	r = math.Abs(r)
	for _, h := range ratioHints {
		if math.Abs(r/h.factor-1) < 0.01 || math.Abs(r*h.factor-1) < 0.01 {
			return h.cause
		}
	}
	return ""
}

// ratioHints lists factors, each meant with its inverse. Common practice.
var ratioHints = []struct {
	factor float64
	cause  string
}{
	{2, "a factor of 2: look for a missing or doubled 1/2, or peak against rms in a square"},
	{4, "a factor of 4: look for a missing 1/4, or a swing used as an amplitude"},
	{math.Sqrt2, "a factor of sqrt(2): look for peak against rms"},
	{2 * math.Sqrt2, "a factor of 2*sqrt(2): look for peak-to-peak against rms"},
	{math.Sqrt(3), "a factor of sqrt(3): look for line-to-line against line-to-earth voltage"},
	{2 * math.Pi, "a factor of 2*pi: look for frequency against angular frequency"},
	{4 * math.Pi * math.Pi, "a factor of (2*pi)^2: look for frequency against angular frequency"},
	{8 * math.Pi, "a factor of 8*pi: look for a Gaussian formula"},
	{4 * math.Pi, "a factor of 4*pi: look for a Gaussian formula"},
	{math.Pi, "a factor of pi: look for radius against diameter, or frequency against angular frequency"},
	{1e3, "a factor of 1000: look at the prefix of a unit"},
	{1e6, "a factor of 1e6: look at the prefix of a unit"},
	{1e9, "a factor of 1e9: look at the prefix of a unit"},
	{1e12, "a factor of 1e12: look at the prefix of a unit"},
	{100, "a factor of 100: look for percent against fraction, or cm against m"},
	{1e4, "a factor of 1e4: look for gauss against tesla, or cm^2 against m^2"},
	{10, "a factor of 10: look for a slipped decimal point"},
	{25.4, "a factor of 25.4: look for mil against µm, or inch against mm"},
	{39.37, "a factor of 39.37: look for mil against mm"},
	{180 / math.Pi, "a factor of 57.3: look for degrees against radians"},
	{20 / math.Ln10, "a factor of 8.686: look for nepers against decibels"},
	{10 / math.Ln10, "a factor of 4.343: look for nepers against decibels of a power"},
	{1.6406, "a factor of 1.64 (2.15 dB): look for ERP against EIRP"},
	{376.73, "a factor of 377: look for E against H"},
}
