# Shared by demo.sh, test.sh and same_bits.sh: finds or installs what they need. POSIX sh, sourced.
#
# need PACKAGE PROBE...   notes PACKAGE (Debian's name) as missing unless the command PROBE succeeds
# install_missing         installs what was noted, or names it and stops
# configure_and_build DIR TARGET OPTION...

missing=""

need() {
    package=$1
    shift
    "$@" >/dev/null 2>&1 || missing="$missing $package"
}

# Both probes are quick and hold on any system, whatever its package manager.
has_command() { command -v "$1"; }
has_header() {
    printf '#if !__has_include(<%s>)\n#error missing\n#endif\n' "$1" |
        "${CXX:-c++}" -std=c++20 -x c++ -E -
}

has_compiler() { echo 'int main() {}' | "${CXX:-c++}" -std=c++20 -x c++ -fsyntax-only -; }
has_build_tool() { has_command ninja || has_command make; }

need_build_tools() {
    need g++ has_compiler
    need cmake has_command cmake
    need ninja-build has_build_tool
}

install_missing() {
    if [ -z "$missing" ]; then
        return
    fi
    if ! has_command apt-get >/dev/null; then
        echo "leat: missing (names of Debian's packages):$missing" >&2
        echo "leat: there is no apt-get here; install them by other means, then run this again" >&2
        exit 1
    fi
    # Without a compiler no header is found; do not list what is there.
    wanted=""
    for package in $missing; do
        case $(dpkg-query -W -f '${db:Status-Status}' "$package" 2>/dev/null || true) in
        installed) ;;
        *) wanted="$wanted $package" ;;
        esac
    done
    missing=""
    if [ -z "$wanted" ]; then
        return
    fi
    as_root=""
    if [ "$(id -u)" -ne 0 ]; then
        if ! has_command sudo >/dev/null; then
            echo "leat: missing:$wanted" >&2
            echo "leat: neither root nor sudo; as root: apt-get install$wanted" >&2
            exit 1
        fi
        as_root=sudo
    fi
    echo "leat: installing$wanted"
    $as_root apt-get -qq update
    # shellcheck disable=SC2086 # a list of words
    $as_root env DEBIAN_FRONTEND=noninteractive \
        apt-get -qq -y --no-install-recommends install $wanted >/dev/null
}

jobs() { nproc 2>/dev/null || getconf _NPROCESSORS_ONLN 2>/dev/null || echo 2; }

configure_and_build() {
    folder=$1
    target=$2
    shift 2
    if [ ! -f "$folder/CMakeCache.txt" ] && has_command ninja >/dev/null; then
        set -- -G Ninja "$@"
    fi
    cmake -S "$root" -B "$folder" -D CMAKE_BUILD_TYPE=Release -D CMAKE_CXX_FLAGS_RELEASE=-O2 "$@"
    cmake --build "$folder" --target "$target" --parallel "$(jobs)"
}
