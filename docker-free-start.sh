#!/usr/bin/env bash
# Starts Wiretag on this machine alone: ./docker-free-start.sh [--fresh] [--dev]
# Runs every check and test:            ./docker-free-start.sh test
set -euo pipefail
cd "$(dirname "$(readlink -f "$0")")"
export NEXT_TELEMETRY_DISABLED=1

say() { printf '%s\n' "$*"; }
fail() { printf 'Wiretag cannot start: %s\n' "$*" >&2; exit 1; }

# Node.js
command -v node >/dev/null 2>&1 || fail "Node.js is not installed. It needs version 20.20 or a later 20."
version=$(node -p 'process.versions.node')
case "$version" in
  20.2[0-9].*|20.[3-9][0-9].*) ;;
  *) fail "this is Node.js $version. It needs version 20.20 or a later 20." ;;
esac

# Debian's packages
missing=()
ls /usr/lib/postgresql/*/bin/initdb >/dev/null 2>&1 || missing+=(postgresql)
if [ "${1:-}" = test ]; then
  [ -x /usr/bin/chromium ] || missing+=(chromium)
fi
if [ "${#missing[@]}" -gt 0 ]; then
  if [ "$(id -u)" = 0 ]; then
    say "Installing ${missing[*]} from Debian's packages"
    # Only the programs are wanted: no cluster of Debian's own is made or started.
    mkdir -p /etc/postgresql-common
    [ -e /etc/postgresql-common/createcluster.conf ] || say "create_main_cluster = false" >/etc/postgresql-common/createcluster.conf
    log=$(mktemp)
    { apt-get update -qq && DEBIAN_FRONTEND=noninteractive apt-get install -y -qq --no-install-recommends "${missing[@]}"; } >"$log" 2>&1 ||
      { tail -n 20 "$log" >&2; fail "apt-get could not install ${missing[*]}."; }
    rm -f "$log"
  else
    fail "it needs ${missing[*]}. As root: apt-get install ${missing[*]}"
  fi
fi

# npm's packages, once for each lock file
lock=$(sha256sum package-lock.json | cut -d' ' -f1)
if [ "$(cat node_modules/.installed-from 2>/dev/null || true)" != "$lock" ]; then
  say "Installing npm's packages"
  npm ci --no-audit --no-fund --loglevel=error
  printf '%s' "$lock" >node_modules/.installed-from
fi

exec node --conditions=react-server --import tsx lib/cli/start/main.ts "$@"
