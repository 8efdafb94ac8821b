#!/bin/sh
# clang-tidy over every source: ./tests/lint.sh [--jobs N] [FILE...]
# Names each file when it is done; the last lines name those with findings. Exits 0 when there are none.
set -eu
cd "$(dirname "$0")/.."
. daemon/packaging/packages.sh

build=build-tests
jobs="$(nproc)"
if [ "${1:-}" = --jobs ]; then
  jobs="$2"
  shift 2
fi

install_missing $build_packages $test_packages clang-tidy-14
cmake -S . -B "$build" -G Ninja -DCMAKE_BUILD_TYPE=RelWithDebInfo >/dev/null
if [ $# -eq 0 ]; then
  set -- $(find thermo sensors storage config daemon tests -name '*.cpp' | sort)
fi
echo "lint: $# files, $jobs at a time"

failed="$(mktemp)"
trap 'rm -f "$failed"' EXIT
number=0
for file in "$@"; do
  number=$((number + 1))
  printf '%s\n' "$number/$#" "$file"
done | xargs -P "$jobs" -n 2 sh -c '
  if said="$(clang-tidy-14 -p "$1" --quiet "$4" 2>&1)"; then
    echo "[$3] $4"
  else
    echo "$4" >>"$2"
    printf "[%s] %s: findings\n%s\n" "$3" "$4" "$said"
  fi' lint "$build" "$failed"

if [ -s "$failed" ]; then
  echo "lint: $(wc -l <"$failed") of $# files have findings:" >&2
  sort "$failed" | sed "s/^/  /" >&2
  exit 1
fi
echo "lint: clean"
