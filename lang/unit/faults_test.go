package unit

import (
	"strings"
	"testing"
	"unicode/utf8"
)

// TestFaults gives, for each wrong phrase, the text that is pointed at and the
// form that is offered.
func TestFaults(t *testing.T) {
	for _, c := range []struct{ phrase, rule, at, suggest string }{
		{"W/m·K", "syntax", "/m·K", "W/(m·K)"},
		{"W/m.K", "syntax", "/m.K", "W/(m·K)"},
		{"J/kg/K", "syntax", "/kg/K", "J/(kg·K)"},
		{"J/(kg·K)/m", "syntax", "/(kg·K)/m", "J/(kg·K·m)"},
		{"A·m^2/kg·K", "syntax", "/kg·K", "A·m^2/(kg·K)"},
		{"V/(m/s/K)", "syntax", "/s/K", "V/(m/(s·K))"},
		{"1/m·s", "syntax", "/m·s", "1/(m·s)"},
		{"Hz^1/2", "syntax", "1/2", "Hz^(1/2)"},
		{"nV/Hz^1/2", "syntax", "1/2", "nV/Hz^(1/2)"},
		{"Hz^-1/2", "syntax", "-1/2", "Hz^(-1/2)"},
		{"Hz^0.5", "syntax", "0.5", "Hz^(1/2)"},
		{"m^1.5", "syntax", "1.5", "m^(3/2)"},
		{"m ^2", "syntax", " ^2", "m^2"},
		{"kV / mm", "syntax", " / mm", "kV/mm"},
		{"m2", "syntax", "m2", "m^2"},
		{"A/m2", "syntax", "m2", "A/m^2"},
		{"s-1", "syntax", "s-1", "s^-1"},
		{"m*s", "syntax", "*", "m·s"},
		{"N×m", "syntax", "×", "N·m"},
		{"W/(m·K", "syntax", "(", "W/(m·K)"},
		{"m)", "syntax", ")", "m"},
		{"W/", "syntax", "/", "W"},
		{"W/m·", "syntax", "·", "W/m"},
		{"", "syntax", "", ""},
		{"m^", "syntax", "^", ""},
		{"m^()", "syntax", "()", ""},
		{"m^(1/0)", "syntax", "(1/0)", ""},
		{"m^x", "syntax", "^", ""},
		{"m^100", "syntax", "100", ""},
		{"m⁻", "syntax", "⁻", ""},
		{"m^2s", "syntax", "s", "m^2·s"},
		{"m(s)", "syntax", "(", "m·(s)"},
		{"5V", "syntax", "5", ""},
		{"V$", "syntax", "$", ""},
		{"((((((((((m))))))))))", "syntax", "(", ""},
		{"foo", "unknown-unit", "foo", ""},
		{"KV/mm", "unknown-unit", "KV", "kV/mm"},
		{"W/(m·k)", "unknown-unit", "k", "W/(m·K)"},
		{"V/Nm", "unknown-unit", "Nm", "V/(N·m)"},
		{"V/r", "unknown-unit", "r", ""},
	} {
		_, err := Parse(c.phrase)
		switch {
		case err == nil:
			t.Errorf("%q parses", c.phrase)
		case err.Rule != c.rule || c.phrase[err.Start:err.End] != c.at || err.Suggest != c.suggest:
			t.Errorf("%q: %s at %q offers %q, want %s at %q, %q", c.phrase, err.Rule, c.phrase[err.Start:err.End], err.Suggest, c.rule, c.at, c.suggest)
		case err.Message == "" || err.Detail == "" && c.phrase != "":
			t.Errorf("%q: message %q, detail %q", c.phrase, err.Message, err.Detail)
		}
		if c.suggest != "" {
			must(t, c.suggest)
		}
	}
}

// TestNearest holds what is offered for common slips; "" for words that are
// more likely names of the note.
func TestNearest(t *testing.T) {
	for symbol, want := range map[string]string{
		"KV": "kV", "Kv": "kV", "hz": "Hz", "mhz": "MHz", "Mhz": "MHz", "GHZ": "GHz", "khz": "kHz", "Nm": "N·m", "kNm": "kN·m", "Vs": "V·s", "As": "A·s", "Pas": "Pa·s",
		"volts": "V", "kilovolts": "kV", "Tesla": "T", "kilometer": "km", "microfarads": "uF", "amps": "A", "ohms": "Ω", "Ohm": "Ω", "MOhm": "MΩ",
		"VAR": "var", "kVAr": "kvar", "dbm": "dBm", "dBuv": "dBuV", "PSI": "psi", "btu": "BTU", "mmhg": "mmHg", "lbs": "lb", "gaus": "G", "weeber": "Wb",
		"Vrms": "V", "kVrms": "kV", "Vpp": "V", "Adc": "A", "Kg": "kg", "sec": "s", "hr": "h", "mho": "S", "micron": "µm", "inches": "in", "degc": "°C",
		"U_dc": "", "x": "", "foo": "", "radius": "", "r": "", "AWG": "", "°F": "", strings.Repeat("V", 1000): "",
	} {
		if got := Nearest(symbol); got != want {
			t.Errorf("%q: offers %q, want %q", symbol, got, want)
		}
	}
}

// TestFaultsOfLongText holds that messages stay short and valid text whatever
// was written.
func TestFaultsOfLongText(t *testing.T) {
	for _, s := range []string{
		strings.Repeat("x", 1<<20), strings.Repeat("m·", 1<<19), strings.Repeat("(", 1<<20), strings.Repeat("m/", 1<<19), strings.Repeat("\x80", 1<<16),
		strings.Repeat("lbf·", 1<<16) + "m", strings.Repeat("€", 1<<16), "m^" + strings.Repeat("9", 1<<20), strings.Repeat(" ", 1<<20), "dB(" + strings.Repeat("m", 1<<20) + ")",
		strings.Repeat("Å", 1<<16), "m" + strings.Repeat("²", 1<<16), "Hz^1/" + strings.Repeat("2", 1<<16), strings.Repeat("in·", 1<<16) + "m",
	} {
		_, err := Parse(s)
		if err == nil {
			t.Errorf("%.20q… parses", s)
			continue
		}
		if len(err.Message) > 400 || len(err.Detail) > 400 || !utf8.ValidString(err.Message+err.Detail) {
			t.Errorf("%.20q…: message of %d and detail of %d bytes", s, len(err.Message), len(err.Detail))
		}
	}
}

func TestParts(t *testing.T) {
	phrase := "kV·m^2/(d·r)"
	var got []string
	for _, p := range Parts(phrase) {
		got = append(got, string(rune(max(p.Operator, ' ')))+phrase[p.Start:p.End])
	}
	if s := strings.Join(got, " "); s != " kV .m /d .r" {
		t.Errorf("parts: %q", s)
	}
}
