package logbook

import (
	"errors"
	"fmt"
	"math/rand/v2"
	"os"
	"os/exec"
	"path/filepath"
	"strconv"
	"strings"
	"testing"
	"time"

	bolt "go.etcd.io/bbolt"
)

var clock = time.Date(2026, 12, 1, 23, 30, 0, 0, time.FixedZone("", 3600))

func draft(i int) Draft {
	return Draft{
		Kind: Shot, At: clock.Add(time.Duration(i) * time.Minute), Event: fmt.Sprintf("%032x", i), By: "R. Amsel", Title: "KF-12 weld 3",
		Given: "95", Plan: []byte(`{"plan":1}`), Engine: "1", Figures: []Figure{{"exposure", "s", "110.6"}},
	}
}

func fresh(t testing.TB, entries int) (*Book, string) {
	t.Helper()
	path := filepath.Join(t.TempDir(), "kf.book")
	b, err := Open(path, clock)
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { b.Close() })
	for i := range entries {
		if n, err := b.Append(draft(i)); err != nil || n != uint64(i+1) {
			t.Fatalf("append %d: %d, %v", i, n, err)
		}
	}
	return b, path
}

func mustHold(t *testing.T, b *Book, entries uint64) {
	t.Helper()
	r, err := b.Verify("")
	if err != nil || !r.Holds || r.Entries != entries {
		t.Fatalf("verify: %+v, %v; want %d entries that hold", r, err, entries)
	}
}

func TestAppendListGetVerify(t *testing.T) {
	b, path := fresh(t, 25)
	mustHold(t, b, 25)
	list, err := b.List(0, 10)
	if err != nil || len(list) != 10 || list[0].Seq != 25 || list[9].Seq != 16 {
		t.Fatalf("list: %v, %v", list, err)
	}
	if list, err = b.List(4, 10); err != nil || len(list) != 3 || list[0].Seq != 3 {
		t.Fatalf("list before 4: %v, %v", list, err)
	}
	r, err := b.Get(7)
	if err != nil || r.By != "R. Amsel" || !r.When().Equal(clock.Add(6*time.Minute)) || r.OffsetMin != 60 {
		t.Fatalf("get 7: %+v, %v", r, err)
	}
	if _, err := b.Get(26); err == nil {
		t.Fatal("entry 26 of 25 was given")
	}
	b.Close()
	again, err := OpenToRead(path)
	if err != nil {
		t.Fatal(err)
	}
	defer again.Close()
	mustHold(t, again, 25)
	if _, err := again.Append(draft(99)); err == nil {
		t.Fatal("a book open to read was written")
	}
}

// The first entry of a new book is number 1 and one press never logs twice.
func TestOneEventIsLoggedOnce(t *testing.T) {
	b, _ := fresh(t, 3)
	n, err := b.Append(draft(1))
	if err != nil || n != 2 {
		t.Fatalf("the same event: %d, %v; want 2", n, err)
	}
	mustHold(t, b, 3)
}

func TestRefusedDraftsWriteNothing(t *testing.T) {
	b, _ := fresh(t, 2)
	bad := map[string]func(*Draft){
		"no name": func(d *Draft) { d.By = "" }, "kind": func(d *Draft) { d.Kind = "guess" }, "event": func(d *Draft) { d.Event = "12" },
		"given": func(d *Draft) { d.Given = "1e3" }, "minus": func(d *Draft) { d.Given = "-3" }, "no plan": func(d *Draft) { d.Plan = nil },
		"figure": func(d *Draft) { d.Figures = []Figure{{"t", "s", "NaN"}} }, "utf8": func(d *Draft) { d.Title = "\xff" },
		"correction of nothing": func(d *Draft) { d.Kind, d.Note = Correction, "why" }, "stray of": func(d *Draft) { d.Of = 1 },
	}
	for name, spoil := range bad {
		d := draft(7)
		spoil(&d)
		if n, err := b.Append(d); err == nil {
			t.Errorf("%s: logged as %d", name, n)
		}
	}
	mustHold(t, b, 2)
	d := draft(8)
	d.Kind, d.Of, d.Note = Correction, 1, "the given time was 59 s"
	if n, err := b.Append(d); err != nil || n != 3 {
		t.Fatalf("a good correction: %d, %v", n, err)
	}
}

// The bytes of version 1, field by field as the package's doc shows them. They
// must decode for ever: never change this test, add one for the next version.
func TestVersion1Bytes(t *testing.T) {
	const golden = `{"by":"R. Amsel","event":"00112233445566778899aabbccddeeff","figures":[{"name":"exposure","unit":"s","value":"110.6"}],` +
		`"given_s":"95","kind":"shot","offset_min":60,"plan":"{\"plan\":1}","seq":1,"time":"2026-12-01T22:30:00Z","title":"KF-12 weld 3","v":1}`
	d := draft(0)
	d.Event = "00112233445566778899aabbccddeeff"
	d.Engine = ""
	got, err := d.entry(1).encode()
	if err != nil || string(got) != golden {
		t.Fatalf("encodes to\n%s\n%v, want\n%s", got, err, golden)
	}
	e, err := Decode([]byte(golden))
	if err != nil || e.Given != "95" || e.Figures[0].Value != "110.6" || e.Seq != 1 {
		t.Fatalf("decodes to %+v, %v", e, err)
	}
	doc, err := os.ReadFile("doc.go")
	if err != nil || !strings.Contains(string(doc), golden) {
		t.Fatal("the package's doc does not show these bytes")
	}
}

func TestDecodeRefusesOtherForms(t *testing.T) {
	good, err := draft(0).entry(1).encode()
	if err != nil {
		t.Fatal(err)
	}
	s := string(good)
	for name, text := range map[string]string{
		"white space": strings.Replace(s, ":", ": ", 1), "trailing": s + "\n", "key order": `{"v":1,` + strings.Replace(s[1:], `,"v":1`, "", 1),
		"unknown key": strings.Replace(s, `"seq"`, `"SEQ"`, 1), "twice": strings.Replace(s, `"seq":1`, `"seq":1,"seq":1`, 1),
		"escape": strings.Replace(s, "KF", `\u004bF`, 1), "number form": strings.Replace(s, `"seq":1`, `"seq":1.0`, 1),
		"version": strings.Replace(s, `"v":1`, `"v":2`, 1), "empty": "", "null": "null", "zero number": strings.Replace(s, `"seq":1`, `"seq":0`, 1),
	} {
		if _, err := Decode([]byte(text)); err == nil {
			t.Errorf("%s: accepted %s", name, text)
		}
	}
}

func FuzzDecode(f *testing.F) {
	good, _ := draft(0).entry(1).encode()
	f.Add(good)
	f.Add([]byte(`{}`))
	f.Fuzz(func(t *testing.T, data []byte) {
		e, err := Decode(data)
		if err != nil {
			return
		}
		again, err := e.encode()
		if err != nil || string(again) != string(data) {
			t.Fatalf("accepted %q, encodes to %q, %v", data, again, err)
		}
	})
}

func TestSecondOpenerIsTold(t *testing.T) {
	b, path := fresh(t, 1)
	start := time.Now()
	for name, open := range map[string]func() (*Book, error){
		"to append": func() (*Book, error) { return Open(path, clock) }, "to read": func() (*Book, error) { return OpenToRead(path) },
	} {
		if other, err := open(); !errors.Is(err, ErrInUse) {
			t.Errorf("%s: got %v, %v", name, other, err)
		}
	}
	out, err := child(path, "open").CombinedOutput()
	if err == nil || !strings.Contains(string(out), ErrInUse.Error()) {
		t.Fatalf("another process: %v, %s", err, out)
	}
	if d := time.Since(start); d > 30*time.Second {
		t.Fatalf("told only after %v", d)
	}
	if n, err := b.Append(draft(1)); err != nil || n != 2 {
		t.Fatalf("the first opener afterwards: %d, %v", n, err)
	}
}

// child runs this test binary again as another process at work on the book.
func child(path, job string) *exec.Cmd {
	cmd := exec.Command(os.Args[0], "-test.run=^TestChild$")
	cmd.Env = append(os.Environ(), "HALFVALUE_CHILD="+job, "HALFVALUE_BOOK="+path)
	return cmd
}

// TestChild is the other process; alone it proves nothing and passes.
func TestChild(t *testing.T) {
	job := os.Getenv("HALFVALUE_CHILD")
	if job == "" {
		return
	}
	b, err := Open(os.Getenv("HALFVALUE_BOOK"), clock)
	if err != nil {
		fmt.Println(err)
		os.Exit(1)
	}
	if job == "open" {
		os.Exit(0)
	}
	for {
		at, err := b.Count()
		if err != nil {
			os.Exit(1)
		}
		n, err := b.Append(draft(int(at)))
		if err != nil {
			fmt.Println(err)
			os.Exit(1)
		}
		fmt.Printf("logged %d\n", n)
	}
}

// A writer killed at random moments loses nothing that it had acknowledged and
// tears nothing. HALFVALUE_KILLS asks for the long form.
func TestKilledWriter(t *testing.T) {
	kills := 12
	if v, err := strconv.Atoi(os.Getenv("HALFVALUE_KILLS")); err == nil {
		kills = v
	}
	path := filepath.Join(t.TempDir(), "kf.book")
	random := rand.New(rand.NewPCG(1, 2))
	acknowledged := 0
	for range kills {
		cmd := child(path, "write")
		out := &strings.Builder{}
		cmd.Stdout = out
		if err := cmd.Start(); err != nil {
			t.Fatal(err)
		}
		time.Sleep(time.Duration(20+random.IntN(150)) * time.Millisecond)
		cmd.Process.Kill()
		cmd.Wait()
		for _, line := range strings.Split(out.String(), "\n") {
			if n, err := strconv.Atoi(strings.TrimPrefix(line, "logged ")); err == nil {
				acknowledged = max(acknowledged, n)
			}
		}
		if _, err := os.Stat(path); err != nil {
			continue // killed before the book was there
		}
		b, err := OpenToRead(path)
		if err != nil {
			t.Fatal(err)
		}
		n, _ := b.Count()
		if n < uint64(acknowledged) || n > uint64(acknowledged)+1 {
			t.Fatalf("%d acknowledged, %d in the book", acknowledged, n)
		}
		mustHold(t, b, n)
		b.Close()
	}
	if acknowledged < kills {
		t.Fatalf("only %d entries in %d lives: the test did not test", acknowledged, kills)
	}
}

// What a hex editor or a script does to a book is found and named.
func TestTamperingIsFound(t *testing.T) {
	cases := map[string]struct {
		spoil func(tx *bolt.Tx) error
		want  string
	}{
		"edited entry": {func(tx *bolt.Tx) error {
			rec := tx.Bucket(bucketRec)
			return rec.Put(be(3), []byte(strings.Replace(string(rec.Get(be(3))), `"given_s":"95"`, `"given_s":"15"`, 1)))
		}, "entry of entry 4"},
		"deleted entry":    {func(tx *bolt.Tx) error { return tx.Bucket(bucketRec).Delete(be(3)) }, "entry of entry 4: missing"},
		"last cut off":     {func(tx *bolt.Tx) error { return tx.Bucket(bucketRec).Delete(be(9)) }, "checkpoint: signs 10 entries, the book holds 9"},
		"stored hash":      {func(tx *bolt.Tx) error { return tx.Bucket(bucketHash).Put(be(2), make([]byte, 32)) }, "hash"},
		"index":            {func(tx *bolt.Tx) error { return tx.Bucket(bucketEvent).Delete(eventKey(draft(5).Event, 5)) }, "index of entry 6"},
		"index with value": {func(tx *bolt.Tx) error { return tx.Bucket(bucketEvent).Put(eventKey(draft(5).Event, 5), []byte("x")) }, "index of entry 6"},
		"stray index key":  {func(tx *bolt.Tx) error { return tx.Bucket(bucketTime).Put([]byte("stray"), nil) }, "index: bucket ix_time"},
		"checkpoint gone":  {func(tx *bolt.Tx) error { return tx.Bucket(bucketHead).Delete(keyLatest) }, "checkpoint"},
	}
	for name, c := range cases {
		b, path := fresh(t, 10)
		b.Close()
		db, err := bolt.Open(path, 0o600, options(false))
		if err != nil {
			t.Fatal(err)
		}
		if err := db.Update(c.spoil); err != nil {
			t.Fatal(err)
		}
		db.Close()
		again, err := OpenToRead(path)
		if err != nil {
			t.Fatalf("%s: %v", name, err)
		}
		r, _ := again.Verify("")
		again.Close()
		if r.Holds || !strings.Contains(fmt.Sprint(r.Faults), c.want) {
			t.Errorf("%s: holds %v, faults %v; want %q", name, r.Holds, r.Faults, c.want)
		}
	}
}

// Bits flipped anywhere in the file are found, refuse to open, or change
// nothing that the book says. HALFVALUE_FLIPS asks for more of them.
func TestFlippedBits(t *testing.T) {
	b, path := fresh(t, 30)
	before := export(t, b)
	b.Close()
	good, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	flips := 400
	if v, err := strconv.Atoi(os.Getenv("HALFVALUE_FLIPS")); err == nil {
		flips = v
	}
	random := rand.New(rand.NewPCG(3, 4))
	found := 0
	for range flips {
		bad := append([]byte(nil), good...)
		at := random.IntN(len(bad) * 8)
		bad[at/8] ^= 1 << (at % 8)
		other := filepath.Join(t.TempDir(), "flipped.book")
		if err := os.WriteFile(other, bad, 0o600); err != nil {
			t.Fatal(err)
		}
		again, err := OpenToRead(other)
		if err != nil {
			found++
			continue
		}
		r, _ := again.Verify("")
		if !r.Holds {
			found++
		} else if got := export(t, again); got != before {
			t.Errorf("bit %d of byte %d: the book holds and says something else", at%8, at/8)
		}
		again.Close()
	}
	t.Logf("%d of %d flips found, the others changed nothing", found, flips)
	if found < flips/20 {
		t.Fatal("hardly a flip was found: the test did not test")
	}
}

// export is everything that a book says.
func export(t *testing.T, b *Book) string {
	t.Helper()
	list, err := b.List(0, 1000)
	if err != nil {
		return err.Error()
	}
	var s strings.Builder
	for _, r := range list {
		s.Write(r.Raw)
		s.WriteByte('\n')
	}
	head, err := b.Checkpoint()
	if err != nil {
		return err.Error()
	}
	return s.String() + head
}

func TestOtherKeyIsRefused(t *testing.T) {
	_, one := fresh(t, 1)
	b, two := fresh(t, 1)
	b.Close()
	data, err := os.ReadFile(one + ".key")
	if err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(two+".key", data, 0o600); err != nil {
		t.Fatal(err)
	}
	if _, err := Open(two, clock); err == nil || !strings.Contains(err.Error(), "another book's") {
		t.Fatalf("got %v", err)
	}
	if err := os.Remove(two + ".key"); err != nil {
		t.Fatal(err)
	}
	if _, err := Open(two, clock); err == nil || !strings.Contains(err.Error(), "reading still works") {
		t.Fatalf("without a key: %v", err)
	}
	r, err := OpenToRead(two)
	if err != nil {
		t.Fatal(err)
	}
	defer r.Close()
	mustHold(t, r, 1)
}

func TestVerifyWithPrintedKey(t *testing.T) {
	b, _ := fresh(t, 3)
	if r, _ := b.Verify(b.VerifierKey()); !r.Holds {
		t.Fatalf("with its own key: %v", r.Faults)
	}
	other, _ := fresh(t, 1)
	if r, _ := b.Verify(other.VerifierKey()); r.Holds {
		t.Fatal("holds with another book's key")
	}
}

func TestNoBookIsNotABook(t *testing.T) {
	path := filepath.Join(t.TempDir(), "letter.txt")
	if err := os.WriteFile(path, []byte("dear auditor"), 0o600); err != nil {
		t.Fatal(err)
	}
	if _, err := OpenToRead(path); err == nil {
		t.Fatal("a letter was opened as a book")
	}
	if _, err := OpenToRead(path + "2"); err == nil {
		t.Fatal("nothing was opened as a book")
	}
}

func BenchmarkAppend(b *testing.B) {
	book, _ := fresh(b, 0)
	i := 0
	for b.Loop() {
		if _, err := book.Append(draft(i)); err != nil {
			b.Fatal(err)
		}
		i++
	}
}
