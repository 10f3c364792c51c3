#!/usr/bin/env bash
# Every check, or the parts named: ops/test.sh [format] [lint] [types] [unit] [reference] [integration] [faults] [cluster] [e2e]
# Ends with a line `N passed, N failed[, N skipped]`.
set -uo pipefail
cd "$(dirname "$0")/.."
export PATH="$PATH:/usr/sbin" ASTRO_TELEMETRY_DISABLED=1

parts=("$@")
[ "${#parts[@]}" -gt 0 ] || parts=(format lint types unit reference integration faults cluster e2e)
bash ops/requirements.sh chromium poppler-utils nginx || exit 1

results=tests/.output
rm -rf "$results" && mkdir -p "$results"
failed_checks=0
passed_checks=0

check() { # name, command…
  local name=$1
  shift
  echo "== $name"
  if "$@"; then passed_checks=$((passed_checks + 1)); else failed_checks=$((failed_checks + 1)); echo "== $name failed" >&2; fi
}

run_tests() { # project
  npx vitest run --config tests/vitest.config.ts --project "$1" --reporter=default --reporter=json \
    --outputFile.json="$results/$1.json"
}

for part in "${parts[@]}"; do
  case "$part" in
    format) check format npm run --silent format:check ;;
    lint) check lint npm run --silent lint ;;
    types) check types npm run --silent check ;;
    unit | reference | integration | faults) check "$part" run_tests "$part" ;;
    cluster) check requirements bash ops/requirements.sh cluster && check "$part" run_tests "$part" ;;
    e2e) check build bash ops/build.sh && check e2e run_tests e2e ;;
    *) echo "unknown part: $part" >&2; exit 2 ;;
  esac
done

node ops/testTotals.mjs "$passed_checks" "$failed_checks" "$results"
