package logbook

import (
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"runtime/debug"
	"sync"
	"time"

	"golang.org/x/mod/sumdb/note"

	bolt "go.etcd.io/bbolt"
	bolterrors "go.etcd.io/bbolt/errors"
)

// ErrInUse is told when another program, or another part of this one, has the
// book open.
var ErrInUse = errors.New("the book is open elsewhere: close the other program that uses it, or work on a copy")

// ErrDamaged is told when the file is there and is no sound book.
var ErrDamaged = errors.New("the file is damaged or is no book")

const schema = "halfvalue book 1"

// The buckets.
var (
	bucketRec   = []byte("rec")
	bucketHash  = []byte("hash")
	bucketHead  = []byte("head")
	bucketTime  = []byte("ix_time")
	bucketEvent = []byte("ix_event")
	bucketMeta  = []byte("meta")

	keyLatest  = []byte("latest")
	keySchema  = []byte("schema")
	keyOrigin  = []byte("origin")
	keyVerify  = []byte("vkey")
	keyCreated = []byte("created")
)

// Book is an open book. Its methods are safe for concurrent use.
type Book struct {
	path     string
	db       *bolt.DB
	origin   string
	verifier note.Verifier
	signer   note.Signer // nil when opened to read

	mu     sync.Mutex
	broken error // after a failed write nothing more is written
	closed bool
}

// openHere are the books of this process by their real path: on some systems a
// second handle would succeed and drop the first one's lock.
var openHere = struct {
	sync.Mutex
	paths map[string]bool
}{paths: map[string]bool{}}

func options(readOnly bool) *bolt.Options {
	return &bolt.Options{Timeout: time.Second, PageSize: 4096, FreelistType: bolt.FreelistMapType, ReadOnly: readOnly, MaxSize: 4 << 30}
}

// Open opens the book at path to append, making it on first use together with
// its key, which lies beside it as path.key. now stamps a new book.
func Open(path string, now time.Time) (*Book, error) {
	if _, err := os.Stat(path); errors.Is(err, fs.ErrNotExist) {
		if err := create(path, now); err != nil {
			return nil, fmt.Errorf("cannot make the book %s: %w", filepath.Base(path), err)
		}
	}
	b, err := open(path, false)
	if err != nil {
		return nil, err
	}
	if b.signer, err = readKey(path + ".key"); err == nil && b.signer.KeyHash() != b.verifier.KeyHash() {
		err = errors.New("the key beside the book is another book's")
	}
	if err != nil {
		b.Close()
		return nil, fmt.Errorf("book %s: %w; without its own key nothing can be appended, reading still works", filepath.Base(path), err)
	}
	return b, nil
}

// OpenToRead opens an existing book to read; it needs no key.
func OpenToRead(path string) (*Book, error) {
	if _, err := os.Stat(path); err != nil {
		return nil, fmt.Errorf("no book to read: %w", err)
	}
	return open(path, true)
}

func open(path string, readOnly bool) (*Book, error) {
	real, err := filepath.Abs(path)
	if err != nil {
		return nil, err
	}
	if r, err := filepath.EvalSymlinks(real); err == nil {
		real = r
	}
	openHere.Lock()
	defer openHere.Unlock()
	if openHere.paths[real] {
		return nil, fmt.Errorf("book %s: %w", filepath.Base(path), ErrInUse)
	}
	b := &Book{path: real}
	err = guard(func() (err error) {
		if b.db, err = bolt.Open(path, 0o600, options(readOnly)); err != nil {
			return err
		}
		return b.db.View(b.readMeta)
	})
	if errors.Is(err, bolterrors.ErrTimeout) {
		return nil, fmt.Errorf("book %s: %w", filepath.Base(path), ErrInUse)
	}
	if err != nil {
		if b.db != nil {
			b.db.Close()
		}
		if !errors.Is(err, fs.ErrPermission) && !errors.Is(err, fs.ErrNotExist) {
			err = fmt.Errorf("%w: %w", ErrDamaged, err)
		}
		return nil, fmt.Errorf("book %s cannot be opened: %w", filepath.Base(path), err)
	}
	openHere.paths[real] = true
	return b, nil
}

func (b *Book) readMeta(tx *bolt.Tx) error {
	for _, name := range [][]byte{bucketRec, bucketHash, bucketHead, bucketTime, bucketEvent, bucketMeta} {
		if tx.Bucket(name) == nil {
			return fmt.Errorf("this is no book: bucket %q is missing", name)
		}
	}
	meta := tx.Bucket(bucketMeta)
	if got := string(meta.Get(keySchema)); got != schema {
		return fmt.Errorf("schema %q is not %q", got, schema)
	}
	b.origin = string(meta.Get(keyOrigin))
	v, err := note.NewVerifier(string(meta.Get(keyVerify)))
	if err != nil {
		return fmt.Errorf("the book's public key: %w", err)
	}
	b.verifier = v
	return nil
}

// guard turns a panic or a memory fault over a damaged file into an error.
func guard(f func() error) (err error) {
	defer debug.SetPanicOnFault(debug.SetPanicOnFault(true))
	defer func() {
		if p := recover(); p != nil {
			err = fmt.Errorf("%w: %v", ErrDamaged, p)
		}
	}()
	return f()
}

// Close closes the book; a second Close does nothing.
func (b *Book) Close() error {
	openHere.Lock()
	defer openHere.Unlock()
	b.mu.Lock()
	defer b.mu.Unlock()
	if b.closed {
		return nil
	}
	b.closed = true
	delete(openHere.paths, b.path)
	return b.db.Close()
}

// VerifierKey gives the public half of the book's key, to be printed and kept.
func (b *Book) VerifierKey() string {
	var key string
	b.db.View(func(tx *bolt.Tx) error {
		key = string(tx.Bucket(bucketMeta).Get(keyVerify))
		return nil
	})
	return key
}

// Checkpoint gives the signed checkpoint of the whole book.
func (b *Book) Checkpoint() (text string, err error) {
	err = guard(func() error {
		return b.db.View(func(tx *bolt.Tx) error {
			text = string(tx.Bucket(bucketHead).Get(keyLatest))
			return nil
		})
	})
	return text, err
}
