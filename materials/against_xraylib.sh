#!/usr/bin/env bash
# Times one mu/rho look-up of this package and one call of xraylib's CS_Total
# from C on the same machine in the same run, the least of ten each, and prints
# the ratio. Needs Go, cc and xraylib's shared library (Debian libxrl11, which
# python3-xraylib brings along).
#
#   bash materials/against_xraylib.sh
set -eu
cd "$(dirname "${BASH_SOURCE[0]}")"
tmp=$(mktemp -d)
trap 'rm -rf "$tmp"' EXIT

lib=$(ldconfig -p | awk '/libxrl\.so/ {print $NF; exit}')
[ -n "$lib" ] || { echo "against_xraylib: no libxrl.so; apt-get install python3-xraylib" >&2; exit 1; }
command -v cc >/dev/null || { echo "against_xraylib: no cc; apt-get install gcc" >&2; exit 1; }

cat >"$tmp/bench.c" <<'C'
#include <stdio.h>
#include <time.h>
double CS_Total(int z, double kev, void **error);
static double now(void) { struct timespec t; clock_gettime(CLOCK_MONOTONIC, &t); return t.tv_sec * 1e9 + t.tv_nsec; }
int main(void) {
	enum { calls = 1 << 20 };
	static const int z[] = {26, 82};
	volatile double sink = 0;
	for (int e = 0; e < 2; e++) {
		double least = 1e99;
		for (int run = 0; run < 10; run++) {
			double start = now();
			for (int i = 0; i < calls; i++)
				sink += CS_Total(z[e], 10 + (i * 389 % 1024) * 0.77, NULL);
			double ns = (now() - start) / calls;
			if (ns < least) least = ns;
		}
		printf("%s %.2f\n", e ? "Pb" : "Fe", least);
	}
	return 0;
}
C
cc -O2 -o "$tmp/bench" "$tmp/bench.c" "$lib" -lm
"$tmp/bench" >"$tmp/theirs"
go test -run '^$' -bench 'MuRho/(Fe|Pb)' -benchtime 100ms -count 10 . |
	awk '/^Benchmark/ { sub(/.*\//, "", $1); sub(/-.*/, "", $1); if (!($1 in least) || $3 < least[$1]) least[$1] = $3 }
	END { for (e in least) print e, least[e] }' >"$tmp/ours"
awk 'NR == FNR { ours[$1] = $2; next }
	{ printf "%s: %.1f ns here, %.1f ns xraylib, ratio %.1f\n", $1, ours[$1], $2, $2 / ours[$1] }' "$tmp/ours" "$tmp/theirs"
