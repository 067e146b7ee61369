#!/bin/sh
# Installs what is missing from Debian, builds, and runs every test: the dev build with all tests, the
# same under sanitizers, clang-tidy, and an installation into an empty folder.
set -eu
cd "$(dirname "$0")/.."
. examples/packages.sh
install_missing $build_packages $test_packages
for workflow in dev sanitize tidy; do
    echo "== cmake --workflow --preset $workflow"
    cmake --workflow --preset "$workflow"
done
echo "== all tests passed"
