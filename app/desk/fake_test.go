package desk

import (
	"errors"
	"fmt"
	"time"

	"halfvalue/exposure"
)

// world is a Platform in memory that counts and can be told to fail.
type world struct {
	now      time.Time
	plan     []byte
	settings []byte
	events   int
	book     *memoryBook
	noBook   error
	noSave   error
	saves    int
}

func newWorld() *world {
	return &world{now: time.Date(2026, 12, 1, 20, 0, 0, 0, time.UTC), book: &memoryBook{}}
}

func (w *world) Now() time.Time            { return w.now }
func (w *world) LastPlan() ([]byte, error) { return w.plan, nil }
func (w *world) Settings() ([]byte, error) { return w.settings, nil }
func (w *world) EventID() (string, error) {
	w.events++
	return fmt.Sprintf("%032x", w.events), nil
}

func (w *world) SavePlan(data []byte) error {
	w.saves++
	if w.noSave == nil {
		w.plan = append([]byte(nil), data...)
	}
	return w.noSave
}

func (w *world) SaveSettings(data []byte) error {
	w.settings = append([]byte(nil), data...)
	return nil
}

func (w *world) OpenBook() (Book, error) {
	if w.noBook != nil {
		return nil, w.noBook
	}
	return w.book, nil
}

// memoryBook is a Book in memory. With lose it writes and then reports an
// error once, as a crash between commit and acknowledgement would.
type memoryBook struct {
	shots []Shot
	lose  bool
}

func (b *memoryBook) Append(s Shot) (uint64, error) {
	for i, old := range b.shots {
		if old.Event == s.Event {
			return uint64(i + 1), nil
		}
	}
	b.shots = append(b.shots, s)
	if b.lose {
		b.lose = false
		return 0, errors.New("the disk did not answer")
	}
	return uint64(len(b.shots)), nil
}

func (b *memoryBook) entry(n uint64) Entry {
	s := b.shots[n-1]
	return Entry{Number: n, At: s.At, By: s.By, GivenSeconds: s.GivenSeconds, Plan: s.Plan, Then: s.Answer.Exposure}
}

func (b *memoryBook) Count() (uint64, error) { return uint64(len(b.shots)), nil }

func (b *memoryBook) Page(before uint64, n int) ([]Entry, error) {
	top := uint64(len(b.shots))
	if before > 0 {
		top = min(top, before-1)
	}
	var out []Entry
	for ; top > 0 && len(out) < n; top-- {
		out = append(out, b.entry(top))
	}
	return out, nil
}

func (b *memoryBook) Entry(n uint64) (Entry, error) {
	if n == 0 || n > uint64(len(b.shots)) {
		return Entry{}, fmt.Errorf("there is no entry %d", n)
	}
	return b.entry(n), nil
}

func (b *memoryBook) Verify() (Verdict, error) { return Verdict{Entries: uint64(len(b.shots))}, nil }
func (b *memoryBook) Close() error             { return nil }

func open(w *world) *Desk {
	return Open(w, Options{Reckon: Engine(exposure.Calibration{}), People: []string{"R. Amsel"}})
}
