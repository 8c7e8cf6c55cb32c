#!/bin/sh
# Installs what is missing, builds, runs the demo main and prints its tables.
set -eu
root=$(cd "$(dirname "$0")/.." && pwd)
. "$root/cases/packages.sh"

# shellcheck disable=SC2086  # a list of words
packages_need $PACKAGES_BUILD

log=$(mktemp)
trap 'rm -f "$log"' EXIT
if ! { (cd "$root" && cmake --preset release) &&
    cmake --build "$root/build" -j "$(nproc)"; } >"$log" 2>&1; then
    cat "$log" >&2
    exit 1
fi
rm -f "$log" # exec leaves no trap behind
exec "$root/build/kentledge" run "$root/cases/design/brackenmoss/brackenmoss.cfg" "$@"
