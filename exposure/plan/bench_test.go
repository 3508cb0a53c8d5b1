package plan

import (
	"strings"
	"testing"
)

func BenchmarkDecode(b *testing.B) {
	data, err := Encode(Demo())
	if err != nil {
		b.Fatal(err)
	}
	for b.Loop() {
		if _, err := Decode(data); err != nil {
			b.Fatal(err)
		}
	}
}

// BenchmarkDecodeHostile is the largest file that is read, all of it faults.
func BenchmarkDecodeHostile(b *testing.B) {
	data := []byte("{" + strings.Repeat(`"activity":1,`, mostBytes/14) + `"plan":1}`)
	for b.Loop() {
		if _, err := Decode(data); err == nil {
			b.Fatal("accepted")
		}
	}
}
