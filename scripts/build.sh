#!/bin/sh
# Builds shared, apps/api and apps/web where their sources have changed.
. "$(dirname -- "$0")/lib.sh"

if help_asked "$@"; then
  say 'Usage: sh scripts/build.sh     builds shared, apps/api and apps/web where their sources have changed'
  exit 0
fi

install_modules
build_all
