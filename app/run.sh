#!/usr/bin/env bash
# Builds Halfvalue and opens it on the demo job. Without a display it does the
# main job on the command line instead: reckons the demo plan, logs the shot in
# a book, draws the sheets, and says where everything is.
# Arguments go to the program: bash app/run.sh --book my.book
. "$(dirname "${BASH_SOURCE[0]}")/lib.sh"

check_go
# shellcheck disable=SC2086
want $window_packages
exe=$build/halfvalue
case "$(uname -s)" in MINGW* | MSYS* | CYGWIN*) exe=$exe.exe ;; esac
say "Building ..."
build_app "$exe"

# no_window is the program's exit code when no window could be opened.
no_window=69

open_window() {
	case "$(uname -s)" in
	Linux) [ -n "${DISPLAY:-}" ] || return $no_window ;;
	esac
	say "Opening the app (close the window to end) ..."
	"$exe" "$@"
}

without_display() {
	local plan=$root/testdata/plans/kf-12-weld-3.json out=$build/demo
	mkdir -p "$out"
	say "No display: doing the demo shot on the command line."
	say ""
	"$exe" reckon "$plan"
	say ""
	local book=$out/demo.book number
	number=$("$exe" book add "$book" "$plan" --by "R. Amsel")
	say "Logged as entry $number in ${book#"$root"/}"
	"$exe" book verify "$book"
	"$exe" draw "$plan" --out "$out" --book "$book"
	say "Everything is in ${out#"$root"/}"
}

rc=0
open_window "$@" || rc=$?
case $rc in
0) ;;
"$no_window") without_display ;;
*) exit "$rc" ;;
esac
