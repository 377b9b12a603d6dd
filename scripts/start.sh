#!/bin/sh
# npm start: everything from a bare checkout to a running Heddle on one port.
. "$(dirname -- "$0")/lib.sh"

if help_asked "$@"; then
  cat <<'TEXT'
Usage: npm start

Installs what is missing (MariaDB from Debian's packages, npm packages), builds what has changed, starts the private
database, brings its tables up to date, makes the demonstration lab if the database is empty and serves Heddle on one
port until Ctrl-C, which stops the database too. A second start takes seconds.

Settings, from the environment or from .env (see .env.example for all of them):
  HEDDLE_PORT    the port; default 8080, or the next free one
  HEDDLE_DATA    where the database and the mail of the local catcher live; default .data
  DATABASE_URL   a MariaDB of your own instead of the private one
TEXT
  exit 0
fi

require_node
read_env
install_modules
build_all
start_database
trap stop_database EXIT
choose_port

say "Starting the server ..."
node apps/api/dist/main.js &
server=$!
trap 'kill -TERM $server 2>/dev/null' INT TERM HUP
if wait_for_server "$server" "$HEDDLE_PORT"; then
  say ''
  say "Heddle is ready: http://localhost:$HEDDLE_PORT      (stop with Ctrl-C)"
  [ -n "${HEDDLE_SMTP_URL:-}" ] || say "Mail that it sends is caught: http://localhost:$HEDDLE_PORT/api/mail"
  accounts=${HEDDLE_DATA:-.data}/demo-accounts
  if [ -f "$accounts" ]; then
    say ''
    say 'Accounts of the demonstration lab (address, password):'
    cat "$accounts"
  fi
fi
status=0
while kill -0 "$server" 2>/dev/null; do
  status=0
  wait "$server" || status=$?
done
[ "$status" -lt 128 ] || status=0
exit "$status"
