#!/usr/bin/env bash
# Installs what a bare Debian 12 with Node 20 lacks. Usage: ops/requirements.sh [chromium] [poppler-utils] [nginx] [cluster] (mariadb-server always).
set -euo pipefail
cd "$(dirname "$0")/.."

node_major=$(node --version 2>/dev/null | sed -E 's/^v([0-9]+).*/\1/' || true)
if [ "${node_major:-0}" -lt 20 ]; then
  echo "Bittern needs Node 20; 'node --version' says: $(node --version 2>&1 || true)" >&2
  exit 1
fi

missing=()
command -v mariadbd >/dev/null || [ -x /usr/sbin/mariadbd ] || missing+=(mariadb-server)
for tool in "$@"; do
  case "$tool" in
    chromium) command -v chromium >/dev/null || missing+=(chromium) ;;
    cluster)
      [ -e /usr/lib/galera/libgalera_smm.so ] || missing+=(galera-4)
      [ -e /usr/lib/mysql/plugin/ha_spider.so ] || missing+=(mariadb-plugin-spider)
      command -v rsync >/dev/null || missing+=(rsync)
      command -v stunnel >/dev/null || missing+=(stunnel4)
      command -v haproxy >/dev/null || [ -x /usr/sbin/haproxy ] || missing+=(haproxy)
      ;;
    nginx) command -v nginx >/dev/null || [ -x /usr/sbin/nginx ] || missing+=(nginx-light) ;;
    poppler-utils) command -v pdftotext >/dev/null || missing+=(poppler-utils) ;;
    *) echo "unknown requirement: $tool" >&2; exit 2 ;;
  esac
done

if [ "${#missing[@]}" -gt 0 ]; then
  command=(env DEBIAN_FRONTEND=noninteractive apt-get install --yes --no-install-recommends "${missing[@]}")
  if [ "$(id -u)" -eq 0 ]; then
    as_root=()
  elif command -v sudo >/dev/null && sudo -n true 2>/dev/null; then
    as_root=(sudo)
  else
    echo "These packages are missing: ${missing[*]}. Install them as root, then start again:" >&2
    echo "  apt-get update && apt-get install --yes --no-install-recommends ${missing[*]}" >&2
    exit 1
  fi
  echo "Installing ${missing[*]} …"
  # A MariaDB that this installs must not take port 3306 or start by itself: Bittern starts its own. Nor must nginx, which tests start.
  was_installed=$(dpkg-query --show --showformat='${Status}' mariadb-server 2>/dev/null || true)
  "${as_root[@]}" apt-get update --quiet=2
  "${as_root[@]}" "${command[@]}" >/dev/null
  if [[ " ${missing[*]} " == *' nginx-light '* ]] && command -v systemctl >/dev/null; then
    "${as_root[@]}" systemctl disable --now nginx >/dev/null 2>&1 || true
  fi
  if [ -z "$was_installed" ] && command -v systemctl >/dev/null; then
    "${as_root[@]}" systemctl disable --now mariadb >/dev/null 2>&1 || true
  fi
fi

lock_digest=$(sha256sum package-lock.json | cut -d' ' -f1)
if [ "$(cat node_modules/.bittern-lock 2>/dev/null || true)" != "$lock_digest" ]; then
  echo 'Installing packages …'
  npm ci --no-audit --no-fund --loglevel=error
  echo "$lock_digest" > node_modules/.bittern-lock
fi
