package logbook

import (
	"encoding/base64"
	"encoding/binary"
	"fmt"
	"time"

	"golang.org/x/mod/sumdb/note"
	"golang.org/x/mod/sumdb/tlog"

	bolt "go.etcd.io/bbolt"
)

// Draft is what an entry is made from; Append gives it number and form.
type Draft struct {
	Kind    Kind
	At      time.Time // wall clock with the local offset
	Event   string    // 32 hexadecimal digits, fresh for each press of the button
	By      string
	Title   string
	Given   string // decimal seconds
	Plan    []byte
	Figures []Figure
	Engine  string
	Of      uint64
	Note    string
}

func (d Draft) entry(seq uint64) Entry {
	_, offset := d.At.Zone()
	return Entry{
		V: Version, Seq: seq, Kind: d.Kind, Time: d.At.UTC().Format(time.RFC3339Nano), OffsetMin: offset / 60, Event: d.Event,
		By: d.By, Title: d.Title, Given: d.Given, Plan: string(d.Plan), Figures: d.Figures, Engine: d.Engine, Of: d.Of, Note: d.Note,
	}
}

// Append writes one entry in one transaction, with its hashes, indexes and the
// new signed checkpoint, and returns its number once it is synced. An entry
// whose event is in the book already is not written again: its number is
// returned. After a failed write the book must be opened anew.
func (b *Book) Append(d Draft) (number uint64, err error) {
	b.mu.Lock()
	defer b.mu.Unlock()
	switch {
	case b.closed:
		return 0, fmt.Errorf("the book is closed")
	case b.signer == nil:
		return 0, fmt.Errorf("the book is open to read only")
	case b.broken != nil:
		return 0, fmt.Errorf("an earlier write failed (%w): close the book, open and verify it, then go on", b.broken)
	}
	if _, err := d.entry(1 << 62).encode(); err != nil {
		return 0, err // refused before anything is written
	}
	err = guard(func() error {
		return b.db.Update(func(tx *bolt.Tx) error {
			if n, ok := findEvent(tx, d.Event); ok {
				number = n + 1
				return nil
			}
			n, err := b.write(tx, d)
			number = n + 1
			return err
		})
	})
	if err != nil {
		b.broken = err
		return 0, fmt.Errorf("not logged: %w", err)
	}
	return number, nil
}

func (b *Book) write(tx *bolt.Tx, d Draft) (uint64, error) {
	n := count(tx)
	e := d.entry(n + 1)
	data, err := e.encode()
	if err != nil {
		return 0, err
	}
	rec := tx.Bucket(bucketRec)
	rec.FillPercent = 1 // written in order
	if err := rec.Put(be(n), data); err != nil {
		return 0, err
	}
	if err := putHashes(tx, n, data); err != nil {
		return 0, err
	}
	if err := tx.Bucket(bucketTime).Put(timeKey(e, n), nil); err != nil {
		return 0, err
	}
	if err := tx.Bucket(bucketEvent).Put(eventKey(e.Event, n), nil); err != nil {
		return 0, err
	}
	return n, seal(tx, b.origin, b.signer, n+1)
}

func putHashes(tx *bolt.Tx, n uint64, data []byte) error {
	hash := tx.Bucket(bucketHash)
	hash.FillPercent = 1
	hashes, err := tlog.StoredHashes(int64(n), data, reader{hash})
	if err != nil {
		return err
	}
	at := uint64(tlog.StoredHashIndex(0, int64(n)))
	for i := range hashes {
		if err := hash.Put(be(at+uint64(i)), hashes[i][:]); err != nil {
			return err
		}
	}
	return nil
}

// seal writes the signed checkpoint over the first size entries.
func seal(tx *bolt.Tx, origin string, signer note.Signer, size uint64) error {
	root, err := tlog.TreeHash(int64(size), reader{tx.Bucket(bucketHash)})
	if err != nil {
		return err
	}
	text := fmt.Sprintf("%s\n%d\n%s\n", origin, size, base64.StdEncoding.EncodeToString(root[:]))
	signed, err := note.Sign(&note.Note{Text: text}, signer)
	if err != nil {
		return err
	}
	return tx.Bucket(bucketHead).Put(keyLatest, signed)
}

// count is the number of entries: one more than the last key.
func count(tx *bolt.Tx) uint64 {
	k, _ := tx.Bucket(bucketRec).Cursor().Last()
	if len(k) != 8 {
		return 0
	}
	return binary.BigEndian.Uint64(k) + 1
}

func be(n uint64) []byte { return binary.BigEndian.AppendUint64(nil, n) }

func timeKey(e Entry, n uint64) []byte {
	return append(be(uint64(e.When().UnixNano())), be(n)...)
}

func eventKey(event string, n uint64) []byte { return append([]byte(event), be(n)...) }

func findEvent(tx *bolt.Tx, event string) (uint64, bool) {
	k, _ := tx.Bucket(bucketEvent).Cursor().Seek([]byte(event))
	if len(k) != len(event)+8 || string(k[:len(event)]) != event {
		return 0, false
	}
	return binary.BigEndian.Uint64(k[len(event):]), true
}

// reader gives the tree's stored hashes to package tlog.
type reader struct{ bucket *bolt.Bucket }

func (r reader) ReadHashes(indexes []int64) ([]tlog.Hash, error) {
	out := make([]tlog.Hash, len(indexes))
	for i, at := range indexes {
		v := r.bucket.Get(be(uint64(at)))
		if len(v) != tlog.HashSize {
			return nil, fmt.Errorf("hash %d is missing", at)
		}
		copy(out[i][:], v)
	}
	return out, nil
}
