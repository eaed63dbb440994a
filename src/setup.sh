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

# What only the report and its tests need. Without it all else works, so nothing here ends the
# set-up.
# shellcheck disable=SC2086
install_extras() {
  extras=
  command -v npm >/dev/null || extras="nodejs npm"
  if [ "$mode" = test ]; then
    for package in chromium chromium-driver tidy; do
      is_installed "$package" || extras="$extras $package"
    done
  fi
  [ -n "$extras" ] || return 0
  if [ "$(id -u)" -ne 0 ]; then
    echo "for 'gapwright report', these packages are missing:" $extras >&2
    return 0
  fi
  echo "installing" $extras >&2
  export DEBIAN_FRONTEND=noninteractive
  { apt-get update -q && apt-get install -q -y --no-install-recommends $extras; } \
    </dev/null >&2 || echo "not installed:" $extras >&2
}

# The packages a report is drawn with, as the lock file pins them; once is enough.
install_web() {
  web=src/report/web
  cmp -s $web/package-lock.json $web/node_modules/.installed && return 0
  if command -v npm >/dev/null && (cd $web && timeout 600 npm ci </dev/null >&2); then
    cp $web/package-lock.json $web/node_modules/.installed
  else
    echo "the packages of 'gapwright report' could not be installed: all else works" >&2
  fi
}

if command -v dpkg-query >/dev/null; then
  install_missing
  install_extras
else
  # shellcheck disable=SC2086
  echo "no Debian packages here; make sure these are present:" $packages >&2
fi
install_web

if [ "$mode" = run ]; then
  cmake -S . -B build -G Ninja -DCMAKE_BUILD_TYPE=Release -DGAPWRIGHT_TESTS=OFF >&2
  cmake --build build >&2
  exec build/gapwright rank examples/double-wall.toml
fi
cmake -S . -B build/test -G Ninja -DCMAKE_BUILD_TYPE=Release -DGAPWRIGHT_TESTS=ON \
  -DGAPWRIGHT_WARNINGS=ON
cmake --build build/test
exec ctest --test-dir build/test -LE long --output-on-failure </dev/null
