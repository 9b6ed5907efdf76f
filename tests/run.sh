#!/usr/bin/env bash
# Runs every test from a fresh clone: installs what Debian or Ubuntu lack, builds, tests, and closes with "N passed, N failed".
# Needs the .NET SDK. ARRAYWATCH_DATA names a folder with recorded data; without it ../shared/data beside the clone is tried, and
# tests on recordings are skipped when there is none.
set -u
cd "$(dirname "$0")/.."
results=$(mktemp -d)
trap 'rm -rf "$results"' EXIT
export DOTNET_CLI_TELEMETRY_OPTOUT=1 DOTNET_NOLOGO=1
if [ -z "${ARRAYWATCH_DATA:-}" ] && [ -d ../shared/data ]; then ARRAYWATCH_DATA=$(cd ../shared/data && pwd); export ARRAYWATCH_DATA; fi

finish() { # passed failed skipped
  if [ "$3" -gt 0 ]; then echo "$1 passed, $2 failed, $3 skipped"; else echo "$1 passed, $2 failed"; fi
  [ "$2" -eq 0 ] && [ "$1" -gt 0 ]
  exit
}

fail() { echo "$1" >&2; finish 0 1 0; }

command -v dotnet >/dev/null || fail "The .NET SDK (10.0) is needed: https://dotnet.microsoft.com/download"

# What a test needs, and the Debian package that has it.
missing=()
PATH="$PATH:/usr/sbin:/usr/local/sbin"
command -v mosquitto >/dev/null || missing+=(mosquitto)
command -v victoria-metrics >/dev/null || missing+=(victoria-metrics)
command -v chromium >/dev/null || command -v chromium-browser >/dev/null || missing+=(chromium)
if [ ${#missing[@]} -gt 0 ]; then
  sudo=""; [ "$(id -u)" -eq 0 ] || sudo="sudo"
  export DEBIAN_FRONTEND=noninteractive
  $sudo apt-get update -q >/dev/null || echo "apt-get update failed; trying with the lists that are there" >&2
  for package in "${missing[@]}"; do
    $sudo apt-get install -y -q --no-install-recommends "$package" >/dev/null \
      || echo "$package cannot be installed; the tests that need it will fail" >&2
  done
fi

dotnet build -c Release -v q || fail "The build failed."

run=0
failures=0
suite() { # title, project, filter; further arguments: variables of the environment
  local title=$1 project=$2 filter=()
  [ -z "$3" ] || filter=(--filter "$3")
  shift 3
  run=$((run + 1))
  echo "== $title"
  env "$@" dotnet test "tests/$project" -c Release --no-build ${filter[@]+"${filter[@]}"} \
    --logger "trx;LogFileName=$run.trx" --results-directory "$results" --logger "console;verbosity=minimal" \
    || true
  # A suite that ended early, or that found no test, has failed.
  grep -q '<Counters total="[1-9]' "$results/$run.trx" 2>/dev/null || { echo "$title did not run to its end" >&2; failures=$((failures + 1)); }
}

suite "Unit tests" ArrayWatch.Tests "" ARRAYWATCH_SUITE=unit
# The kernels once more on each tier of vectors that this machine has besides its best; the first test sees to it that the tier is right.
grep -q -w avx2 /proc/cpuinfo && suite "Kernels, 256-bit vectors" ArrayWatch.Tests "Category=Kernels" DOTNET_EnableAVX512=0 ARRAYWATCH_EXPECT_TIER=Avx2
suite "Kernels, portable vectors" ArrayWatch.Tests "Category=Kernels" DOTNET_EnableAVX2=0 ARRAYWATCH_EXPECT_TIER=Portable
suite "Kernels, no vectors" ArrayWatch.Tests "Category=Kernels" DOTNET_EnableHWIntrinsic=0 ARRAYWATCH_EXPECT_TIER=Scalar
suite "End-to-end tests" ArrayWatch.EndToEnd.Tests "" ARRAYWATCH_SUITE=end-to-end

count() { # attribute of the counters, summed over all suites
  cat "$results"/*.trx 2>/dev/null | grep -o '<Counters [^>]*' | grep -o " $1=\"[0-9]*\"" | grep -o '[0-9]*' | awk '{ n += $1 } END { print n + 0 }'
}
total=$(count total)
passed=$(count passed)
failed=$(($(count failed) + $(count error) + $(count timeout) + $(count aborted) + failures))
finish "$passed" "$failed" $((total - passed - $(count failed) - $(count error) - $(count timeout) - $(count aborted)))
