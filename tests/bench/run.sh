#!/bin/sh
# Builds the benchmarks (Release) and prints their tables.
# Usage: sh tests/bench/run.sh [BUILD_FOLDER]
set -eu
root=$(cd "$(dirname "$0")/../.." && pwd)
build=${1:-"$root/build/bench"}
cmake -S "$root" -B "$build" -G Ninja -DCMAKE_BUILD_TYPE=Release -DGAPWRIGHT_BENCH=ON \
  -DGAPWRIGHT_TESTS=OFF >&2
cmake --build "$build" --target bench_coaxial bench_parallel bench_ribbon bench_table >&2
"$build/tests/bench/bench_coaxial" "$root/examples/double-wall.toml"
"$build/tests/bench/bench_parallel"
"$build/tests/bench/bench_ribbon"
exec "$build/tests/bench/bench_table"
