#!/bin/sh
# clang-tidy over every source: ./tests/lint.sh [FILE...]
set -eu
cd "$(dirname "$0")/.."
. daemon/packaging/packages.sh

install_missing $build_packages $test_packages clang-tidy-14
build=build-tests
cmake -S . -B "$build" -G Ninja -DCMAKE_BUILD_TYPE=RelWithDebInfo >/dev/null
if [ $# -eq 0 ]; then
  set -- $(find thermo sensors storage config daemon tests -name '*.cpp' ! -path 'tests/fuzz/*')
fi
printf '%s\n' "$@" | xargs -P "$(nproc)" -n 4 clang-tidy-14 -p "$build" --quiet
echo "lint: clean"
