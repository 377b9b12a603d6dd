# Shared by the scripts, which source it first: where the checkout is, what must be there, what must be built.
# shellcheck shell=sh
set -eu

root=$(CDPATH='' cd -- "$(dirname -- "$0")/.." && pwd)
cd "$root"
# shellcheck source=docker-free-db/ports.sh
. docker-free-db/ports.sh

say() { printf '%s\n' "$*"; }
fail() { printf '%s\n' "$*" >&2; exit 1; }
db() { sh docker-free-db/db.sh "$@"; }

help_asked() { case ${1:-} in --help | -h) return 0 ;; *) return 1 ;; esac; }

# Settings of .env that the environment does not give already.
read_env() {
  [ -f .env ] || return 0
  while IFS='=' read -r key value || [ -n "$key" ]; do
    case $key in '' | *[!A-Za-z0-9_]*) continue ;; esac
    value=${value#[\"\']} value=${value%[\"\']}
    eval "is_set=\${$key+yes}"
    [ "$is_set" = yes ] || export "$key=$value"
  done <.env
}

# The port of the server: the one asked for, or the first free one from 8080 on.
choose_port() {
  if [ -n "${HEDDLE_PORT:-}" ]; then
    ! port_taken "$HEDDLE_PORT" || fail "Port $HEDDLE_PORT is taken by another program. Choose another with HEDDLE_PORT."
  else
    HEDDLE_PORT=$(free_port 8080) || fail "No free port near 8080. Name one with HEDDLE_PORT."
  fi
  export HEDDLE_PORT
}

require_node() {
  command -v node >/dev/null 2>&1 || fail "Node.js is not installed. Heddle needs version 20 or later: https://nodejs.org"
  major=$(node -p 'process.versions.node.split(".")[0]')
  [ "$major" -ge 20 ] || fail "Node.js $(node -v) is too old: install version 20 or later."
}

# require_debian COMMAND PACKAGES: installs the packages if the command is missing.
require_debian() {
  tool=$1
  shift
  command -v "$tool" >/dev/null 2>&1 && return 0
  command -v apt-get >/dev/null 2>&1 || fail "$tool is missing and this is no Debian: install what provides it ($*)."
  [ "$(id -u)" = 0 ] || fail "$tool is missing. Run as root: apt-get install --no-install-recommends $*"
  say "Installing from Debian: $* ..."
  apt-get update -q
  DEBIAN_FRONTEND=noninteractive apt-get install -q -y --no-install-recommends "$@" ||
    fail "apt-get could not install $*: see its message above; often it is the network or a full disk."
}

# Starts the database unless it runs, reads DATABASE_URL and remembers whether it is ours to stop.
start_database() {
  started_database=no
  if ! db status >/dev/null 2>&1; then
    [ -n "${DATABASE_URL:-}" ] || db install
    db start
    started_database=yes
  fi
  DATABASE_URL=$(db url)
  export DATABASE_URL
}

stop_database() {
  [ "${started_database:-no}" = yes ] || return 0
  started_database=no
  (unset DATABASE_URL && db stop)
}

# Packages of npm, again only when the lock file has changed since.
install_modules() {
  cmp -s package-lock.json node_modules/.installed-lock && return 0
  say "Installing npm packages (npm ci, about a minute) ..."
  npm ci --no-audit --no-fund --loglevel=error
  cp package-lock.json node_modules/.installed-lock
}

# build NAME OUTPUT SOURCES... -- COMMAND...: runs the command when the sources differ from those of the last build.
build() {
  name=$1 output=$2
  shift 2
  sources=''
  while [ "$1" != -- ]; do sources="$sources $1"; shift; done
  shift
  # shellcheck disable=SC2086 # a list of folders without blanks
  now=$(find $sources package-lock.json -type f -printf '%p %s %T@\n' | sort | cksum)
  [ "$(cat "$output/.sources" 2>/dev/null || true)" != "$now" ] || return 0
  say "Building $name ..."
  rm -rf "$output"
  "$@" || fail "$name could not be built: see the messages above."
  printf '%s\n' "$now" >"$output/.sources"
}

build_all() {
  build 'the engine (shared)' shared/dist shared/src shared/tsconfig.build.json -- npm run --silent build -w shared
  build 'the server (apps/api)' apps/api/dist shared/src apps/api/src apps/api/tsconfig.build.json -- npm run --silent build -w apps/api
  build 'the client (apps/web)' apps/web/dist shared/src apps/web/src apps/web/public apps/web/index.html apps/web/vite.config.ts fonts \
    -- npm run --silent build -w apps/web
}

# Waits until the server answers or its process has ended: wait_for_server PID PORT
wait_for_server() {
  tries=0
  until node -e 'fetch(process.argv[1]).then((reply) => process.exit(reply.ok ? 0 : 1), () => process.exit(1))' \
    "http://127.0.0.1:$2/api/health" 2>/dev/null; do
    kill -0 "$1" 2>/dev/null || return 1
    tries=$((tries + 1))
    [ "$tries" -lt 300 ] || return 1
    [ $((tries % 25)) -ne 0 ] || say "Waiting for the server to answer ..."
    sleep 0.2
  done
}
