#!/bin/sh
# A sweep cut into slices for GNU parallel, here or on other machines (parallel --sshlogin ...), and joined:
#   sh sweep-parallel.sh FLOWSHEET SLICES TABLE SWEEP-OPTIONS...
# Run again after any stop it goes on where it was: --resume.
# Where looptally is not installed for all: LOOPTALLY='npx looptally' sh sweep-parallel.sh ...
set -eu
: "${LOOPTALLY:=looptally}"
flowsheet=$1 slices=$2 table=$3
shift 3
kind=${table##*.}
seq "$slices" | parallel --will-cite --halt now,fail=1 --quote \
  $LOOPTALLY sweep "$flowsheet" "$@" --part "{}/$slices" --workers 1 --resume --quiet --out "$table.{}.$kind"
# shellcheck disable=SC2046,SC2086
$LOOPTALLY gather $(seq -f "$table.%g.$kind" "$slices") --out "$table"
rm -f $(seq -f "$table.%g.$kind" "$slices")
