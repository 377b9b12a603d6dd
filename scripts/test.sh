#!/bin/sh
# npm test: every check and every test, on a database of its own.
. "$(dirname -- "$0")/lib.sh"

if help_asked "$@"; then
  cat <<'TEXT'
Usage: npm test [-- STEP...]

Installs what is missing (MariaDB, Chromium and poppler-utils from Debian's packages, npm packages), starts a database
of its own in .data/test on a port of its own, and runs all steps, going on after one that fails: formatting, lint,
types, dead code, duplicates, generated files, unit tests of shared, scripts and apps/web, tests of apps/api, builds,
and the main job in a real browser. Ends with `N passed, N failed`: all test cases, and one for each other check.
With names of steps (see the list that `npm test -- --list` prints) only those run.
TEXT
  exit 0
fi

require_node
install_modules
[ "${1:-}" != --list ] || exec node --import tsx --conditions=heddle-src scripts/test/run.ts --list
require_debian chromium chromium
require_debian pdftotext poppler-utils
unset DATABASE_URL HEDDLE_DB_PORT HEDDLE_PORT
HEDDLE_DATA=$root/.data/test
export HEDDLE_DATA
start_database
trap stop_database EXIT
trap 'exit 130' INT TERM HUP
private() { (unset DATABASE_URL && db "$@"); }
for name in api e2e; do private fresh "heddle_$name"; done
API_DATABASE_URL=$(private url heddle_api)
E2E_DATABASE_URL=$(private url heddle_e2e)
export API_DATABASE_URL E2E_DATABASE_URL
node --import tsx --conditions=heddle-src scripts/test/run.ts "$@"
