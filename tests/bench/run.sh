#!/bin/sh
# Builds and runs the race and times the demo and a large reading; prints one report. Exit status 1 where the
# engine is less than 5 times as fast as the textbook program.
# usage: tests/bench/run.sh [BUILD_FOLDER]
set -eu
root=$(cd "$(dirname "$0")/../.." && pwd)
build=${1:-$root/build-bench}
[ -d "$build" ] || mkdir -p "$build"
cmake -S "$root" -B "$build" -DCMAKE_BUILD_TYPE=Release >"$build/configure.log" 2>&1 ||
    { cat "$build/configure.log"; exit 1; }
cmake --build "$build" --target bench_march bench_read kentledge >"$build/build.log" 2>&1 ||
    { cat "$build/build.log"; exit 1; }
printf 'machine: %s, %s processors, %s, %s\n' \
    "$(sed -n 's/^model name[^:]*: //p' /proc/cpuinfo | head -n 1)" \
    "$(getconf _NPROCESSORS_ONLN)" "$(uname -sm)" \
    "$(sed -n 's/^CMAKE_C_COMPILER:[^=]*=//p' "$build/CMakeCache.txt")"

runs=9
demo=$root/cases/design/brackenmoss/brackenmoss.cfg
results=$(mktemp -d)
trap 'rm -rf "$results"' EXIT
for run in $(seq $runs); do
    start=$(date +%s%N)
    "$build/kentledge" --quiet --out="$results/$run" run "$demo" >"$results/table"
    echo $((($(date +%s%N) - start) / 1000000))
done >"$results/times"
sort -n "$results/times" | awk '{ t[NR] = $1 } END {
    printf "%-28s median %7d  least %7d  ms of clock time, %d runs (aim: below 300)\n",
        "demo, cold start to table", t[int(NR / 2) + 1], t[1], NR }'

"$build/tests/bench/bench_read"
"$build/tests/bench/bench_march"
