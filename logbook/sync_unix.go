//go:build !windows

package logbook

import "os"

// syncDir makes a new name durable.
func syncDir(dir string) error {
	f, err := os.Open(dir)
	if err != nil {
		return err
	}
	defer f.Close()
	return f.Sync()
}
