#!/usr/bin/env bash
# Starts all of Bittern on this machine: ops/start.sh [--empty]. Ctrl-C or SIGTERM stops it.
set -euo pipefail
cd "$(dirname "$0")/.."
export PATH="$PATH:/usr/sbin" ASTRO_TELEMETRY_DISABLED=1
bash ops/requirements.sh
bash ops/build.sh
exec node --import tsx ops/start/main.ts "$@"
