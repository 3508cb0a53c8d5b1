package logbook

// syncDir does nothing: Windows keeps names durable with the file and has no
// handle of a folder to flush.
func syncDir(string) error { return nil }
