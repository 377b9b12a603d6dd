#!/bin/sh
# Puts a backup in the place of what the database holds now.
. "$(dirname -- "$0")/lib.sh"

if help_asked "$@"; then
  cat <<'TEXT'
Usage: sh scripts/restore.sh FILE [--yes]

Replaces everything in Heddle's database by the backup FILE (made by scripts/backup.sh). Stop Heddle first. What is in
the database now is saved to .data/backups before. Asks first, unless --yes is given.
The database of DATABASE_URL is taken if that is set, else the private one.
TEXT
  exit 0
fi

file=${1:-}
[ -n "$file" ] || fail "Name the backup: sh scripts/restore.sh FILE (see --help)"
[ -f "$file" ] || fail "There is no file $file."
gzip -t "$file" || fail "$file is damaged or no backup of Heddle; nothing was changed."
[ "$(gzip -dc "$file" | tail -n 1)" = '-- Dump completed' ] || fail "$file is not a complete backup; nothing was changed."
read_env
start_database
trap stop_database EXIT
if [ "${2:-}" != --yes ]; then
  printf 'Replace everything in the database by %s? Type yes: ' "$file"
  read -r answer
  [ "$answer" = yes ] || fail "Nothing was changed."
fi
sh scripts/backup.sh
say "Restoring $file ..."
db empty
gzip -dc "$file" | db load || fail "The backup could not be read in. The state before is in .data/backups: restore that file."
say "Restored."
