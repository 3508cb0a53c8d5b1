package logbook

import (
	"crypto/rand"
	"encoding/hex"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"strings"
	"time"

	"golang.org/x/mod/sumdb/note"

	bolt "go.etcd.io/bbolt"
)

// create makes an empty book whole in a temporary file, syncs it and puts it in
// place; if another program was quicker, that one's book stands.
func create(path string, now time.Time) error {
	dir := filepath.Dir(path)
	var id [8]byte
	if _, err := rand.Read(id[:]); err != nil {
		return err
	}
	origin := "halfvalue/book/" + hex.EncodeToString(id[:])
	secret, public, err := note.GenerateKey(rand.Reader, origin)
	if err != nil {
		return err
	}
	signer, err := note.NewSigner(secret)
	if err != nil {
		return err
	}
	temp, err := os.MkdirTemp(dir, ".new-book-")
	if err != nil {
		return err
	}
	defer os.RemoveAll(temp)
	fresh, key := filepath.Join(temp, "book"), filepath.Join(temp, "key")
	if err := fill(fresh, origin, public, signer, now); err != nil {
		return err
	}
	if err := writeSynced(key, secret+"\n"); err != nil {
		return err
	}
	// The key first: a book without one could never be appended to.
	if err := place(key, path+".key"); err != nil {
		return fmt.Errorf("%w: a key lies there without its book; move it away to start a new book", err)
	}
	if err := place(fresh, path); err != nil && !errors.Is(err, fs.ErrExist) {
		return err
	}
	return syncDir(dir)
}

// place gives a finished file its name, never over another.
func place(from, to string) error {
	if err := os.Link(from, to); err == nil || errors.Is(err, fs.ErrExist) {
		return err
	}
	if _, err := os.Lstat(to); err == nil { // no hard links here
		return fs.ErrExist
	}
	return os.Rename(from, to)
}

func fill(path, origin, public string, signer note.Signer, now time.Time) error {
	db, err := bolt.Open(path, 0o600, options(false))
	if err != nil {
		return err
	}
	err = db.Update(func(tx *bolt.Tx) error {
		for _, name := range [][]byte{bucketRec, bucketHash, bucketHead, bucketTime, bucketEvent, bucketMeta} {
			if _, err := tx.CreateBucket(name); err != nil {
				return err
			}
		}
		meta := tx.Bucket(bucketMeta)
		for _, kv := range [][2]string{
			{string(keySchema), schema}, {string(keyOrigin), origin}, {string(keyVerify), public},
			{string(keyCreated), now.UTC().Format(time.RFC3339)},
		} {
			if err := meta.Put([]byte(kv[0]), []byte(kv[1])); err != nil {
				return err
			}
		}
		return seal(tx, origin, signer, 0)
	})
	if err != nil {
		db.Close()
		return err
	}
	return db.Close()
}

func readKey(path string) (note.Signer, error) {
	data, err := os.ReadFile(path)
	if err != nil {
		return nil, err
	}
	return note.NewSigner(strings.TrimSpace(string(data)))
}

func writeSynced(path, text string) error {
	f, err := os.OpenFile(path, os.O_WRONLY|os.O_CREATE|os.O_EXCL, 0o600)
	if err != nil {
		return err
	}
	if _, err := f.WriteString(text); err != nil {
		f.Close()
		return err
	}
	if err := f.Sync(); err != nil {
		f.Close()
		return err
	}
	return f.Close()
}
