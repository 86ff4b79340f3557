#!/usr/bin/env bash
# Puts the distribution's Chromium on this machine, for the tests and the bench of the live page. Nothing else needs it.
set -euo pipefail

for name in chromium chromium-browser google-chrome; do
  if found=$(command -v "$name"); then
    echo "a browser is there already: $found"
    exit 0
  fi
done
if ! command -v apt-get >/dev/null; then
  echo "no apt-get on this machine: install Chromium by its own means, or set LOOPTALLY_BROWSER to a Chromium or Chrome" >&2
  exit 1
fi
if [ "$(id -u)" -ne 0 ]; then
  echo "installing needs the rights of root: run it with sudo, or set LOOPTALLY_BROWSER to a Chromium or Chrome" >&2
  exit 1
fi
install() { DEBIAN_FRONTEND=noninteractive apt-get install -y --no-install-recommends chromium; }
# The lists of packages of a fresh machine may be empty or old.
install || { apt-get update && install; }
