#!/bin/sh
# The same bits everywhere, shown: builds the digest program (tests/digest) for every compiler,
# processor and system below, runs it, and compares it with tests/golden/digests.txt.
#
#   sh cmake/same_bits.sh [--quick]      --quick: this machine's builds, 32-bit x86, aarch64, s390x
#
# Prints a table and ends with status 1 if any row is not as it must be, naming the lines that
# differ. Builds that cannot keep the promise (x87, fast-math) must be refused by the compiler.
# On Debian it installs what is missing; foreign processors run under qemu-user, Windows under wine.
set -eu

root=$(cd "$(dirname "$0")/.." && pwd)
. "$root/cmake/setup.sh"

quick=no
case ${1-} in
'') ;;
--quick) quick=yes ;;
*)
    echo "usage: sh cmake/same_bits.sh [--quick]" >&2
    exit 2
    ;;
esac

# ---- What it needs ----

compiles_m32() { echo 'int main() {}' | g++ -m32 -x c++ - -o /dev/null; }

need g++ has_command g++
need clang has_command clang++
# Not g++-multilib, which would remove the cross compilers.
need g++-12-multilib compiles_m32
need qemu-user has_command qemu-s390x
need g++-aarch64-linux-gnu has_command aarch64-linux-gnu-g++
need g++-s390x-linux-gnu has_command s390x-linux-gnu-g++
if [ $quick = no ]; then
    need clang-19 has_command clang++-19
    need libc++-19-dev test -d /usr/lib/llvm-19/include/c++/v1
    need libc++abi-19-dev test -e /usr/lib/llvm-19/lib/libc++abi.a
    need g++-arm-linux-gnueabihf has_command arm-linux-gnueabihf-g++
    need g++-riscv64-linux-gnu has_command riscv64-linux-gnu-g++
    need g++-powerpc64le-linux-gnu has_command powerpc64le-linux-gnu-g++
    need g++-powerpc-linux-gnu has_command powerpc-linux-gnu-g++
    need g++-mingw-w64-x86-64-posix has_command x86_64-w64-mingw32-g++-posix
    need wine has_command wine
    need wine64 test -e /usr/lib/wine/wine64
    need nodejs has_command node
    need lld-19 has_command wasm-ld-19
    need wasi-libc test -d /usr/include/wasm32-wasi
    need libc++-19-dev-wasm32 test -e /usr/lib/wasm32-wasi/libc++.a
    need libclang-rt-19-dev-wasm32 test -d /usr/lib/llvm-19/lib/clang/19/lib/wasi
fi
install_missing

# ---- The rows ----

work=$(mktemp -d "${TMPDIR:-/tmp}/leat-same-bits.XXXXXX")
trap 'rm -rf "$work"' EXIT
golden=$root/tests/golden/digests.txt
failed=""
rows=0

print_row() { printf '%-9s %-70s %4s %-6s %-9s %4s\n' "$@"; }

build() { # FOLDER COMPILER FLAGS...: one process a source file, so that all cores have work
    folder=$1
    shift
    mkdir -p "$folder"
    for source in "$root"/tests/digest/*.cpp; do
        printf '%s\n' "$source"
    done | xargs -P "$(jobs)" -I '{}' sh -c '
        source=$1 folder=$2
        shift 2
        "$@" -c "$source" -o "$folder/$(basename "$source" .cpp).o"' \
        sh '{}' "$folder" "$@" -std=c++20 "-I$root/include" "-I$root/tests" &&
        "$@" "$folder"/*.o -o "$folder/digest.exe"
}

same() { # TARGET RUNNER COMPILER FLAGS...: a build whose digests must be the golden ones
    target=$1
    runner=$2
    shift 2
    rows=$((rows + 1))
    folder=$work/$rows
    began=$(date +%s)
    machine="? ?"
    if ! build "$folder" "$@" >"$folder.log" 2>&1; then
        result=BROKEN
        head -n 20 "$folder.log" >"$folder.why"
    elif ! $runner "$folder/digest.exe" >"$folder.out" 2>"$folder.why"; then
        result=CRASHED
        echo "it ended with an error" >>"$folder.why"
    elif tr -d '\r' <"$folder.out" | diff "$golden" - >"$folder.diff"; then
        result=same
    else
        result=DIFFERENT
        sed -n 's/^> //p' "$folder.diff" >"$folder.why"
    fi
    if [ -e "$folder/digest.exe" ]; then
        machine=$($runner "$folder/digest.exe" --machine 2>/dev/null | tr -d '\r') || machine="? ?"
    fi
    if [ $result != same ]; then
        failed="$failed $rows"
    fi
    label="$*"
    # shellcheck disable=SC2086 # two words
    print_row "$target" "${label%" $m32"}" $machine "$result" $(($(date +%s) - began))
}

refused() { # TARGET TEXT COMPILER FLAGS...: a build that must stop with TEXT
    target=$1
    text=$2
    shift 2
    rows=$((rows + 1))
    began=$(date +%s)
    if "$@" -std=c++20 "-I$root/include" "-I$root/tests" -fsyntax-only \
        "$root/tests/digest/uniform.cpp" >"$work/$rows.why" 2>&1; then
        result=ACCEPTED
    elif grep -qF -e "$text" "$work/$rows.why"; then
        result=refused
    else
        result=BROKEN
    fi
    if [ $result != refused ]; then
        failed="$failed $rows"
    fi
    label="$*"
    print_row "$target" "${label%" $m32"}" - - "$result" $(($(date +%s) - began))
}

host=$(uname -m)
# The kernel's headers, which g++-12-multilib alone does not make visible to -m32.
m32="-idirafter /usr/include/x86_64-linux-gnu"
# Some kernels run no 32-bit programs themselves.
run32=env
echo 'int main() {}' | g++ -m32 -x c++ - -o "$work/m32"
"$work/m32" 2>/dev/null || run32=qemu-i386
print_row target compiler bits bytes result "s"

same "$host" env g++ -O0
same "$host" env g++ -O2
same "$host" env g++ -O3 -march=native -ffp-contract=fast
same "$host" env clang++ -O3 -march=native -ffp-contract=fast
same i686 $run32 g++ -O2 -m32 -msse2 -mfpmath=sse $m32
same aarch64 qemu-aarch64 aarch64-linux-gnu-g++ -O2 -static
same s390x qemu-s390x s390x-linux-gnu-g++ -O2 -static
if [ $quick = no ]; then
    same "$host" env clang++ -O0
    same "$host" env clang++ -O2
    same "$host" env clang++-19 -O0
    same "$host" env clang++-19 -O2
    same "$host" env clang++-19 -O3 -march=native -ffp-contract=fast
    same "$host" env clang++-19 -O2 -stdlib=libc++
    same "$host" env g++ -O1 -fsanitize=address,undefined -fno-sanitize-recover=all
    same "$host" env g++ -O2 -flto=auto
    same "$host" env g++ -O2 -fno-exceptions -fno-rtti
    same i686 $run32 clang++ -O2 -m32 -msse2 -mfpmath=sse $m32
    same aarch64 qemu-aarch64 aarch64-linux-gnu-g++ -O3 -ffp-contract=fast -static
    same armhf qemu-arm arm-linux-gnueabihf-g++ -O2 -static
    same riscv64 qemu-riscv64 riscv64-linux-gnu-g++ -O2 -static
    same ppc64le qemu-ppc64le powerpc64le-linux-gnu-g++ -O2 -static
    same powerpc qemu-ppc powerpc-linux-gnu-g++ -O2 -static
    export WINEPREFIX="$work/wine" WINEDEBUG=-all
    same windows wine x86_64-w64-mingw32-g++-posix -O2 -static
    same wasm32 "node --no-warnings $root/cmake/run_wasi.mjs" \
        clang++-19 --target=wasm32-wasi -O2 -fno-exceptions
fi

x87="leat: floating point is evaluated with excess precision"
fast="leat: -ffast-math (or -Ofast, /fp:fast, a part of them) changes results"
refused i686 "$x87" g++ -m32 -mfpmath=387 $m32
refused i686 "$x87" clang++ -m32 -mno-sse $m32
refused "$host" "$fast" g++ -O2 -ffast-math
refused "$host" "$fast" g++ -Ofast
refused "$host" "$fast" clang++ -O2 -ffast-math

for row in $failed; do
    echo
    echo "row $row:"
    cat "$work/$row.why"
done
if [ -n "$failed" ]; then
    exit 1
fi
echo "all $rows rows are as they must be"
