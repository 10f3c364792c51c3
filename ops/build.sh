#!/usr/bin/env bash
# Builds the web when its sources changed since the last build.
set -euo pipefail
cd "$(dirname "$0")/.."

sources_digest=$(
  find src public db/queries db/client.ts db/settings.ts db/receiving.ts ingest astro.config.mjs package-lock.json tsconfig.json -type f -print0 |
    sort --zero-terminated | xargs --null sha256sum | sha256sum | cut -d' ' -f1
)
if [ "$(cat dist/.sources 2>/dev/null || true)" != "$sources_digest" ]; then
  echo 'Building …'
  rm -rf dist
  npx astro build --silent
  find dist/client/_astro -type f \( -name '*.js' -o -name '*.mjs' -o -name '*.css' \) -exec gzip --keep --best --no-name {} +
  echo "$sources_digest" > dist/.sources
fi
