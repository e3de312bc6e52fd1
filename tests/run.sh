#!/usr/bin/env bash
# Builds everything and runs every test; ends with one line "N passed, N failed, N skipped".
# Needs Debian (or a relative) and the .NET SDK; installs what else the tests use where it may. Longer searches: tests/long.sh.
set -euo pipefail
cd "$(dirname "$0")/.."
export DOTNET_CLI_TELEMETRY_OPTOUT=1 TESTINGPLATFORM_TELEMETRY_OPTOUT=1 DOTNET_NOLOGO=1 LC_ALL=C

# The independent simulator that results are compared with is a NumPy program (without it those tests skip and say so); local dates need
# the time zone data.
missing=()
/usr/bin/python3 -c 'import numpy, scipy' 2>/dev/null || missing+=(python3-numpy python3-scipy)
[ -e /usr/share/zoneinfo/Europe/Berlin ] || missing+=(tzdata)
if [ ${#missing[@]} -gt 0 ] && [ "$(id -u)" = 0 ] && command -v apt-get >/dev/null; then
  apt-get update -qq && DEBIAN_FRONTEND=noninteractive apt-get install -y -qq "${missing[@]}" >/dev/null ||
    echo "could not install ${missing[*]}"
fi

dotnet restore Portfolio.sln --locked-mode
dotnet build Portfolio.sln -c Release --no-restore

out=$(mktemp -d)
trap 'rm -rf "$out"' EXIT
status=0
for project in tests/Portfolio.*.Tests; do
  name=$(basename "$project")
  dotnet run --project "$project" -c Release --no-build -- --no-ansi --results-directory "$out" "$@" 2>&1 | tee "$out/$name.log" || status=1
done

# The figures are read without colours: a test program that takes its output for a build server's prints some, whatever it is told.
sum() { sed 's/\x1b\[[0-9;]*m//g' "$out"/*.log | { grep -oE "^ *$1: [0-9]+" || true; } | awk '{ n += $2 } END { print n + 0 }'; }
passed=$(sum succeeded) failed=$(sum failed) skipped=$(sum skipped)
if [ "$passed" -eq 0 ]; then
  echo "no test ran"
  exit 1
fi
if [ "$status" -ne 0 ] && [ "$failed" -eq 0 ]; then
  echo "a test program ended without a verdict"
  failed=1
fi
echo "$passed passed, $failed failed, $skipped skipped"
[ "$failed" -eq 0 ]
