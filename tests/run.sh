#!/usr/bin/env bash
# Builds everything and runs every test; ends with one line "N passed, N failed, N skipped".
# Needs Debian (or a relative) and the .NET SDK; installs what else the tests use where it may. Longer searches: tests/long.sh.
set -euo pipefail
cd "$(dirname "$0")/.."
export DOTNET_CLI_TELEMETRY_OPTOUT=1 TESTINGPLATFORM_TELEMETRY_OPTOUT=1 DOTNET_NOLOGO=1 LC_ALL=C

# The independent simulator that results are compared with is a NumPy program, and the store is tested on PostgreSQL too (without them
# those tests skip and say so); local dates need the time zone data, the examples of the documents curl and openssl.
postgres_programs() { find /usr/lib/postgresql /usr/pgsql* -path '*/bin/initdb' -printf '%h\n' 2>/dev/null | sort -V | tail -n 1; }
missing=()
/usr/bin/python3 -c 'import numpy, scipy' 2>/dev/null || missing+=(python3-numpy python3-scipy)
[ -e /usr/share/zoneinfo/Europe/Berlin ] || missing+=(tzdata)
for program in curl openssl; do command -v $program >/dev/null || missing+=($program); done
[ -n "${PORTFOLIO_POSTGRES:-}" ] || [ -n "$(postgres_programs)" ] || missing+=(postgresql)
if [ ${#missing[@]} -gt 0 ] && [ "$(id -u)" = 0 ] && command -v apt-get >/dev/null; then
  apt-get update -qq && DEBIAN_FRONTEND=noninteractive apt-get install -y -qq "${missing[@]}" >/dev/null ||
    echo "could not install ${missing[*]}"
fi

dotnet restore Portfolio.sln --locked-mode
dotnet build Portfolio.sln -c Release --no-restore

out=$(mktemp -d)
trap 'stop_postgres; rm -rf "$out"' EXIT

# A PostgreSQL server for the time of the tests, on a socket that only we reach. It refuses to run as root. Nothing on it is to outlive a
# power cut, so it need not wait for the disk.
as_postgres() { if [ "$(id -u)" = 0 ]; then (cd "$out/postgres" && runuser -u postgres -- "$@"); else "$@"; fi; }
start_postgres() {
  local programs data="$out/postgres/data"
  programs=$(postgres_programs)
  [ -n "$programs" ] || return 1
  mkdir "$out/postgres" && chmod 711 "$out"
  [ "$(id -u)" != 0 ] || chown postgres "$out/postgres" || return 1
  as_postgres "$programs/initdb" -D "$data" -U portfolio -A trust -E UTF8 --locale=C --no-sync >"$out/initdb.txt" || return 1
  as_postgres "$programs/pg_ctl" -D "$data" -w -s -l "$out/postgres/log" start -o "-k $out/postgres -c listen_addresses= -c fsync=off \
    -c full_page_writes=off -c synchronous_commit=off -c max_connections=300" || return 1
  export PORTFOLIO_POSTGRES="Host=$out/postgres;Username=portfolio;Database=postgres"
}
stop_postgres() {
  local data="$out/postgres/data"
  [ ! -e "$data/postmaster.pid" ] || as_postgres "$(postgres_programs)/pg_ctl" -D "$data" -s -m immediate stop || true
}
[ -n "${PORTFOLIO_POSTGRES:-}" ] || start_postgres || echo "PostgreSQL could not be started; its tests skip"

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
