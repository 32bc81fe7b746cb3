package lsp

import (
	"encoding/json"
	"fmt"
	"os"
	"path/filepath"
	"runtime"
	"slices"
	"strings"
	"testing"
	"time"
)

// longNote is a note of n statements: groups that depend on a voltage of their
// own, as a calculation for many parts does.
func longNote(n int) string {
	var b strings.Builder
	b.WriteString("Stored energy of many gaps\n\n    medium oil: linear, isotropic, homogeneous, lossless\n        eps_r = 2.2 per \"data sheet\"\n\n    d = 3.00 mm ± 0.05 mm\n")
	for i := 0; i < (n-2)/4; i++ {
		fmt.Fprintf(&b, "\nGap %d\n\n    U_%[1]d, peak voltage = %d.0 kV\n", i, 10+i%5)
		fmt.Fprintf(&b, "    E_%[1]d in oil, peak electric field strength = U_%[1]d/d\n", i)
		fmt.Fprintf(&b, "    w_%[1]d in oil, peak energy density = 1/2 * oil.eps * E_%[1]d^2\n", i)
		fmt.Fprintf(&b, "    p_%[1]d = w_%[1]d*d = __ J/m^2\n", i)
	}
	return b.String()
}

// spread reports the median, the 95th percentile and the longest.
func spread(b *testing.B, took []time.Duration, what string) {
	slices.Sort(took)
	if len(took) == 0 {
		return
	}
	ms := func(d time.Duration) float64 { return float64(d.Microseconds()) / 1000 }
	b.ReportMetric(ms(took[len(took)/2]), what+"-p50-ms")
	b.ReportMetric(ms(took[len(took)*95/100]), what+"-p95-ms")
	b.ReportMetric(ms(took[len(took)-1]), what+"-max-ms")
	b.ReportMetric(0, "ns/op")
}

var sizes = []int{300, 10_000}

// seat opens a long note and waits until it is diagnosed.
func seat(b *testing.B, n int) *desk {
	d := &desk{editor: launch(b, realOptions(b)), uri: "file:///w/long.joule", text: longNote(n), enc: utf8Bytes}
	d.start(able)
	d.open(d.uri, d.text)
	d.diagnosed(d.uri, 1)
	return d
}

// forget drops the messages received so far.
func (e *editor) forget() {
	e.mu.Lock()
	defer e.mu.Unlock()
	e.got = nil
}

// middle is the position of a digit of a voltage in the middle of the note.
func (d *desk) middle() (line, column int) {
	lines := strings.Split(d.text, "\n")
	for line = len(lines) / 2; ; line++ {
		if column = strings.Index(lines[line], "voltage = "); column >= 0 {
			return line, column + len("voltage = ")
		}
	}
}

// BenchmarkEditToDiagnostics types a digit in the middle of a note and waits
// for its diagnostics. Budget: p95 below 10 ms for 300 statements and below
// 50 ms for 10,000.
func BenchmarkEditToDiagnostics(b *testing.B) {
	for _, n := range sizes {
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			d := seat(b, n)
			line, column := d.middle()
			var took []time.Duration
			for i := range b.N {
				d.forget()
				begun := time.Now()
				d.change(d.uri, i+2, object{"range": between(line, column, line, column+1), "text": fmt.Sprint(1 + i%9)})
				d.diagnosed(d.uri, i+2)
				took = append(took, time.Since(begun))
			}
			spread(b, took, "edit")
		})
	}
}

// BenchmarkHover asks for the value of a name. Budget: p95 below 5 ms.
func BenchmarkHover(b *testing.B) {
	for _, n := range sizes {
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			d := seat(b, n)
			line, _ := d.middle()
			params := object{"textDocument": object{"uri": d.uri}, "position": at(line+1, 4)}
			var took []time.Duration
			for range b.N {
				d.forget()
				begun := time.Now()
				var h *hovered
				d.must("textDocument/hover", params, &h)
				took = append(took, time.Since(begun))
				if h == nil {
					b.Fatal("no hover")
				}
			}
			spread(b, took, "hover")
		})
	}
}

// BenchmarkCompletion asks for the names that fit a letter. Budget: 100 ms.
func BenchmarkCompletion(b *testing.B) {
	for _, n := range sizes {
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			d := seat(b, n)
			line, _ := d.middle()
			params := object{"textDocument": object{"uri": d.uri}, "position": at(line+3, len("    p_1"))}
			var took []time.Duration
			for range b.N {
				d.forget()
				begun := time.Now()
				var c completed
				d.must("textDocument/completion", params, &c)
				took = append(took, time.Since(begun))
			}
			spread(b, took, "completion")
		})
	}
}

// BenchmarkWorkspace reviews 1,000 notes of 100 statements that are not open,
// and reports the time and the memory afterwards. Budget: below 200 MB
// resident. Run it with -benchtime=1x.
func BenchmarkWorkspace(b *testing.B) {
	dir := b.TempDir()
	text := strings.Replace(longNote(100), "U_0/d", "U_0/nothing", 1) // one finding each
	const n = 1000
	for i := range n {
		if err := os.WriteFile(filepath.Join(dir, fmt.Sprintf("%04d.joule", i)), []byte(text), 0o644); err != nil {
			b.Fatal(err)
		}
	}
	for range b.N {
		e := launch(b, realOptions(b))
		begun := time.Now()
		e.startIn(object{}, dir)
		e.await("the last note", func(m message) bool { return strings.Contains(string(m.Params), fmt.Sprintf("%04d.joule", n-1)) })
		b.ReportMetric(time.Since(begun).Seconds(), "s-survey")
		e.forget()
		e.must("workspace/symbol", object{"query": "w_7"}, nil)
		begun = time.Now()
		e.must("workspace/symbol", object{"query": "w_7"}, nil)
		b.ReportMetric(float64(time.Since(begun).Milliseconds()), "ms-symbols")
		runtime.GC()
		var m runtime.MemStats
		runtime.ReadMemStats(&m)
		b.ReportMetric(float64(m.HeapAlloc)/1e6, "MB-heap")
		b.ReportMetric(resident(), "MB-resident")
		b.ReportMetric(0, "ns/op")
		e.quit()
	}
}

// resident is the memory of this process in MB, where the system tells it.
func resident() float64 {
	raw, _ := os.ReadFile("/proc/self/status")
	for line := range strings.Lines(string(raw)) {
		var kB float64
		if n, _ := fmt.Sscanf(line, "VmRSS: %f kB", &kB); n == 1 {
			return kB / 1000
		}
	}
	return 0
}

// BenchmarkTyping replays 200 edits at intervals of 20 ms, each with a hover,
// and reports how long after an edit its diagnostics came, and the hover. Run
// it with -benchtime=1x.
func BenchmarkTyping(b *testing.B) {
	for _, n := range sizes {
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			d := seat(b, n)
			line, column := d.middle()
			hover := object{"textDocument": object{"uri": d.uri}, "position": at(line+1, 4)}
			const edits = 200
			version := 1
			var diagnosed, hovered []time.Duration
			superseded := 0
			for range b.N {
				sent := map[int]time.Time{}
				tick := time.NewTicker(20 * time.Millisecond)
				asked := map[string]time.Time{}
				for i := range edits {
					<-tick.C
					version++
					sent[version] = time.Now()
					d.change(d.uri, version, object{"range": between(line, column, line, column+1), "text": fmt.Sprint(1 + i%9)})
					asked[d.begin("textDocument/hover", hover)] = time.Now()
				}
				tick.Stop()
				d.diagnosed(d.uri, version)
				shown, answered := d.replayed(sent, asked)
				diagnosed, hovered = append(diagnosed, shown...), append(hovered, answered...)
				superseded += edits - len(shown)
				d.forget()
			}
			spread(b, diagnosed, "diagnosed")
			spread(b, hovered, "hover")
			b.ReportMetric(float64(superseded)/float64(b.N), "superseded")
		})
	}
}

// replayed tells how long after its edit or question each message came. A
// diagnosis or a hover that a newer edit has superseded has no time.
func (d *desk) replayed(sent map[int]time.Time, asked map[string]time.Time) (shown, answered []time.Duration) {
	for _, m := range d.all(func(message) bool { return true }) {
		if begun, ok := asked[string(m.ID)]; ok && m.Error == nil {
			answered = append(answered, m.came.Sub(begun))
		}
		var p pushed
		if m.Method != "textDocument/publishDiagnostics" || json.Unmarshal(m.Params, &p) != nil {
			continue
		}
		if begun, ok := sent[*p.Version]; ok {
			shown = append(shown, m.came.Sub(begun))
		}
	}
	return shown, answered
}
