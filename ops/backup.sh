#!/usr/bin/env bash
# Backs up the database and the files while Bittern runs: ops/backup.sh [--secrets-to FILE].
# Ends with 0: done; 1: failed, nothing was kept of it; 2: settings or arguments are wrong; 3: another backup runs.
set -euo pipefail
cd "$(dirname "$0")/.."
export PATH="$PATH:/usr/sbin"
exec node --import tsx ops/backup/backup.ts "$@"
