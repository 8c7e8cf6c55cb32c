#!/bin/sh
# check_format.sh CLANG_FORMAT ROOT: every C file as the pinned formatter lays it out.
set -eu
format=$1
cd "$2"
"$format" --version | grep -q 'version 14\.' || { echo "needs clang-format 14"; exit 1; }
files=$(find src tests -name '*.[ch]' | sort)
[ -n "$files" ] || { echo "no C files found"; exit 1; }
# shellcheck disable=SC2086  # a list of names without spaces
"$format" --dry-run -Werror $files
