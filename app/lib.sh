# Shared by run.sh and test.sh: find Go, find or install what the build needs.
# Sourced, not run. Sets root (the tree), build (ignored outputs) and tags.

set -eu
root=$(cd "$(dirname "${BASH_SOURCE[0]}")/.." && pwd)
build=$root/.build
tags=nowayland,novulkan
need_go=1.26

# A bare container may have no HOME; Go wants one for its caches.
if [ -z "${HOME:-}" ]; then
	HOME=$( (getent passwd "$(id -u)" 2>/dev/null || true) | cut -d: -f6)
	[ -n "$HOME" ] && [ -d "$HOME" ] && [ -w "$HOME" ] || HOME=$build/home
	mkdir -p "$HOME"
	export HOME
fi
export GOFLAGS="-buildvcs=false ${GOFLAGS:-}"
export GOTOOLCHAIN=${GOTOOLCHAIN:-local}

say() { printf '%s\n' "$*"; }
die() { printf 'halfvalue: %s\n' "$*" >&2; exit 1; }

check_go() {
	if ! command -v go >/dev/null 2>&1; then
		[ -x /usr/local/go/bin/go ] || die "Go $need_go or newer is needed and no go command was found on PATH. Install Go, then run this again."
		PATH=$PATH:/usr/local/go/bin
		export PATH
	fi
	local have
	have=$(cd / && go env GOVERSION 2>/dev/null | sed 's/^go//; s/[^0-9.].*$//') || have=
	[ -n "$have" ] || die "the go command on PATH does not answer 'go env GOVERSION'. Install Go $need_go or newer."
	if [ "$(printf '%s\n%s\n' "$need_go" "$have" | sort -V | head -n 1)" != "$need_go" ]; then
		die "Go $have is too old: Halfvalue needs Go $need_go or newer. Install it and put it first on PATH."
	fi
}

# missing PACKAGE... prints those that dpkg does not have installed.
missing() {
	local p
	for p in "$@"; do
		dpkg-query -W -f='${db:Status-Status}\n' "$p" 2>/dev/null | grep -qx installed || printf '%s ' "$p"
	done
}

# want PACKAGE... installs what is missing with apt, by sudo where not root.
# macOS and Windows need no extra packages; other systems are told what to find.
want() {
	case "$(uname -s)" in
	Darwin | MINGW* | MSYS* | CYGWIN*) return 0 ;;
	esac
	if ! command -v dpkg-query >/dev/null 2>&1; then
		say "This is not a Debian-like system: if the build stops, install the equivalents of: $*"
		return 0
	fi
	local lack as=
	lack=$(missing "$@")
	[ -n "$lack" ] || return 0
	if [ "$(id -u)" != 0 ]; then
		command -v sudo >/dev/null 2>&1 && sudo -n true 2>/dev/null && as="sudo -n"
		if [ -z "$as" ] && command -v sudo >/dev/null 2>&1 && [ -t 0 ]; then as=sudo; fi
		[ -n "$as" ] || die "these Debian packages are missing and there is neither root nor sudo to install them: $lack
Ask an administrator to run: apt-get install --no-install-recommends $lack"
	fi
	say "Installing with apt: $lack"
	export DEBIAN_FRONTEND=noninteractive
	$as apt-get -o DPkg::Lock::Timeout=300 update -qq || say "apt-get update failed; trying with the lists at hand"
	# shellcheck disable=SC2086
	$as env DEBIAN_FRONTEND=noninteractive apt-get -o DPkg::Lock::Timeout=300 install -y -qq --no-install-recommends $lack >"$build/apt.log" 2>&1 || {
		tail -n 20 "$build/apt.log" >&2
		die "apt could not install: $lack"
	}
}

# What the window, and drawing without one, are built and run with on Linux.
window_packages="ca-certificates gcc libc6-dev pkg-config libegl-dev libgles2 libx11-dev libxcursor-dev libxkbcommon-x11-dev libx11-xcb-dev"

# build_app OUTPUT builds the program; a warm second build takes seconds.
build_app() {
	case "$(uname -s)" in
	MINGW* | MSYS* | CYGWIN*) (cd "$root" && CGO_ENABLED=0 go build -tags "$tags" -o "$1" ./app) ;;
	*) (cd "$root" && CGO_ENABLED=1 go build -tags "$tags" -o "$1" ./app) ;;
	esac
}

mkdir -p "$build"
