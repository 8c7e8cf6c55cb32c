# Sourced by cases/demo.sh and tests/run.sh, not run by itself.
#
# packages_need LIST...: makes sure the Debian packages are there. Quiet when nothing is
# missing. Installs with apt as root or through sudo; elsewhere says what is needed.

# shellcheck disable=SC2034  # for whoever sources this
PACKAGES_BUILD="gcc libc6-dev make cmake pkg-config libsundials-dev libsuitesparse-dev
libconfig-dev libcsv-dev libudunits2-dev libjansson-dev"

# shellcheck disable=SC2034
PACKAGES_TEST="libcmocka-dev clang clang-tidy-14 clang-format-14 locales
python3-numpy python3-fluids python3-iapws"

packages_missing() {
    for package in "$@"; do
        dpkg-query -W -f '${Status}' "$package" 2>/dev/null |
            grep -q '^install ok installed$' || printf '%s ' "$package"
    done
}

packages_need() {
    if ! command -v dpkg-query >/dev/null 2>&1; then
        echo "This is not a Debian system: if the build fails, install what these Debian" \
            "packages hold:" "$@" >&2
        return 0
    fi
    missing=$(packages_missing "$@")
    [ -n "$missing" ] || return 0

    as_root=
    if [ "$(id -u)" -ne 0 ]; then
        if ! command -v sudo >/dev/null 2>&1; then
            echo "Needs root or sudo to install: $missing" >&2
            return 1
        fi
        as_root=sudo
    fi
    echo "Installing: $missing" >&2
    log=$(mktemp)
    # shellcheck disable=SC2086  # a list of words
    if ! { $as_root apt-get update -q &&
        $as_root env DEBIAN_FRONTEND=noninteractive apt-get install -q -y \
            --no-install-recommends $missing; } >"$log" 2>&1; then
        tail -n 20 "$log" >&2
        rm -f "$log"
        return 1
    fi
    rm -f "$log"
}
