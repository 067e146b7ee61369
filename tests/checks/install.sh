#!/bin/sh
# Installs into an empty folder, moves it, and asks the installed program for its materials from elsewhere.
set -eu
build=$1
prefix=$(mktemp -d)
trap 'rm -rf "$prefix"' EXIT
cmake --install "$build" --prefix "$prefix/first" >/dev/null
mv "$prefix/first" "$prefix/moved"
cd /
listing=$("$prefix/moved/bin/stillcoat" materials tantala-ibs)
case "$listing" in
    *"$prefix/moved/share/stillcoat/materials/tantala-ibs.toml"*) echo "installed program found its own materials" ;;
    *) echo "the installed program did not use its own materials:"; echo "$listing" | head -5; exit 1 ;;
esac
test -f "$prefix/moved/share/stillcoat/schemas/appraisal.schema.json"
# A draft of the installed program leads editors to the schema beside it.
first=$("$prefix/moved/bin/stillcoat" draft | head -n 1)
test -f "${first#\#:schema }"
