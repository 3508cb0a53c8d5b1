// Package logbook is the local log of shots: append, read, verify. Nothing in
// it is ever changed or deleted; a mistake is followed by a correction. It knows
// entries, not physics, and imports neither a screen nor the engine.
//
// # The file
//
// A book is one bbolt file with these buckets:
//
//	rec       key: number-1, 8 bytes big-endian   value: the entry's bytes
//	hash      key: stored hash index, 8 bytes     value: 32 bytes, leaf and inner hashes of the tree
//	head      key: "latest"                       value: the signed checkpoint of the whole book
//	ix_time   key: time in ns, then number-1      value: empty
//	ix_event  key: event, then number-1           value: empty
//	meta      schema, origin, vkey, created
//
// Entries are leaves of a Merkle tree as in RFC 6962 (golang.org/x/mod/sumdb/tlog).
// The checkpoint is a C2SP tlog-checkpoint: origin, number of entries, root in
// base64, signed with Ed25519 (sumdb/note). Entry, hashes, indexes and
// checkpoint are written in one transaction, synced before Append returns: what
// has a number is on the disk, and what has no number is not in the book.
//
// # An entry
//
// An entry is canonical JSON (RFC 8785): one line, keys sorted, no white space,
// and only bytes that encode to themselves are accepted. Quantities are decimal
// text with the unit in the key, so that no processor can round them; whole
// numbers (v, seq, offset_min) are JSON numbers. An example of version 1:
//
//	{"by":"R. Amsel","event":"00112233445566778899aabbccddeeff","figures":[{"name":"exposure","unit":"s","value":"110.6"}],"given_s":"95","kind":"shot","offset_min":60,"plan":"{\"plan\":1}","seq":1,"time":"2026-12-01T22:30:00Z","title":"KF-12 weld 3","v":1}
//
// Its leaf hash is sha256(0x00 then these bytes). Version 1 entries are decoded
// for ever; a later version adds fields and raises v.
//
// # What the seal cannot prove
//
// Whoever has the key and the tablet can write a new history; an entry never
// made leaves no trace; a wrong clock gives a wrong time. What helps is a
// checkpoint that left the tablet: hand one out at the end of each shift.
package logbook
