# Sourced by start.sh and test.sh: what a fresh Debian machine with Node.js 20 lacks.

stop_with() { printf '%s\n' "$*" >&2; exit 1; }

# Runs a long step, its output in a log, and says how long it took.
step() {
  local what=$1 began=$SECONDS log
  shift
  log=$(mktemp)
  printf '  %s ...' "$what"
  if "$@" >"$log" 2>&1; then
    printf ' done in %s s\n' "$((SECONDS - began))"
    rm -f "$log"
  else
    printf ' failed\n' >&2
    tail -n 20 "$log" >&2
    stop_with "\"$what\" failed; its whole output is in $log."
  fi
}

need_node() {
  command -v node >/dev/null || stop_with 'Node.js is missing. Install Node.js 20.19 or newer, then start again.'
  node -e 'const [a, b] = process.versions.node.split(".").map(Number); process.exit(a > 20 || (a === 20 && b >= 19) ? 0 : 1)' ||
    stop_with "Node.js $(node --version) is too old. Install Node.js 20.19 or newer, then start again."
}

APT_LISTS_READ=
install_debian() {
  [ "$(id -u)" = 0 ] || stop_with "Missing: $*. Install with: sudo apt-get install $*"
  command -v apt-get >/dev/null || stop_with "Missing: $*. This machine has no apt-get; install them by hand, then start again."
  if [ -z "$APT_LISTS_READ" ]; then
    step 'Reading the package lists' apt-get update -q
    APT_LISTS_READ=1
  fi
  step "Installing $*" env DEBIAN_FRONTEND=noninteractive apt-get install -y -q --no-install-recommends "$@"
}

need_postgresql() {
  [ -n "${DATABASE_URL:-}" ] && return
  compgen -G '/usr/lib/postgresql/*/bin/initdb' >/dev/null && return
  # Debian's package would make and start a cluster of its own; ours lives under DATA_DIR.
  if [ "$(id -u)" = 0 ] && [ ! -e /etc/postgresql-common/createcluster.conf ]; then
    mkdir -p /etc/postgresql-common
    echo 'create_main_cluster = false' >/etc/postgresql-common/createcluster.conf
  fi
  install_debian postgresql
}

# Node packages from the lock file, again only when the lock changes.
need_packages() {
  local stamp=node_modules/.installed-lock
  if [ -f "$stamp" ] && cmp -s package-lock.json "$stamp"; then return; fi
  step 'Installing the Node packages' npm ci --no-progress
  cp package-lock.json "$stamp"
}
