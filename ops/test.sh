#!/usr/bin/env bash
# Every check, or those named: ops/test.sh [format] [lint] [types] [unit] [reference] [integration] [faults] [cluster] [build] [e2e]
# Lanes joined by `+` run beside one another, parts joined by `,` after one another in their lane: `ops/test.sh unit,build+reference`.
# What lanes say is told whole when they have ended. Ends with a line `N passed, N failed[, N skipped]`.
set -uo pipefail
cd "$(dirname "$0")/.."
export PATH="$PATH:/usr/sbin" ASTRO_TELEMETRY_DISABLED=1

# Beside one another runs what needs one processor or mostly waits, has a database of its own, and does not start a web while one is built.
stages=("$@")
[ "${#stages[@]}" -gt 0 ] || stages=(types+lint,format unit,build+reference integration faults cluster e2e)
read -ra parts <<<"$(tr ',+' '  ' <<<"${stages[*]}")"
for part in "${parts[@]}"; do
  [[ " format lint types unit reference integration faults cluster build e2e " == *" $part "* ]] && continue
  echo "unknown part: $part" >&2
  exit 2
done
bash ops/requirements.sh chromium poppler-utils nginx || exit 1

results=tests/.output
rm -rf "$results" && mkdir -p "$results"
touch "$results/checks"

check() { # name, command…
  local name=$1 outcome=passed
  shift
  echo "== $name"
  "$@" || outcome=failed
  echo "$name $outcome" >>"$results/checks"
  [ "$outcome" = passed ] || echo "== $name failed" >&2
  [ "$outcome" = passed ]
}

run_tests() { # project
  npx vitest run --config tests/vitest.config.ts --project "$1" --reporter=default --reporter=json \
    --outputFile.json="$results/$1.json"
}

run_lane() { # parts joined by commas
  local part
  for part in ${1//,/ }; do
    case "$part" in
      format) check format npm run --silent format:check ;;
      lint) check lint npm run --silent lint ;;
      types) check types npm run --silent check ;;
      build) check build bash ops/build.sh ;;
      cluster) [ "$has_cluster" = yes ] && check cluster run_tests cluster ;;
      e2e) check build bash ops/build.sh && check e2e run_tests e2e ;;
      *) check "$part" run_tests "$part" ;;
    esac
  done
}

run_stage() { # lanes joined by plus signs
  local lanes pids=() at
  read -ra lanes <<<"${1//+/ }"
  if [ "${#lanes[@]}" -eq 1 ]; then
    run_lane "$1"
    return
  fi
  echo "== beside one another: ${lanes[*]}"
  trap 'for pid in "${pids[@]}"; do kill -TERM -- "-$pid" 2>/dev/null; done; wait; exit 130' INT TERM
  set -m # A lane is a process group, which an interruption ends as a whole.
  for at in "${!lanes[@]}"; do
    run_lane "${lanes[at]}" >"$results/${lanes[at]}.txt" 2>&1 </dev/null &
    pids+=($!)
  done
  set +m
  for at in "${!lanes[@]}"; do
    wait "${pids[at]}"
    cat "$results/${lanes[at]}.txt"
  done
  trap - INT TERM
}

# Nothing is installed while tests run.
has_cluster=yes
if [[ " ${parts[*]} " == *' cluster '* ]]; then check requirements bash ops/requirements.sh cluster || has_cluster=no; fi
for stage in "${stages[@]}"; do run_stage "$stage"; done

sort --unique "$results/checks" >"$results/outcomes"
node ops/testTotals.mjs "$(grep -c ' passed$' "$results/outcomes")" "$(grep -c ' failed$' "$results/outcomes")" "$results"
