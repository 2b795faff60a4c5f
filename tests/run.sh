#!/usr/bin/env bash
# Installs what is absent, builds everything and runs the tests.
set -euo pipefail
cd "$(dirname "${BASH_SOURCE[0]}")/.."

usage() {
  cat <<'END'
usage: bash tests/run.sh [options]
  --slow       also the tests labelled slow
  --only NAME  only tests whose name matches NAME (a regular expression), slow ones too
  --asan       logic and fuzz tests with the address and undefined-behaviour sanitizers, in build/asan
  --tidy       clang-tidy on all sources, no tests
  --help       this text
END
}

refuse() {
  echo "tests/run.sh: $1 (see --help)" >&2
  exit 2
}

mode=all
select=(-LE '^slow$')
while [ $# -gt 0 ]; do
  case $1 in
    --slow) select=() ;;
    --only)
      [ $# -ge 2 ] || refuse "--only needs a name"
      select=(-R "$2")
      shift
      ;;
    --asan) mode=asan ;;
    --tidy) mode=tidy ;;
    --help) usage; exit 0 ;;
    *) refuse "unknown option $1" ;;
  esac
  shift
done

bash tests/packages.sh build tests

configure() {
  local folder=$1
  shift
  cmake -S . -B "$folder" -G Ninja -DBUILD_TESTING=ON "$@" --log-level=WARNING
}

run_tests() {
  ctest --test-dir "$1" -j2 --output-on-failure --no-tests=error "${@:2}"
}

case $mode in
  all)
    configure build/release -DCMAKE_BUILD_TYPE=Release
    # Beside the programs: one source per public header, which shows that it compiles alone.
    cmake --build build/release --target all all_verify_interface_header_sets
    run_tests build/release "${select[@]}"
    ;;
  asan)
    configure build/asan -DCMAKE_BUILD_TYPE=Release -DCISTERN_SANITIZE=ON
    # Logic and parsers; tests of memory use and of whole experiments are left out.
    programs=(statistics_test unit_digitizer_test unit_station_test unit_messages_test unit_trigger_test
              unit_scenario_test fuzz_scenario_test)
    cmake --build build/asan --target "${programs[@]}"
    for program in "${programs[@]}"; do
      build/asan/tests/"$program" --gtest_brief=1
    done
    ;;
  tidy)
    bash tests/packages.sh tidy
    configure build/release -DCMAKE_BUILD_TYPE=Release -DCMAKE_EXPORT_COMPILE_COMMANDS=ON
    cmake --build build/release --target all  # generated headers must be there
    run-clang-tidy -p build/release -quiet -j2 "$PWD/(traces|firmware_model|comms|bench)/.*\.cpp$"
    ;;
esac
