#!/bin/sh
# Writes the whole database to one compressed file.
. "$(dirname -- "$0")/lib.sh"

if help_asked "$@"; then
  cat <<'TEXT'
Usage: sh scripts/backup.sh [FILE]

Writes all of Heddle's database (accounts, systems, runs with their results, reviews, collections) as compressed SQL to
FILE, by default .data/backups/heddle-DATE-TIME.sql.gz. Heddle may go on running: the copy is of one moment. The file
holds password hashes and the lab's work, so it is readable by its owner only; keep copies on another machine.
The database of DATABASE_URL is taken if that is set, else the private one.
TEXT
  exit 0
fi

umask 077
read_env
file=${1:-${HEDDLE_DATA:-.data}/backups/heddle-$(date +%Y%m%d-%H%M%S).sql.gz}
mkdir -p "$(dirname -- "$file")"
part=$file.part
start_database
trap 'rm -f "$part" "$part.gz"; stop_database' EXIT
say "Reading the database ..."
db dump >"$part" || fail "The database could not be read; no backup was made."
[ "$(tail -n 1 "$part")" = '-- Dump completed' ] || fail "The dump is not complete (is the disk full?); no backup was made."
gzip "$part"
mv "$part.gz" "$file"
say "Backup written: $file ($(du -h "$file" | cut -f1))"
