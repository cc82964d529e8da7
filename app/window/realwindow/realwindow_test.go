//go:build realwindow

// Package realwindow drives the real program with mouse and keys under the
// display it is given, as a user does: once round the main job.
package realwindow

import (
	"fmt"
	"math"
	"os"
	"os/exec"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"
	"time"

	"stillroom/app/project"
)

// patience is how long an event is waited for; the events come in a fraction of
// it on a quiet machine.
const patience = 60 * time.Second

// desk is a running program and the hands at it.
type desk struct {
	t       *testing.T
	log     string
	home    string
	program *exec.Cmd
	errors  *os.File
}

func start(t *testing.T) *desk {
	t.Helper()
	if os.Getenv("DISPLAY") == "" {
		t.Fatal("no DISPLAY: this test needs a real window")
	}
	home := t.TempDir()
	d := &desk{t: t, home: home, log: filepath.Join(home, "events.log")}
	binary := filepath.Join(home, "stillroom")
	if out, err := exec.Command("go", "build", "-tags", "gles", "-o", binary, "stillroom/app").CombinedOutput(); err != nil {
		t.Fatalf("build: %v\n%s", err, out)
	}
	var err error
	if d.errors, err = os.Create(filepath.Join(home, "stderr")); err != nil {
		t.Fatal(err)
	}
	d.program = exec.Command(binary)
	d.program.Env = append(os.Environ(), "HOME="+home, "XDG_CONFIG_HOME="+home+"/config", "XDG_STATE_HOME="+home+"/state", "LANG=en_GB.UTF-8", "STILLROOM_UI_LOG="+d.log)
	d.program.Stderr, d.program.Stdout = d.errors, d.errors
	if err := d.program.Start(); err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() {
		_ = d.program.Process.Kill()
		_ = d.program.Wait()
		said, _ := os.ReadFile(d.errors.Name())
		if len(said) > 0 {
			t.Logf("the program said:\n%s", said)
		}
		if strings.Contains(string(said), "Error in Fyne call thread") {
			t.Error("a widget was touched from the wrong goroutine")
		}
		if t.Failed() {
			events, _ := os.ReadFile(d.log)
			lines := strings.Split(string(events), "\n")
			t.Logf("last events:\n%s", strings.Join(lines[max(0, len(lines)-60):], "\n"))
		}
	})
	return d
}

// events returns what has happened so far.
func (d *desk) events() []string {
	data, _ := os.ReadFile(d.log)
	return strings.Split(strings.TrimSpace(string(data)), "\n")
}

// await waits for an event after the first so many and returns how many there
// are then.
func (d *desk) await(after int, text string) int {
	d.t.Helper()
	for end := time.Now().Add(patience); time.Now().Before(end); time.Sleep(20 * time.Millisecond) {
		for i, e := range d.events() {
			if i >= after && strings.Contains(e, text) {
				return len(d.events())
			}
		}
	}
	d.t.Fatalf("no event %q", text)
	return 0
}

// place returns where a thing was last.
func (d *desk) place(name string) (x, y float64) {
	d.t.Helper()
	for _, e := range slices.Backward(d.events()) {
		f := strings.Fields(e)
		if len(f) == 5 && f[1] == "place" && f[2] == name {
			x, _ = strconv.ParseFloat(f[3], 64)
			y, _ = strconv.ParseFloat(f[4], 64)
			return x, y
		}
	}
	d.t.Fatalf("no place %q", name)
	return 0, 0
}

func (d *desk) hand(args ...string) {
	d.t.Helper()
	if out, err := exec.Command("xdotool", args...).CombinedOutput(); err != nil {
		d.t.Fatalf("xdotool %v: %v %s", args, err, out)
	}
}

func px(v float64) string { return strconv.Itoa(int(math.Round(v))) }

func (d *desk) click(x, y float64) {
	d.hand("mousemove", px(x), px(y))
	d.hand("click", "1")
}

// drag moves in steps, as a hand does.
func (d *desk) drag(x, y, dx, dy float64, steps int) {
	d.hand("mousemove", px(x), px(y))
	d.hand("mousedown", "1")
	for i := 1; i <= steps; i++ {
		d.hand("mousemove", px(x+dx*float64(i)/float64(steps)), px(y+dy*float64(i)/float64(steps)))
	}
	d.hand("mouseup", "1")
}

// retype replaces what is in the entry that has the focus.
func (d *desk) retype(text string) {
	d.hand("key", "ctrl+a")
	d.hand("type", "--delay", "15", text)
	d.hand("key", "Return")
}

func TestRealWindow(t *testing.T) {
	d := start(t)
	n := d.await(0, "ready")
	n = d.await(0, "result stage 3")

	// Type a new length.
	x, y := d.place("field-Length")
	d.click(x, y)
	d.retype("5.45 m")
	n = d.await(n, "edit change length")
	n = d.await(n, "result stage 3")

	// Drag a loudspeaker by half a metre towards the back.
	x, y = d.place("loudspeaker-L")
	metre, _ := d.place("metre")
	d.drag(x, y, metre/2, 0, 12)
	n = d.await(n, "edit move loudspeaker")
	n = d.await(n, "result stage 3")

	// Select the first mode of the schedule and tune an absorber to it.
	x, y = d.place("schedule-row-0")
	d.click(x, y)
	n = d.await(n, "selected mode 0 ")
	d.hand("key", "ctrl+t")
	d.await(n, "proposals")
	if slices.ContainsFunc(d.events(), func(e string) bool { return strings.HasSuffix(e, "proposals 0") }) {
		t.Fatal("the tuner proposed nothing")
	}
	d.hand("key", "Return")
	n = d.await(n, "placed ")
	n = d.await(n, "result stage 3")

	// Save and export.
	file, pdf := filepath.Join(d.home, "tried.stillroom"), filepath.Join(d.home, "tried.pdf")
	d.hand("key", "ctrl+s")
	time.Sleep(500 * time.Millisecond) // a dialog has no event of its own
	d.retype(file)
	n = d.await(n, "saved "+file)
	d.hand("key", "ctrl+e")
	time.Sleep(500 * time.Millisecond)
	d.retype(pdf)
	d.await(n, "exported "+pdf)

	checkFile(t, file)
	checkPDF(t, pdf)
}

func checkFile(t *testing.T, file string) {
	p, err := project.Load(file)
	if err != nil {
		t.Fatalf("the saved file: %v", err)
	}
	if p.Room.Length != 5.45 {
		t.Errorf("the saved length is %v m, typed was 5.45 m", p.Room.Length)
	}
	// A pixel is about 2 cm here; the drag keeps to whole centimetres.
	if at := p.Loudspeakers[0].At[0]; math.Abs(at-1.6) > 0.05 || math.Abs(at*100-math.Round(at*100)) > 1e-6 {
		t.Errorf("the loudspeaker was dragged to %v m, wanted 1.60 m", at)
	}
	if len(p.Absorbers) != 3 {
		t.Errorf("%d absorbers are saved, wanted 3", len(p.Absorbers))
	}
}

func checkPDF(t *testing.T, pdf string) {
	text, err := exec.Command("pdftotext", "-layout", pdf, "-").Output()
	if err != nil {
		t.Fatalf("the PDF: %v", err)
	}
	for _, want := range []string{"5.45 m", "Mode schedule", "A3", "Cautions", "asbestos"} {
		if !strings.Contains(string(text), want) {
			t.Errorf("the PDF does not say %q", want)
		}
	}
}

// TestRealWindowFollowsDrag drags a wall and prints how often the window showed
// a new result meanwhile.
func TestRealWindowFollowsDrag(t *testing.T) {
	d := start(t)
	n := d.await(0, "result stage 3")
	x, y := d.place("back-wall")
	script := []string{"mousemove", px(x), px(y), "mousedown", "1"}
	for i := range 160 {
		script = append(script, "mousemove", px(x-float64(40-abs(40-i%80))), px(y), "sleep", "0.012")
	}
	d.hand(append(script, "mouseup", "1")...)
	d.await(n, "edit move wall")
	d.await(n, "result stage 3")
	gaps := d.framesDuring(n, "edit move wall")
	if len(gaps) < 10 {
		t.Fatalf("only %d frames while the wall was dragged", len(gaps))
	}
	var whole float64
	for _, g := range gaps {
		whole += g
	}
	slices.Sort(gaps)
	fmt.Printf("while a wall is dragged: %d frames, %.1f a second; between them p50 %.0f ms, p95 %.0f ms\n",
		len(gaps), 1000*float64(len(gaps))/whole, gaps[len(gaps)/2], gaps[len(gaps)*95/100])
}

// framesDuring returns the times in ms between the window's frames from the
// first to the last event of a name after the first so many events.
func (d *desk) framesDuring(after int, name string) []float64 {
	var gaps []float64
	events := d.events()[after:]
	first := slices.IndexFunc(events, func(e string) bool { return strings.Contains(e, name) })
	last := len(events)
	for i, e := range slices.Backward(events) {
		if strings.Contains(e, name) {
			last = i
			break
		}
	}
	before := -1.0
	for _, e := range events[first:last] {
		f := strings.Fields(e)
		if len(f) < 2 || f[1] != "frame" {
			continue
		}
		ms, err := strconv.ParseFloat(f[0], 64)
		if err != nil {
			d.t.Fatalf("event %q: %v", e, err)
		}
		if before >= 0 {
			gaps = append(gaps, ms-before)
		}
		before = ms
	}
	return gaps
}

func abs(v int) int { return max(v, -v) }
