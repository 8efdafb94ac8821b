# Sourced by daemon/demo.sh and tests/run.sh: the Debian packages that lostwork is built and tested with.

build_packages="g++ cmake ninja-build pkg-config libboost1.81-dev libmodbus-dev libeigen3-dev libsqlite3-dev
libexpected-dev libtomlplusplus-dev libhowardhinnant-date-dev libjs-dygraphs libsystemd-dev tzdata"
test_packages="libgtest-dev libgmock-dev libbenchmark-dev chromium chromium-driver clang-format-14 binutils"

# install_missing PACKAGE...: says what is missing and installs it; needs root, or sudo, only when something is.
install_missing() {
  missing=""
  for package in "$@"; do
    if ! dpkg-query -W -f='${Status}' "$package" 2>/dev/null | grep -q 'ok installed'; then
      missing="$missing $package"
    fi
  done
  if [ -z "$missing" ]; then
    return 0
  fi
  echo "Installing Debian packages:$missing"
  as_root=""
  if [ "$(id -u)" -ne 0 ]; then
    as_root="sudo"
    command -v sudo >/dev/null || {
      echo "These packages need root to install. Run as root: apt-get install$missing" >&2
      return 1
    }
  fi
  $as_root apt-get update -q >/dev/null &&
    $as_root env DEBIAN_FRONTEND=noninteractive apt-get install -y -q --no-install-recommends $missing >/dev/null
}
