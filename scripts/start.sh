#!/usr/bin/env bash
# Starts all of Fallbright on this machine, on loopback: installs what is missing, then hands over to scripts/start.ts.
set -euo pipefail
cd "$(dirname "${BASH_SOURCE[0]}")/.."
. scripts/lib/install.sh

need_node
need_postgresql
need_packages
exec node --import tsx scripts/start.ts "$@"
