package logbook

import (
	"encoding/hex"
	"fmt"
	"slices"

	"golang.org/x/mod/sumdb/tlog"

	bolt "go.etcd.io/bbolt"
)

// Record is an entry as it lies in the book.
type Record struct {
	Entry
	Raw  []byte // the exact bytes
	Hash string // leaf hash, hexadecimal
}

// Count gives the number of entries.
func (b *Book) Count() (n uint64, err error) {
	err = b.view(func(tx *bolt.Tx) error { n = count(tx); return nil })
	return n, err
}

// Get gives one entry by its number, from 1.
func (b *Book) Get(number uint64) (r Record, err error) {
	err = b.view(func(tx *bolt.Tx) error {
		if n := count(tx); number < 1 || number > n {
			return fmt.Errorf("there is no entry %d: the book holds %d", number, n)
		}
		r, err = read(tx, number-1)
		return err
	})
	return r, err
}

// List gives at most n entries older than number before, newest first; before
// 0 starts at the newest.
func (b *Book) List(before uint64, n int) (list []Record, err error) {
	err = b.view(func(tx *bolt.Tx) error {
		at := count(tx)
		if before > 0 && before-1 < at {
			at = before - 1
		}
		for ; at > 0 && len(list) < n; at-- {
			r, err := read(tx, at-1)
			if err != nil {
				return err
			}
			list = append(list, r)
		}
		return nil
	})
	return list, err
}

func (b *Book) view(f func(*bolt.Tx) error) error {
	return guard(func() error { return b.db.View(f) })
}

func read(tx *bolt.Tx, n uint64) (Record, error) {
	raw := slices.Clone(tx.Bucket(bucketRec).Get(be(n)))
	if raw == nil {
		return Record{}, fmt.Errorf("entry %d is missing", n+1)
	}
	e, err := Decode(raw)
	if err != nil {
		return Record{}, fmt.Errorf("entry %d: %w", n+1, err)
	}
	h := tlog.RecordHash(raw)
	return Record{e, raw, hex.EncodeToString(h[:])}, nil
}
