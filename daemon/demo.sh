#!/bin/sh
# Builds lostwork and runs it against the simulated plant: ./daemon/demo.sh [--seconds N] [options of `lostwork demo`]
set -eu
cd "$(dirname "$0")/.."
. daemon/packaging/packages.sh

install_missing $build_packages

build=build-demo
if [ ! -f "$build/build.ninja" ]; then
  echo "Configuring (once)."
  cmake -S . -B "$build" -G Ninja -DCMAKE_BUILD_TYPE=Release -DBUILD_TESTING=OFF >"$build.log" 2>&1 || {
    cat "$build.log" >&2
    exit 1
  }
  mv "$build.log" "$build/configure.log"
fi
echo "Building (some minutes the first time, nothing to do afterwards)."
cmake --build "$build" --target lostwork
exec "$build/daemon/lostwork" demo "$@"
