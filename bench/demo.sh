#!/usr/bin/env bash
# Builds the program and qualifies the candidate trigger of the demo station: does it fire on what it
# should, at what background rate, how fast, and within its buffers? Takes a few minutes at first.
set -euo pipefail
cd "$(dirname "${BASH_SOURCE[0]}")/.."

scenario=bench/scenarios/kestrel-heath.toml

bash tests/packages.sh build
# A folder that tests/run.sh has configured already is left as it is.
[ -f build/release/build.ninja ] ||
  cmake -S . -B build/release -G Ninja -DCMAKE_BUILD_TYPE=Release -DBUILD_TESTING=OFF --log-level=WARNING
cmake --build build/release --target cistern

status=0
build/release/bin/cistern qualify "$scenario" --quick || status=$?

case $status in
  0) verdict="all requirements met" ;;
  1) verdict="a requirement was not met or is undecided" ;;
  *) exit "$status" ;;
esac
echo
echo "Verdict: $verdict."
echo "Report:  cistern-run/qualify/report.html (open it in a browser); tables: cistern-run/qualify/run.sqlite"
