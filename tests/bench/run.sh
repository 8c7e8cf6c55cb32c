#!/bin/sh
# Builds and runs the races; prints one report. Exit status 1 where a goal is missed.
# usage: tests/bench/run.sh [BUILD_FOLDER]
set -eu
root=$(cd "$(dirname "$0")/../.." && pwd)
build=${1:-$root/build-bench}
[ -d "$build" ] || mkdir -p "$build"
cmake -S "$root" -B "$build" -DCMAKE_BUILD_TYPE=Release >"$build/configure.log" 2>&1 ||
    { cat "$build/configure.log"; exit 1; }
cmake --build "$build" --target bench_march >"$build/build.log" 2>&1 ||
    { cat "$build/build.log"; exit 1; }
printf 'machine: %s, %s processors, %s, %s\n' \
    "$(sed -n 's/^model name[^:]*: //p' /proc/cpuinfo | head -n 1)" \
    "$(getconf _NPROCESSORS_ONLN)" "$(uname -sm)" \
    "$(sed -n 's/^CMAKE_C_COMPILER:[^=]*=//p' "$build/CMakeCache.txt")"
"$build/tests/bench/bench_march"
