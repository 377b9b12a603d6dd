#!/bin/sh
# npm run dev: the same as npm start with hot reload of all three workspaces.
. "$(dirname -- "$0")/lib.sh"

if help_asked "$@"; then
  cat <<'TEXT'
Usage: npm run dev

Starts the database, compiles shared and apps/api at each change and restarts the server, and serves the client with
Vite, which reloads what changes and reads shared from its sources. Ctrl-C stops all of it.

Settings as for npm start, and:
  HEDDLE_WEB_PORT   the port to open in the browser; default 5173, or the next free one
TEXT
  exit 0
fi

require_node
read_env
install_modules
build_all
start_database
choose_port
HEDDLE_WEB_PORT=${HEDDLE_WEB_PORT:-$(free_port 5173)}

children=''
stop_all() {
  trap - INT TERM HUP
  # shellcheck disable=SC2086 # a list of process numbers
  kill $children 2>/dev/null || true
  wait
  stop_database
}
trap stop_all EXIT
trap 'exit 0' INT TERM HUP

run() { "$@" & children="$children $!"; }
tsc="node node_modules/typescript/bin/tsc --watch --preserveWatchOutput"
$tsc -p shared/tsconfig.build.json & children="$children $!"
$tsc -p apps/api/tsconfig.build.json & children="$children $!"
run node --watch --watch-preserve-output apps/api/dist/main.js
(cd apps/web && HEDDLE_API="http://127.0.0.1:$HEDDLE_PORT" exec node ../../node_modules/vite/bin/vite.js --port "$HEDDLE_WEB_PORT" --strictPort) &
children="$children $!"
say "Open http://localhost:$HEDDLE_WEB_PORT   (the server itself listens on $HEDDLE_PORT; stop with Ctrl-C)"
wait
