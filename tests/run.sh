#!/bin/sh
# Builds and runs every test: ./tests/run.sh [--sanitize address,undefined|thread] [--compiler clang] [ctest options]
# Thread sanitizing is by clang: that of gcc 12 loses one signal in 300 on a loaded machine.
# The last line is "lostwork: N passed, N failed"; exits 0 when none failed.
set -eu
cd "$(dirname "$0")/.."
. daemon/packaging/packages.sh

build=build-tests
type=RelWithDebInfo
cxx=g++
sanitize=""
clang=""
while [ $# -gt 0 ]; do
  case "$1" in
    --sanitize)
      sanitize="$2"
      case "$2" in
        address,undefined) ;;
        thread) clang=yes ;;
        *) echo "--sanitize $2: allowed are address,undefined and thread" >&2; exit 2 ;;
      esac
      build="$build-$(echo "$2" | tr ',' '-')"
      shift 2 ;;
    --compiler)
      [ "$2" = clang ] || { echo "--compiler $2: allowed is clang" >&2; exit 2; }
      clang=yes
      shift 2 ;;
    *) break ;;
  esac
done
extra=""
if [ -n "$clang" ]; then
  cxx=clang++-16
  extra="clang-16 libclang-rt-16-dev"
  build="$build-clang"
fi

install_missing $build_packages $test_packages $extra
cmake -S . -B "$build" -G Ninja -DCMAKE_BUILD_TYPE=$type -DCMAKE_CXX_COMPILER=$cxx \
  -DLOSTWORK_SANITIZE="$sanitize" >/dev/null
cmake --build "$build"

status=0
ctest --test-dir "$build" --output-on-failure -j "$(nproc)" --output-junit results.xml "$@" || status=$?
all=$(tr '\n' ' ' <"$build/results.xml" | sed -n 's/.*<testsuite[^>]*[[:space:]]tests="\([0-9]*\)".*/\1/p')
failed=$(tr '\n' ' ' <"$build/results.xml" | sed -n 's/.*<testsuite[^>]*[[:space:]]failures="\([0-9]*\)".*/\1/p')
echo "lostwork: $((all - failed)) passed, $failed failed"
exit $status
