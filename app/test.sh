#!/usr/bin/env bash
# Runs the whole test suite, installing what is missing first.
#   bash app/test.sh          everything that CI runs
#   bash app/test.sh cross    builds for Windows, Android and iOS
. "$(dirname "${BASH_SOURCE[0]}")/lib.sh"

check_go
cd "$root"

# Everything but package main and the pictures needs neither C nor a display,
# so it is built and tested without them; that is also the quicker build.
pure() { CGO_ENABLED=0 go list -e ./... | grep -v '^halfvalue/app$'; }

suite() {
	# shellcheck disable=SC2086
	want $window_packages xvfb xdotool imagemagick python3-xraylib python-fisx-common
	say "== vet and test, without C"
	# shellcheck disable=SC2046
	CGO_ENABLED=0 go vet $(pure)
	# shellcheck disable=SC2046
	CGO_ENABLED=0 go test -vet=off $(pure)
	say "== cross sections against xraylib"
	/usr/bin/python3 materials/xraylib_check.py --check
	say "== the program: window, drawing, command line"
	EGL_PLATFORM=surfaceless go vet -tags "$tags" ./app
	EGL_PLATFORM=surfaceless go test -vet=off -tags "$tags" ./app
}

# packages lists what is no program of its own: a second program cannot be
# linked for a telephone without C.
packages() { CGO_ENABLED=0 go list -e -f '{{if ne .Name "main"}}{{.ImportPath}}{{end}}' ./...; }

cross() {
	local a p
	for a in amd64 arm64; do
		say "== windows/$a, the whole program"
		GOOS=windows GOARCH=$a CGO_ENABLED=0 go build -o "$build/halfvalue-$a.exe" ./app
	done
	for p in android/arm64 ios/arm64; do
		say "== $p, all but package main"
		# shellcheck disable=SC2046
		GOOS=${p%/*} GOARCH=${p#*/} CGO_ENABLED=0 go build $(packages)
	done
}

case "${1:-}" in
"") suite ;;
cross) cross ;;
*) die "test.sh takes nothing or: cross" ;;
esac
say "All passed."
