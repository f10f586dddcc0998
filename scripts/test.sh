#!/usr/bin/env bash
# Runs every check on this machine: installs what the tests need, then hands over to scripts/test.ts.
set -euo pipefail
cd "$(dirname "${BASH_SOURCE[0]}")/.."
. scripts/lib/install.sh

need_node
need_postgresql
missing=()
command -v chromium >/dev/null || missing+=(chromium)
command -v mosquitto >/dev/null || [ -x /usr/sbin/mosquitto ] || missing+=(mosquitto)
[ ${#missing[@]} = 0 ] || install_debian "${missing[@]}"
need_packages
exec node --import tsx scripts/test.ts "$@"
