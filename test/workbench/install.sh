#!/usr/bin/env bash
# Installs what the check in a real VS Code needs, on Debian as root; what is there already is left as it is.
set -euo pipefail
cd "$(dirname "$0")"

wanted=(chromium fonts-dejavu-core libkrb5-dev libx11-dev libxkbfile-dev libsecret-1-dev)
for tool in g++ make python3; do command -v "$tool" > /dev/null || wanted+=("$tool"); done
missing=()
for package in "${wanted[@]}"; do
  dpkg-query --show --showformat='${db:Status-Status}' "$package" 2> /dev/null | grep -qx installed || missing+=("$package")
done
if ((${#missing[@]})); then
  echo "installing ${missing[*]}"
  apt-get update -qq
  DEBIAN_FRONTEND=noninteractive apt-get install -y -qq --no-install-recommends "${missing[@]}" > /dev/null
fi

# Written last, so that an install that broke off is done again.
installed=node_modules/.installed
if ! sha256sum --check --status "$installed" 2> /dev/null; then
  echo "installing the workbench (about three minutes)"
  log=$(mktemp)
  trap 'rm -f "$log"' EXIT
  (
    # VS Code's own install scripts ask for Node 24, so that comes first.
    npm ci --ignore-scripts --no-audit --no-fund
    npm rebuild node
    PATH="$PWD/node_modules/node/bin:$PATH" npm rebuild argon2 code-server
    sha256sum package-lock.json > "$installed"
  ) > "$log" 2>&1 || { cat "$log"; exit 1; }
fi
