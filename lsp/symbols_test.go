package lsp

import (
	"fmt"
	"strings"
	"testing"
)

type outlined struct {
	Name, Detail          string
	Kind                  int
	Range, SelectionRange reach
	Children              []outlined
}

func TestDocumentSymbols(t *testing.T) {
	d := sit(t, able, capacitor)
	var all []outlined
	d.must("textDocument/documentSymbol", object{"textDocument": object{"uri": d.uri}}, &all)
	var got []string
	var visit func(list []outlined, indent string)
	visit = func(list []outlined, indent string) {
		for _, s := range list {
			if whole := d.quoted(s.Range); d.quoted(s.SelectionRange) != s.Name || !strings.Contains(whole, s.Name) {
				t.Errorf("%s: selects %q in %q", s.Name, d.quoted(s.SelectionRange), whole)
			}
			if before(s.SelectionRange.Start, s.Range.Start) || before(s.Range.End, s.SelectionRange.End) {
				t.Errorf("%s: the selection lies outside of the range", s.Name)
			}
			got = append(got, strings.TrimSpace(fmt.Sprintf("%s%s %d %s", indent, s.Name, s.Kind, s.Detail)))
			visit(s.Children, "- ")
		}
	}
	visit(all, "")
	want := []string{
		"mica 5", "- eps_r 7 diag(6.900, 6.900, 8.700)", "- E_bd 7 118.0 kV/mm", "U 14 12.00(10) kV", "d 14 3.000(29) mm",
		"E 13 (0, 0, 4.000) kV/mm", "D 13 (0, 0, 308.1) µC/m^2", "w 13 616(16) J/m^3", "Ü_max 13 3.390(43) %", "ω 13 314.2 rad/s", "N 13 628.3 rad",
	}
	if fmt.Sprint(got) != fmt.Sprint(want) {
		t.Errorf("got %s\nwant %s", show(got), show(want))
	}
	d.quit()
}

func before(a, b struct{ Line, Character uint32 }) bool {
	return a.Line < b.Line || a.Line == b.Line && a.Character < b.Character
}

// TestFlatSymbols holds that a client without hierarchy gets a list.
func TestFlatSymbols(t *testing.T) {
	d := sit(t, object{}, capacitor)
	var all []struct {
		Name, ContainerName string
		Location            struct {
			URI   string
			Range reach
		}
	}
	d.must("textDocument/documentSymbol", object{"textDocument": object{"uri": d.uri}}, &all)
	if len(all) != 11 || all[1].Name != "eps_r" || all[1].ContainerName != "mica" || all[1].Location.URI != d.uri {
		t.Errorf("got %s", show(all))
	}
	d.quit()
}
