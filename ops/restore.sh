#!/usr/bin/env bash
# Restores a backup into the instance of the settings, which must be empty: ops/restore.sh SET|latest [--keys SET|none] [--replace] [--check].
# Ends with 0: done; 1: failed; 2: settings or arguments are wrong; 3: the backup is not what was written; 4: the instance is not empty, or in use.
set -euo pipefail
cd "$(dirname "$0")/.."
export PATH="$PATH:/usr/sbin"
exec node --import tsx ops/backup/restore.ts "$@"
