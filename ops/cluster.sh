#!/usr/bin/env bash
# A cluster on this machine: ops/cluster.sh up|status|kill NAME|heal|down|move BUCKET SERVER|empty SERVER|link. See ops/guide-cluster.md.
set -euo pipefail
cd "$(dirname "$0")/.."
export PATH="$PATH:/usr/sbin"
case "${1:-}" in
  up | heal) bash ops/requirements.sh cluster ;;
esac
exec node --import tsx ops/cluster/main.ts "$@"
