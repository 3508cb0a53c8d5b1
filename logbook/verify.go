package logbook

import (
	"bytes"
	"encoding/base64"
	"fmt"
	"io"
	"os"
	"runtime"
	"strconv"
	"strings"

	"golang.org/x/mod/sumdb/note"
	"golang.org/x/mod/sumdb/tlog"

	bolt "go.etcd.io/bbolt"
)

// Fault is one thing that does not hold.
type Fault struct {
	Entry uint64 `json:"entry,omitempty"` // 0: not of one entry
	Kind  string `json:"kind"`            // checkpoint, entry, hash, index or file
	Text  string `json:"text"`
}

// String gives the fault in one line.
func (f Fault) String() string {
	if f.Entry == 0 {
		return f.Kind + ": " + f.Text
	}
	return fmt.Sprintf("%s of entry %d: %s", f.Kind, f.Entry, f.Text)
}

// Report is the outcome of a verification.
type Report struct {
	Entries    uint64  `json:"entries"`
	Holds      bool    `json:"holds"`
	Faults     []Fault `json:"faults"`
	Checkpoint string  `json:"checkpoint"` // the signed one that the book holds
	Key        string  `json:"key"`        // public key that it was verified with
}

// mostFaults bounds the list: a book with more is damaged throughout.
const mostFaults = 1000

func (r *Report) add(entry uint64, kind, format string, args ...any) {
	if len(r.Faults) < mostFaults {
		r.Faults = append(r.Faults, Fault{entry, kind, fmt.Sprintf(format, args...)})
	}
}

// chunk is how many entries are read in one transaction: a long one would keep
// the file from reusing its pages.
const chunk = 4096

// Verify reads the whole book anew: every entry is in canonical form and has
// its number, hashes to the tree's stored hashes and these to the root that the
// checkpoint signs; the indexes hold every entry and nothing else; the file's
// own structure is sound. Key, when not empty, is the public key that the
// checkpoint must be signed with instead of the one that the book names.
func (b *Book) Verify(key string) (Report, error) {
	r := Report{Faults: []Fault{}, Key: key}
	readAhead(b.path)
	err := guard(func() error {
		if err := b.view(func(tx *bolt.Tx) error { return b.verifyHead(tx, &r) }); err != nil {
			return err
		}
		if err := b.verifyEntries(&r); err != nil {
			return err
		}
		return b.view(func(tx *bolt.Tx) error {
			for err := range tx.Check() {
				r.add(0, "file", "%v", err)
			}
			return nil
		})
	})
	if err != nil {
		r.add(0, "file", "%v", err)
	}
	r.Holds = len(r.Faults) == 0
	return r, nil
}

// readAhead reads the file front to back once: bbolt's mapping asks for no
// read-ahead, which makes a cold verification several times slower.
//
// Not on Android: there closing any descriptor of the file drops its lock.
func readAhead(path string) {
	if runtime.GOOS == "android" {
		return
	}
	f, err := os.Open(path)
	if err != nil {
		return
	}
	defer f.Close()
	io.CopyBuffer(struct{ io.Writer }{io.Discard}, struct{ io.Reader }{f}, make([]byte, 1<<20))
}

func (b *Book) verifyHead(tx *bolt.Tx, r *Report) error {
	r.Entries = count(tx)
	r.Checkpoint = string(tx.Bucket(bucketHead).Get(keyLatest))
	verifier := b.verifier
	if r.Key == "" {
		r.Key = string(tx.Bucket(bucketMeta).Get(keyVerify))
	} else {
		v, err := note.NewVerifier(r.Key)
		if err != nil {
			return fmt.Errorf("key %q: %w", r.Key, err)
		}
		verifier = v
	}
	size, root, err := OpenCheckpoint(r.Checkpoint, verifier)
	if err != nil {
		r.add(0, "checkpoint", "%v", err)
		return nil
	}
	if size != r.Entries {
		r.add(0, "checkpoint", "signs %d entries, the book holds %d", size, r.Entries)
	}
	if size > r.Entries {
		return nil
	}
	got, err := tlog.TreeHash(int64(size), reader{tx.Bucket(bucketHash)})
	if err != nil {
		r.add(0, "hash", "%v", err)
	} else if got != root {
		r.add(0, "checkpoint", "its root is not that of the stored hashes")
	}
	return nil
}

// OpenCheckpoint verifies a signed checkpoint and gives its size and root.
func OpenCheckpoint(text string, v note.Verifier) (size uint64, root tlog.Hash, err error) {
	n, err := note.Open([]byte(text), note.VerifierList(v))
	if err != nil {
		return 0, root, fmt.Errorf("the signature does not hold: %w", err)
	}
	lines := strings.Split(n.Text, "\n")
	if len(lines) != 4 || lines[3] != "" || lines[0] != v.Name() {
		return 0, root, fmt.Errorf("not three lines of this book")
	}
	size, err = strconv.ParseUint(lines[1], 10, 62)
	if err != nil || strconv.FormatUint(size, 10) != lines[1] {
		return 0, root, fmt.Errorf("size %q is no number", lines[1])
	}
	h, err := base64.StdEncoding.Strict().DecodeString(lines[2])
	if err != nil || len(h) != tlog.HashSize {
		return 0, root, fmt.Errorf("root %q is no hash", lines[2])
	}
	copy(root[:], h)
	return size, root, nil
}

func (b *Book) verifyEntries(r *Report) error {
	for from := uint64(0); from < r.Entries; from += chunk {
		err := b.view(func(tx *bolt.Tx) error {
			for n := from; n < min(from+chunk, r.Entries); n++ {
				verifyEntry(tx, r, n)
			}
			return nil
		})
		if err != nil {
			return err
		}
	}
	return b.view(func(tx *bolt.Tx) error {
		verifyCounts(tx, r)
		return nil
	})
}

func verifyEntry(tx *bolt.Tx, r *Report, n uint64) {
	raw := tx.Bucket(bucketRec).Get(be(n))
	if raw == nil {
		r.add(n+1, "entry", "missing")
		return
	}
	hash := tx.Bucket(bucketHash)
	hashes, err := tlog.StoredHashes(int64(n), raw, reader{hash})
	if err != nil {
		r.add(n+1, "hash", "%v", err)
	}
	at := uint64(tlog.StoredHashIndex(0, int64(n)))
	for i := range hashes {
		if !bytes.Equal(hash.Get(be(at+uint64(i))), hashes[i][:]) {
			r.add(n+1, "entry", "does not hash to what was sealed")
			break
		}
	}
	e, err := Decode(raw)
	if err != nil {
		r.add(n+1, "entry", "%v", err)
		return
	}
	if e.Seq != n+1 {
		r.add(n+1, "entry", "carries the number %d", e.Seq)
	}
	for name, key := range map[string][]byte{"time": timeKey(e, n), "event": eventKey(e.Event, n)} {
		bucket := bucketTime
		if name == "event" {
			bucket = bucketEvent
		}
		if k, v := tx.Bucket(bucket).Cursor().Seek(key); !bytes.Equal(k, key) || len(v) != 0 {
			r.add(n+1, "index", "by %s does not hold it", name)
		}
	}
}

// verifyCounts finds what should not be there.
func verifyCounts(tx *bolt.Tx, r *Report) {
	want := map[string]uint64{string(bucketRec): r.Entries, string(bucketTime): r.Entries, string(bucketEvent): r.Entries,
		string(bucketHash): uint64(tlog.StoredHashCount(int64(r.Entries)))}
	for _, name := range []string{"rec", "hash", "ix_time", "ix_event"} {
		var n uint64
		c := tx.Bucket([]byte(name)).Cursor()
		for k, _ := c.First(); k != nil; k, _ = c.Next() {
			n++
		}
		if n != want[name] {
			r.add(0, "index", "bucket %s holds %d keys, want %d", name, n, want[name])
		}
	}
}
