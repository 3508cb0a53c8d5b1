package main

import (
	"crypto/rand"
	"encoding/hex"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"time"

	"gioui.org/app"

	"halfvalue/app/desk"
)

// Names inside the data folder.
const (
	planFile     = "last-plan.json"
	settingsFile = "settings.json"
	bookFile     = "halfvalue.book"
)

// platform is the world as the desk may use it: files of one folder, the
// clock and random numbers. It implements desk.Platform.
type platform struct {
	dir      string // data folder, exists
	bookPath string
	book     desk.Book // open, or nil
}

// newPlatform makes the data folder if need be. Without a folder named it is
// the platform's own for programs; without a book named it lies in the folder.
func newPlatform(dir, book string) (*platform, error) {
	if dir == "" {
		base, err := app.DataDir()
		if err != nil {
			return nil, fmt.Errorf("no folder to keep plans and the book in: %w; name one with --data", err)
		}
		dir = filepath.Join(base, "halfvalue")
	}
	if err := os.MkdirAll(dir, 0o700); err != nil {
		return nil, fmt.Errorf("cannot make the data folder: %w", err)
	}
	if book == "" {
		book = filepath.Join(dir, bookFile)
	}
	return &platform{dir: dir, bookPath: book}, nil
}

// Now gives the wall clock.
func (p *platform) Now() time.Time { return time.Now() }

// EventID gives 128 fresh random bits in hexadecimal.
func (p *platform) EventID() (string, error) {
	var b [16]byte
	if _, err := rand.Read(b[:]); err != nil {
		return "", err
	}
	return hex.EncodeToString(b[:]), nil
}

// LastPlan gives the plan of the last session, or none.
func (p *platform) LastPlan() ([]byte, error) { return p.read(planFile) }

// SavePlan keeps the plan whole or not at all.
func (p *platform) SavePlan(data []byte) error { return p.write(planFile, data) }

// Settings gives what SaveSettings kept, or none.
func (p *platform) Settings() ([]byte, error) { return p.read(settingsFile) }

// SaveSettings keeps units, light and text size whole or not at all.
func (p *platform) SaveSettings(data []byte) error { return p.write(settingsFile, data) }

// OpenBook opens the book, making it on first use.
func (p *platform) OpenBook() (desk.Book, error) {
	b, err := openDeskBook(p.bookPath)
	p.book = b
	return b, err
}

// Close closes the book.
func (p *platform) Close() error {
	if p.book == nil {
		return nil
	}
	return p.book.Close()
}

func (p *platform) read(name string) ([]byte, error) {
	data, err := os.ReadFile(filepath.Join(p.dir, name))
	if errors.Is(err, fs.ErrNotExist) {
		return nil, nil
	}
	return data, err
}

func (p *platform) write(name string, data []byte) error {
	return writeWhole(filepath.Join(p.dir, name), func(w io.Writer) error {
		_, err := w.Write(data)
		return err
	})
}
