#!/usr/bin/env bash
# The searches that are too long for every run: the same tests with more cases.
set -euo pipefail
PORTFOLIO_LONG=1 exec bash "$(dirname "$0")/run.sh" "$@"
