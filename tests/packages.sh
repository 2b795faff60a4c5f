#!/usr/bin/env bash
# The one list of Debian packages. Installs those that are absent, and does nothing else.
# usage: tests/packages.sh [build|tests|tidy]...   (default: build tests)
set -euo pipefail

build="g++ cmake ninja-build ccache pkg-config git ca-certificates
  libsystemc-dev libboost-dev libprotobuf-dev protobuf-compiler libspdlog-dev libfmt-dev libgtest-dev
  libbenchmark-dev libcli11-dev libtomlplusplus-dev nlohmann-json3-dev libhdf5-dev librandom123-dev libhwy-dev
  libexpected-dev libsqlite3-dev"
tests="verilator iverilog sqlite3 python3 python3-numpy python3-h5py chromium"
tidy="clang-format clang-tidy"

wanted=""
for group in "${@:-build tests}"; do
  for name in $group; do
    case $name in
      build) wanted+=" $build" ;;
      tests)
        wanted+=" $tests"
        # Node from another source conflicts with Debian's npm: each only where its command is absent.
        command -v node >/dev/null || wanted+=" nodejs"
        command -v npm >/dev/null || wanted+=" npm"
        ;;
      tidy) wanted+=" $tidy" ;;
      *) echo "tests/packages.sh: unknown group $name; expected build, tests or tidy" >&2; exit 2 ;;
    esac
  done
done

if ! command -v dpkg-query >/dev/null; then
  echo "tests/packages.sh: this is not a Debian system; install by its own means:$wanted" >&2
  exit 3
fi
# shellcheck disable=SC2086  # the list is words
present=$(dpkg-query -W -f '${db:Status-Status} ${Package}\n' $wanted 2>/dev/null || true)
missing=()
for package in $wanted; do
  case $'\n'"$present"$'\n' in
    *$'\n'"installed $package"$'\n'*) ;;
    *) missing+=("$package") ;;
  esac
done
[ ${#missing[@]} -gt 0 ] || exit 0

as_root=()
if [ "$(id -u)" -ne 0 ]; then
  if ! command -v sudo >/dev/null; then
    echo "tests/packages.sh: neither root nor sudo; have an administrator install: ${missing[*]}" >&2
    exit 3
  fi
  as_root=(sudo)
fi
echo "installing: ${missing[*]}"
"${as_root[@]}" apt-get update -q
"${as_root[@]}" env DEBIAN_FRONTEND=noninteractive apt-get install -y -q --no-install-recommends "${missing[@]}"
