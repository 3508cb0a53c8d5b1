package desk

import (
	"time"

	"halfvalue/exposure/plan"
)

// Platform is what the desk may ask of the world. Package main gives the real
// one, tests give their own. Every method is called from the one goroutine
// that calls Apply.
type Platform interface {
	// Now is the wall clock. It may be wrong; the book keeps its own order.
	Now() time.Time
	// EventID returns 32 hexadecimal digits of fresh randomness, the identity
	// of one press of the button.
	EventID() (string, error)
	// LastPlan returns the bytes of the last SavePlan, or none.
	LastPlan() ([]byte, error)
	// SavePlan keeps the plan whole or not at all.
	SavePlan(data []byte) error
	// Settings returns the bytes of the last SaveSettings, or none.
	Settings() ([]byte, error)
	// SaveSettings keeps units, light, text size and where the user was.
	SaveSettings(data []byte) error
	// OpenBook opens the book, or says why it cannot.
	OpenBook() (Book, error)
}

// Reckoner computes everything from a plan: exposure.Reckon with its
// calibration, in the form that the sheets show.
type Reckoner func(plan.Plan) (Answer, error)

// Book is the local log as the desk uses it. Append returns only when the
// entry is synced; an entry with an event that is already in the book is not
// written twice, its number is returned again.
type Book interface {
	Append(Shot) (number uint64, err error)
	Count() (uint64, error)
	// Page returns at most n entries older than the given number, newest
	// first; before 0 starts at the newest.
	Page(before uint64, n int) ([]Entry, error)
	Entry(number uint64) (Entry, error)
	// Verify reads the whole book and names what does not hold.
	Verify() (Verdict, error)
	Close() error
}

// Shot is what goes into the book when a shot is logged.
type Shot struct {
	Event        string    // from Platform.EventID
	At           time.Time // wall clock when the button was pressed
	By           string    // who logs it
	GivenSeconds float64   // exposure time really given
	Note         string
	Plan         []byte // the plan's bytes
	Answer       Answer // the reckoning as planned
}

// Entry is one record of the book as a sheet shows it.
type Entry struct {
	Number       uint64
	At           time.Time
	By           string
	Title        string
	GivenSeconds float64
	Note         string
	Planned      string // exposure as planned, in one line
	Hash         string // the entry's hash, hexadecimal
	Plan         []byte // the plan as logged
	Text         []byte // the whole record as stored
	Engine       string // version that reckoned it
	Figures      []Figure
	Then         Exposure // exposure as the entry holds it
}

// Figure is one named number of an entry, as decimal text with its unit.
type Figure struct{ Name, Value, Unit string }

// Verdict is the outcome of verifying the book.
type Verdict struct {
	Entries uint64
	Faults  []string // empty: everything holds
	At      time.Time
}

// Holds says whether the book verified without a fault.
func (v Verdict) Holds() bool { return len(v.Faults) == 0 }
