# The Debian packages that Stillcoat needs; sourced by examples/run.sh and tests/run.sh.
build_packages="g++ cmake ninja-build libfmt-dev libtoml11-dev libboost-dev nlohmann-json3-dev
libcli11-dev libudunits2-dev libudunits2-data gnuplot-nox"
test_packages="libgtest-dev clang-tidy python3 python3-mpmath python3-numpy python3-scipy python3-jsonschema git"

# Installs what is missing of the named packages; as root, or with sudo as a user.
install_missing() {
    missing=""
    for package in "$@"; do
        if ! dpkg-query -W -f='${Status}' "$package" 2>/dev/null | grep -q "install ok installed"; then
            missing="$missing $package"
        fi
    done
    if [ -z "$missing" ]; then
        echo "== all Debian packages are there"
        return 0
    fi
    echo "== installing from Debian:$missing"
    as_root=""
    if [ "$(id -u)" -ne 0 ]; then
        if ! command -v sudo >/dev/null 2>&1; then
            echo "These packages are missing and neither root nor sudo is at hand; install them with" >&2
            echo "    apt-get install$missing" >&2
            return 1
        fi
        as_root="sudo"
    fi
    $as_root apt-get update -q
    # shellcheck disable=SC2086
    $as_root env DEBIAN_FRONTEND=noninteractive apt-get install -y -q --no-install-recommends $missing
}
