#!/bin/sh
# Sets up what gapwright needs on Debian 12, then runs the shipped example or the tests.
# Usage: sh src/setup.sh run | test
set -eu

cd "$(dirname "$0")/.."
mode=${1:-}
packages="g++ cmake ninja-build libeigen3-dev libspectra-dev libtbb-dev libfmt-dev libcli11-dev
  nlohmann-json3-dev libtomlplusplus-dev libsqlite3-dev"
case $mode in
  run) ;;
  test) packages="$packages catch2 libboost-math-dev python3 clang-format" ;;
  *)
    echo "usage: sh src/setup.sh run | test" >&2
    exit 2
    ;;
esac

is_installed() {
  [ "$(dpkg-query -W -f='${db:Status-Status}' "$1" 2>/dev/null)" = installed ]
}

install_missing() {
  missing=
  for package in $packages; do
    is_installed "$package" || missing="$missing $package"
  done
  [ -n "$missing" ] || return 0
  if [ "$(id -u)" -ne 0 ]; then
    echo "missing packages; install them with:" >&2
    echo "  sudo apt-get install --no-install-recommends$missing" >&2
    exit 2
  fi
  echo "installing$missing" >&2
  export DEBIAN_FRONTEND=noninteractive
  apt-get update -q </dev/null >&2
  # shellcheck disable=SC2086
  apt-get install -q -y --no-install-recommends $missing </dev/null >&2
}

if command -v dpkg-query >/dev/null; then
  install_missing
else
  # shellcheck disable=SC2086
  echo "no Debian packages here; make sure these are present:" $packages >&2
fi

if [ "$mode" = run ]; then
  cmake -S . -B build -G Ninja -DCMAKE_BUILD_TYPE=Release -DGAPWRIGHT_TESTS=OFF >&2
  cmake --build build >&2
  exec build/gapwright rank examples/double-wall.toml
fi
cmake -S . -B build/test -G Ninja -DCMAKE_BUILD_TYPE=Release -DGAPWRIGHT_TESTS=ON \
  -DGAPWRIGHT_WARNINGS=ON
cmake --build build/test
exec ctest --test-dir build/test -LE long --output-on-failure </dev/null
