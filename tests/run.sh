#!/bin/sh
# Installs what is missing, builds with warnings as errors under both compilers, and runs
# every test: under clang, under the sanitizers (where the lines run are counted, and none
# that tells of an error may be left out), and last under gcc with the checks of the source
# itself (format, clang-tidy, layers).
set -eu
root=$(cd "$(dirname "$0")/.." && pwd)
. "$root/cases/packages.sh"

# shellcheck disable=SC2086  # lists of words
packages_need $PACKAGES_BUILD $PACKAGES_TEST

cd "$root"
log=$(mktemp)
trap 'rm -f "$log"' EXIT

build() {
    echo "== building: $1"
    if ! { cmake --preset "$1" && cmake --build --preset "$1" -j "$(nproc)"; } \
        >"$log" 2>&1; then
        cat "$log"
        exit 1
    fi
}

build clang
ctest --preset clang -j "$(nproc)"
build sanitize
find build-sanitize -name '*.gcda' -delete # counts of this run alone
ctest --preset sanitize -j "$(nproc)"
/usr/bin/python3 tests/source/check_error_lines.py build-sanitize .
build ci
ctest --preset ci -j "$(nproc)"
